/** Many seeded runs of one scenario: is the filter's error what its covariance says? */
import { scenarioSchema, type ImuGrade, type ScenarioInput } from '@/shared/contracts/scenarios';
import { parametersSchema, type Parameters, type ParametersInput } from '@/shared/contracts/parameters';
import { radToDeg } from '@/shared/units';
import { createRandom } from '@/workers/engine/random';
import { emptyError, ReferenceReader, stateError } from '@/workers/engine/run/reference';
import { Run } from '@/workers/engine/run/run';
import { ACCEL_BIAS, GYRO_BIAS, STATES } from '@/workers/engine/filter/states';
import type { ImuModel } from '@/workers/engine/simulator/grades';
import { imuModel, simulateScenario, type SimulatedRecording } from '@/workers/engine/simulator/scenario';
import { mahalanobis } from '@/workers/engine/statistics/consistency';
import { NAV_ACCEL_BIAS, NAV_GYRO_BIAS } from '@/workers/engine/strapdown/navigation-state';

export interface MonteCarloCase {
  name: string;
  scenario: ScenarioInput;
  parameters?: ParametersInput;
  /** Given: the start is truth plus errors drawn from stated σ. Found: the engine aligns itself. */
  start: 'given' | 'found';
  /** Windows without GNSS, s. */
  outagesS: readonly (readonly [number, number])[];
  /** How the simulated biases wander; the filter's default model is exact for the random walk. */
  wander?: ImuModel['wander'];
  /** Epochs before this are not counted, s. */
  settleS: number;
  /** The smoother too. */
  smooth?: boolean;
}

const BLOCKS = { position: [0, 3], velocity: [3, 3], attitude: [6, 3], gyroBias: [9, 3], accelBias: [12, 3], all: [0, 15] } as const; // prettier-ignore
export type Block = keyof typeof BLOCKS;
export const BLOCK_NAMES = Object.keys(BLOCKS) as Block[];

export interface MonteCarloResult {
  /** Per run: mean over its epochs of the NEES of each block. */
  nees: Record<Block, number[]>;
  /** The same of the smoothed solution, its stretches without GNSS included; empty where it was not asked for. */
  smoothedNees: Record<Block, number[]>;
  /** Per run: mean NIS of accepted and refused fixes alike. */
  nis: { position: number[]; velocity: number[] };
  rejected: number;
  measured: number;
  /** Every window: seconds since its start → horizontal error and its predicted 1σ, m. */
  drift: Map<number, { actual: number; predicted: number }[]>;
  failures: string[];
}

/** The filter's parameters that describe a grade exactly. */
export function matchedParameters(
  grade: ImuGrade,
  scenario: ScenarioInput,
  other: ParametersInput = {},
): Parameters {
  const model = imuModel(grade, scenario.imuErrors);
  const floor = 1e-8; // a perfect sensor still needs some noise
  return parametersSchema.parse({
    ...other,
    gyro: {
      whiteNoiseRadPerSqrtS: Math.max(model.gyroWhiteNoiseRadPerSqrtS, floor),
      biasInstabilityRadPerS: Math.max(model.gyroBiasInstabilityRadPerS, floor),
      biasCorrelationTimeS: model.gyroBiasCorrelationTimeS,
      turnOnBiasSigmaRadPerS: Math.max(model.gyroTurnOnBiasSigmaRadPerS, floor),
      ...other.gyro,
    },
    accel: {
      whiteNoiseMPerSPerSqrtS: Math.max(model.accelWhiteNoiseMPerSPerSqrtS, floor),
      biasInstabilityMPerS2: Math.max(model.accelBiasInstabilityMPerS2, floor),
      biasCorrelationTimeS: model.accelBiasCorrelationTimeS,
      turnOnBiasSigmaMPerS2: Math.max(model.accelTurnOnBiasSigmaMPerS2, floor),
      ...other.accel,
    },
  });
}

/** Start = truth + errors drawn from these σ: north, east, down (m, m/s); roll, pitch, yaw (rad). */
const START_SIGMA = { position: [2, 2, 3], velocity: [0.2, 0.2, 0.2], attitude: [0.01, 0.01, 0.03] } as const;

function givenStart({ reference }: SimulatedRecording, seed: number): Parameters['initial'] {
  const random = createRandom(seed).split('start');
  const draw = (sigma: readonly [number, number, number]) =>
    sigma.map((s) => s * random.normal()) as [number, number, number];
  const p = draw(START_SIGMA.position);
  const v = draw(START_SIGMA.velocity);
  const a = draw(START_SIGMA.attitude);
  const [lat, lon] = [reference.latRad[0]!, reference.lonRad[0]!];
  const [roll, pitch, yaw] = reference.attitude.map((column) => column[0]!) as [number, number, number];
  return {
    timeS: 0,
    position: {
      latDeg: radToDeg(lat + p[0] / 6.37e6),
      lonDeg: radToDeg(lon + p[1] / (6.39e6 * Math.cos(lat))),
      heightM: reference.heightM[0]! - p[2],
    },
    velocityNedMPerS: reference.velocityNed.map((column, i) => column[0]! + v[i]!) as [
      number,
      number,
      number,
    ],
    attitude: {
      rollDeg: radToDeg(roll + a[0]),
      pitchDeg: radToDeg(pitch + a[1]),
      yawDeg: radToDeg(yaw + a[2]),
    },
    positionSigmaNedM: [...START_SIGMA.position],
    velocitySigmaNedMPerS: [...START_SIGMA.velocity],
    attitudeSigmaDeg: START_SIGMA.attitude.map(radToDeg) as [number, number, number],
    courseSpeedMPerS: 2,
  };
}

