/** The whole of what is said about a run, from its tables. */
import { ENGINE_VERSION } from '../types';
import type { ChannelStatistics, GroupStatistics, RunSummary, StateVector } from '@/shared/contracts/runs';
import { formatNumber } from '@/shared/format';
import { averageBounds } from '../statistics/consistency';
import { autocorrelation, autocorrelationBand } from '../statistics/correlation';
import { chiSquaredQuantile, chiSquaredUpper } from '../statistics/distributions';
import type { SolutionTable } from '../types';
import { layoutOf } from '../filter/states';
import { optionalResults } from './optional-columns';
import { findings } from './findings';
import type { Run } from './run';
import type { InnovationWriter } from './tables';

/** Fewer accepted innovations than this give no autocorrelation. */
const MIN_FOR_LAG = 60;
const LAGS = 20;

export function summarise(run: Run): RunSummary {
  const { solution, position, velocity } = run;
  const [startS, endS] = run.extentS;
  const channels = [
    ...channelStatistics('position', 'm', position),
    ...channelStatistics('velocity', 'm/s', velocity),
  ];
  const groups = [groupStatistics('position', position), groupStatistics('velocity', velocity)];
  const last = solution.count - 1;
  const biases = (prefix: string, unit: string): [number, number, number] => [
    solution.table[`${prefix}_x_${unit}`]![last]!,
    solution.table[`${prefix}_y_${unit}`]![last]!,
    solution.table[`${prefix}_z_${unit}`]![last]!,
  ];
  const summary: Omit<RunSummary, 'findings'> = {
    engineVersion: ENGINE_VERSION,
    startS,
    endS,
    durationS: endS - startS,
    imuSamples: run.imuSamples,
    computeS: 0,
    alignment: run.alignment.report,
    channels,
    groups,
    outages: run.coasting.results(),
    finalSigma: stateSigmas(solution.table, (column) => column[last]!),
    meanSigma: stateSigmas(solution.table, (column) => meanOf(column, solution.count)),
    gyroBiasRadPerS: biases('gyro_bias', 'rad_s'),
    accelBiasMPerS2: biases('accel_bias', 'm_s2'),
    truth: run.truth?.result() ?? null,
    ...(run.smoothedTruth === null ? {} : { smoothedTruth: run.smoothedTruth.result() }),
    warnings: [...inflationWarnings(run), ...run.warnings.all()],
    aids: run.aids.results(),
    ...optionalResults(layoutOf(run.request.parameters), solution.table, solution.count),
  };
  return { ...summary, findings: findings(summary, run) };
}

/** R that is not the receiver's own is said, not hidden. */
function inflationWarnings(run: Run): RunSummary['warnings'] {
  const { gnss } = run.request.parameters;
  return (['position', 'velocity'] as const)
    .filter((group) => gnss[`${group}Inflation`] > 1)
    .map((group) => ({
      code: `${group}-r-inflated`,
      sentence: `R of the ${group} fixes is inflated by ${formatNumber(gnss[`${group}Inflation`], 3)}× for errors that are correlated in time; their NIS lies below its dimension by that.`,
      timeS: null,
    }));
}

function meanOf(column: Float64Array, count: number): number {
  let sum = 0;
  for (let i = 0; i < count; i += 1) sum += column[i]!;
  return sum / count;
}

function stateSigmas(table: SolutionTable, read: (column: Float64Array) => number): StateVector {
  const three = (...names: [string, string, string]): [number, number, number] => [
    read(table[`sigma_${names[0]}`]!),
    read(table[`sigma_${names[1]}`]!),
    read(table[`sigma_${names[2]}`]!),
  ];
  return {
    positionM: three('n_m', 'e_m', 'd_m'),
    velocityMPerS: three('vn_m_s', 've_m_s', 'vd_m_s'),
    attitudeDeg: three('roll_deg', 'pitch_deg', 'yaw_deg'),
    gyroBiasRadPerS: three('gyro_bias_x_rad_s', 'gyro_bias_y_rad_s', 'gyro_bias_z_rad_s'),
    accelBiasMPerS2: three('accel_bias_x_m_s2', 'accel_bias_y_m_s2', 'accel_bias_z_m_s2'),
  };
}

/** Accepted innovations of each axis: mean, size against prediction, whiteness. */
function channelStatistics(group: string, unit: string, writer: InnovationWriter): ChannelStatistics[] {
  const { table, count } = writer;
  return ['north', 'east', 'down'].map((axis, a) => {
    const innovation = table.innovation[a as 0 | 1 | 2];
    const sigma = table.sigma[a as 0 | 1 | 2];
    const buffer = new Float64Array(count);
    let used = 0;
    let sum = 0;
    let squares = 0;
    let rejected = 0;
    for (let i = 0; i < count; i += 1) {
      const value = innovation[i]!;
      if (value !== value) continue; // NaN: not measured
      if (table.accepted[i] === 0) {
        rejected += 1;
        continue;
      }
      const z = value / sigma[i]!;
      buffer[used] = z;
      sum += value;
      squares += z * z;
      used += 1;
    }
    const normalised = buffer.subarray(0, used);
    const enough = used >= MIN_FOR_LAG;
    return {
      channel: `${group} ${axis}`,
      unit,
      used,
      rejected,
      mean: used > 0 ? sum / used : null,
      sigmaRatio: used > 0 ? Math.sqrt(squares / used) : null,
      ...(enough ? whiteness(normalised) : { lag1: null, lag1Band: null }),
    };
  });
}

/** Correlation of an innovation with itself at lags 1…20, and the portmanteau test over them (Ljung & Box 1978). */
function whiteness(
  z: Float64Array,
): Pick<ChannelStatistics, 'lag1' | 'lag1Band' | 'autocorrelation' | 'whitenessP'> {
  const r = autocorrelation(z, LAGS);
  const n = z.length;
  const q = r.reduce((sum, value, i) => sum + (value * value) / (n - i - 1), 0) * n * (n + 2);
  return {
    lag1: r[0]!,
    lag1Band: autocorrelationBand(n),
    autocorrelation: Array.from(r),
    whitenessP: chiSquaredUpper(q, LAGS),
  };
}

function groupStatistics(group: 'position' | 'velocity', writer: InnovationWriter): GroupStatistics {
  const { table, count, dimension } = writer;
  const bounds = [1, 2, 3].map((n) => [chiSquaredQuantile(0.025, n), chiSquaredQuantile(0.975, n)] as const);
  let used = 0;
  let sum = 0;
  let inside = 0;
  let freedom = 0;
  for (let i = 0; i < count; i += 1) {
    if (table.accepted[i] === 0) continue;
    const nis = table.nis[i]!;
    const [low, high] = bounds[dimension[i]! - 1]!;
    used += 1;
    sum += nis;
    freedom += dimension[i]!;
    if (nis >= low && nis <= high) inside += 1;
  }
  const mean = used > 0 ? freedom / used : 3;
  return {
    group,
    dimension: Math.round(mean),
    used,
    rejected: count - used,
    nisMean: used > 0 ? sum / used : null,
    nisBounds: used > 0 ? averageBounds(used, mean) : null,
    insideShare: used > 0 ? inside / used : null,
  };
}
