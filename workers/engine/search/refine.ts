/**
 * From a good point to the minimum: Newton steps on a quadratic from differences, inside a trust region and a box
 * (Conn, Gould & Toint 2000, ch. 6–7; the Hessian is needed for the uncertainties in any case).
 */
import { EigenvalueDecomposition, type Matrix } from 'ml-matrix';
import type { Asking, Minimum } from './box-search';
import { differences, type Quadratic } from './curvature';

const FIRST_STEP = 0.15;
const STEP_LIMITS = [0.01, 0.3] as const;
const FIRST_RADIUS = 0.7;
const LARGEST_RADIUS = 2;
const ROUNDS = 12;
/** A step that promises less than this in −2 ln likelihood is not worth taking: a tenth of a σ. */
const ENOUGH = 0.01;

export interface Refined extends Minimum {
  /** The last quadratic, taken about `point`. */
  quadratic: Quadratic;
  converged: boolean;
}

/** The differences may reach out of the box by a step; the answer lies within. */
export function* refine(start: Minimum, low: readonly number[], high: readonly number[]): Asking<Refined> {
  let best = start;
  let steps = start.point.map(() => FIRST_STEP);
  let radius = FIRST_RADIUS;
  let quadratic = yield* differences(best.point, best.value, steps);
  for (let round = 0; round < ROUNDS; round += 1) {
    const before = best;
    for (let tries = 0; tries < 6 && best === before; tries += 1) {
      const step = trustedStep(quadratic, radius, low, high);
      const promised = -change(quadratic, step);
      if (promised < ENOUGH) break;
      const point = best.point.map((x, i) => x + step[i]!);
      const value: number = yield point;
      const kept = (best.value - value) / promised;
      if (kept > 0.1) best = { point, value };
      radius = kept < 0.25 ? radius / 3 : kept > 0.75 ? Math.min(LARGEST_RADIUS, 2 * radius) : radius;
    }
    const rested = best === before;
    const finer = steps.map((_, i) => fittingStep(quadratic.hessian.get(i, i)));
    const settled = finer.every((h, i) => Math.abs(Math.log(h / steps[i]!)) < 0.4);
    if (rested && settled) return { ...best, quadratic, converged: true };
    steps = finer;
    quadratic = yield* differences(best.point, best.value, steps);
  }
  return { ...best, quadratic, converged: false };
}

/** A step over which −2 ln likelihood rises by one: a σ, where the curvature is the whole story. */
function fittingStep(curvature: number): number {
  const [smallest, largest] = STEP_LIMITS;
  return curvature > 0 ? Math.min(largest, Math.max(smallest, Math.sqrt(2 / curvature))) : largest;
}

function change({ gradient, hessian }: Quadratic, step: readonly number[]): number {
  let sum = 0;
  for (let i = 0; i < step.length; i += 1) {
    sum += gradient[i]! * step[i]!;
    for (let j = 0; j < step.length; j += 1) sum += 0.5 * step[i]! * step[j]! * hessian.get(i, j);
  }
  return sum;
}

/** The quadratic's lowest point within the radius, axes that press against the box held at its side. */
function trustedStep(
  quadratic: Quadratic,
  radius: number,
  low: readonly number[],
  high: readonly number[],
): number[] {
  const { centre, gradient, hessian } = quadratic;
  const step = centre.map(() => 0);
  let free = centre.map((_, i) => i);
  // Each turn holds at least one more axis.
  while (free.length > 0) {
    const held = gradient.map(
      (g, i) => g + step.reduce((sum, s, j) => sum + (free.includes(j) ? 0 : s * hessian.get(i, j)), 0),
    );
    const part = sphereStep(
      hessian.selection(free, free),
      free.map((i) => held[i]!),
      radius,
    );
    const outside = free.filter(
      (i, k) => centre[i]! + part[k]! < low[i]! || centre[i]! + part[k]! > high[i]!,
    );
    free.forEach(
      (i, k) => (step[i] = Math.min(high[i]! - centre[i]!, Math.max(low[i]! - centre[i]!, part[k]!))),
    );
    if (outside.length === 0) break;
    free = free.filter((i) => !outside.includes(i));
  }
  return step;
}

/** Minimiser of gᵀs + ½ sᵀHs with |s| ≤ radius: (H + λI)s = −g, λ by bisection. */
function sphereStep(hessian: Matrix, gradient: readonly number[], radius: number): number[] {
  const { realEigenvalues: curvature, eigenvectorMatrix: v } = new EigenvalueDecomposition(hessian, {
    assumeSymmetric: true,
  });
  const slope = curvature.map((_, k) => gradient.reduce((sum, g, i) => sum + v.get(i, k) * g, 0));
  const along = (shift: number) => slope.map((g, k) => -g / (curvature[k]! + shift));
  const length = (shift: number) => Math.hypot(...along(shift));
  const floor = Math.max(0, 1e-9 - Math.min(...curvature));
  let shift = floor;
  if (length(floor) > radius) {
    let lowShift = floor;
    let highShift = floor + Math.hypot(...slope) / radius + 1;
    for (let i = 0; i < 80; i += 1) {
      shift = (lowShift + highShift) / 2;
      if (length(shift) > radius) lowShift = shift;
      else highShift = shift;
    }
  }
  const part = along(shift);
  return gradient.map((_, i) => part.reduce((sum, s, k) => sum + v.get(i, k) * s, 0));
}
