/** Noise terms fitted to a measured Allan curve. */
import { equivalentDegrees, kindOfSlope } from './confidence';
import type { AllanPoint } from './deviation';
import { nonNegativeLeastSquares } from './nnls';
import { modelSlope, NO_TERMS, TERM_NAMES, unitVariance, type TermName, type TermValues } from './terms';

/** Local names: a global looked up in each call costs more than the call. */
const { abs, log, max, min, sqrt } = Math;

export interface TermFit {
  values: TermValues;
  /** Equivalent degrees of freedom of each point under the fitted terms. */
  edf: Float64Array;
  /** Gamma deviance of the points about the model: smaller is better. */
  deviance: number;
}

/** A point counts as known to 3 % of its deviation at best: no five-term law fits a real sensor better. */
const MOST_DEGREES = 555;
const MOST_ROUNDS = 15;

/**
 * Non-negative coefficients of the given terms by least squares on the variance, each point weighted by its degrees of
 * freedom over the square of its own variance under the model, and iterated: the scoring equations of the gamma
 * distribution, which the estimated variances follow. Weights from the measured values instead would favour points that
 * happen to lie low.
 * @param samples length of the series that the points were made from.
 */
export function fitTerms(
  points: readonly AllanPoint[],
  samples: number,
  terms: readonly TermName[] = TERM_NAMES,
): TermFit {
  const count = points.length;
  const variance = Float64Array.from(points, (p) => p.deviation ** 2);
  const basis = Float64Array.from(points.flatMap((p) => terms.map((term) => unitVariance(term, p.tauS))));
  const edf = Float64Array.from(points, (p, i) =>
    equivalentDegrees(kindOfSlope(measuredSlope(points, i)), samples + 1, p.m),
  );
  const model = variance.slice();
  const weights = new Float64Array(count);
  const values = { ...NO_TERMS };
  for (let round = 0; round < MOST_ROUNDS; round += 1) {
    for (let i = 0; i < count; i += 1) weights[i] = sqrt(trusted(edf[i]!) / 2) / model[i]!;
    const squares = nonNegativeLeastSquares(basis, variance, weights, terms.length);
    terms.forEach((term, j) => {
      values[term] = sqrt(squares[j]!);
    });
    let change = 0;
    for (let i = 0; i < count; i += 1) {
      let fitted = 0;
      for (let j = 0; j < terms.length; j += 1) fitted += squares[j]! * basis[i * terms.length + j]!;
      fitted = max(fitted, 1e-12 * variance[i]!);
      change = max(change, abs(fitted / model[i]! - 1));
      model[i] = fitted;
      const { m, tauS } = points[i]!;
      edf[i] = equivalentDegrees(kindOfSlope(modelSlope(values, tauS)), samples + 1, m);
    }
    if (change < 1e-4) break;
  }
  let deviance = 0;
  for (let i = 0; i < count; i += 1) {
    const ratio = variance[i]! / model[i]!;
    deviance += trusted(edf[i]!) * (ratio - 1 - log(ratio));
  }
  return { values, edf, deviance };
}

const trusted = (edf: number) => min(edf, MOST_DEGREES);

/** Slope of the measured variance in log–log between a point's neighbours. */
function measuredSlope(points: readonly AllanPoint[], i: number): number {
  const a = points[max(i - 1, 0)]!;
  const b = points[min(i + 1, points.length - 1)]!;
  if (a === b) return -1;
  return (2 * log(b.deviation / a.deviation)) / log(b.tauS / a.tauS);
}
