/** The incomplete gamma function, on which the χ² and normal distributions stand. */

/** Local names: a global looked up in each call costs more than the call. */
const { abs, exp, log, sin, sqrt } = Math;

/** Γ(x)'s logarithm for x > 0: Lanczos approximation (g = 7, n = 9; Godfrey 2001), rel 1e-14. */
export function logGamma(x: number): number {
  if (x < 0.5) return log(Math.PI / sin(Math.PI * x)) - logGamma(1 - x);
  const y = x - 1;
  let sum = LANCZOS[0]!;
  for (let i = 1; i < LANCZOS.length; i += 1) sum += LANCZOS[i]! / (y + i);
  const t = y + 7.5;
  return HALF_LN_2PI + (y + 0.5) * log(t) - t + log(sum);
}

/**
 * Both tails of the regularised incomplete gamma function, P(a, x) and Q(a, x) = 1 − P, each to full relative digits
 * (Abramowitz & Stegun 6.5: series below a + 1, continued fraction above, by the modified Lentz method).
 */
export function incompleteGamma(a: number, x: number): { lower: number; upper: number } {
  if (!(a > 0) || Number.isNaN(x)) return { lower: Number.NaN, upper: Number.NaN };
  if (x <= 0) return { lower: 0, upper: 1 };
  if (x === Infinity) return { lower: 1, upper: 0 };
  if (x < a + 1) {
    const lower = poissonTerm(a, x) * seriesSum(a, x);
    return { lower, upper: 1 - lower };
  }
  const upper = poissonTerm(a, x) * a * continuedFraction(a, x);
  return { lower: 1 - upper, upper };
}

/**
 * x^a e^−x / Γ(a + 1) without the cancellation of its logarithms, after Loader, Fast and accurate computation of
 * binomial probabilities (2000): the exponent is a deviance, not a difference of large terms.
 */
export function poissonTerm(a: number, x: number): number {
  return exp(-stirlingError(a) - deviance(a, x)) / sqrt(2 * Math.PI * a);
}

const HALF_LN_2PI = 0.9189385332046728;
const LANCZOS = [
  0.99999999999980993, 676.5203681218851, -1259.1392167224028, 771.32342877765313, -176.61502916214059,
  12.507343278686905, -0.13857109526572012, 9.9843695780195716e-6, 1.5056327351493116e-7,
];
const MAX_TERMS = 100_000;

/** Σ x^k / ((a+1)…(a+k)), k = 0… */
function seriesSum(a: number, x: number): number {
  let term = 1;
  let sum = 1;
  for (let k = 1; k < MAX_TERMS; k += 1) {
    term *= x / (a + k);
    sum += term;
    if (term < sum * 1e-17) break;
  }
  return sum;
}

function continuedFraction(a: number, x: number): number {
  const tiny = 1e-300;
  let b = x + 1 - a;
  let c = 1 / tiny;
  let d = 1 / (b === 0 ? tiny : b);
  let h = d;
  for (let i = 1; i < MAX_TERMS; i += 1) {
    const an = -i * (i - a);
    b += 2;
    d = an * d + b;
    if (abs(d) < tiny) d = tiny;
    c = b + an / c;
    if (abs(c) < tiny) c = tiny;
    d = 1 / d;
    const step = d * c;
    h *= step;
    if (abs(step - 1) < 1e-16) break;
  }
  return h;
}

/** ln Γ(a+1) − [½ ln(2πa) + a ln a − a]. */
function stirlingError(a: number): number {
  if (a < 16) return logGamma(a + 1) - (a + 0.5) * log(a) + a - HALF_LN_2PI;
  const i2 = 1 / (a * a);
  return (1 / 12 - (1 / 360 - (1 / 1260 - (1 / 1680 - i2 / 1188) * i2) * i2) * i2) / a;
}

/** a·ln(a/x) + x − a, by a series where the two are close. */
function deviance(a: number, x: number): number {
  if (abs(a - x) >= 0.1 * (a + x)) return a * log(a / x) + x - a;
  const v = (a - x) / (a + x);
  let sum = (a - x) * v;
  let term = 2 * a * v;
  for (let j = 1; j < 1000; j += 1) {
    term *= v * v;
    const next = sum + term / (2 * j + 1);
    if (next === sum) break;
    sum = next;
  }
  return sum;
}
