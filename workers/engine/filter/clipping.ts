/**
 * Samples at the end of a sensor's range: where they are, and how much they may hide.
 *
 * With a stated range, samples at or beyond it count. Without one, flat tops are looked for: several equal samples in
 * a row at the axis' own extreme, entered or left by a jump. (The extreme differs by axis and sign where a bias was
 * taken off after clipping.)
 */
import type { Parameters } from '@/shared/contracts/parameters';
import { percentile } from '../statistics/descriptive';
import { medianSpacing } from '../strapdown/imu-intervals';
import type { ImuColumns } from '../types';

/** Samples within this share of a stated range count as at it. */
const AT_RANGE = 0.999;
/** A flat top is at least this many equal samples … */
const FLAT_TOP_SAMPLES = 3;
/** … far from the axis' median, in steps of its own resolution … */
const TOP_RESOLUTIONS = 20;
/** … and its flank a jump of this share of the way from the median. */
const FLANK_SHARE = 0.1;

/** Consecutive samples of which at least one axis was clipped. */
export interface ClippedRun {
  /** Samples from…to, both included. */
  from: number;
  to: number;
  /** White noise that by the run's end has spread as far as a constant overflow would have: rad²/s and m²/s³. */
  gyroNoise: number;
  accelNoise: number;
}

/** Runs of clipped samples in the order of time; empty where the parameters switch the policy off. */
export function findClipping(imu: ImuColumns, parameters: Parameters['clipping']): ClippedRun[] {
  if (!parameters.enabled) return [];
  const scale = imu.sampling === 'increment' ? 1 / medianSpacing(imu.timeS) : 1;
  const gyro = clippedBy(imu.gyro, parameters.gyroRangeRadPerS, scale);
  const accel = clippedBy(imu.accel, parameters.accelRangeMPerS2, scale);
  if (gyro === null && accel === null) return [];
  return collectRuns(imu, gyro, accel, parameters.overflowShare);
}

interface Clipped {
  /** 1: clipped. */
  marks: Uint8Array;
  /** Largest range of the axes that clip, in rad/s or m/s². */
  range: number;
}

function clippedBy(axes: ImuColumns['gyro'], stated: number | undefined, scale: number): Clipped | null {
  let found: Clipped | null = null;
  for (const axis of axes) {
    const [low, high] =
      stated === undefined ? flatTops(axis) : statedLimits(axis, (stated * AT_RANGE) / scale);
    if (low === -Infinity && high === Infinity) continue;
    found ??= { marks: new Uint8Array(axis.length), range: 0 };
    for (let k = 0; k < axis.length; k += 1) if (axis[k]! <= low || axis[k]! >= high) found.marks[k] = 1;
    const limits = [Math.abs(low), Math.abs(high)].filter(Number.isFinite);
    found.range = Math.max(found.range, stated ?? Math.max(...limits) * scale);
  }
  return found;
}

function statedLimits(axis: Float64Array, limit: number): [number, number] {
  const { low, high } = extremes(axis);
  return [low <= -limit ? -limit : -Infinity, high >= limit ? limit : Infinity];
}

/** Values at or beyond which the axis is clipped; infinite where it is not. */
function flatTops(axis: Float64Array): [number, number] {
  const { low, high, lowRun, highRun } = extremes(axis);
  const isTop = (value: number, run: number) => run >= FLAT_TOP_SAMPLES && hasFlank(axis, value);
  return [isTop(low, lowRun) ? low : -Infinity, isTop(high, highRun) ? high : Infinity];
}

/** Least and largest value, and the longest runs of equal samples there. */
function extremes(axis: Float64Array) {
  let low = Infinity;
  let high = -Infinity;
  let lowRun = 0;
  let highRun = 0;
  let run = 0;
  let previous = NaN;
  for (let k = 0; k < axis.length; k += 1) {
    const x = axis[k]!;
    if (x >= high) {
      run = x === previous ? run + 1 : 1;
      if (x > high || run > highRun) highRun = run;
      high = x;
    }
    if (x <= low) {
      run = x === previous ? run + 1 : 1;
      if (x < low || run > lowRun) lowRun = run;
      low = x;
    }
    previous = x;
  }
  return { low, high, lowRun, highRun };
}

/** Is one of the runs at `value` entered or left by a jump? A steady turn of a coarse sensor is not. */
function hasFlank(axis: Float64Array, value: number): boolean {
  const stride = Math.max(1, Math.floor(axis.length / 2000));
  const sample: number[] = [];
  let resolution = Infinity;
  for (let k = 1; k < axis.length; k += stride) {
    sample.push(axis[k]!);
    const step = Math.abs(axis[k]! - axis[k - 1]!);
    if (step > 0 && step < resolution) resolution = step;
  }
  const height = Math.abs(value - percentile(sample, 0.5));
  if (height < TOP_RESOLUTIONS * resolution) return false;
  for (let k = 0; k + FLAT_TOP_SAMPLES <= axis.length; k += 1) {
    if (axis[k] !== value || axis[k - 1] === value) continue;
    let end = k;
    while (axis[end + 1] === value) end += 1;
    const flank = Math.max(
      Math.abs((axis[k - 1] ?? value) - value),
      Math.abs((axis[end + 1] ?? value) - value),
    );
    if (end - k + 1 >= FLAT_TOP_SAMPLES && flank > FLANK_SHARE * height) return true;
  }
  return false;
}

function collectRuns(
  imu: ImuColumns,
  gyro: Clipped | null,
  accel: Clipped | null,
  share: number,
): ClippedRun[] {
  const time = imu.timeS;
  const runs: ClippedRun[] = [];
  const marked = (k: number) => (gyro?.marks[k] ?? 0) + (accel?.marks[k] ?? 0) > 0;
  for (let k = 1; k < time.length; k += 1) {
    if (!marked(k)) continue;
    const from = k;
    while (k + 1 < time.length && marked(k + 1)) k += 1;
    const duration = time[k]! - time[from - 1]!;
    const noise = (clipped: Clipped | null) => {
      const touched = clipped !== null && clipped.marks.subarray(from, k + 1).includes(1);
      return touched ? (share * clipped.range) ** 2 * duration : 0;
    };
    runs.push({ from, to: k, gyroNoise: noise(gyro), accelNoise: noise(accel) });
  }
  return runs;
}
