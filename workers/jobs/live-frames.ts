/** Frames of a run while it goes: each holds the rows that came since the last one, thinned to what a screen can show. */
import { encodeFrame, type FrameTables } from '@/shared/contracts/frames';
import type { EngineRun } from '../engine/types';
import { coastingColumns, innovationColumns, stateColumns } from './frame-tables';
import { drawnStates, Standouts } from './standouts';
import { bucketFor, extremeRows, strideFor, strideRows } from './thinning';

export interface LiveFramesOptions {
  runId: string;
  /** Points a series over the whole extent. */
  points: number;
  /** Rows that the kept solution will have, about. */
  expectedRows: number;
  /** GNSS epochs of the recording. */
  expectedEpochs: number;
}

export class LiveFrames {
  private readonly sent = { solution: 0, position: 0, velocity: 0, coasting: 0 };
  private readonly stride: number;
  private readonly bucket: number;
  private readonly standouts = new Standouts();
  /** Rows of the solution that their ranges know. */
  private seen = 0;
  private seq = 0;

  constructor(
    private readonly run: EngineRun,
    private readonly options: LiveFramesOptions,
  ) {
    this.stride = strideFor(options.expectedRows, options.points);
    this.bucket = bucketFor(options.expectedEpochs, options.points);
  }

  /** The next frame; null while there is nothing new. `last` also takes the rows of unfinished steps. */
  next(last: boolean): Uint8Array | null {
    const { run, options } = this;
    const tables = this.newTables(last);
    if (!last && Object.keys(tables).length === 0) return null;
    const head = {
      runId: options.runId,
      seq: this.seq,
      progress: run.progress,
      toS: run.reachedS,
      extentS: [run.extentS[0], run.extentS[1]] as [number, number],
      origin: run.origin,
    };
    this.seq += 1;
    return encodeFrame({ head, tables });
  }

  private newTables(last: boolean): FrameTables {
    const { tables, counts, origin } = this.run;
    const found: FrameTables = {};
    const state = this.stateRows(last);
    if (state.length > 0) found.state = stateColumns(tables.solution, state, origin);
    for (const group of ['position', 'velocity'] as const) {
      const to = last ? counts[group] : wholeBuckets(counts[group], this.bucket);
      const rows = extremeRows(tables[group], this.sent[group], to, this.bucket);
      if (rows.length > 0) Object.assign(found, { [group]: innovationColumns(group, tables[group], rows) });
      this.sent[group] = Math.max(this.sent[group], to);
    }
    const coasting = strideRows(this.sent.coasting, counts.coasting, this.stride, last);
    if (coasting.length > 0) found.coasting = coastingColumns(tables.coasting, coasting);
    this.sent.coasting = counts.coasting;
    return found;
  }

  /** Strided rows at once; what stands out between two of them when the second is there. */
  private stateRows(last: boolean): number[] {
    const { tables, counts } = this.run;
    const { stride, sent } = this;
    const available = counts.solution;
    const columns = drawnStates(tables.solution);
    this.standouts.see(columns, this.seen, available);
    this.seen = available;
    const to = last ? available : Math.floor(Math.max(0, available - 1) / stride) * stride;
    const rows = this.standouts.rows(columns, sent.solution, to, stride, available);
    if (last && available > 0 && rows.at(-1) !== available - 1) rows.push(available - 1);
    sent.solution = Math.max(sent.solution, to);
    return rows;
  }
}

const wholeBuckets = (rows: number, bucket: number) => Math.floor(rows / bucket) * bucket;
