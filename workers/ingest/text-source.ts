/** A raw upload as text, chunk by chunk: unpacked where it is gzip, decoded as UTF-8 or UTF-16, refused where it is binary. */
import { isAscii } from 'node:buffer';
import { Readable } from 'node:stream';
import { StringDecoder } from 'node:string_decoder';
import { createGunzip } from 'node:zlib';
import type { FileRole } from '@/shared/contracts/recordings';
import type { Store } from '../store/types';
import { FILE_NAMES, rejection } from './problems';

export interface RawFile {
  role: FileRole;
  name: string;
  key: string;
}

export interface TextSource {
  /** Line ends are '\n'; a byte-order mark is gone. */
  chunks: AsyncGenerator<string>;
  /** Share of the stored bytes that has been read, 0…1. */
  readShare(): number;
}

/** Text logs shrink about tenfold; far beyond it is no honest log. */
const MAX_EXPANSION = 250;
const EXPANSION_FREE_BYTES = 32 * 1024 * 1024;
const PROBE_BYTES = 64 * 1024;
const UTF16_MARKS = ['fffe', 'feff'];

/** Throws (while it is read) IntakeRejected: empty, binary, damaged or over-expanding gzip. Throws StoreKeyMissing. */
export async function openText(store: Store, file: RawFile): Promise<TextSource> {
  const total = Math.max(1, await store.size(file.key));
  const stream = await store.stream(file.key);
  let read = 0;
  const counted = async function* () {
    for await (const chunk of stream as AsyncIterable<Uint8Array>) {
      read += chunk.length;
      yield chunk;
    }
  };
  return {
    chunks: closing(
      normalised(
        decoded(
          unpacked(counted(), file, () => read),
          file,
        ),
      ),
      stream,
    ),
    readShare: () => Math.min(1, read / total),
  };
}

/** Whoever stops reading early leaves no open file behind. */
async function* closing(chunks: AsyncGenerator<string>, stream: Readable): AsyncGenerator<string> {
  try {
    yield* chunks;
  } finally {
    stream.destroy();
  }
}

async function* unpacked(
  bytes: AsyncGenerator<Uint8Array>,
  file: RawFile,
  readBytes: () => number,
): AsyncGenerator<Uint8Array> {
  const [first, rest] = await probed(bytes, 2);
  if (first[0] !== 0x1f || first[1] !== 0x8b) {
    yield first;
    yield* rest;
    return;
  }
  const chained = async function* () {
    yield first;
    yield* rest;
  };
  const gunzip = createGunzip();
  const packed = Readable.from(chained(), { objectMode: false });
  packed.on('error', (error) => gunzip.destroy(error));
  let unpackedBytes = 0;
  try {
    for await (const chunk of packed.pipe(gunzip) as AsyncIterable<Uint8Array>) {
      unpackedBytes += chunk.length;
      if (unpackedBytes > EXPANSION_FREE_BYTES && unpackedBytes > MAX_EXPANSION * readBytes())
        throw rejection(
          'gzip-expands', { file: file.role },
          `The ${FILE_NAMES[file.role]} unpacks to more than ${MAX_EXPANSION} times its size, which no log does.`,
          'Upload the log itself, or pack it again from the original.',
        ); // prettier-ignore
      yield chunk;
    }
  } catch (error) {
    throw isZlibError(error) ? damagedGzip(file) : error;
  } finally {
    packed.destroy();
    gunzip.destroy();
  }
}

async function* decoded(bytes: AsyncGenerator<Uint8Array>, file: RawFile): AsyncGenerator<string> {
  const [first, rest] = await probed(bytes, PROBE_BYTES);
  if (first.length === 0) throw empty(file);
  const mark = markOf(first);
  const isUtf16 = UTF16_MARKS.includes(mark);
  if (!isUtf16) refuseBinary(first, file);
  const decoder = decoderFor(mark);
  const start = decoder.write(first);
  yield start.startsWith('\uFEFF') ? start.slice(1) : start;
  for await (const chunk of rest) yield decoder.write(chunk);
  yield decoder.end();
}

