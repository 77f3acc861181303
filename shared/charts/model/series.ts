/** What a chart draws: growing columns seen through small accessors, so that nothing is copied when a frame arrives. */

/** `length` points in order of time; `at` may answer NaN where nothing was measured. */
export interface TimeSeries {
  length: number;
  time: ArrayLike<number>;
  at: (index: number) => number;
}

/** A series over a column, multiplied by `factor` (to the display unit). */
export function columnSeries(
  time: ArrayLike<number>,
  values: ArrayLike<number>,
  length: number,
  factor = 1,
): TimeSeries {
  return {
    length,
    time,
    at: factor === 1 ? (i) => values[i] ?? NaN : (i) => (values[i] ?? NaN) * factor,
  };
}

/** Index of the first point at or after `t` (length when there is none). */
export function lowerBound(time: ArrayLike<number>, length: number, t: number): number {
  let [low, high] = [0, length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((time[middle] ?? Infinity) < t) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** First and one past the last point to draw for `[fromS, toS]`: one beyond each edge, so that lines run out of the plot. */
export function visibleRange(series: TimeSeries, fromS: number, toS: number): [number, number] {
  const first = lowerBound(series.time, series.length, fromS);
  const last = lowerBound(series.time, series.length, toS);
  return [Math.max(0, first - 1), Math.min(series.length, last + 1)];
}

/** Index of the point nearest to `t`, or −1 of an empty series. */
export function nearestIndex(series: TimeSeries, t: number): number {
  if (series.length === 0) return -1;
  const after = lowerBound(series.time, series.length, t);
  if (after === 0) return 0;
  if (after === series.length) return series.length - 1;
  return t - series.time[after - 1]! <= series.time[after]! - t ? after - 1 : after;
}

/** Least and largest value in `[fromS, toS]`, or null when nothing finite lies there. */
export function valueExtent(series: TimeSeries, fromS: number, toS: number): [number, number] | null {
  const first = lowerBound(series.time, series.length, fromS);
  let [low, high] = [Infinity, -Infinity];
  for (let i = first; i < series.length && series.time[i]! <= toS; i++) {
    const value = series.at(i);
    if (value < low) low = value;
    if (value > high) high = value;
  }
  return high >= low ? [low, high] : null;
}

/** The `share` quantile (0…1) of |value| in `[fromS, toS]`, or null. */
export function absoluteQuantile(
  series: TimeSeries,
  fromS: number,
  toS: number,
  share: number,
): number | null {
  const values: number[] = [];
  for (
    let i = lowerBound(series.time, series.length, fromS);
    i < series.length && series.time[i]! <= toS;
    i++
  ) {
    const value = Math.abs(series.at(i));
    if (Number.isFinite(value)) values.push(value);
  }
  if (values.length === 0) return null;
  values.sort((a, b) => a - b);
  return values[Math.min(values.length - 1, Math.floor(share * values.length))]!;
}
