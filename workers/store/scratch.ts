/** Writes stay in memory, reads fall through to the store behind: for work whose results nobody keeps. */
import { Readable } from 'node:stream';
import { StoreKeyMissing, type Store } from './types';

export class ScratchStore implements Store {
  private readonly written = new Map<string, Buffer>();

  constructor(private readonly behind: Store) {}

  async put(key: string, source: Readable | Uint8Array): Promise<{ bytes: number }> {
    const pieces: Uint8Array[] = [];
    if (source instanceof Uint8Array) pieces.push(source);
    else for await (const piece of source as AsyncIterable<Uint8Array>) pieces.push(piece);
    const whole = Buffer.concat(pieces);
    this.written.set(key, whole);
    return { bytes: whole.length };
  }

  /** Nothing that is only looked at takes a file over. */
  adopt(key: string): Promise<{ bytes: number }> {
    return Promise.reject(new StoreKeyMissing(key));
  }

  async stream(key: string): Promise<Readable> {
    const own = this.written.get(key);
    return own ? Readable.from([own], { objectMode: false }) : this.behind.stream(key);
  }

  async bytes(key: string): Promise<Uint8Array> {
    return this.written.get(key) ?? this.behind.bytes(key);
  }

  async has(key: string): Promise<boolean> {
    return this.written.has(key) || this.behind.has(key);
  }

  async size(key: string): Promise<number> {
    return this.written.get(key)?.length ?? this.behind.size(key);
  }

  async list(prefix: string): Promise<string[]> {
    const own = [...this.written.keys()].filter((key) => key.startsWith(prefix));
    return [...new Set([...own, ...(await this.behind.list(prefix))])];
  }

  /** What lies behind stays. */
  removePrefix(prefix: string): Promise<void> {
    for (const key of this.written.keys()) if (key.startsWith(prefix)) this.written.delete(key);
    return Promise.resolve();
  }
}
