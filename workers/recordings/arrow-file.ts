/**
 * Tables of Float64 columns as Apache Arrow IPC files. The same values give the same bytes. A table of one record batch
 * is read without copying; a longer one (written batch by batch, so that its writer needs little memory) is joined once.
 */
import { Readable } from 'node:stream';
import { createHash } from 'node:crypto';
import {
  Field,
  Float64,
  makeData,
  RecordBatch,
  RecordBatchFileWriter,
  Schema,
  Struct,
  tableFromIPC,
} from 'apache-arrow';
import type { Store } from '../store/types';

export type Columns = Record<string, Float64Array>;

export interface ArrowTable {
  rows: number;
  columns: Columns;
  metadata: ReadonlyMap<string, string>;
}

export interface WrittenFile {
  bytes: number;
  sha256: string;
}

/** Writes a table that grows batch by batch. Nothing appears under the key unless `finish` is reached. */
export class ArrowFileWriter {
  private readonly writer = new RecordBatchFileWriter();
  private readonly schema: Schema;
  private readonly hash = createHash('sha256');
  private readonly stored: Promise<{ bytes: number }>;
  private batches = 0;

  constructor(
    store: Store,
    key: string,
    private readonly names: readonly string[],
    metadata: ReadonlyMap<string, string> = new Map(),
  ) {
    const fields = names.map((name) => new Field(name, new Float64(), false));
    this.schema = new Schema(fields, new Map(metadata));
    this.stored = store.put(key, Readable.from(this.hashed(), { objectMode: false }));
    // Awaited in finish or abort; without this an early failure would count as unhandled.
    this.stored.catch(() => undefined);
  }

  /** The arrays are taken over: the caller must not write into them again. All must be of equal length. */
  write(columns: Columns): void {
    const length = columns[this.names[0]!]!.length;
    const children = this.names.map((name) =>
      makeData({ type: new Float64(), data: columns[name]!, length }),
    );
    const struct = makeData({ type: new Struct(this.schema.fields), length, children, nullCount: 0 });
    this.writer.write(new RecordBatch(this.schema, struct));
    this.batches += 1;
  }

  async finish(): Promise<WrittenFile> {
    if (this.batches === 0)
      this.write(Object.fromEntries(this.names.map((name) => [name, new Float64Array(0)])));
    this.writer.finish();
    const { bytes } = await this.stored;
    return { bytes, sha256: this.hash.digest('hex') };
  }

  async abort(reason: Error): Promise<void> {
    this.writer.abort(reason);
    await this.stored.catch(() => undefined);
  }

  private async *hashed(): AsyncGenerator<Uint8Array> {
    for await (const chunk of this.writer) {
      this.hash.update(chunk);
      yield chunk;
    }
  }
}

/** Writes a whole table at once. `columns` must all be of equal length; their order is the file's. */
export async function writeTable(
  store: Store,
  key: string,
  columns: Columns,
  metadata?: ReadonlyMap<string, string>,
): Promise<WrittenFile> {
  const writer = new ArrowFileWriter(store, key, Object.keys(columns), metadata);
  writer.write(columns);
  return writer.finish();
}

/** Reads a table of Float64 columns. Throws StoreKeyMissing. */
export async function readTable(store: Store, key: string): Promise<ArrowTable> {
  const table = tableFromIPC(aligned(await store.bytes(key)));
  const columns: Columns = {};
  for (const field of table.schema.fields) {
    const parts = table.getChild(field.name)!.data.map((data) => data.values as Float64Array);
    columns[field.name] = parts.length === 1 ? parts[0]! : joined(parts, table.numRows);
  }
  return { rows: table.numRows, columns, metadata: table.schema.metadata };
}

/** Views on Float64 need a start at a multiple of 8. */
const aligned = (bytes: Uint8Array) => (bytes.byteOffset % 8 === 0 ? bytes : new Uint8Array(bytes));

function joined(parts: readonly Float64Array[], rows: number): Float64Array {
  const whole = new Float64Array(rows);
  let at = 0;
  for (const part of parts) {
    whole.set(part, at);
    at += part.length;
  }
  return whole;
}
