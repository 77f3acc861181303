/** Noise terms fitted to a measured Allan curve. */
import { equivalentDegrees, kindOfSlope } from './confidence';
import type { AllanPoint } from './deviation';
import { nonNegativeLeastSquares } from './nnls';
import {
  modelDeviation,
  modelSlope,
  TERM_NAMES,
  unitVariance,
  type TermName,
  type TermValues,
} from './terms';

export interface TermFit {
  values: TermValues;
  /** Equivalent degrees of freedom of each point under the fitted terms. */
  edf: Float64Array;
  /** Gamma deviance of the points about the model: smaller is better. */
  deviance: number;
}

const NO_TERMS: TermValues = { quantisation: 0, white: 0, biasInstability: 0, rateRandomWalk: 0, ramp: 0 };

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
  const variance = points.map((p) => p.deviation ** 2);
  const model = [...variance];
  let values = NO_TERMS;
  const edf = new Float64Array(points.length);
  points.forEach((p, i) => {
    edf[i] = equivalentDegrees(kindOfSlope(measuredSlope(points, i)), samples + 1, p.m);
  });
  for (let round = 0; round < 12; round += 1) {
    const weights = points.map((_, i) => Math.sqrt(edf[i]! / 2) / model[i]!);
    const rows = points.map((p, i) => terms.map((term) => weights[i]! * unitVariance(term, p.tauS)));
    const squares = nonNegativeLeastSquares(
      rows,
      variance.map((v, i) => weights[i]! * v),
    );
    const next: TermValues = { ...NO_TERMS };
    terms.forEach((term, j) => {
      next[term] = Math.sqrt(squares[j]!);
    });
    const change = Math.max(
      ...points.map((p, i) => {
        const fitted = Math.max(modelDeviation(next, p.tauS) ** 2, 1e-12 * variance[i]!);
        const moved = Math.abs(fitted / model[i]! - 1);
        model[i] = fitted;
        edf[i] = equivalentDegrees(kindOfSlope(modelSlope(next, p.tauS)), samples + 1, p.m);
        return moved;
      }),
    );
    values = next;
    if (change < 1e-9) break;
  }
  let deviance = 0;
  for (let i = 0; i < points.length; i += 1) {
    const ratio = variance[i]! / model[i]!;
    deviance += edf[i]! * (ratio - 1 - Math.log(ratio));
  }
  return { values, edf, deviance };
}

/** Slope of the measured variance in log–log between a point's neighbours. */
function measuredSlope(points: readonly AllanPoint[], i: number): number {
  const a = points[Math.max(i - 1, 0)]!;
  const b = points[Math.min(i + 1, points.length - 1)]!;
  if (a === b) return -1;
  return (2 * Math.log(b.deviation / a.deviation)) / Math.log(b.tauS / a.tauS);
}
