/** Curves of a whole run or recording with finer pieces in place of their stretches. Pure. */
import { FRAME_TABLES, type Frame, type FrameTable } from '@/shared/contracts/frames';
import type { Series } from '@/shared/contracts/recordings';
import { RunData } from '../live/run-data';
import type { Span } from './tiles';

export interface Piece<T> {
  /** The stretch that it takes the place of; its data may reach further. */
  span: Span;
  data: T;
}

/** `coarse` with the rows of `pieces` (by time, not overlapping) in place of its own in their stretches. */
export function splicedRun(coarse: RunData, pieces: readonly Piece<Frame>[]): RunData {
  const spliced = new RunData(coarse.runId);
  const tables = Object.fromEntries(
    (Object.keys(FRAME_TABLES) as FrameTable[]).map((name) => [name, splicedTable(coarse, pieces, name)]),
  );
  const { extentS, origin, toS } = coarse;
  const head = {
    runId: coarse.runId,
    seq: 0,
    progress: 1,
    toS,
    extentS: [extentS[0], extentS[1]] as [number, number],
    origin,
  };
  spliced.replace({ head, tables }, coarse.complete);
  return spliced;
}

type Columns = Record<string, Float64Array | Float32Array>;

function splicedTable(coarse: RunData, pieces: readonly Piece<Frame>[], name: FrameTable): Columns {
  const { columns, length } = coarse.table(name);
  const parts: Columns[] = [];
  let from = 0;
  let doneS = -Infinity;
  for (const { span, data } of pieces) {
    const finer = data.tables[name] as Columns | undefined;
    if (!finer) continue;
    parts.push(slice(columns, from, Math.max(from, firstAt(columns.time_s!, length, span[0]))));
    parts.push(slice(finer, ...rowsWithin(finer.time_s!, span, doneS)));
    from = firstAfter(columns.time_s!, length, span[1]);
    doneS = span[1];
  }
  parts.push(slice(columns, from, length));
  return joined(parts, FRAME_TABLES[name]);
}

const slice = (columns: Columns, from: number, to: number): Columns =>
  Object.fromEntries(Object.entries(columns).map(([name, column]) => [name, column.subarray(from, to)]));

function joined(parts: readonly Columns[], names: readonly string[]): Columns {
  const rows = parts.reduce((sum, part) => sum + part.time_s!.length, 0);
  return Object.fromEntries(
    names.map((name) => {
      const all = name === 'time_s' ? new Float64Array(rows) : new Float32Array(rows);
      let at = 0;
      for (const part of parts) {
        all.set(part[name]!, at);
        at += part[name]!.length;
      }
      return [name, all];
    }),
  );
}

/** The same for the channels of a recording. */
export function splicedSeries(coarse: Series, pieces: readonly Piece<Series>[]): Series {
  return {
    channels: coarse.channels.map((channel) => {
      const timeS: number[] = [];
      const values: (number | null)[] = [];
      const take = (source: Series['channels'][number], from: number, to: number) => {
        for (let i = from; i < to; i++) {
          timeS.push(source.timeS[i]!);
          values.push(source.values[i]!);
        }
      };
      const { length } = channel.timeS;
      let from = 0;
      let doneS = -Infinity;
      for (const { span, data } of pieces) {
        const finer = data.channels.find(({ name }) => name === channel.name);
        if (!finer) continue;
        take(channel, from, firstAt(channel.timeS, length, span[0]));
        take(finer, ...rowsWithin(finer.timeS, span, doneS));
        from = firstAfter(channel.timeS, length, span[1]);
        doneS = span[1];
      }
      take(channel, from, length);
      return { ...channel, timeS, values };
    }),
  };
}

/** Rows within the span and after what is done: neighbours share the row at their border. */
function rowsWithin(time: ArrayLike<number>, [fromS, toS]: Span, doneS: number): [number, number] {
  const { length } = time;
  return [
    Math.max(firstAt(time, length, fromS), firstAfter(time, length, doneS)),
    firstAfter(time, length, toS),
  ];
}

function firstAt(time: ArrayLike<number>, length: number, limit: number): number {
  let [low, high] = [0, length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (time[middle]! < limit) low = middle + 1;
    else high = middle;
  }
  return low;
}

function firstAfter(time: ArrayLike<number>, length: number, limit: number): number {
  let at = firstAt(time, length, limit);
  while (at < length && time[at] === limit) at++;
  return at;
}
