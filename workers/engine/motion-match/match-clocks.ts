/**
 * Two logs whose clocks share nothing (an uptime beside UTC, a counter beside a flight log) are laid over one another by
 * the motion that both have seen. Three quantities that need neither axes nor attitude are compared second by second at
 * every shift: the turn rate about the vertical, the rate of tilting (which in hovering flight makes the acceleration)
 * and the horizontal acceleration. The shift found is refined by `findClockOffsets`.
 */
import type { GnssColumns } from '../types';
import { findClockOffsets } from './find-offsets';
import { gnssTraces, imuTraces, type Traces } from './motion-traces';
import type { MotionIntegrals } from './motion-integrals';

export interface MatchedClocks {
  /** Added to the GNSS times it brings them onto the IMU's clock, s. */
  offsetS: number;
  /** 1σ. */
  sigmaS: number;
}

/** At least so many seconds must lie over one another, and this share of the shorter log. */
const LEAST_OVERLAP_S = 45;
const LEAST_SHARE = 0.5;
/** So much of the GNSS log is compared, its liveliest part, s. */
const LONGEST_TEMPLATE_S = 1800;
const LEAST_CORRELATION = 0.6;
/** Motion lasts for seconds: so many of them count as one observation. */
const SECONDS_PER_OBSERVATION = 3;
/** A second best shift at least so far off (s) must be worse by so much in the log-likelihood. */
const RIVAL_S = 6;
const RIVAL_LOG_LIKELIHOOD = 15;
/** Steps in which the match is made finer than a second, and what they leave in doubt, s. */
const PHASE_S = 0.25;
const DRAGS_PER_S = [0, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6];
const COARSE_SIGMA_S = 0.1;

/** Null where the motion does not tell: too little of it, or several shifts fit alike. */
export function matchClocks(motion: MotionIntegrals, gnss: GnssColumns): MatchedClocks | null {
  const sensed = imuTraces(motion);
  const seen = liveliest(gnssTraces(gnss));
  if (!sensed || !seen) return null;
  const best = bestLag(sensed, seen);
  if (best === null) return null;
  const coarseS = sensed.startS - seen.startS + best;
  const offsetS = coarseS + betweenSeconds(motion, gnss, coarseS);
  const shifted = { ...gnss, timeS: gnss.timeS.map((timeS) => timeS + offsetS) };
  const fine = findClockOffsets(motion, shifted).offset;
  return fine
    ? { offsetS: offsetS + fine.offsetS, sigmaS: fine.sigmaS }
    : { offsetS, sigmaS: COARSE_SIGMA_S };
}

/**
 * What is left below a second: the seconds of both logs are begun later and later, in steps; the parabola through the
 * summed scores around the best of the differences. Drag makes a hovering vehicle lean before it accelerates: the drag
 * that fits best is taken.
 */
function betweenSeconds(motion: MotionIntegrals, gnss: GnssColumns, offsetS: number): number {
  const phases = Array.from({ length: 1 / PHASE_S }, (_, i) => i * PHASE_S);
  const differences = Array.from({ length: 2 / PHASE_S + 1 }, (_, i) => i * PHASE_S - 1);
  const tried = DRAGS_PER_S.map((drag) => {
    const seen = phases
      .map((afterS) => liveliest(gnssTraces(gnss, afterS, drag)))
      .filter((one) => one !== null);
    return differences.map((by) => seen.reduce((sum, one) => sum + scoreAt(motion, one, offsetS + by), 0));
  });
  const scores = tried.reduce((best, one) => (Math.max(...one) > Math.max(...best) ? one : best));
  const at = scores.indexOf(Math.max(...scores));
  return differences[at]! + vertex(scores[at - 1], scores[at]!, scores[at + 1]) * PHASE_S;
}

/** Of GNSS traces moved by any number of seconds. */
function scoreAt(motion: MotionIntegrals, seen: Traces, offsetS: number): number {
  const behindS = seen.startS + offsetS - motion.timeS[0]!;
  const lag = Math.floor(behindS);
  const sensed = imuTraces(motion, behindS - lag);
  return sensed ? fitAt(sensed, seen, lag).score : 0;
}

