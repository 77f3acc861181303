/**
 * Thinning of curves that are mostly smooth: every n-th row, and between two of them the rows that the straight stroke
 * would plainly miss. So a spike of one row in a long recording stays in sight, at its own time.
 */

/** What stands out by less than this share of a curve's range, two pixels of a chart, is seen only when zoomed. */
const SHARE = 1 / 70;
/** A curve that steps at every fix is not kept whole for it: only what is so many times its usual stands out. */
const TIMES = 3;
/** Strides over which the usual is averaged. */
const MEMORY = 16;
/** Rows kept between two strided ones at the most: of all curves those that stand out furthest. */
const MOST_BETWEEN = 2;

export class Standouts {
  private readonly low: number[] = [];
  private readonly high: number[] = [];
  /** How far a stroke usually misses the curve. */
  private readonly usual: number[] = [];

  /** Takes the rows [from, to) of `columns` into the curves' ranges. */
  see(columns: readonly Float64Array[], from: number, to: number): void {
    columns.forEach((column, i) => {
      let [low, high] = [this.low[i] ?? Infinity, this.high[i] ?? -Infinity];
      for (let row = from; row < to; row += 1) {
        if (column[row]! < low) low = column[row]!;
        if (column[row]! > high) high = column[row]!;
      }
      this.low[i] = low;
      this.high[i] = high;
    });
  }

  /**
   * Rows of [from, to), ascending: from + k·stride, and what stands out between them. `available` rows may be read:
   * the stroke to the next strided row is known only when that one is there.
   */
  rows(
    columns: readonly Float64Array[],
    from: number,
    to: number,
    stride: number,
    available: number,
  ): number[] {
    const rows: number[] = [];
    for (let start = from; start < to; start += stride) {
      rows.push(start);
      const end = Math.min(start + stride, available - 1);
      if (end > start + 1) rows.push(...this.between(columns, start, end));
    }
    return rows;
  }

  private between(columns: readonly Float64Array[], start: number, end: number): number[] {
    const found = new Map<number, number>();
    columns.forEach((column, i) => {
      const { row, size } = furthest(column, start, end);
      const usual = this.usual[i] ?? 0;
      this.usual[i] = usual + (size - usual) / MEMORY;
      const least = Math.max((this.high[i]! - this.low[i]!) * SHARE, TIMES * usual);
      if (least > 0 && size > least) found.set(row, Math.max(found.get(row) ?? 0, size / least));
    });
    return [...found]
      .sort((a, b) => b[1] - a[1])
      .slice(0, MOST_BETWEEN)
      .map(([row]) => row)
      .sort((a, b) => a - b);
  }
}

/** The curves of the state that charts draw: σ, biases and the track. */
export const drawnStates = (table: Record<string, Float64Array>): Float64Array[] =>
  Object.entries(table)
    .filter(([name]) => /^(sigma_|gyro_bias_|accel_bias_|lat_deg$|lon_deg$)/.test(name))
    .map(([, column]) => column);

/** The curves of the error while coasting. */
export const drawnCoasting = (table: Record<string, Float64Array>): Float64Array[] =>
  Object.entries(table)
    .filter(([name]) => name.endsWith('_m'))
    .map(([, column]) => column);

/** The row between `start` and `end` that lies furthest from the straight line through both. */
function furthest(column: Float64Array, start: number, end: number): { row: number; size: number } {
  const slope = (column[end]! - column[start]!) / (end - start);
  let best = { row: start, size: 0 };
  for (let row = start + 1; row < end; row += 1) {
    const size = Math.abs(column[row]! - column[start]! - slope * (row - start));
    if (size > best.size) best = { row, size };
  }
  return best;
}
