/** Simulated drives as what the comparison of IMU and GNSS works on. */
import { scenarioSchema, type ScenarioInput } from '@/shared/contracts/scenarios';
import { MotionIntegrator, type MotionIntegrals } from '@/workers/engine/motion-match/motion-integrals';
import type { GnssOptions } from '@/workers/engine/simulator/gnss';
import { simulateScenario } from '@/workers/engine/simulator/scenario';
import type { ImuColumns } from '@/workers/engine/types';

export function integrals({ timeS, gyro, accel }: ImuColumns): MotionIntegrals {
  const integrator = new MotionIntegrator();
  timeS.forEach((t, k) => {
    integrator.add(
      t,
      Float64Array.from([...gyro, ...accel], (axis) => axis[k]!),
    );
  });
  return integrator.finish();
}

/** Five minutes of road at one fix a second unless overridden. */
export function drive(input: ScenarioInput, gnss: Partial<GnssOptions> = {}) {
  const scenario = {
    motion: 'road' as const,
    durationS: 300,
    imuRateHz: 50,
    gnssRateHz: 1,
    staticStartS: 10,
  };
  return simulateScenario(scenarioSchema.parse({ ...scenario, ...input }), { gnss });
}