const emptyNees = () =>
  Object.fromEntries(BLOCK_NAMES.map((block) => [block, []])) as unknown as Record<Block, number[]>;

export function monteCarlo(study: MonteCarloCase, runs: number, firstSeed = 1): MonteCarloResult {
  const result: MonteCarloResult = {
    nees: emptyNees(),
    smoothedNees: emptyNees(),
    nis: { position: [], velocity: [] },
    rejected: 0,
    measured: 0,
    drift: new Map(),
    failures: [],
  };
  for (let seed = firstSeed; seed < firstSeed + runs; seed += 1) {
    const scenario = scenarioSchema.parse({ ...study.scenario, seed });
    const recording = simulateScenario(scenario, { imu: { wander: study.wander ?? 'gauss-markov' } });
    const parameters = matchedParameters(scenario.imuGrade, study.scenario, study.parameters);
    if (study.start === 'given') parameters.initial = givenStart(recording, seed);
    try {
      oneRun(recording, parameters, scenario.leverArmM, study, result);
    } catch (error) {
      result.failures.push(`seed ${seed}: ${(error as Error).message}`);
    }
  }
  return result;
}

function oneRun(
  recording: SimulatedRecording,
  parameters: Parameters,
  leverArmM: readonly [number, number, number],
  study: MonteCarloCase,
  result: MonteCarloResult,
): void {
  const outages = study.outagesS.map(([startS, endS]) => ({ startS, endS, withhold: 'gnss' as const }));
  const smooth = study.smooth === true;
  const run = new Run(recording, { parameters, leverArmM, outages, outputRateHz: 1, smooth });
  const error = new ErrorVector(recording);
  const coasts = (timeS: number) => study.outagesS.some(([from, to]) => timeS >= from && timeS < to + 5);
  const filtered = new NeesMeans(error, (timeS) => timeS >= study.settleS && !coasts(timeS));
  const smoothed = new NeesMeans(error, (timeS) => timeS >= study.settleS);
  // The run hands every kept state with its covariance to its comparison with truth: listen there.
  run.truth!.add = filtered.add;
  if (smooth) run.smoothedTruth!.add = smoothed.add;
  while (!run.advance(100_000));
  const finished = run.finish();
  filtered.give(result.nees);
  if (smooth) smoothed.give(result.smoothedNees);
  for (const group of ['position', 'velocity'] as const) {
    const table = finished[group];
    const nis = table.nis.filter((_, i) => table.timeS[i]! >= study.settleS);
    result.nis[group].push(nis.reduce((sum, value) => sum + value, 0) / nis.length);
    result.measured += nis.length;
    result.rejected += table.accepted.filter((ok, i) => ok === 0 && table.timeS[i]! >= study.settleS).length;
  }
  for (const outage of finished.summary.outages)
    for (const point of outage.points) {
      const list = result.drift.get(point.afterS) ?? [];
      list.push({ actual: point.horizontalM, predicted: point.predictedHorizontalM });
      result.drift.set(point.afterS, list);
    }
}

/** All fifteen errors, computed minus true, at an IMU epoch. */
class ErrorVector {
  private readonly reader: ReferenceReader;
  private readonly error = emptyError();
  private readonly x = new Float64Array(STATES);

  constructor(private readonly recording: SimulatedRecording) {
    this.reader = new ReferenceReader(recording.reference);
  }

  at(timeS: number, nav: Float64Array): Float64Array {
    const { recording, error, x } = this;
    this.reader.read(timeS);
    stateError(nav, this.reader.state, error);
    x.set(error.position, 0);
    x.set(error.velocity, 3);
    x.set(error.attitude, 6);
    const k = Math.round(timeS / (recording.imu.timeS[1]! - recording.imu.timeS[0]!));
    for (const i of [0, 1, 2] as const) {
      x[GYRO_BIAS + i] = nav[NAV_GYRO_BIAS + i]! - recording.gyroBias[i][k]!;
      x[ACCEL_BIAS + i] = nav[NAV_ACCEL_BIAS + i]! - recording.accelBias[i][k]!;
    }
    return x;
  }
}

/** Means of a run's NEES over the epochs that count. */
class NeesMeans {
  private readonly sums = new Map(BLOCK_NAMES.map((block) => [block, 0]));
  private count = 0;

  constructor(
    private readonly error: ErrorVector,
    private readonly counts: (timeS: number) => boolean,
  ) {}

  readonly add = (timeS: number, nav: Float64Array, p: Float64Array): void => {
    if (!this.counts(timeS)) return;
    const x = this.error.at(timeS, nav);
    for (const block of BLOCK_NAMES)
      this.sums.set(block, this.sums.get(block)! + blockNees(x, p, BLOCKS[block][0], BLOCKS[block][1]));
    this.count += 1;
  };

  give(to: Record<Block, number[]>): void {
    for (const [block, sum] of this.sums) to[block].push(sum / this.count);
  }
}

function blockNees(x: Float64Array, p: Float64Array, first: number, size: number): number {
  const s = new Float64Array(size * size);
  for (let r = 0; r < size; r += 1)
    for (let c = 0; c < size; c += 1) s[r * size + c] = p[(first + r) * STATES + first + c]!;
  return mahalanobis(x.subarray(first, first + size), s).squared;
}
