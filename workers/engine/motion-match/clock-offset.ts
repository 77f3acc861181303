/**
 * The offset between an IMU's and a GNSS receiver's clocks, from motion that both have seen: turning, and changes of
 * speed. For each shift the IMU's integrals, taken at the very instants (or over the intervals) of the fixes, are fitted
 * to the receiver's course or speed by weighted least squares, with a line of its own in each stretch, so that scale,
 * bias and slope cost nothing; the shift that leaves the least is the offset. Its 1σ is that of non-linear least
 * squares, from the curvature there, and of a vertical that is not quite known. One fix a second gives hundredths of one.
 */
import type { GnssColumns } from '../types';
import type { MotionIntegrals } from './motion-integrals';
import {
  meanVertical,
  motionOf,
  tiltedHeadings,
  trackStretches,
  type MotionKind,
  type MotionSource,
  type RunningIntegral,
  type TrackStretch,
} from './track-stretches';

export interface OffsetEstimate {
  /** Added to the GNSS times it brings them onto the IMU's clock, s. */
  offsetS: number;
  sigmaS: number;
  /** Of course or speed, lines removed; negative: the IMU turns (or accelerates) the other way. */
  correlation: number;
  /** GNSS change ÷ IMU change: 1, or −1 where the senses differ, or 57.3 where units do. */
  factor: number;
  /** Fixes behind it. */
  fixes: number;
}

/** Searched on both sides, s. */
export const SEARCH_S = 10;
const COARSE_S = 0.1;
const FINE_S = 0.02;
/** Half the width of the parabola at the end: wide enough that the grid's corners do not show, s. */
const VERTEX_S = 0.1;
const LEAST_FIXES = 20;
const LEAST_CORRELATION: Record<MotionKind, number> = { turn: 0.9, speed: 0.6 };
/** A second best shift at least this far off must be worse by this much in the log-likelihood, or nothing is known. */
const RIVAL_S = 1.5;
const RIVAL_LOG_LIKELIHOOD = 8;
/** Residuals are not white: side slip and tilt last. The plain 1σ is up to this much too small. */
const SIGMA_FACTOR = 2;
/** The mean specific force gives the vertical to about this in flight, where the angle of attack is not known, rad. */
const VERTICAL_SIGMA = 0.06;

/** Null where the motion does not tell: too little of it, or several shifts fit alike. `vertical`: down, in the body. */
export function clockOffset(
  motion: MotionIntegrals,
  gnss: GnssColumns,
  kind: MotionKind,
  source: MotionSource,
  vertical: readonly number[] = meanVertical(motion),
): OffsetEstimate | null {
  if (motion.timeS.length < 2) return null;
  const stretches = trackStretches(gnss, kind, source);
  const integral = motionOf(motion, kind, vertical);
  const best = bestShift(stretches, integral, LEAST_CORRELATION[kind]);
  const found = best && atVertex(stretches, integral, best);
  if (!found || kind !== 'turn') return found;
  const shifts = tiltedHeadings(motion, vertical, VERTICAL_SIGMA).map((tilted) => {
    const near = least(scan(stretches, tilted, [best.shift - RIVAL_S, best.shift + RIVAL_S], COARSE_S));
    return ((near && atVertex(stretches, tilted, near)?.offsetS) ?? Infinity) - found.offsetS;
  });
  const sigmaS = Math.hypot(found.sigmaS, ...shifts);
  return Number.isFinite(sigmaS) ? { ...found, sigmaS } : null;
}

interface Fit {
  shift: number;
  fixes: number;
  /** Of a residual, in units of the stated one. */
  variance: number;
  correlation: number;
  factor: number;
}

function bestShift(
  stretches: readonly TrackStretch[],
  integral: RunningIntegral,
  leastCorrelation: number,
): Fit | null {
  const coarse = scan(stretches, integral, [-SEARCH_S, SEARCH_S], COARSE_S);
  const best = least(coarse);
  if (!best || best.fixes < LEAST_FIXES || Math.abs(best.shift) > SEARCH_S - RIVAL_S) return null;
  if (Math.abs(best.correlation) < leastCorrelation) return null;
  const rival = least(coarse.filter((one) => Math.abs(one.shift - best.shift) >= RIVAL_S));
  if (rival && 0.5 * best.fixes * Math.log(rival.variance / best.variance) < RIVAL_LOG_LIKELIHOOD)
    return null;
  return least(scan(stretches, integral, [best.shift - 2 * COARSE_S, best.shift + 2 * COARSE_S], FINE_S));
}

