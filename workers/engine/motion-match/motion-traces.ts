/** How a vehicle moves, second by second, as its IMU and as its receiver see it: sizes that need neither axes nor attitude. */
import { STANDARD_GRAVITY_M_S2 } from '@/shared/units';
import { wrapAngle } from '../geodesy';
import type { GnssColumns } from '../types';
import type { MotionIntegrals } from './motion-integrals';
import {
  along,
  chords,
  meanVertical,
  RunningIntegral,
  thinned,
  velocityPoints,
  type Point,
} from './track-stretches';

/** N seconds from startS; NaN where nothing is known. */
export interface Traces {
  startS: number;
  seconds: number;
  /** About the vertical, rad/s; clockwise from above is positive. */
  turn: Float64Array;
  /** Size of the rate about level axes, rad/s. */
  tilt: Float64Array;
  /** Size of the horizontal acceleration, m/s². */
  acceleration: Float64Array;
}

/** Below this the course says nothing, m/s; further apart than this fixes say nothing of what lies between, s. */
const LEAST_SPEED = 1;
const LONGEST_INTERVAL_S = 3.1;

/** Means over whole seconds from `afterS` behind the first sample; null where there are fewer than two samples. */
export function imuTraces(motion: MotionIntegrals, afterS = 0): Traces | null {
  const { timeS, breaksS } = motion;
  if (timeS.length < 2) return null;
  const startS = timeS[0]! + afterS;
  const seconds = Math.floor(timeS[timeS.length - 1]! - startS);
  const vertical = meanVertical(motion);
  const means = (axes: MotionIntegrals['gyro']) =>
    axes.map((axis) => secondMeans(timeS, axis, breaksS, startS, seconds));
  const [gyro, force] = [means(motion.gyro), means(motion.accel)];
  return {
    startS,
    seconds,
    turn: along([gyro[0]!, gyro[1]!, gyro[2]!], vertical),
    tilt: levelSize(gyro, vertical),
    acceleration: levelSize(force, vertical),
  };
}

/**
 * The same from velocities, or from positions where there are none; null where fewer than two say anything. Hovering
 * flight leans by (acceleration + drag · velocity) ÷ gravity; `drag` in 1/s.
 */
export function gnssTraces(gnss: GnssColumns, afterS = 0, drag = 0): Traces | null {
  const points = velocityPoints(gnss, thinned(gnss, 'velocity'));
  const known = points.length > 1 ? points : chords(gnss, thinned(gnss, 'position'));
  if (known.length < 2) return null;
  const startS = middle(known[0]!) + afterS;
  const seconds = Math.floor(middle(known[known.length - 1]!) - startS);
  const velocity = velocityAt(known, startS, seconds + 1);
  const [turn, tilt, acceleration] = [0, 1, 2].map(() => new Float64Array(seconds).fill(NaN)) as [
    Float64Array,
    Float64Array,
    Float64Array,
  ];
  const v = (k: number) => velocity[k] ?? NOWHERE;
  for (let k = 0; k < seconds; k += 1) {
    const [a, b, before, after] = [v(k), v(k + 1), v(k - 1), v(k + 2)];
    acceleration[k] = Math.hypot(b.north - a.north, b.east - a.east);
    // The acceleration at both ends of the second, by central differences.
    const north = (after.north - a.north - (b.north - before.north)) / 2 + drag * (b.north - a.north);
    const east = (after.east - a.east - (b.east - before.east)) / 2 + drag * (b.east - a.east);
    tilt[k] = Math.hypot(north, east) / STANDARD_GRAVITY_M_S2;
    const moving = Math.min(Math.hypot(a.north, a.east), Math.hypot(b.north, b.east)) > LEAST_SPEED;
    if (moving) turn[k] = wrapAngle(Math.atan2(b.east, b.north) - Math.atan2(a.east, a.north));
  }
  return { startS, seconds, turn, tilt, acceleration };
}

interface Velocity {
  north: number;
  east: number;
}
const NOWHERE: Velocity = { north: NaN, east: NaN };

const middle = ({ fromS, toS }: Point) => (fromS + toS) / 2;

/** Velocities at whole seconds, along straight lines between what is known. */
function velocityAt(points: readonly Point[], startS: number, count: number): Velocity[] {
  let at = 0;
  return Array.from({ length: count }, (_, k) => {
    const timeS = startS + k;
    while (at < points.length - 2 && middle(points[at + 1]!) < timeS) at += 1;
    const [one, two] = [points[at]!, points[at + 1]!];
    const spanS = middle(two) - middle(one);
    const share = (timeS - middle(one)) / spanS;
    if (spanS > LONGEST_INTERVAL_S || !(share >= -0.01 && share <= 1.01)) return NOWHERE;
    const part = (of: (angle: number) => number) =>
      (1 - share) * one.speed * of(one.course) + share * two.speed * of(two.course);
    return { north: part(Math.cos), east: part(Math.sin) };
  });
}

/** Mean of a rate over each second, its mean over the log taken off; NaN across pauses. */
function secondMeans(
  timeS: Float64Array,
  integral: Float64Array,
  breaksS: Float64Array,
  startS: number,
  seconds: number,
): Float64Array {
  const running = new RunningIntegral(timeS, integral, breaksS);
  const means = Float64Array.from({ length: seconds }, (_, k) => {
    const [from, to] = [startS + k, startS + k + 1];
    return running.broken(from, to) ? NaN : running.at(to) - running.at(from);
  });
  const known = means.filter((value) => !Number.isNaN(value));
  const mean = known.reduce((sum, value) => sum + value, 0) / Math.max(1, known.length);
  return means.map((value) => value - mean);
}

/** Size of what is square to `vertical`. */
const levelSize = (axes: readonly Float64Array[], vertical: readonly number[]): Float64Array =>
  axes[0]!.map((_, k) => {
    const parts = axes.map((axis) => axis[k]!);
    const down = parts.reduce((sum, part, i) => sum + part * vertical[i]!, 0);
    return Math.hypot(...parts.map((part, i) => part - down * vertical[i]!));
  });
