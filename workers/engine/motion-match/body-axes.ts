/**
 * Which body axes of an accelerometer feel the drive: the forward one follows changes of speed, the one to the right
 * follows speed × turn rate, and gravity lies along the one that looks down.
 */
import type { GnssColumns } from '../types';
import type { MotionIntegrals } from './motion-integrals';
import { meanVertical, RunningIntegral, trackStretches } from './track-stretches';

/** True body axis = sign × the axis that now bears number `axis` (0, 1, 2: forward, right, down). */
export interface TrueAxis {
  axis: number;
  sign: 1 | -1;
}
export type TrueAxes = readonly [TrueAxis, TrueAxis, TrueAxis];

const LEAST_INTERVALS = 25;
/** Of the axis that follows, and the most that the axis which should have may have. */
const FOLLOWS = 0.75;
const STRAYS = 0.5;
/** A vertical must be this near to an axis. */
const ALONG_AXIS = 0.8;

/**
 * The true axes where the motion shows all three plainly and they are not as they are named; null where they are, or
 * where the motion does not tell (no turns, no braking, a vehicle that banks). `shiftS`: added to GNSS times.
 */
export function strayAxes(motion: MotionIntegrals, gnss: GnssColumns, shiftS: number): TrueAxes | null {
  const vertical = meanVertical(motion);
  const down = strongest(vertical);
  if (Math.abs(vertical[down.axis]!) < ALONG_AXIS) return null;
  const { along, across } = correlations(motion, gnss, shiftS);
  const forward = strongest(along);
  const right = strongest(across);
  const plain = Math.min(Math.abs(along[forward.axis]!), Math.abs(across[right.axis]!)) >= FOLLOWS;
  if (!plain || new Set([forward.axis, right.axis, down.axis]).size < 3) return null;
  const named =
    forward.axis === 0 && right.axis === 1 && forward.sign === 1 && right.sign === 1 && down.sign === 1;
  const rival = forward.axis === 0 ? 0 : Math.abs(along[0]!);
  return named || rival > STRAYS ? null : [forward, right, down];
}

function strongest(values: readonly number[]): TrueAxis {
  const axis = values.reduce((best, value, i) => (Math.abs(value) > Math.abs(values[best]!) ? i : best), 0);
  return { axis, sign: values[axis]! < 0 ? -1 : 1 };
}

/** Of each body axis' specific force, interval by interval, with the change of speed and with speed × turn, by GNSS. */
function correlations(motion: MotionIntegrals, gnss: GnssColumns, shiftS: number) {
  const source = gnss.velocityNed[0].some((value) => Number.isFinite(value)) ? 'velocity' : 'position';
  const forces = motion.accel.map((axis) => new RunningIntegral(motion.timeS, axis, motion.breaksS));
  const rows: number[][] = [];
  for (const { fromS, toS, value: course, speed } of trackStretches(gnss, 'turn', source))
    for (let i = 1; i < course.length; i += 1) {
      const [t0, t1] = [0.5 * (fromS[i - 1]! + toS[i - 1]!), 0.5 * (fromS[i]! + toS[i]!)];
      const rate = (change: number) => change / (t1 - t0);
      const row = [
        rate(speed[i]! - speed[i - 1]!),
        rate(course[i]! - course[i - 1]!) * 0.5 * (speed[i - 1]! + speed[i]!),
        ...forces.map((integral) => rate(integral.at(t1 + shiftS) - integral.at(t0 + shiftS))),
      ];
      const broken = forces[0]!.broken(t0 + shiftS, t1 + shiftS);
      if (!broken && row.every(Number.isFinite)) rows.push(row);
    }
  const of = (a: number, b: number) => (rows.length < LEAST_INTERVALS ? 0 : correlation(rows, a, b));
  return { along: [2, 3, 4].map((axis) => of(0, axis)), across: [2, 3, 4].map((axis) => of(1, axis)) };
}

function correlation(rows: readonly number[][], a: number, b: number): number {
  const mean = (i: number) => rows.reduce((sum, row) => sum + row[i]!, 0) / rows.length;
  const [ma, mb] = [mean(a), mean(b)];
  let [aa, ab, bb] = [0, 0, 0];
  for (const row of rows) {
    aa += (row[a]! - ma) ** 2;
    ab += (row[a]! - ma) * (row[b]! - mb);
    bb += (row[b]! - mb) ** 2;
  }
  return aa > 0 && bb > 0 ? ab / Math.sqrt(aa * bb) : 0;
}
