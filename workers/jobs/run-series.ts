/** A stored run, or a stretch of it, as one frame thinned to what a screen can show. */
import { encodeFrame } from '@/shared/contracts/frames';
import type { CoastingTable, InnovationTable, SolutionTable } from '../engine/types';
import type { RunSeriesJob } from '../protocol';
import { readRunTables } from '../recordings/results';
import { coastingColumns, innovationColumns, smoothedColumns, stateColumns } from './frame-tables';
import type { JobHelpers } from './helpers';
import { firstAfter, firstAtLeast } from './time-rows';
import { drawnCoasting, drawnStates, Standouts } from './standouts';
import { bucketFor, extremeRows, strideFor } from './thinning';

export async function runSeries(job: RunSeriesJob, helpers: JobHelpers): Promise<Uint8Array> {
  const tables = await readRunTables(helpers.store, job.runId);
  const span: [number, number] = [job.fromS ?? -Infinity, job.toS ?? Infinity];
  const { points } = job;
  const { smoothed } = tables;
  const [from, to] = rowsWithin(tables.solution.time_s!, span);
  const coasting = rowsOfSpan(tables.coasting.time_s!, span);
  const counts = [to - from, coasting.length, ...[tables.position, tables.velocity].map(rowsIn)];
  function rowsIn({ timeS }: InnovationTable): number {
    const [first, end] = rowsWithin(timeS, span);
    return end - first;
  }
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
      whole: counts.every((count) => count <= points),
    },
    tables: {
      state: stateColumns(tables.solution, stateRows(tables.solution, from, to, points), tables.origin),
      position: innovations('position', tables.position),
      velocity: innovations('velocity', tables.velocity),
      ...(smoothed && {
        smoothed: smoothedColumns(smoothed, stateRows(smoothed, from, to, points), tables.origin),
      }),
      coasting: coastingColumns(tables.coasting, coastingRows(tables.coasting, coasting, points)),
    },
  });
}

/** Every n-th row, what stands out between them, and the last one. */
function stateRows(table: SolutionTable, from: number, to: number, points: number): number[] {
  const columns = drawnStates(table);
  const standouts = new Standouts();
  standouts.see(columns, from, to);
  const rows = standouts.rows(columns, from, to, strideFor(to - from, points), to);
  return to > from && rows.at(-1) !== to - 1 ? [...rows, to - 1] : rows;
}

/** Coasting rows run window by window, each on its own time axis: of the given ones, thinned, edges and standouts kept. */
function coastingRows(table: CoastingTable, given: readonly number[], points: number): number[] {
  const stride = strideFor(given.length, points);
  if (stride === 1) return [...given];
  const outage = table.outage!;
  const columns = drawnCoasting(table);
  const standouts = new Standouts();
  const kept: number[] = [];
  for (const [from, to] of piecesOf(given, outage)) {
    standouts.see(columns, from, to);
    const rows = standouts.rows(columns, from, to, stride, to);
    if (rows.at(-1) !== to - 1) rows.push(to - 1);
    kept.push(...rows);
  }
  return kept;
}

/** Runs of neighbouring rows of one outage: [first, one past the last]. */
function piecesOf(rows: readonly number[], outage: Float64Array): [number, number][] {
  const pieces: [number, number][] = [];
  for (const row of rows) {
    const piece = pieces.at(-1);
    if (piece && piece[1] === row && outage[row] === outage[row - 1]) piece[1] = row + 1;
    else pieces.push([row, row + 1]);
  }
  return pieces;
}

function rowsOfSpan(time: Float64Array, [from, to]: [number, number]): number[] {
  const rows: number[] = [];
  for (let row = 0; row < time.length; row += 1) if (time[row]! >= from && time[row]! <= to) rows.push(row);
  return rows;
}

/** First row at or after the span's start, and the row after the last one within it. */
const rowsWithin = (time: Float64Array, [from, to]: [number, number]): [number, number] => [
  firstAtLeast(time, from),
  firstAfter(time, to),
];
