/** Percentiles of a sample, one definition for the engine, verdicts and screens. */

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
