/** Least squares with unknowns that may not be negative. */

/** Local names: a global looked up in each call costs more than the call. */
const { abs, hypot, max, min, sqrt } = Math;

/**
 * x ≥ 0 that minimises Σᵢ wᵢ² (Σⱼ aᵢⱼ xⱼ − bᵢ)²: the active-set method of Lawson & Hanson (Solving Least Squares
 * Problems, 1974, ch. 23) on the normal equations of columns scaled to unit length, with one step of refinement by the
 * residual, which wins back the digits that squaring the condition number costs. For a handful of unknowns.
 * @param a rows × columns, row by row; @param b, w one value a row.
 */
export function nonNegativeLeastSquares(
  a: Float64Array,
  b: Float64Array,
  w: Float64Array,
  columns: number,
): Float64Array {
  const rows = b.length;
  const scaled = new Float64Array(rows * columns);
  const lengths = new Float64Array(columns);
  for (let j = 0; j < columns; j += 1) {
    let sum = 0;
    for (let i = 0; i < rows; i += 1) sum += (w[i]! * a[i * columns + j]!) ** 2;
    lengths[j] = sqrt(sum) || 1;
    for (let i = 0; i < rows; i += 1) scaled[i * columns + j] = (w[i]! * a[i * columns + j]!) / lengths[j]!;
  }
  const target = Float64Array.from(b, (value, i) => w[i]! * value);
  const x = activeSet(scaled, target, columns);
  for (let j = 0; j < columns; j += 1) x[j] = x[j]! / lengths[j]!;
  return x;
}

function activeSet(a: Float64Array, b: Float64Array, columns: number): Float64Array {
  const gram = gramOf(a, columns);
  const x = new Float64Array(columns);
  const gradient = new Float64Array(columns);
  const free: number[] = [];
  const tolerance = 1e-13 * hypot(...b);
  for (let round = 0; round < 5 * columns; round += 1) {
    project(a, b, x, gradient);
    let entering = -1;
    for (let j = 0; j < columns; j += 1)
      if (!free.includes(j) && gradient[j]! > (entering < 0 ? tolerance : gradient[entering]!)) entering = j;
    if (entering < 0) break;
    free.push(entering);
    while (free.length > 0) {
      // Step from x towards the least squares over the free unknowns.
      project(a, b, x, gradient);
      const step = solve(gram, gradient, free, columns);
      let share = 1;
      free.forEach((j, k) => {
        if (x[j]! + step[k]! <= 0 && step[k]! < 0) share = min(share, -x[j]! / step[k]!);
      });
      free.forEach((j, k) => {
        x[j] = x[j]! + share * step[k]!;
      });
      if (share === 1) break;
      for (let k = free.length - 1; k >= 0; k -= 1)
        if (x[free[k]!]! <= 1e-15 * abs(step[k]!)) x[free.splice(k, 1)[0]!] = 0;
    }
    if (free.length === 0) break;
  }
  project(a, b, x, gradient);
  const last = free.length > 0 ? solve(gram, gradient, free, columns) : [];
  free.forEach((j, k) => {
    x[j] = max(x[j]! + last[k]!, 0);
  });
  return x;
}

function gramOf(a: Float64Array, columns: number): Float64Array {
  const gram = new Float64Array(columns * columns);
  for (let at = 0; at < a.length; at += columns)
    for (let r = 0; r < columns; r += 1)
      for (let c = 0; c < columns; c += 1) gram[r * columns + c]! += a[at + r]! * a[at + c]!;
  return gram;
}

/** out = Aᵀ(b − Ax). */
function project(a: Float64Array, b: Float64Array, x: Float64Array, out: Float64Array): void {
  const columns = x.length;
  out.fill(0);
  for (let i = 0; i < b.length; i += 1) {
    let residual = b[i]!;
    for (let j = 0; j < columns; j += 1) residual -= a[i * columns + j]! * x[j]!;
    for (let j = 0; j < columns; j += 1) out[j]! += a[i * columns + j]! * residual;
  }
}

/** Solution of the free part of gram·s = g by Cholesky; a hair on the diagonal keeps twin columns apart. */
function solve(gram: Float64Array, g: Float64Array, free: readonly number[], columns: number): number[] {
  const n = free.length;
  const l: number[][] = [];
  const y: number[] = [];
  for (let r = 0; r < n; r += 1) {
    const row: number[] = [];
    for (let c = 0; c <= r; c += 1) {
      let sum = gram[free[r]! * columns + free[c]!]! + (r === c ? 1e-15 : 0);
      for (let k = 0; k < c; k += 1) sum -= row[k]! * (c === r ? row[k]! : l[c]![k]!);
      row.push(c === r ? sqrt(max(sum, 1e-15)) : sum / l[c]![c]!);
    }
    l.push(row);
    let value = g[free[r]!]!;
    for (let k = 0; k < r; k += 1) value -= row[k]! * y[k]!;
    y.push(value / row[r]!);
  }
  const s = new Array<number>(n).fill(0);
  for (let r = n - 1; r >= 0; r -= 1) {
    let value = y[r]!;
    for (let k = r + 1; k < n; k += 1) value -= l[k]![r]! * s[k]!;
    s[r] = value / l[r]![r]!;
  }
  return s;
}
