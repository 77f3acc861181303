/** The five noise terms of an inertial sensor and their parts of the Allan variance. */

/** Local names: a global looked up in each call costs more than the call. */
const { sqrt } = Math;

export const TERM_NAMES = ['quantisation', 'white', 'biasInstability', 'rateRandomWalk', 'ramp'] as const;
export type TermName = (typeof TERM_NAMES)[number];

/**
 * Coefficients (IEEE Std 952-1997, annex C), in the unit u of the rates: quantisation Q (u·s), white N (u·√s: angle or
 * velocity random walk), bias instability B (u), rate random walk K (u/√s), ramp R (u/s).
 */
export type TermValues = Record<TermName, number>;

export const NO_TERMS: Readonly<TermValues> = {
  quantisation: 0,
  white: 0,
  biasInstability: 0,
  rateRandomWalk: 0,
  ramp: 0,
};

const FLICKER = (2 * Math.LN2) / Math.PI;

/** Allan variance at τ of a unit coefficient: 3/τ², 1/τ, 2 ln 2/π, τ/3, τ²/2. */
export function unitVariance(term: TermName, tauS: number): number {
  switch (term) {
    case 'quantisation':
      return 3 / (tauS * tauS);
    case 'white':
      return 1 / tauS;
    case 'biasInstability':
      return FLICKER;
    case 'rateRandomWalk':
      return tauS / 3;
    case 'ramp':
      return (tauS * tauS) / 2;
  }
}

/** Allan deviation of the terms together. */
export function modelDeviation(values: TermValues, tauS: number): number {
  return sqrt(TERM_NAMES.reduce((sum, term) => sum + values[term] ** 2 * unitVariance(term, tauS), 0));
}

/** Slope of the terms' Allan variance in log–log at τ. */
export function modelSlope(values: TermValues, tauS: number): number {
  const exponents = [-2, -1, 0, 1, 2];
  let total = 0;
  let weighted = 0;
  TERM_NAMES.forEach((term, i) => {
    const part = values[term] ** 2 * unitVariance(term, tauS);
    total += part;
    weighted += exponents[i]! * part;
  });
  return total === 0 ? 0 : weighted / total;
}
