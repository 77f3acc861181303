/** The filter with states behind the fifteen over a flight whose sensors have scale factor errors, the lever arm misjudged. */
import type { ParametersInput } from '@/shared/contracts/parameters';
import { align } from '@/workers/engine/alignment/align';
import { ErrorStateFilter } from '@/workers/engine/filter/error-state-filter';
import { prepareFixes } from '@/workers/engine/filter/fixes';
import { STATES } from '@/workers/engine/filter/states';
import { createRandom } from '@/workers/engine/random';
import { emptyError, ReferenceReader, stateError } from '@/workers/engine/run/reference';
import { NAV_ACCEL_BIAS, NAV_GYRO_BIAS } from '@/workers/engine/strapdown/navigation-state';
import { nees, simulateCase } from './monte-carlo';

const SILENT = { onInnovation: () => undefined, onWarning: () => undefined };
const ASSUMED_ARM = [1, -0.5, -1.2] as const;

/** 1σ of what is wrong: scale factors (1), lever arm (m). */
export interface TrueErrors {
  gyroScale: number;
  accelScale: number;
  leverArm: number;
}
const NONE: TrueErrors = { gyroScale: 0, accelScale: 0, leverArm: 0 };

/** Error (computed minus true) and covariance of all states carried. */
export interface OptionalCase {
  size: number;
  error: Float64Array;
  p: Float64Array;
}

export function runCase(
  seed: number,
  states: ParametersInput['states'],
  durationS: number,
  sigma: TrueErrors = NONE,
): OptionalCase {
  const random = createRandom(seed + 7000);
  const arm = ASSUMED_ARM.map((l) => l + sigma.leverArm * random.normal()) as [number, number, number];
  const simulated = simulateCase(
    {
      motion: 'fixed-wing', durationS, imuRateHz: 50, staticStartS: 20, imuGrade: 'tactical', seed, leverArmM: arm,
      gnss: { positionSigmaHorizontalM: 0.1, positionSigmaVerticalM: 0.15 },
    },
    { states },
    { imu: { gyroScaleSigma: sigma.gyroScale, accelScaleSigma: sigma.accelScale, wander: 'random-walk' } },
  ); // prettier-ignore
  const { recording, parameters } = simulated;
  const { imu, gnss, reference } = recording;
  const fixes = prepareFixes(gnss, parameters.gnss);
  const start = align(imu, fixes, parameters, ASSUMED_ARM);
  const filter = new ErrorStateFilter(
    imu, fixes, new Uint8Array(fixes.count), parameters, ASSUMED_ARM, SILENT,
  ); // prettier-ignore
  filter.start(start.sample, start.fix, start.nav, start.p);
  while (filter.sample < imu.timeS.length - 1) filter.advanceSample();
  const { layout, optional } = filter;
  const e = emptyError();
  const reader = new ReferenceReader(reference);
  if (!reader.read(filter.timeS)) throw new Error('No truth at the end.');
  const { nav } = filter.strapdown;
  stateError(nav, reader.state, e);
  const error = new Float64Array(layout.size);
  error.set([...e.position, ...e.velocity, ...e.attitude]);
  const value = (first: number, i: number) => optional!.values[first - STATES + i]!;
  for (let i = 0; i < 3; i += 1) {
    const axis = i as 0 | 1 | 2;
    error[9 + i] = nav[NAV_GYRO_BIAS + i]! - recording.gyroBias[axis][filter.sample]!;
    error[12 + i] = nav[NAV_ACCEL_BIAS + i]! - recording.accelBias[axis][filter.sample]!;
    if (layout.gyroScale >= 0)
      error[layout.gyroScale + i] = value(layout.gyroScale, i) - recording.gyroScale[axis];
    if (layout.accelScale >= 0)
      error[layout.accelScale + i] = value(layout.accelScale, i) - recording.accelScale[axis];
    if (layout.leverArm >= 0) error[layout.leverArm + i] = value(layout.leverArm, i) - arm[i]!;
  }
  return { size: layout.size, error, p: filter.covarianceNow(new Float64Array(layout.size ** 2)) };
}

/** NEES of `count` states from `first` on. */
export const optionalNees = ({ error, p }: OptionalCase, first: number, count: number): number =>
  nees(error, p, first, count);
