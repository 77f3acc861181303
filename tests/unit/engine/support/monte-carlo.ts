/** Runs the filter over simulated recordings and compares states and covariance with what is true. */
import { parametersSchema, type Parameters, type ParametersInput } from '@/shared/contracts/parameters';
import { scenarioSchema, type Scenario, type ScenarioInput } from '@/shared/contracts/scenarios';
import { align } from '@/workers/engine/alignment/align';
import { ErrorStateFilter } from '@/workers/engine/filter/error-state-filter';
import type { FilterListener } from '@/workers/engine/filter/filter-types';
import { prepareFixes, withheldBy } from '@/workers/engine/filter/fixes';
import { sizeOf, STATES } from '@/workers/engine/filter/states';
import { emptyError, ReferenceReader, stateError } from '@/workers/engine/run/reference';
import {
  imuModel,
  simulateScenario,
  type ScenarioExtras,
  type SimulatedRecording,
} from '@/workers/engine/simulator/scenario';
import { mahalanobis } from '@/workers/engine/statistics/consistency';
import { NAV_ACCEL_BIAS, NAV_GYRO_BIAS } from '@/workers/engine/strapdown/navigation-state';
import type { RunRequest } from '@/workers/engine/types';

/** Parameters that describe a scenario's own sensors. */
export function matchedParameters(scenario: Scenario, more: ParametersInput = {}): Parameters {
  const m = imuModel(scenario.imuGrade, scenario.imuErrors);
  // Quantisation adds its own white noise: step²/12 a sample.
  const white = (density: number, step: number) =>
    Math.hypot(density, step / Math.sqrt(12 * scenario.imuRateHz));
  return parametersSchema.parse({
    ...more,
    gyro: {
      whiteNoiseRadPerSqrtS: Math.max(1e-9, white(m.gyroWhiteNoiseRadPerSqrtS, m.gyroStepRadPerS)),
      turnOnBiasSigmaRadPerS: Math.max(1e-10, m.gyroTurnOnBiasSigmaRadPerS),
      biasInstabilityRadPerS: Math.max(1e-10, m.gyroBiasInstabilityRadPerS),
      biasCorrelationTimeS: m.gyroBiasCorrelationTimeS,
      ...more.gyro,
    },
    accel: {
      whiteNoiseMPerSPerSqrtS: Math.max(1e-8, white(m.accelWhiteNoiseMPerSPerSqrtS, m.accelStepMPerS2)),
      turnOnBiasSigmaMPerS2: Math.max(1e-9, m.accelTurnOnBiasSigmaMPerS2),
      biasInstabilityMPerS2: Math.max(1e-9, m.accelBiasInstabilityMPerS2),
      biasCorrelationTimeS: m.accelBiasCorrelationTimeS,
      ...more.accel,
    },
  });
}

export interface SimulatedCase {
  scenario: Scenario;
  recording: SimulatedRecording;
  parameters: Parameters;
}

export function simulateCase(
  scenario: ScenarioInput,
  parameters: ParametersInput = {},
  extras: ScenarioExtras = {},
): SimulatedCase {
  const complete = scenarioSchema.parse(scenario);
  return {
    scenario: complete,
    recording: simulateScenario(complete, extras),
    parameters: matchedParameters(complete, parameters),
  };
}

export function requestOf(
  { scenario, parameters }: SimulatedCase,
  more: Partial<RunRequest> = {},
): RunRequest {
  return { parameters, leverArmM: scenario.leverArmM, outages: [], outputRateHz: 10, ...more };
}

/** Errors (computed minus true), covariance and NEES of the filter at one time. */
export interface Snapshot {
  timeS: number;
  error: Float64Array;
  p: Float64Array;
  nees: { position: number; velocity: number; attitude: number; all: number };
}

export interface FilterRun {
  snapshots: Snapshot[];
  nis: { position: number[]; velocity: number[] };
  rejected: { position: number; velocity: number };
  warnings: string[];
}

/** Drives the filter itself and takes snapshots at the IMU samples next to the given times, s. */
export function runFilter(
  simulated: SimulatedCase,
  timesS: readonly number[],
  outages: RunRequest['outages'] = [],
): FilterRun {
  const { recording, parameters, scenario } = simulated;
  const { imu, gnss, reference } = recording;
  const fixes = prepareFixes(gnss, parameters.gnss);
  const alignment = align(imu, fixes, parameters, scenario.leverArmM);
  const result: FilterRun = {
    snapshots: [],
    nis: { position: [], velocity: [] },
    rejected: { position: 0, velocity: 0 },
    warnings: [],
  };
  const listener: FilterListener = {
    onInnovation: (group, _timeS, _axes, update, accepted) => {
      if (group !== 'position' && group !== 'velocity') return;
      if (accepted) result.nis[group].push(update.nis);
      else result.rejected[group] += 1;
    },
    onWarning: (code) => result.warnings.push(code),
  };
  const filter = new ErrorStateFilter(
    imu, fixes, withheldBy(fixes, outages), parameters, scenario.leverArmM, listener,
  ); // prettier-ignore
  filter.start(alignment.sample, alignment.fix, alignment.nav, alignment.p);
  const reader = new ReferenceReader(reference);
  let next = 0;
  for (;;) {
    while (next < timesS.length && filter.timeS >= timesS[next]! - 1e-6) {
      result.snapshots.push(snapshot(filter, reader, recording));
      next += 1;
    }
    if (next >= timesS.length || filter.sample >= imu.timeS.length - 1) break;
    filter.advanceSample();
  }
  return result;
}

function snapshot(
  filter: ErrorStateFilter,
  reader: ReferenceReader,
  recording: SimulatedRecording,
): Snapshot {
  const p = filter.covarianceNow(new Float64Array(STATES * STATES));
  const { nav } = filter.strapdown;
  const e = emptyError();
  if (!reader.read(filter.timeS)) throw new Error(`No truth at ${filter.timeS} s.`);
  stateError(nav, reader.state, e);
  const k = filter.sample;
  const error = new Float64Array(STATES);
  error.set(e.position, 0);
  error.set(e.velocity, 3);
  error.set(e.attitude, 6);
  for (let i = 0; i < 3; i += 1) {
    error[9 + i] = nav[NAV_GYRO_BIAS + i]! - recording.gyroBias[i as 0 | 1 | 2][k]!;
    error[12 + i] = nav[NAV_ACCEL_BIAS + i]! - recording.accelBias[i as 0 | 1 | 2][k]!;
  }
  return {
    timeS: filter.timeS,
    error,
    p,
    nees: {
      position: nees(error, p, 0, 3),
      velocity: nees(error, p, 3, 3),
      attitude: nees(error, p, 6, 3),
      all: nees(error, p, 0, 15),
    },
  };
}

/** NEES of the `size` states from `first` on, scaled to unit variances first for the sake of digits. */
export function nees(error: Float64Array, p: Float64Array, first: number, size: number): number {
  const n = sizeOf(p);
  const sigma = Array.from({ length: size }, (_, i) => Math.sqrt(p[(first + i) * (n + 1)]!));
  const e = sigma.map((s, i) => error[first + i]! / s);
  const c: number[] = [];
  for (let i = 0; i < size; i += 1)
    for (let j = 0; j < size; j += 1) c.push(p[(first + i) * n + first + j]! / (sigma[i]! * sigma[j]!));
  return mahalanobis(e, c).squared;
}
