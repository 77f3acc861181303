/** A sensor's noise from a stretch at rest: the Allan curve with its confidence, and the terms that it supports. */
import { createRandom } from '../random';
import { standardDeviation } from '../statistics/descriptive';
import { deviationInterval } from './confidence';
import { logSpacedClusters, overlappingAllan, type AllanPoint } from './deviation';
import { fitTerms, type TermFit } from './fit';
import { REPLICATES, replicateCurve } from './replicates';
import { modelDeviation, NO_TERMS, TERM_NAMES, type TermName, type TermValues } from './terms';

export interface CurvePoint extends AllanPoint {
  edf: number;
  /** 68 % interval of the true deviation. */
  low: number;
  high: number;
  /** Of the terms that were found. */
  model: number;
}

/** One term: its coefficient and 1σ where the record tells it; else null, and why. */
export interface TermVerdict {
  term: TermName;
  observable: boolean;
  value: number | null;
  sigma: number | null;
  /** Chance that a record without this term would look as much like having it. */
  p: number;
}

export interface NoiseAnalysis {
  durationS: number;
  intervalS: number;
  points: CurvePoint[];
  terms: Record<TermName, TermVerdict>;
}

/** A term is reported when a record without it would look so with less than this chance. */
const SIGNIFICANCE = 0.03;
/** Shortest record that is analysed, samples. */
export const MIN_SAMPLES = 100;

/**
 * Allan curve and noise terms of `rates` (one axis at rest, N samples at a constant interval τ₀ s, any unit u; the
 * coefficients come in the units of `TermValues`).
 *
 * All terms are fitted together; a ramp only where the record shows one, because it is mostly temperature. Each is then
 * tested: would records that lack it (seeded series with the other terms, as long as this one) be fitted better by having
 * it as often as this record is? Where they would, the term is called not observable and has no number. σ is the spread
 * of the fit over seeded series with the terms found.
 * @throws RangeError below 100 samples, or for values that are not finite.
 */
export function analyseNoise(rates: ArrayLike<number>, intervalS: number): NoiseAnalysis {
  if (rates.length < MIN_SAMPLES)
    throw new RangeError(
      `${rates.length} samples at rest are too few for a noise analysis: at least ${MIN_SAMPLES} are needed.`,
    );
  const n = rates.length;
  const curve = overlappingAllan(rates, intervalS, logSpacedClusters(n));
  const record: RecordShape = { samples: n, durationS: n * intervalS, curve };
  const steady = TERM_NAMES.filter((term) => term !== 'ramp');
  const p = { ...NO_TERMS };
  p.ramp = chanceWithout('ramp', TERM_NAMES, record);
  const kept = p.ramp < SIGNIFICANCE ? TERM_NAMES : steady;
  for (const term of steady) p[term] = chanceWithout(term, kept, record);
  const fit = fitTerms(curve, n, kept);
  return {
    durationS: record.durationS,
    intervalS,
    points: curve.map((point, i) => {
      const [low, high] = deviationInterval(point.deviation, fit.edf[i]!);
      return { ...point, edf: fit.edf[i]!, low, high, model: modelDeviation(fit.values, point.tauS) };
    }),
    terms: verdicts(fit, kept, p, record),
  };
}

interface RecordShape {
  samples: number;
  durationS: number;
  curve: AllanPoint[];
}

/** How often records without the term gain as much deviance from having it as this one does. */
function chanceWithout(term: TermName, kept: readonly TermName[], record: RecordShape): number {
  const others = kept.filter((name) => name !== term);
  const without = fitTerms(record.curve, record.samples, others);
  const gain = without.deviance - fitTerms(record.curve, record.samples, kept).deviance;
  if (!(gain > 1e-9)) return 1;
  let asMuch = 0;
  for (let r = 0; r < REPLICATES; r += 1) {
    const curve = drawnCurve(without, record, r);
    const drawn =
      fitTerms(curve, record.samples, others).deviance - fitTerms(curve, record.samples, kept).deviance;
    if (drawn >= gain) asMuch += 1;
  }
  return (asMuch + 1) / (REPLICATES + 1);
}

/**
 * A curve as a record with these terms might give it: at long τ that of a seeded series, at short τ, where thousands of
 * clusters are averaged, the model with the scatter that its degrees of freedom allow.
 */
function drawnCurve(fit: TermFit, record: RecordShape, r: number): AllanPoint[] {
  const long = replicateCurve(fit.values, record.durationS, r);
  const random = createRandom(7919 * r + 1);
  const from = long[0]!.tauS;
  let octave = Number.NaN;
  let z = 0;
  const short = record.curve.flatMap((point, i) => {
    if (point.tauS >= 0.99 * from) return [];
    // Neighbouring points share most of their data: one draw an octave.
    const here = Math.floor(Math.log2(point.m));
    if (here !== octave) z = random.normal();
    octave = here;
    const deviation = modelDeviation(fit.values, point.tauS) * (1 + z / Math.sqrt(2 * fit.edf[i]!));
    return [{ ...point, deviation }];
  });
  const perSample = record.durationS / record.samples;
  return [
    ...short,
    ...long.map((point) => ({ ...point, m: Math.max(Math.round(point.tauS / perSample), 1) })),
  ];
}

function verdicts(
  fit: TermFit,
  kept: readonly TermName[],
  p: Record<TermName, number>,
  record: RecordShape,
): Record<TermName, TermVerdict> {
  const drawn: TermValues[] = [];
  for (let r = 0; r < REPLICATES; r += 1)
    drawn.push(fitTerms(drawnCurve(fit, record, r), record.samples, kept).values);
  const verdict = (term: TermName): TermVerdict => {
    const value = fit.values[term];
    const observable = kept.includes(term) && p[term] < SIGNIFICANCE && value > 0;
    const sigma = observable ? standardDeviation(drawn.map((values) => values[term])) : null;
    return { term, observable, value: observable ? value : null, sigma, p: p[term] };
  };
  return {
    quantisation: verdict('quantisation'),
    white: verdict('white'),
    biasInstability: verdict('biasInstability'),
    rateRandomWalk: verdict('rateRandomWalk'),
    ramp: verdict('ramp'),
  };
}
