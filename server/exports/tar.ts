/** A tar archive as a stream, in flat memory: the ustar interchange format of POSIX.1-1988 (IEEE Std 1003.1, pax, "ustar"). */

export interface TarEntry {
  /** Path in the archive, slashes between; each part and the whole short enough for ustar (100 and 255 bytes of ASCII). */
  path: string;
  bytes: number;
  /** Exactly `bytes` long. */
  content: AsyncIterable<Uint8Array> | Iterable<Uint8Array>;
}

const BLOCK = 512;
const NAME_BYTES = 100;
const PREFIX_BYTES = 155;

/** Throws where a path is too long, or a content has another length than was said: the archive would be broken. */
export async function* tar(entries: AsyncIterable<TarEntry>, modified: Date): AsyncGenerator<Uint8Array> {
  for await (const { path, bytes, content } of entries) {
    yield header(path, bytes, modified);
    let written = 0;
    for await (const chunk of content) {
      written += chunk.byteLength;
      yield chunk;
    }
    if (written !== bytes) throw new Error(`${path} was said to have ${bytes} bytes and has ${written}.`);
    const rest = written % BLOCK;
    if (rest > 0) yield new Uint8Array(BLOCK - rest);
  }
  yield new Uint8Array(2 * BLOCK);
}

function header(path: string, bytes: number, modified: Date): Uint8Array {
  const [prefix, name] = split(path);
  const block = Buffer.alloc(BLOCK);
  const octal = (value: number, at: number, length: number) =>
    block.write(
      `${Math.floor(value)
        .toString(8)
        .padStart(length - 1, '0')}\0`,
      at,
      'ascii',
    );
  block.write(name, 0, 'ascii');
  octal(0o644, 100, 8);
  octal(0, 108, 8);
  octal(0, 116, 8);
  octal(bytes, 124, 12);
  octal(modified.getTime() / 1000, 136, 12);
  block.write('        ', 148, 'ascii'); // the checksum's own field counts as spaces
  block.write('0', 156, 'ascii');
  block.write('ustar\0' + '00', 257, 'ascii');
  block.write(prefix, 345, 'ascii');
  const sum = block.reduce((total, byte) => total + byte, 0);
  block.write(`${sum.toString(8).padStart(6, '0')}\0 `, 148, 'ascii');
  return block;
}

/** Where the path is longer than a name may be, its folders go into the prefix. */
function split(path: string): [prefix: string, name: string] {
  if (path.length <= NAME_BYTES) return ['', path];
  const at = path.indexOf('/', path.length - NAME_BYTES - 1);
  if (at < 0 || at > PREFIX_BYTES) throw new Error(`${path} is too long for a tar archive.`);
  return [path.slice(0, at), path.slice(at + 1)];
}
