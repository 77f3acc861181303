/** Which rows of a run's tables a screen needs: every n-th of the state, the extremes of the innovations. */
import type { InnovationTable } from '../engine/types';

/** Rows a bucket may give at most: lowest and highest of three channels, and the largest NIS. */
const ROWS_OF_BUCKET = 7;
/** What a bucket gives on average, found on white innovations. */
const TYPICAL_ROWS_OF_BUCKET = 5;

/** Step between kept rows, so that `total` rows become about `points`. */
export const strideFor = (total: number, points: number) => Math.max(1, Math.ceil(total / points));

/** Rows of one bucket of innovations, so that `total` rows become about `points`; 1 keeps every row. */
export const bucketFor = (total: number, points: number) =>
  total <= points ? 1 : Math.max(ROWS_OF_BUCKET + 1, Math.ceil((total * TYPICAL_ROWS_OF_BUCKET) / points));

/** Row numbers in [from, to) that are multiples of `stride`; with `last`, the last row as well. */
export function strideRows(from: number, to: number, stride: number, last: boolean): number[] {
  const rows: number[] = [];
  for (let row = Math.ceil(from / stride) * stride; row < to; row += stride) rows.push(row);
  if (last && to > from && rows.at(-1) !== to - 1) rows.push(to - 1);
  return rows;
}

/**
 * Row numbers in [from, to), ascending: of every `bucket` rows those where a channel's innovation is lowest or highest
 * or NIS largest. A rejected fix is an extreme of its bucket or close to one that is drawn.
 */
export function extremeRows(table: InnovationTable, from: number, to: number, bucket: number): number[] {
  if (bucket <= 1) return strideRows(from, to, 1, false);
  const rows: number[] = [];
  for (let start = from; start < to; start += bucket)
    rows.push(...extremesOf(table, start, Math.min(to, start + bucket)));
  return rows;
}

function extremesOf(table: InnovationTable, from: number, to: number): number[] {
  const kept = new Set<number>();
  for (const channel of table.innovation) {
    let [low, high] = [from, from];
    for (let row = from + 1; row < to; row += 1) {
      if (channel[row]! < channel[low]!) low = row;
      if (channel[row]! > channel[high]!) high = row;
    }
    kept.add(low).add(high);
  }
  let peak = from;
  for (let row = from + 1; row < to; row += 1) if (table.nis[row]! > table.nis[peak]!) peak = row;
  kept.add(peak);
  return [...kept].sort((a, b) => a - b);
}
