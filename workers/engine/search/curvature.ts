/** Gradient and Hessian of a function from its values alone, and what the Hessian says of a likelihood's parameters. */
import { EigenvalueDecomposition, Matrix } from 'ml-matrix';
import type { Asking } from './box-search';

export interface Quadratic {
  centre: number[];
  value: number;
  gradient: number[];
  /** n×n, symmetric. */
  hessian: Matrix;
}

/**
 * Central differences about `centre` with the steps h: error of second order in h (Abramowitz & Stegun 1964, 25.3.23 and
 * 25.3.27). 2n + n(n − 1) evaluations.
 */
export function* differences(
  centre: readonly number[],
  value: number,
  steps: readonly number[],
): Asking<Quadratic> {
  const n = centre.length;
  const up: number[] = [];
  const down: number[] = [];
  for (let i = 0; i < n; i += 1) {
    up.push(yield moved(centre, steps, [i], 1));
    down.push(yield moved(centre, steps, [i], -1));
  }
  const gradient = steps.map((h, i) => (up[i]! - down[i]!) / (2 * h));
  const hessian = Matrix.zeros(n, n);
  for (let i = 0; i < n; i += 1) {
    hessian.set(i, i, (up[i]! - 2 * value + down[i]!) / steps[i]! ** 2);
    for (let j = 0; j < i; j += 1) {
      const both = (yield moved(centre, steps, [i, j], 1)) + (yield moved(centre, steps, [i, j], -1));
      const sides = up[i]! + down[i]! + up[j]! + down[j]!;
      const mixed = (both - sides + 2 * value) / (2 * steps[i]! * steps[j]!);
      hessian.set(i, j, mixed);
      hessian.set(j, i, mixed);
    }
  }
  return { centre: [...centre], value, gradient, hessian };
}

function moved(centre: readonly number[], steps: readonly number[], axes: number[], sign: number): number[] {
  return centre.map((x, i) => (axes.includes(i) ? x + sign * steps[i]! : x));
}

/** σ of ln x along a direction above which the data do not tell the value: a factor of two. */
const OBSERVABLE_SIGMA = Math.LN2;
/** Share of a parameter that may lie in directions that the data do not tell. */
const HIDDEN_SHARE = 0.02;

/**
 * 1σ of each parameter where −2 ln likelihood has this Hessian: the observed information is H/2, the covariance its
 * inverse (Kendall & Stuart 1979, § 18.26). null for a parameter that has a share in a direction whose own σ is above a
 * factor of two or along which the likelihood does not even rise.
 */
export function deviations(hessian: Matrix): (number | null)[] {
  const n = hessian.rows;
  const { realEigenvalues, eigenvectorMatrix } = new EigenvalueDecomposition(Matrix.mul(hessian, 0.5), {
    assumeSymmetric: true,
  });
  return Array.from({ length: n }, (_, i) => {
    let hidden = 0;
    let variance = 0;
    realEigenvalues.forEach((information, k) => {
      const share = eigenvectorMatrix.get(i, k) ** 2;
      if (information * OBSERVABLE_SIGMA ** 2 > 1) variance += share / information;
      else hidden += share;
    });
    return hidden > HIDDEN_SHARE || variance > OBSERVABLE_SIGMA ** 2 ? null : Math.sqrt(variance);
  });
}
