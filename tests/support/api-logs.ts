/** Small paired logs as text, simulated once a process. */
import { scenarioSchema, type ScenarioInput } from '@/shared/contracts/scenarios';
import { radToDeg } from '@/shared/units';
import { simulateScenario } from '@/workers/engine/simulator/scenario';

export interface Logs {
  imu: string | Uint8Array;
  gnss: string | Uint8Array;
  reference?: string | Uint8Array;
}

export const IMU_HEADER =
  'time_s,gyro_x_rad_s,gyro_y_rad_s,gyro_z_rad_s,accel_x_m_s2,accel_y_m_s2,accel_z_m_s2';
export const GNSS_HEADER = 'time_s,lat_deg,lon_deg,height_m,vn_m_s,ve_m_s,vd_m_s';

const kept = new Map<string, { imu: string; gnss: string }>();

/** A road drive of 80 s at 50 Hz unless overridden. */
export function smallLogs(overrides: ScenarioInput = {}): { imu: string; gnss: string } {
  const scenario = { durationS: 80, imuRateHz: 50, gnssRateHz: 2, staticStartS: 10, seed: 11, ...overrides };
  const key = JSON.stringify(scenario);
  const made = kept.get(key) ?? makeLogs(scenario);
  kept.set(key, made);
  return made;
}

function makeLogs(input: ScenarioInput): { imu: string; gnss: string } {
  const { imu, gnss } = simulateScenario(scenarioSchema.parse(input));
  const place = [gnss.latRad.map(radToDeg), gnss.lonRad.map(radToDeg), gnss.heightM];
  return {
    imu: csv(IMU_HEADER, [imu.timeS, ...imu.gyro, ...imu.accel]),
    gnss: csv(GNSS_HEADER, [gnss.timeS, ...place, ...gnss.velocityNed]),
  };
}

function csv(header: string, columns: Float64Array[]): string {
  const [first] = columns;
  const rows = Array.from(first ?? [], (_, row) => columns.map((column) => column[row]).join(','));
  return `${header}\n${rows.join('\n')}\n`;
}
