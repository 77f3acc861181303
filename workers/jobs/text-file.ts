/** A text of any length into the store, piece by piece, so that memory stays flat and a cancel is heard. */
import { Readable } from 'node:stream';
import type { JobHelpers } from './helpers';

export async function putText(
  key: string,
  text: Iterable<string>,
  helpers: JobHelpers,
): Promise<{ key: string; bytes: number }> {
  const source = Readable.from(breathing(text, helpers), { objectMode: false });
  const { bytes } = await helpers.store.put(key, source);
  return { key, bytes };
}

async function* breathing(text: Iterable<string>, helpers: JobHelpers): AsyncGenerator<Buffer> {
  for (const piece of text) {
    yield Buffer.from(piece);
    await helpers.breathe();
  }
}
