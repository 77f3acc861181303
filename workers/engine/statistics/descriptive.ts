/** Plain figures of a sample. Non-finite values are not filtered: what goes in must be clean. */

export function mean(x: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < x.length; i += 1) sum += x[i]!;
  return sum / x.length;
}

/** Root mean square about zero. */
export function rms(x: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < x.length; i += 1) sum += x[i]! * x[i]!;
  return Math.sqrt(sum / x.length);
}

/** Sample standard deviation, divisor n − 1, in two passes. */
export function standardDeviation(x: ArrayLike<number>): number {
  const m = mean(x);
  let sum = 0;
  for (let i = 0; i < x.length; i += 1) sum += (x[i]! - m) ** 2;
  return Math.sqrt(sum / (x.length - 1));
}

/**
 * Percentile by linear interpolation of the order statistics (definition 7 of Hyndman & Fan 1996); `share` in [0, 1].
 * NaN for an empty sample. Sorts a copy.
 */
export function percentile(x: ArrayLike<number>, share: number): number {
  return percentileOfSorted(Float64Array.from(x).sort(), share);
}

/** As `percentile`, for values that are in ascending order already. */
export function percentileOfSorted(sorted: ArrayLike<number>, share: number): number {
  const n = sorted.length;
  if (n === 0) return Number.NaN;
  const at = (n - 1) * Math.min(Math.max(share, 0), 1);
  const below = Math.floor(at);
  const low = sorted[below]!;
  return below + 1 < n ? low + (at - below) * (sorted[below + 1]! - low) : low;
}
