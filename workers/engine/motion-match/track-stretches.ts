/**
 * What GNSS says of a vehicle's course and speed, in stretches of up to a minute, and the same of an IMU for a given
 * shift between the two clocks. From velocities (at the epochs) or from positions (chords: means over the intervals),
 * because a receiver's velocity may be older than its position.
 */
import { meridianRadius, transverseRadius } from '../geodesy';
import type { GnssColumns } from '../types';
import type { MotionIntegrals } from './motion-integrals';

export type MotionKind = 'turn' | 'speed';
export type MotionSource = 'velocity' | 'position';

/** K neighbouring observations. */
export interface TrackStretch {
  /** The instant (both alike), or the interval that a chord spans, s. */
  fromS: Float64Array;
  toS: Float64Array;
  /** Course without jumps (rad), or speed (m/s). */
  value: Float64Array;
  /** m/s. */
  speed: Float64Array;
  /** 1/variance. */
  weight: Float64Array;
}

/** Epochs further apart than this belong to two stretches, s. */
const LONGEST_INTERVAL_S = 3.1;
/** Longer ones would let the gyro's bias wander, and the slope of the ground change, s. */
const LONGEST_STRETCH_S: Record<MotionKind, number> = { turn: 60, speed: 15 };
const LEAST_POINTS = 8;
/** Below this, or so many σ, a course is noise, m/s. */
const LEAST_SPEED = 0.5;
const SPEED_SIGMAS = 3;
/** Taken where the receiver says nothing, m/s and m. */
const VELOCITY_SIGMA = 0.1;
const POSITION_SIGMA = 1;
/** A course has this error besides: the vehicle's side slip, rad; and a speed this one: slopes, m/s. */
const COURSE_FLOOR = 0.01;
const SPEED_FLOOR = 0.05;
/** Faster epochs are thinned to about this spacing, s; and of long logs stretches are left out evenly beyond so many fixes. */
const SPACING_S = 0.45;
const MOST_FIXES = 2500;

export function trackStretches(gnss: GnssColumns, kind: MotionKind, source: MotionSource): TrackStretch[] {
  const rows = thinned(gnss, source);
  const points = source === 'velocity' ? velocityPoints(gnss, rows) : chords(gnss, rows);
  const stretches: TrackStretch[] = [];
  let open: Point[] = [];
  const close = () => {
    if (open.length >= LEAST_POINTS) stretches.push(stretchOf(open, kind));
    open = [];
  };
  for (const point of points) {
    if (kind === 'turn' && point.speed < Math.max(LEAST_SPEED, SPEED_SIGMAS * point.sigma)) {
      close();
      continue;
    }
    const last = open[open.length - 1];
    if (
      last &&
      (point.fromS - last.toS > LONGEST_INTERVAL_S || point.toS - open[0]!.fromS > LONGEST_STRETCH_S[kind])
    )
      close();
    open.push(point);
  }
  close();
  return evenly(stretches);
}

/** A share of the stretches from all over the log. */
function evenly(stretches: TrackStretch[]): TrackStretch[] {
  const fixes = stretches.reduce((sum, { value }) => sum + value.length, 0);
  const share = Math.min(1, MOST_FIXES / Math.max(1, fixes));
  return stretches.filter((_, i) => Math.floor((i + 1) * share) > Math.floor(i * share));
}

function stretchOf(points: readonly Point[], kind: MotionKind): TrackStretch {
  let course = points[0]!.course;
  const values = points.map((point) => {
    course += wrapped(point.course - course);
    return kind === 'turn' ? course : point.speed;
  });
  const variance = (point: Point) =>
    kind === 'turn'
      ? (point.sigma / point.speed) ** 2 + COURSE_FLOOR ** 2
      : point.sigma ** 2 + SPEED_FLOOR ** 2;
  return {
    fromS: Float64Array.from(points, (point) => point.fromS),
    toS: Float64Array.from(points, (point) => point.toS),
    value: Float64Array.from(values),
    speed: Float64Array.from(points, (point) => point.speed),
    weight: Float64Array.from(points, (point) => 1 / variance(point)),
  };
}

export interface Point {
  fromS: number;
  toS: number;
  speed: number;
  course: number;
  sigma: number;
}

export function thinned(gnss: GnssColumns, source: MotionSource): number[] {
  const rows: number[] = [];
  let last = -Infinity;
  for (let j = 0; j < gnss.timeS.length; j += 1) {
    const there =
      source === 'velocity'
        ? gnss.velocityNed[0][j]! + gnss.velocityNed[1][j]!
        : gnss.latRad[j]! + gnss.lonRad[j]!;
    if (!Number.isFinite(there) || gnss.timeS[j]! - last < SPACING_S) continue;
    rows.push(j);
    last = gnss.timeS[j]!;
  }
  return rows;
}

export const velocityPoints = (gnss: GnssColumns, rows: readonly number[]): Point[] =>
  rows.map((j) => {
    const [north, east] = [gnss.velocityNed[0][j]!, gnss.velocityNed[1][j]!];
    const time = gnss.timeS[j]!;
    return {
      fromS: time,
      toS: time,
      speed: Math.hypot(north, east),
      course: Math.atan2(east, north),
      sigma: finite(gnss.velocitySigma[0][j], VELOCITY_SIGMA),
    };
  });