/** The parabola through three fits around the least one: its vertex, and 1σ from its curvature. */
function atVertex(
  stretches: readonly TrackStretch[],
  integral: RunningIntegral,
  { shift }: Fit,
): OffsetEstimate | null {
  const step = VERTEX_S;
  const [before, at, after] = [-step, 0, step].map((by) => fitAt(stretches, integral, shift + by));
  if (!before || !at || !after) return null;
  const curvature = (before.variance + after.variance - 2 * at.variance) / (step * step);
  if (!(curvature > 0)) return null;
  return {
    offsetS: shift - (after.variance - before.variance) / (2 * step) / curvature,
    sigmaS: SIGMA_FACTOR * Math.sqrt((2 * at.variance) / (curvature * at.fixes)),
    correlation: at.correlation,
    factor: at.factor,
    fixes: at.fixes,
  };
}

function scan(
  stretches: readonly TrackStretch[],
  integral: RunningIntegral,
  [from, to]: readonly [number, number],
  step: number,
): Fit[] {
  const steps = Math.round((to - from) / step);
  return Array.from({ length: steps + 1 }, (_, i) => fitAt(stretches, integral, from + i * step)).filter(
    (one) => one !== null,
  );
}

/** Of the fits with nearly as many fixes as any: a shift that leaves half of the log out proves little. */
function least(fits: readonly Fit[]): Fit | null {
  const most = Math.max(0, ...fits.map(({ fixes }) => fixes));
  return fits.reduce<Fit | null>(
    (best, one) => (one.fixes >= 0.7 * most && (!best || one.variance < best.variance) ? one : best),
    null,
  );
}

/** value = a·x + a line a stretch, by weighted least squares at one shift; null with too few fixes. */
function fitAt(stretches: readonly TrackStretch[], integral: RunningIntegral, shift: number): Fit | null {
  let [fixes, lines, xx, xy, yy] = [0, 0, 0, 0, 0];
  for (const stretch of stretches) {
    const sums = withoutLine(stretch, integral, shift);
    if (!sums) continue;
    fixes += sums.fixes;
    lines += 2;
    xx += sums.xx;
    xy += sums.xy;
    yy += sums.yy;
  }
  const free = fixes - lines - 2;
  if (free < 5 || !(xx > 0) || !(yy > 0)) return null;
  const left = Math.max(yy - (xy * xy) / xx, 1e-12 * yy);
  return { shift, fixes, variance: left / free, correlation: xy / Math.sqrt(xx * yy), factor: xy / xx };
}

/** Weighted sums of squares and products of x and the value, the best line of each taken out. */
function withoutLine({ fromS, toS, value, weight }: TrackStretch, integral: RunningIntegral, shift: number) {
  if (integral.broken(fromS[0]! + shift, toS[toS.length - 1]! + shift)) return null;
  let [fixes, w, t, tt, x, tx, y, ty, xx, xy, yy] = [0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0];
  const [t0, y0] = [fromS[0]!, value[0]!];
  let x0 = NaN;
  for (let i = 0; i < value.length; i += 1) {
    const [from, to] = [fromS[i]! + shift, toS[i]! + shift];
    const sensed = from === to ? integral.at(from) : integral.mean(from, to);
    if (Number.isNaN(sensed)) continue;
    if (Number.isNaN(x0)) x0 = sensed;
    const [wi, ti, xi, yi] = [weight[i]!, from - shift - t0, sensed - x0, value[i]! - y0];
    fixes += 1;
    w += wi;
    t += wi * ti;
    tt += wi * ti * ti;
    x += wi * xi;
    tx += wi * ti * xi;
    y += wi * yi;
    ty += wi * ti * yi;
    xx += wi * xi * xi;
    xy += wi * xi * yi;
    yy += wi * yi * yi;
  }
  const slopeOf = (of: number, withTime: number) => (withTime - (t * of) / w) / (tt - (t * t) / w);
  if (fixes < 4 || !(tt - (t * t) / w > 0)) return null;
  const [slopeX, slopeY] = [slopeOf(x, tx), slopeOf(y, ty)];
  return {
    fixes,
    xx: xx - (x * x) / w - slopeX * (tx - (t * x) / w),
    xy: xy - (x * y) / w - slopeX * (ty - (t * y) / w),
    yy: yy - (y * y) / w - slopeY * (ty - (t * y) / w),
  };
}
