/** χ² and normal distributions: probabilities and quantiles. */
import { incompleteGamma, logGamma, poissonTerm } from './gamma';

/** Local names: a global looked up in each call costs more than the call. */
const { abs, exp, log, min, sqrt } = Math;

/** P(X ≤ x) of χ² with `dof` degrees of freedom (any positive real number). */
export function chiSquaredCdf(x: number, dof: number): number {
  return incompleteGamma(dof / 2, x / 2).lower;
}

/** P(X > x) of χ²: keeps its digits where 1 − CDF would lose them. */
export function chiSquaredUpper(x: number, dof: number): number {
  return incompleteGamma(dof / 2, x / 2).upper;
}

/**
 * x with P(X ≤ x) = p, for 0 ≤ p < 1 and any positive dof: Wilson–Hilferty's start (1931), then Newton steps kept
 * inside a shrinking bracket. Relative error below 1e-12.
 * @throws RangeError for p outside [0, 1) or dof that is not positive.
 */
export function chiSquaredQuantile(p: number, dof: number): number {
  if (!(p >= 0 && p < 1)) throw new RangeError(`A χ² probability lies in [0, 1), not ${p}.`);
  if (!(dof > 0)) throw new RangeError(`χ² needs positive degrees of freedom, not ${dof}.`);
  if (p === 0) return 0;
  const a = dof / 2;
  let low = 0;
  let high = Infinity;
  let x = quantileStart(p, dof) / 2;
  for (let i = 0; i < 200; i += 1) {
    const tails = incompleteGamma(a, x);
    const excess = p < 0.5 ? tails.lower - p : 1 - p - tails.upper;
    if (excess > 0) high = x;
    else low = x;
    // Density of the gamma distribution: x^(a−1) e^−x / Γ(a) = poissonTerm·a / x.
    const density = (poissonTerm(a, x) * a) / x;
    let next = x - excess / density;
    if (!(next > low && next < high)) next = high === Infinity ? 2 * x : (low + high) / 2;
    const done = abs(next - x) <= 1e-14 * next;
    x = next;
    if (done) break;
  }
  return 2 * x;
}

/** P(Z ≤ z) of the standard normal; both tails to full relative digits. */
export function normalCdf(z: number): number {
  const tails = incompleteGamma(0.5, (z * z) / 2);
  return z < 0 ? tails.upper / 2 : 0.5 + tails.lower / 2;
}

/**
 * z with P(Z ≤ z) = p: rational start (Abramowitz & Stegun 26.2.23), then Halley steps.
 * @throws RangeError for p outside (0, 1).
 */
export function normalQuantile(p: number): number {
  if (!(p > 0 && p < 1)) throw new RangeError(`A normal probability lies in (0, 1), not ${p}.`);
  if (p === 0.5) return 0;
  const tail = min(p, 1 - p);
  const t = sqrt(-2 * log(tail));
  let z =
    -t + (2.515517 + t * (0.802853 + t * 0.010328)) / (1 + t * (1.432788 + t * (0.189269 + t * 0.001308)));
  for (let i = 0; i < 4; i += 1) {
    const error = normalCdf(z) - tail;
    const density = exp((-z * z) / 2) / sqrt(2 * Math.PI);
    const step = error / density;
    z -= step / (1 + (z * step) / 2);
  }
  return p < 0.5 ? z : -z;
}

function quantileStart(p: number, dof: number): number {
  const k = 2 / (9 * dof);
  const root = 1 - k + normalQuantile(p) * sqrt(k);
  // Where the cube root nears zero the leading term of the lower tail is the better guess.
  if (root < 0.2) return 2 * exp((log(p) + logGamma(dof / 2 + 1)) / (dof / 2));
  return dof * root * root * root;
}
