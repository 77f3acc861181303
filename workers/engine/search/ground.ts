/** Checks a search's request and lays down what stays the same from point to point. */
import { prepareFixes } from '../filter/fixes';
import { EngineError } from '../types';
import type { Ground } from './evaluation';
import { describeTunable, readTunable, tunableLimits } from './tunables';
import type { Interval, SearchRequest, Tuned } from './types';

/** The wide density's σ is so many times the fixes' own at the start. */
const WIDE = 30;
/** Bounds and prior of a value of which nothing is said: this factor either way. */
const LOOSE_FACTOR = 10;

/** One axis of a search, in ln x. */
export interface Axis {
  start: number;
  low: number;
  high: number;
  /** null: none. */
  prior: { mean: number; sigma: number } | null;
}

/** @throws EngineError 'search-request', saying what is wrong and what to do. */
export function layGround(request: SearchRequest): { ground: Ground; axes: Axis[] } {
  const { cases, tuned, outlierShare = 0.01, driftWeight = 0 } = request;
  demand(tuned.length > 0, 'Nothing is to be tuned. Name at least one parameter.');
  demand(
    new Set(tuned.map((t) => t.name)).size === tuned.length,
    'A parameter is named twice. Name each once.',
  );
  demand(
    cases.some((c) => c.trainingS.length > 0),
    'No interval trains. Give at least one recording a training interval.',
  );
  demand(
    outlierShare >= 0 && outlierShare < 0.5,
    `The share of outliers lies in [0, 0.5), not ${outlierShare}.`,
  );
  demand(driftWeight >= 0, `The weight of the drift must not be negative, it is ${driftWeight}.`);
  cases.forEach(checkIntervals);
  const sigmas = cases.map(({ recording }) => wideSigmas(recording.gnss, request));
  return {
    ground: { cases, outlierShare, driftWeight, wideSigmas: sigmas },
    axes: tuned.map((t) => layAxis(t, request)),
  };
}

function checkIntervals(
  { trainingS, heldOutS, outages = [] }: SearchRequest['cases'][number],
  index: number,
): void {
  const all = [...trainingS, ...heldOutS].sort((a, b) => a[0] - b[0]);
  const name = `recording ${index + 1}`;
  for (const [from, to] of all)
    demand(to > from, `An interval of ${name} ends at ${to} s, not after its start at ${from} s.`);
  all.forEach((interval, i) =>
    demand(
      i === 0 || interval[0] >= all[i - 1]![1],
      `Intervals of ${name} overlap near ${interval[0]} s. What trains must not judge: part them.`,
    ),
  );
  const contains = ([from, to]: Interval, a: number, b: number) => a >= from && b <= to;
  for (const { startS, endS } of outages)
    demand(
      all.some((interval) => contains(interval, startS, endS)),
      `The outage at ${startS} s of ${name} lies in no interval. Put it wholly into a training or a held-out one.`,
    );
}

function layAxis({ name, bounds, prior }: Tuned, { parameters }: SearchRequest): Axis {
  const start = readTunable(name, parameters);
  const [least, most] = tunableLimits(name, parameters);
  const [low, high] = bounds ?? [Math.max(least, start / LOOSE_FACTOR), Math.min(most, start * LOOSE_FACTOR)];
  const { label, unit } = describeTunable(name, parameters);
  demand(
    low >= least && high <= most && low < high,
    `Bounds of ${label} must rise and lie within ${least} and ${most} ${unit}; they are ${low} and ${high}.`,
  );
  demand(
    start >= low && start <= high,
    `The start value of ${label}, ${start} ${unit}, lies outside its bounds ${low} and ${high}.`,
  );
  const known = prior === undefined ? { value: start, factor: LOOSE_FACTOR } : prior;
  demand(
    known === null || (known.value > 0 && known.factor > 1),
    `The prior of ${label} needs a positive value and a factor above 1.`,
  );
  return {
    start: Math.log(start),
    low: Math.log(low),
    high: Math.log(high),
    prior: known === null ? null : { mean: Math.log(known.value), sigma: Math.log(known.factor) },
  };
}

function wideSigmas(
  gnss: SearchRequest['cases'][number]['recording']['gnss'],
  { parameters }: SearchRequest,
) {
  const fixes = prepareFixes(gnss, parameters.gnss);
  const median = (variances: Float64Array) => Math.sqrt(variances.slice().sort()[variances.length >> 1] ?? 1);
  return {
    position: WIDE * median(fixes.positionVariance),
    velocity: WIDE * median(fixes.velocityVariance),
  };
}

/** Σ((ln x − μ)/s)²: −2 ln of the priors, but for a constant. */
export function priorOf(axes: readonly Axis[], point: readonly number[]): number {
  return axes.reduce(
    (sum, { prior }, i) => (prior === null ? sum : sum + ((point[i]! - prior.mean) / prior.sigma) ** 2),
    0,
  );
}

function demand(holds: boolean, message: string): asserts holds {
  if (!holds) throw new EngineError('search-request', message);
}
