/** Radial errors of Gaussian position errors: CEP, R95, DRMS and the shares that go with them. */
import { chiSquaredCdf, chiSquaredQuantile, normalCdf } from './distributions';

/** Radius that holds `share` of a circular Gaussian with σ on each axis (Rayleigh). CEP: share 0.5. */
export function circularRadius(sigma: number, share: number): number {
  return sigma * Math.sqrt(-2 * Math.log1p(-share));
}

/** Share of a circular Gaussian inside a radius (Rayleigh). */
export function circularShare(sigma: number, radius: number): number {
  return -Math.expm1(-((radius / sigma) ** 2) / 2);
}

/** Radius of the sphere that holds `share` of a Gaussian with σ on each of three axes. SEP: share 0.5. */
export function sphericalRadius(sigma: number, share: number): number {
  return sigma * Math.sqrt(chiSquaredQuantile(share, 3));
}

/** Share of a three-axis Gaussian inside a radius. */
export function sphericalShare(sigma: number, radius: number): number {
  return chiSquaredCdf((radius / sigma) ** 2, 3);
}

/**
 * Share of a two-axis Gaussian (independent, σ₁ and σ₂) inside a radius: ∫ of the density along the longer axis times
 * the chord's probability across it. Absolute error below 1e-8 for any σ₂/σ₁, zero included.
 */
export function ellipticalShare(sigma1: number, sigma2: number, radius: number): number {
  const long = Math.max(sigma1, sigma2);
  const short = Math.min(sigma1, sigma2);
  if (radius <= 0) return 0;
  if (long === 0) return 1;
  // x = r·sin t takes the square-root singularity off the ends; t = π/2·(1 − (1 − u)³) crowds nodes where the chord closes.
  const panels = 48;
  let sum = 0;
  for (let i = 0; i < panels; i += 1)
    for (let k = 0; k < GAUSS_NODES.length; k += 1) {
      const u = (i + 0.5 + GAUSS_NODES[k]! / 2) / panels;
      const rest = (1 - u) ** 3;
      const t = (Math.PI / 2) * (1 - rest);
      const half = radius * Math.sin((Math.PI / 2) * rest);
      const chord = short === 0 ? 1 : 2 * normalCdf(half / short) - 1;
      const x = (radius * Math.sin(t)) / long;
      const dx = half * (Math.PI / 2) * 3 * (1 - u) ** 2;
      sum += (GAUSS_WEIGHTS[k]! / 2 / panels) * Math.exp((-x * x) / 2) * chord * dx;
    }
  return (2 * sum) / (long * Math.sqrt(2 * Math.PI));
}

/** Radius that holds `share` of a two-axis Gaussian with σ₁ and σ₂, by bisection. CEP: share 0.5; R95: 0.95. */
export function ellipticalRadius(sigma1: number, sigma2: number, share: number): number {
  let low = 0;
  let high = circularRadius(Math.max(sigma1, sigma2), share);
  for (let i = 0; i < 50 && high - low > 1e-9 * high; i += 1) {
    const middle = (low + high) / 2;
    if (ellipticalShare(sigma1, sigma2, middle) < share) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

/** Four-point Gauss–Legendre on [−1, 1]. */
const GAUSS_NODES = [-0.8611363115940526, -0.3399810435848563, 0.3399810435848563, 0.8611363115940526];
const GAUSS_WEIGHTS = [0.3478548451374538, 0.6521451548625461, 0.6521451548625461, 0.3478548451374538];
