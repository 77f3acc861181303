/** Quantiles of χ² for the few degrees of freedom that a measurement group has. Source: tabulated values (Abramowitz & Stegun, table 26.8). */

/** Two-sided 95 % bounds of one value with `dimension` degrees of freedom (1…3). */
export function nisBounds95(dimension: number): [number, number] {
  return BOUNDS_95[dimension] ?? BOUNDS_95[3]!;
}

const BOUNDS_95: Record<number, [number, number]> = {
  1: [0.000982, 5.02389],
  2: [0.0506356, 7.37776],
  3: [0.215795, 9.3484],
};

/**
 * Radius that holds 95 % of a plane normal error, as a multiple of its root of summed variances √(σ₁² + σ₂²).
 * `ratio` is the smaller σ ÷ the larger one, 0…1. Polynomial of W. Hoover, Algorithms for confidence circles and
 * ellipses, NOAA Technical Report NOS 107 C&GS 3 (1984); exact at 0 and 1 to 0.2 %.
 */
export function radius95OverDrms(ratio: number): number {
  const c = Math.min(1, Math.max(0, ratio));
  const overLarger = 1.96079 + 0.004071 * c + 0.114276 * c * c + 0.371625 * c * c * c;
  return overLarger / Math.sqrt(1 + c * c);
}