/** Whole seconds by which the GNSS traces are moved behind the start of the IMU's. */
function bestLag(sensed: Traces, seen: Traces): number | null {
  const [n, m] = [sensed.seconds, seen.seconds];
  const least = Math.max(LEAST_OVERLAP_S, LEAST_SHARE * Math.min(n, m));
  const from = Math.ceil(least) - m;
  const to = n - Math.ceil(least);
  if (to < from) return null;
  const fits = Array.from({ length: to - from + 1 }, (_, i) => fitAt(sensed, seen, from + i));
  const at = fits.reduce((best, fit, i) => (fit.score > fits[best]!.score ? i : best), 0);
  const best = fits[at]!;
  if (best.correlation < LEAST_CORRELATION) return null;
  const rival = Math.max(0, ...fits.filter((_, i) => Math.abs(i - at) >= RIVAL_S).map(({ score }) => score));
  if (best.score - rival < RIVAL_LOG_LIKELIHOOD) return null;
  return from + at;
}

/** Of the parabola through three neighbouring values around the largest: −½ to ½. */
function vertex(before: number | undefined, at: number, after: number | undefined): number {
  if (before === undefined || after === undefined) return 0;
  const bend = before + after - 2 * at;
  return bend < 0 ? (before - after) / (2 * bend) : 0;
}

/** Log-likelihood gained over "the two have nothing in common", and the best of the correlations. */
function fitAt(sensed: Traces, seen: Traces, lag: number): { score: number; correlation: number } {
  let [score, correlation] = [0, 0];
  for (const kind of ['turn', 'tilt', 'acceleration'] as const) {
    const { r, n } = correlated(sensed[kind], seen[kind], lag);
    // The sense of the turns is not known; sizes must rise and fall together.
    const size = kind === 'turn' ? Math.abs(r) : Math.max(0, r);
    score += (-0.5 * n * Math.log(1 - Math.min(size * size, 0.9999))) / SECONDS_PER_OBSERVATION;
    correlation = Math.max(correlation, size);
  }
  return { score, correlation };
}

/** Pearson's r of a[k + lag] and b[k] where both are known, and how many those are. */
function correlated(a: Float64Array, b: Float64Array, lag: number): { r: number; n: number } {
  let [n, x, y, xx, yy, xy] = [0, 0, 0, 0, 0, 0];
  const end = Math.min(b.length, a.length - lag);
  for (let k = Math.max(0, -lag); k < end; k += 1) {
    const [one, two] = [a[k + lag]!, b[k]!];
    if (one !== one || two !== two) continue;
    n += 1;
    x += one;
    y += two;
    xx += one * one;
    yy += two * two;
    xy += one * two;
  }
  const [sx, sy] = [xx - (x * x) / n, yy - (y * y) / n];
  return n < LEAST_OVERLAP_S / 2 || !(sx > 0 && sy > 0)
    ? { r: 0, n }
    : { r: (xy - (x * y) / n) / Math.sqrt(sx * sy), n };
}

/** The part of at most LONGEST_TEMPLATE_S with the most acceleration. */
function liveliest(traces: Traces | null): Traces | null {
  if (!traces || traces.seconds <= LONGEST_TEMPLATE_S) return traces;
  const step = 60;
  let [bestFrom, most] = [0, -1];
  for (let from = 0; from + LONGEST_TEMPLATE_S <= traces.seconds; from += step) {
    let sum = 0;
    for (let k = from; k < from + LONGEST_TEMPLATE_S; k += 1) sum += traces.acceleration[k]! || 0;
    if (sum > most) [bestFrom, most] = [from, sum];
  }
  const cut = (values: Float64Array) => values.subarray(bestFrom, bestFrom + LONGEST_TEMPLATE_S);
  return {
    startS: traces.startS + bestFrom,
    seconds: LONGEST_TEMPLATE_S,
    turn: cut(traces.turn),
    tilt: cut(traces.tilt),
    acceleration: cut(traces.acceleration),
  };
}