/** The byte-order mark; UTF-16 without one shows by its zeros, every second byte. */
function markOf(start: Uint8Array): string {
  const probe = start.subarray(0, 512);
  const zeros = (from: number) => probe.filter((byte, i) => i % 2 === from && byte === 0).length;
  if (probe.length > 16 && zeros(1) > probe.length / 3 && zeros(0) === 0) return 'fffe';
  if (probe.length > 16 && zeros(0) > probe.length / 3 && zeros(1) === 0) return 'feff';
  return Buffer.from(start.subarray(0, 2)).toString('hex');
}

interface Decoder {
  write(chunk: Uint8Array): string;
  end(): string;
}

/** Node's own decoder is several times faster than TextDecoder, but knows no big-endian UTF-16. */
function decoderFor(mark: string): Decoder {
  if (mark === 'feff') {
    const decoder = new TextDecoder('utf-16be');
    return { write: (chunk) => decoder.decode(chunk, { stream: true }), end: () => decoder.decode() };
  }
  const decoder = new StringDecoder(mark === 'fffe' ? 'utf16le' : 'utf8');
  const write = (chunk: Uint8Array) => decoder.write(bufferOn(chunk));
  return mark === 'fffe' ? { write, end: () => decoder.end() } : plainFirst(write, () => decoder.end());
}

/** Logs are nearly always plain ASCII, which needs no decoding; only pieces with other signs go through UTF-8. */
function plainFirst(write: Decoder['write'], end: Decoder['end']): Decoder {
  return {
    write: (chunk) => (isAscii(chunk) ? end() + bufferOn(chunk).toString('latin1') : write(chunk)),
    end,
  };
}

const bufferOn = (chunk: Uint8Array) => Buffer.from(chunk.buffer, chunk.byteOffset, chunk.length);

/** Every kind of line end becomes '\n', also where a '\r\n' lies across two chunks. */
async function* normalised(text: AsyncGenerator<string>): AsyncGenerator<string> {
  let held = '';
  for await (const piece of text) {
    let chunk = held + piece;
    held = '';
    if (chunk.endsWith('\r')) {
      held = '\r';
      chunk = chunk.slice(0, -1);
    }
    // A card that lost power leaves zeros behind.
    if (chunk.includes('\0')) chunk = chunk.replaceAll('\0', '');
    if (chunk.includes('\r')) chunk = chunk.replace(/\r\n?/g, '\n');
    if (chunk) yield chunk;
  }
  if (held) yield '\n';
}

/** At least `length` bytes from the start (fewer only where there are no more), and what follows. */
async function probed(
  bytes: AsyncGenerator<Uint8Array>,
  length: number,
): Promise<[Uint8Array, AsyncGenerator<Uint8Array>]> {
  const parts: Uint8Array[] = [];
  let size = 0;
  while (size < length) {
    const next = await bytes.next();
    if (next.done) break;
    parts.push(next.value);
    size += next.value.length;
  }
  return [parts.length === 1 ? parts[0]! : Buffer.concat(parts), bytes];
}

function refuseBinary(start: Uint8Array, file: RawFile): void {
  // Zeros at the end are what a power cut leaves of a block.
  const last = start.subarray(0, PROBE_BYTES).findLastIndex((byte) => byte !== 0);
  const probe = start.subarray(0, last + 1);
  const control = probe.reduce((count, byte) => count + (byte < 9 || (byte > 13 && byte < 32) ? 1 : 0), 0);
  if (!probe.includes(0) && control <= probe.length * 0.02) return;
  const isZip = probe[0] === 0x50 && probe[1] === 0x4b;
  throw rejection(
    'binary', { file: file.role },
    `The ${FILE_NAMES[file.role]} is ${isZip ? 'a ZIP archive or a spreadsheet' : 'binary'}, not text.`,
    'Export the log as CSV (plain or packed with gzip) and upload that.',
  ); // prettier-ignore
}

export const empty = (file: { role: FileRole }) =>
  rejection(
    'empty', { file: file.role },
    `The ${FILE_NAMES[file.role]} is empty.`,
    'Check that the log was copied completely, then upload it again.',
  ); // prettier-ignore

const damagedGzip = (file: RawFile) =>
  rejection(
    'gzip-damaged', { file: file.role },
    `The ${FILE_NAMES[file.role]} is packed with gzip but cannot be unpacked to its end.`,
    'Check that the log was copied completely, pack it again and upload it.',
  ); // prettier-ignore

const isZlibError = (error: unknown) =>
  String((error as NodeJS.ErrnoException | null)?.code).startsWith('Z_');
