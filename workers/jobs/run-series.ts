/** A stored run, or a stretch of it, as one frame thinned to what a screen can show. */
import { encodeFrame } from '@/shared/contracts/frames';
import type { InnovationTable } from '../engine/types';
import type { RunSeriesJob } from '../protocol';
import { readRunTables } from '../recordings/results';
import { coastingColumns, innovationColumns, stateColumns } from './frame-tables';
import type { JobHelpers } from './helpers';
import { firstAfter, firstAtLeast } from './time-rows';
import { bucketFor, extremeRows, strideFor, strideRows } from './thinning';

export async function runSeries(job: RunSeriesJob, helpers: JobHelpers): Promise<Uint8Array> {
  const tables = await readRunTables(helpers.store, job.runId);
  const span: [number, number] = [job.fromS ?? -Infinity, job.toS ?? Infinity];
  const { points } = job;
  const state = rowsWithin(tables.solution.time_s!, span);
  const strided = ([from, to]: [number, number]) =>
    strideRows(0, to - from, strideFor(to - from, points), true).map((row) => from + row);
  const innovations = <T extends 'position' | 'velocity'>(name: T, table: InnovationTable) => {
    const [from, to] = rowsWithin(table.timeS, span);
    return innovationColumns(name, table, extremeRows(table, from, to, bucketFor(to - from, points)));
  };
  return encodeFrame({
    head: {
      runId: job.runId,
      seq: 0,
      progress: 1,
      toS: tables.extentS[1],
      extentS: [tables.extentS[0], tables.extentS[1]],
      origin: tables.origin,
    },
    tables: {
      state: stateColumns(tables.solution, strided(state), tables.origin),
      position: innovations('position', tables.position),
      velocity: innovations('velocity', tables.velocity),
      coasting: coastingColumns(tables.coasting, coastingRows(tables.coasting, span, points)),
    },
  });
}

/** Coasting rows run window by window, each on its own time axis: rows within the span, thinned. */
function coastingRows(table: Record<string, Float64Array>, span: [number, number], points: number): number[] {
  const time = table.time_s!;
  const rows: number[] = [];
  for (let row = 0; row < time.length; row += 1)
    if (time[row]! >= span[0] && time[row]! <= span[1]) rows.push(row);
  const stride = strideFor(rows.length, points);
  const outage = table.outage!;
  const isEdge = (i: number) =>
    i === 0 ||
    i === rows.length - 1 ||
    outage[rows[i]!] !== outage[rows[i + 1]!] ||
    outage[rows[i]!] !== outage[rows[i - 1]!];
  return rows.filter((_, i) => i % stride === 0 || isEdge(i));
}

/** First row at or after the span's start, and the row after the last one within it. */
const rowsWithin = (time: Float64Array, [from, to]: [number, number]): [number, number] => [
  firstAtLeast(time, from),
  firstAfter(time, to),
];
