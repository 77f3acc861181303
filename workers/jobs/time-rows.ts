/** Rows of a table by its ascending time column. */

/** First row with a time of at least `limit`. */
export function firstAtLeast(time: Float64Array, limit: number): number {
  let [low, high] = [0, time.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (time[middle]! < limit) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** First row with a time beyond `limit`. */
export function firstAfter(time: Float64Array, limit: number): number {
  let row = firstAtLeast(time, limit);
  while (row < time.length && time[row]! === limit) row += 1;
  return row;
}
