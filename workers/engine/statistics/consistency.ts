/** Tests of a filter's consistency: bounds on averages, shares and standard deviations. */
import { chiSquaredQuantile, normalQuantile } from './distributions';

/**
 * Two-sided bounds on the average NIS or NEES of `count` independent samples of dimension `dimension`
 * (Bar-Shalom, Li & Kirubarajan 2001, §5.4): χ² quantiles of count·dimension degrees of freedom ÷ count.
 */
export function averageBounds(count: number, dimension: number, level = 0.95): [number, number] {
  const dof = count * dimension;
  return [chiSquaredQuantile((1 - level) / 2, dof) / count, chiSquaredQuantile((1 + level) / 2, dof) / count];
}

/** Factors on a sample standard deviation (mean known to be removed: count − 1 degrees) that bound the true one. */
export function sigmaInterval(count: number, level = 0.95): [number, number] {
  const dof = count - 1;
  return [
    Math.sqrt(dof / chiSquaredQuantile((1 + level) / 2, dof)),
    Math.sqrt(dof / chiSquaredQuantile((1 - level) / 2, dof)),
  ];
}

/** Half-width of the interval about an observed share of `count` independent cases whose true share is `p` (normal approximation). */
export function shareHalfWidth(p: number, count: number, level = 0.95): number {
  return normalQuantile((1 + level) / 2) * Math.sqrt((p * (1 - p)) / count);
}

/**
 * νᵀS⁻¹ν and ln|S| of a symmetric positive definite S (n×n, row by row) by Cholesky; NaN for both where S is not.
 * For analysis: allocates.
 */
export function mahalanobis(
  nu: ArrayLike<number>,
  s: ArrayLike<number>,
): { squared: number; logDet: number } {
  const n = nu.length;
  const l = new Float64Array(n * n);
  const y = new Float64Array(n);
  let squared = 0;
  let logDet = 0;
  for (let i = 0; i < n; i += 1) {
    for (let j = 0; j <= i; j += 1) {
      let sum = s[i * n + j]!;
      for (let k = 0; k < j; k += 1) sum -= l[i * n + k]! * l[j * n + k]!;
      if (i === j && !(sum > 0)) return { squared: Number.NaN, logDet: Number.NaN };
      l[i * n + j] = i === j ? Math.sqrt(sum) : sum / l[j * n + j]!;
    }
    let v = nu[i]!;
    for (let k = 0; k < i; k += 1) v -= l[i * n + k]! * y[k]!;
    y[i] = v / l[i * n + i]!;
    squared += y[i]! * y[i]!;
    logDet += 2 * Math.log(l[i * n + i]!);
  }
  return { squared, logDet };
}
