/** The series of one run as they arrive: tables of typed columns that grow, outside React. */
import { FRAME_TABLES, type Frame, type FrameColumn, type FrameTable } from '@/shared/contracts/frames';

/** Rows below `length` are valid; the arrays behind are longer and are replaced when they are full. */
export interface GrowingTable {
  length: number;
  columns: Record<string, Float64Array | Float32Array>;
}

export type AppendResult = 'appended' | 'gap' | 'ignored';

export class RunData {
  extentS: readonly [number, number] = [0, 0];
  origin = { latDeg: 0, lonDeg: 0, heightM: 0 };
  /** Time that the curves reach, s. */
  toS = -Infinity;
  progress = 0;
  /** All of the run is here. */
  complete = false;
  /** A frame was missed: the curves have a hole until the series is fetched. */
  holed = false;
  /** Raised by every change. */
  revision = 0;
  private nextSeq = 0;
  private readonly tables: Record<FrameTable, GrowingTable>;

  constructor(readonly runId: string) {
    const names = Object.keys(FRAME_TABLES) as FrameTable[];
    this.tables = Object.fromEntries(names.map((name) => [name, emptyTable(name)])) as Record<
      FrameTable,
      GrowingTable
    >;
  }

  table(name: FrameTable): GrowingTable {
    return this.tables[name];
  }

  column<T extends FrameTable>(table: T, column: FrameColumn<T>): Float64Array | Float32Array {
    return this.tables[table].columns[column]!;
  }

  /** Nothing has arrived yet. */
  get empty(): boolean {
    return this.revision === 0;
  }

  /** Takes a streamed frame. Frames of other runs and repeated ones are ignored; a gap in `seq` is marked and told. */
  append(frame: Frame): AppendResult {
    const { head } = frame;
    if (head.runId !== this.runId || head.seq < this.nextSeq) return 'ignored';
    const gap = head.seq > this.nextSeq;
    this.nextSeq = head.seq + 1;
    this.holed ||= gap;
    this.takeHead(frame);
    for (const name of Object.keys(this.tables) as FrameTable[]) this.appendTable(name, frame);
    return gap ? 'gap' : 'appended';
  }

  /** Replaces everything by the fetched series: a frame that holds all rows so far. */
  replace(frame: Frame, complete: boolean): void {
    for (const name of Object.keys(this.tables) as FrameTable[]) this.tables[name] = emptyTable(name);
    this.takeHead(frame);
    for (const name of Object.keys(this.tables) as FrameTable[]) this.appendTable(name, frame);
    this.holed = false;
    if (complete) this.finish();
  }

  /** The run is done and nothing is missing. */
  finish(): void {
    this.complete = true;
    this.progress = 1;
    this.revision++;
  }

  private takeHead({ head }: Frame): void {
    this.extentS = head.extentS;
    this.origin = head.origin;
    this.toS = Math.max(this.toS, head.toS);
    this.progress = Math.max(this.progress, head.progress);
    this.revision++;
  }

  private appendTable(name: FrameTable, frame: Frame): void {
    const incoming = frame.tables[name] as Record<string, Float64Array | Float32Array> | undefined;
    const rows = incoming?.time_s?.length ?? 0;
    if (!incoming || rows === 0) return;
    const table = this.tables[name];
    // After a fetched series the next frame may overlap it: rows that are already here are left out.
    const last = table.length > 0 ? table.columns.time_s![table.length - 1]! : -Infinity;
    let skip = 0;
    while (skip < rows && incoming.time_s![skip]! < last) skip++;
    reserve(table, table.length + rows - skip);
    for (const column of FRAME_TABLES[name])
      table.columns[column]!.set(incoming[column]!.subarray(skip), table.length);
    table.length += rows - skip;
  }
}

function emptyTable(name: FrameTable): GrowingTable {
  const columns: GrowingTable['columns'] = {};
  for (const column of FRAME_TABLES[name]) columns[column] = makeColumn(column, 0);
  return { length: 0, columns };
}

const makeColumn = (name: string, capacity: number) =>
  name === 'time_s' ? new Float64Array(capacity) : new Float32Array(capacity);

function reserve(table: GrowingTable, rows: number): void {
  const capacity = table.columns.time_s!.length;
  if (rows <= capacity) return;
  const wider = Math.max(256, capacity * 2, rows);
  for (const [name, old] of Object.entries(table.columns)) {
    const column = makeColumn(name, wider);
    column.set(old);
    table.columns[name] = column;
  }
}