/** Between neighbouring positions: mean velocity over the interval. */
export function chords(gnss: GnssColumns, rows: readonly number[]): Point[] {
  const points: Point[] = [];
  for (let i = 1; i < rows.length; i += 1) {
    const [a, b] = [rows[i - 1]!, rows[i]!];
    const interval = gnss.timeS[b]! - gnss.timeS[a]!;
    if (interval > LONGEST_INTERVAL_S) continue;
    const north = (gnss.latRad[b]! - gnss.latRad[a]!) * meridianRadius(gnss.latRad[a]!);
    const east =
      wrapped(gnss.lonRad[b]! - gnss.lonRad[a]!) *
      transverseRadius(gnss.latRad[a]!) *
      Math.cos(gnss.latRad[a]!);
    points.push({
      fromS: gnss.timeS[a]!,
      toS: gnss.timeS[b]!,
      speed: Math.hypot(north, east) / interval,
      course: Math.atan2(east, north),
      // Neighbouring fixes share much of their error.
      sigma: (0.5 * finite(gnss.positionSigma[0][b], POSITION_SIGMA)) / interval,
    });
  }
  return points;
}

const finite = (value: number | undefined, otherwise: number) =>
  value !== undefined && Number.isFinite(value) && value > 0 ? value : otherwise;
const wrapped = (angle: number) => Math.atan2(Math.sin(angle), Math.cos(angle));

/** One running integral as a function of time, with its own integral behind it. */
export class RunningIntegral {
  private readonly second: Float64Array;

  /** `first`: cumulative, at `timeS`. */
  constructor(
    private readonly timeS: Float64Array,
    private readonly first: Float64Array,
    private readonly breaksS: Float64Array,
  ) {
    this.second = new Float64Array(first.length);
    for (let k = 1; k < first.length; k += 1)
      this.second[k] = this.second[k - 1]! + 0.5 * (first[k]! + first[k - 1]!) * (timeS[k]! - timeS[k - 1]!);
  }

  /** Whether a pause lies between two times: the integral is worth nothing across it. */
  broken(fromS: number, toS: number): boolean {
    const { breaksS } = this;
    // Asked for every stretch at every shift, and a poor log has thousands of pauses.
    let [low, high] = [0, breaksS.length];
    while (low < high) {
      const middle = (low + high) >> 1;
      if (breaksS[middle]! <= fromS) low = middle + 1;
      else high = middle;
    }
    return low < breaksS.length && breaksS[low]! <= toS;
  }

  /** NaN outside. */
  at(timeS: number): number {
    const k = this.row(timeS);
    if (k < 0) return NaN;
    const share = (timeS - this.timeS[k]!) / (this.timeS[k + 1]! - this.timeS[k]!);
    return this.first[k]! + share * (this.first[k + 1]! - this.first[k]!);
  }

  /** Mean over [fromS, toS]; NaN outside. */
  mean(fromS: number, toS: number): number {
    return (this.doubleAt(toS) - this.doubleAt(fromS)) / (toS - fromS);
  }

  private doubleAt(timeS: number): number {
    const k = this.row(timeS);
    if (k < 0) return NaN;
    const past = timeS - this.timeS[k]!;
    return this.second[k]! + 0.5 * (this.first[k]! + this.at(timeS)) * past;
  }

  /** Row k with timeS in [t_k, t_k+1]; −1 outside. Rows are nearly even: a few steps from where an even grid would have it. */
  private row(timeS: number): number {
    const { timeS: grid } = this;
    const last = grid.length - 1;
    if (!(timeS >= grid[0]! && timeS <= grid[last]!)) return -1;
    const even = ((timeS - grid[0]!) / (grid[last]! - grid[0]!)) * last;
    let k = Math.min(last - 1, Math.floor(even));
    let step = 1;
    // Outwards in growing steps, then halved.
    let [low, high] = [k, k + 1];
    while (low > 0 && grid[low]! > timeS) [low, step] = [Math.max(0, low - step), 2 * step];
    step = 1;
    while (high < last && grid[high]! < timeS) [high, step] = [Math.min(last, high + step), 2 * step];
    while (high - low > 1) {
      k = (low + high) >> 1;
      if (grid[k]! <= timeS) low = k;
      else high = k;
    }
    return low;
  }
}

/**
 * From the IMU: heading (∫ of the turn rate about `vertical`, a unit vector in the body that points down; clockwise is
 * positive), or forward speed.
 */
export function motionOf(
  motion: MotionIntegrals,
  kind: MotionKind,
  vertical: readonly number[],
): RunningIntegral {
  const first = kind === 'turn' ? along(motion.gyro, vertical) : motion.accel[0];
  return new RunningIntegral(motion.timeS, first, motion.breaksS);
}

/** Headings if the vertical were tilted by `tilt` rad about forward and about right: what roll and pitch leak. */
export const tiltedHeadings = (
  motion: MotionIntegrals,
  vertical: readonly number[],
  tilt: number,
): RunningIntegral[] =>
  [0, 1].map((axis) => {
    const tilted = vertical.map((part, i) => part + (i === axis ? tilt : 0));
    return new RunningIntegral(motion.timeS, along(motion.gyro, tilted), motion.breaksS);
  });

/** On average an IMU feels gravity alone: its mean specific force points up, whatever the mounting. */
export function meanVertical({ timeS, accel }: MotionIntegrals): number[] {
  const last = timeS.length - 1;
  const total = accel.map((axis) => axis[last]! - axis[0]!);
  const length = Math.hypot(...total) || 1;
  return total.map((value) => -value / length);
}

export const along = (axes: MotionIntegrals['gyro'], direction: readonly number[]): Float64Array =>
  axes[0].map((x, k) => direction[0]! * x + direction[1]! * axes[1][k]! + direction[2]! * axes[2][k]!);
