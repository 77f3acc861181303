/**
 * By how much a receiver's velocities are older than its positions, from the fixes alone: p(t) − ∫v dt = lag · v(t) + a
 * line, a stretch at a time. Velocities that lag lead the integral behind the positions in proportion to the speed.
 */
import { meridianRadius, transverseRadius } from '../geodesy';
import type { GnssColumns } from '../types';

export interface VelocityLag {
  lagS: number;
  sigmaS: number;
}

const LONGEST_INTERVAL_S = 3.1;
const LONGEST_STRETCH_S = 60;
const LEAST_FIXES = 12;
/** The speed must change this much in a stretch (RMS, m/s) for it to count at all. */
const LEAST_UNREST = 0.5;
/** Residuals beyond this many σ are left out the second time: fixes that jump. */
const OUTLIER = 4;

/** Null without velocities, or without changes of velocity. */
export function velocityLag(gnss: GnssColumns): VelocityLag | null {
  const rows = stretches(gnss).flatMap((stretch) => reduced(gnss, stretch));
  if (rows.length < 2 * LEAST_FIXES) return null;
  const first = regress(rows);
  if (!first) return null;
  const limit = OUTLIER * first.deviation;
  return regress(rows.filter(({ miss, speed }) => Math.abs(miss - first.lagS * speed) <= limit));
}

/** One axis of one fix: its departure from the integral and its velocity, the stretch's line taken out of both. */
interface Row {
  miss: number;
  speed: number;
}

function stretches(gnss: GnssColumns): number[][] {
  const found: number[][] = [];
  let open: number[] = [];
  const close = () => {
    if (open.length >= LEAST_FIXES) found.push(open);
    open = [];
  };
  for (let j = 0; j < gnss.timeS.length; j += 1) {
    if (!Number.isFinite(gnss.latRad[j]! + gnss.velocityNed[0][j]! + gnss.velocityNed[1][j]!)) continue;
    const last = open.at(-1);
    const time = gnss.timeS[j]!;
    if (
      last !== undefined &&
      (time - gnss.timeS[last]! > LONGEST_INTERVAL_S || time - gnss.timeS[open[0]!]! > LONGEST_STRETCH_S)
    )
      close();
    open.push(j);
  }
  close();
  return found;
}

function reduced(gnss: GnssColumns, rows: readonly number[]): Row[] {
  const [first] = rows;
  const time = rows.map((j) => gnss.timeS[j]! - gnss.timeS[first!]!);
  const place = [
    rows.map((j) => (gnss.latRad[j]! - gnss.latRad[first!]!) * meridianRadius(gnss.latRad[first!]!)),
    rows.map(
      (j) =>
        (gnss.lonRad[j]! - gnss.lonRad[first!]!) *
        transverseRadius(gnss.latRad[first!]!) *
        Math.cos(gnss.latRad[first!]!),
    ),
  ];
  return place.flatMap((positions, axis) => {
    const speeds = rows.map((j) => gnss.velocityNed[axis as 0 | 1][j]!);
    let integral = 0;
    const misses = positions.map((position, i) => {
      if (i > 0) integral += 0.5 * (speeds[i]! + speeds[i - 1]!) * (time[i]! - time[i - 1]!);
      return position - integral;
    });
    const [miss, speed] = [withoutLine(time, misses), withoutLine(time, speeds)];
    const unrest = Math.sqrt(speed.reduce((sum, value) => sum + value * value, 0) / speed.length);
    return unrest < LEAST_UNREST ? [] : miss.map((value, i) => ({ miss: value, speed: speed[i]! }));
  });
}

function withoutLine(time: readonly number[], values: readonly number[]): number[] {
  const n = values.length;
  const mean = (list: readonly number[]) => list.reduce((sum, value) => sum + value, 0) / n;
  const [mt, mv] = [mean(time), mean(values)];
  let [tt, tv] = [0, 0];
  for (let i = 0; i < n; i += 1) {
    tt += (time[i]! - mt) ** 2;
    tv += (time[i]! - mt) * (values[i]! - mv);
  }
  return values.map((value, i) => value - mv - (tv / tt) * (time[i]! - mt));
}

/** Errors of positions last: 1σ is widened by the residuals' own correlation from fix to fix. */
function regress(rows: readonly Row[]): (VelocityLag & { deviation: number }) | null {
  let [xx, xy] = [0, 0];
  for (const { miss, speed } of rows) {
    xx += speed * speed;
    xy += speed * miss;
  }
  if (!(xx > 0) || rows.length < 2 * LEAST_FIXES) return null;
  const lagS = xy / xx;
  const left = rows.map(({ miss, speed }) => miss - lagS * speed);
  const squares = left.reduce((sum, value) => sum + value * value, 0);
  const neighbours = left.slice(1).reduce((sum, value, i) => sum + value * left[i]!, 0);
  const correlation = Math.min(0.98, Math.max(0, neighbours / squares));
  const deviation = Math.sqrt(squares / (rows.length - 3));
  const widened = Math.sqrt((1 + correlation) / (1 - correlation));
  return { lagS, sigmaS: Math.max(1e-3, (widened * deviation) / Math.sqrt(xx)), deviation };
}
