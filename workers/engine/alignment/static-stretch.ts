/** Finds how long the vehicle stands still from a sample on, from the IMU's own unrest and from GNSS. */
import type { Fixes } from '../filter/fixes';
import { horizontalDistance, horizontalSpeed } from './track';
import { medianSpacing } from '../strapdown/imu-intervals';
import type { ImuColumns } from '../types';

/** Judged in windows of this length, s. */
const WINDOW_S = 0.5;
/** A stretch shorter than this levels nothing, s. */
export const MIN_STATIC_S = 2;
/** A vehicle that moves off gently is noticed late, s. */
const END_MARGIN_S = 2;
/** Spread within a window: a running engine is still static, a hand is not. */
const GYRO_SPREAD = 0.03; // rad/s
const ACCEL_SPREAD = 0.6; // m/s²
/** Change of a window's mean against the stretch so far. */
const GYRO_CHANGE = 0.006; // rad/s
const ACCEL_CHANGE = 0.08; // m/s²
/** GNSS speed (m/s) and straying (m) that may still be noise; or this many σ, if more. */
const SPEED_FLOOR = 0.3;
const STRAY_FLOOR = 1;
const SIGMAS = 4;

export interface StaticStretch {
  /** Samples from…to (both included) and the time between, s. */
  from: number;
  to: number;
  durationS: number;
  /** Mean rates over the stretch (at most its first MEAN_LIMIT_S): rad/s and m/s². */
  gyro: [number, number, number];
  accel: [number, number, number];
  meanDurationS: number;
}

/** Longer means add bias wander and no precision, s. */
const MEAN_LIMIT_S = 60;

/** The static stretch that starts at sample `from`, or null if there is none. */
export function findStaticStretch(imu: ImuColumns, fixes: Fixes, from: number): StaticStretch | null {
  const scale = imu.sampling === 'increment' ? 1 / medianSpacing(imu.timeS) : 1;
  const time = imu.timeS;
  const axes = [...imu.gyro, ...imu.accel];
  const sums = new Float64Array(6);
  const gnss = new GnssRest(fixes, time[from]!);
  let good = from;
  let counted = 0;
  let windowStart = from;
  for (;;) {
    let end = windowStart;
    while (end < time.length && time[end]! - time[windowStart]! < WINDOW_S) end += 1;
    if (end >= time.length || end - windowStart < 3) break;
    if (!windowIsStill(axes, windowStart, end, scale, sums, counted)) break;
    if (!gnss.isStillUntil(time[end]!)) {
      // Since the first of the fixes that say so.
      while (good > from && time[good]! > gnss.movingSinceS) good -= 1;
      break;
    }
    if (counted === 0 || time[end]! - time[from]! <= MEAN_LIMIT_S) {
      for (let i = 0; i < 6; i += 1)
        for (let k = windowStart; k < end; k += 1) sums[i] = sums[i]! + axes[i]![k]! * scale;
      counted += end - windowStart;
    }
    good = end;
    windowStart = end;
  }
  return finish(imu, axes, scale, from, good);
}

/** Leaves out the end, in which the vehicle may have begun to move, and takes the means. */
function finish(
  imu: ImuColumns,
  axes: readonly Float64Array[],
  scale: number,
  from: number,
  good: number,
): StaticStretch | null {
  const time = imu.timeS;
  const margin = Math.min(END_MARGIN_S, (time[good]! - time[from]!) / 3);
  let to = good;
  if (good < time.length - 1) while (to > from && time[good]! - time[to]! < margin) to -= 1;
  if (time[to]! - time[from]! < MIN_STATIC_S) return null;
  let last = to;
  while (time[last]! - time[from]! > MEAN_LIMIT_S) last -= 1;
  const mean = (i: number) => {
    let sum = 0;
    for (let k = from + 1; k <= last; k += 1) sum += axes[i]![k]! * scale;
    return sum / (last - from);
  };
  return {
    from,
    to,
    durationS: time[to]! - time[from]!,
    gyro: [mean(0), mean(1), mean(2)],
    accel: [mean(3), mean(4), mean(5)],
    meanDurationS: time[last]! - time[from]!,
  };
}

function windowIsStill(
  axes: readonly Float64Array[],
  from: number,
  end: number,
  scale: number,
  sums: Float64Array,
  counted: number,
): boolean {
  const count = end - from;
  for (let i = 0; i < 6; i += 1) {
    const axis = axes[i]!;
    let sum = 0;
    for (let k = from; k < end; k += 1) sum += axis[k]!;
    const mean = sum / count;
    let squares = 0;
    for (let k = from; k < end; k += 1) squares += (axis[k]! - mean) ** 2;
    const spread = Math.sqrt(squares / count) * scale;
    if (spread > (i < 3 ? GYRO_SPREAD : ACCEL_SPREAD)) return false;
    if (counted === 0) continue;
    // Noise of a window's mean is allowed for on top of the fixed threshold.
    const change = Math.abs(mean * scale - sums[i]! / counted);
    if (change > (i < 3 ? GYRO_CHANGE : ACCEL_CHANGE) + (4 * spread) / Math.sqrt(count)) return false;
  }
  return true;
}

/** Looks at fixes in the order of time: do they stand still? One that does not may be an outlier, two in a row are not. */
class GnssRest {
  /** Time of the first of the latest fixes that move, s. */
  movingSinceS = Infinity;
  private next = 0;
  private first = -1;

  constructor(
    private readonly fixes: Fixes,
    private readonly startS: number,
  ) {}

  isStillUntil(timeS: number): boolean {
    const { fixes } = this;
    for (; this.next < fixes.count && fixes.timeS[this.next]! <= timeS; this.next += 1) {
      const j = this.next;
      if (fixes.timeS[j]! < this.startS || (fixes.positionAxes[j]! | fixes.velocityAxes[j]!) === 0) continue;
      if (this.isStill(j)) this.movingSinceS = Infinity;
      else if (this.movingSinceS < Infinity) return false;
      else this.movingSinceS = fixes.timeS[j]!;
      if (this.first < 0 && fixes.positionAxes[j] !== 0) this.first = j;
    }
    return true;
  }

  private isStill(j: number): boolean {
    const { fixes, first } = this;
    const at = 3 * j;
    if (fixes.velocityAxes[j] !== 0) {
      const variance = Math.max(fixes.velocityVariance[at]!, fixes.velocityVariance[at + 1]!);
      return horizontalSpeed(fixes, j) <= Math.max(SPEED_FLOOR, SIGMAS * Math.sqrt(variance));
    }
    if (fixes.positionAxes[j] === 0 || first < 0) return true;
    const sigma = Math.sqrt(fixes.positionVariance[at]! + fixes.positionVariance[3 * first]!);
    return horizontalDistance(fixes, first, j) <= Math.max(STRAY_FLOOR, SIGMAS * sigma);
  }
}
