/** Least squares with unknowns that may not be negative. */
import { Matrix, QrDecomposition } from 'ml-matrix';

/**
 * x ≥ 0 that minimises |Ax − b|: the active-set method of Lawson & Hanson (Solving Least Squares Problems, 1974,
 * ch. 23). Columns are scaled to unit length inside. A is rows × columns, rows ≥ columns; for small problems.
 */
export function nonNegativeLeastSquares(a: readonly (readonly number[])[], b: readonly number[]): number[] {
  const columns = a[0]!.length;
  const lengths = Array.from({ length: columns }, (_, j) => Math.hypot(...a.map((row) => row[j]!)) || 1);
  const scaled = a.map((row) => row.map((value, j) => value / lengths[j]!));
  const size = Math.hypot(...b) || 1;
  const free = new Set<number>();
  let x = new Array<number>(columns).fill(0);
  for (let round = 0; round < 10 * columns; round += 1) {
    const entering = steepest(scaled, b, x, free, 1e-13 * size);
    if (entering < 0) break;
    free.add(entering);
    for (;;) {
      const trial = solveFree(scaled, b, [...free], columns);
      const blocked = [...free].filter((j) => trial[j]! <= 0);
      if (blocked.length === 0) {
        x = trial;
        break;
      }
      // Go towards the trial until the first unknown reaches zero; it leaves.
      const step = Math.min(...blocked.map((j) => x[j]! / (x[j]! - trial[j]! || 1)));
      x = x.map((value, j) => value + step * (trial[j]! - value));
      for (const j of blocked)
        if (x[j]! <= 1e-15 * size) {
          x[j] = 0;
          free.delete(j);
        }
      if (free.size === 0) break;
    }
    if (free.size === 0) break;
  }
  return x.map((value, j) => value / lengths[j]!);
}

/** The bound unknown whose growth reduces the residual most; −1 where none does. */
function steepest(
  a: readonly (readonly number[])[],
  b: readonly number[],
  x: readonly number[],
  free: ReadonlySet<number>,
  tolerance: number,
): number {
  const residual = a.map((row, i) => b[i]! - row.reduce((sum, value, j) => sum + value * x[j]!, 0));
  let best = -1;
  let most = tolerance;
  for (let j = 0; j < x.length; j += 1) {
    if (free.has(j)) continue;
    const gradient = a.reduce((sum, row, i) => sum + row[j]! * residual[i]!, 0);
    if (gradient > most) {
      most = gradient;
      best = j;
    }
  }
  return best;
}

function solveFree(
  a: readonly (readonly number[])[],
  b: readonly number[],
  free: readonly number[],
  columns: number,
): number[] {
  const solution = new QrDecomposition(new Matrix(a.map((row) => free.map((j) => row[j]!)))).solve(
    Matrix.columnVector([...b]),
  );
  const x = new Array<number>(columns).fill(0);
  free.forEach((j, k) => {
    x[j] = solution.get(k, 0);
  });
  return x;
}
