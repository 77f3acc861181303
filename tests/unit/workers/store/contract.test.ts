/** What every backing of the store promises, asked of each of them. */
import { createHash } from 'node:crypto';
import { existsSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { Readable } from 'node:stream';
import { FolderStore } from '@/workers/store/folder';
import { S3Store } from '@/workers/store/s3';
import { StoreKeyMissing, type Store } from '@/workers/store/types';
import { startObjectStorage } from '../../../support/object-storage';

interface Backing {
  store: Store;
  stop(): Promise<void>;
}

const BACKINGS: Record<string, (folder: string) => Promise<Backing>> = {
  'a folder': async (folder) => ({
    store: new FolderStore(path.join(folder, 'store')),
    stop: async () => undefined,
  }),
  'object storage': async () => {
    const storage = await startObjectStorage();
    return { store: new S3Store(storage.config), stop: () => storage.stop() };
  },
};

/** Pieces of 64 KiB that tell one another apart, then `failure` if there is one. */
function pieces(count: number, failure?: Error): Readable {
  const each = async function* () {
    for (let i = 0; i < count; i += 1) yield Buffer.alloc(65_536, i % 251);
    if (failure) throw failure;
  };
  return Readable.from(each(), { objectMode: false });
}

const hashOf = async (source: Readable) => {
  const hash = createHash('sha256');
  for await (const piece of source as AsyncIterable<Uint8Array>) hash.update(piece);
  return hash.digest('hex');
};

describe.each(Object.entries(BACKINGS))('the store in %s', (_name, open) => {
  let folder: string;
  let backing: Backing;
  let store: Store;
  beforeAll(async () => {
    folder = mkdtempSync(path.join(tmpdir(), 'driftwright-contract-'));
    backing = await open(folder);
    store = backing.store;
  });
  afterAll(async () => {
    await backing.stop();
    rmSync(folder, { recursive: true, force: true });
  });

  const text = async (key: string) => Buffer.from(await store.bytes(key)).toString();
  const put = (key: string, content: string) => store.put(key, Buffer.from(content));

  it('gives back what was put: bytes and streams, short, empty and in several parts', async () => {
    expect(await put('runs/a/short.txt', 'short')).toEqual({ bytes: 5 });
    expect(await put('runs/a/empty', '')).toEqual({ bytes: 0 });
    expect(await store.put('runs/a/nothing', pieces(0))).toEqual({ bytes: 0 });
    const long = 700; // beyond two parts
    expect(await store.put('runs/a/long', pieces(long))).toEqual({ bytes: long * 65_536 });

    expect(await text('runs/a/short.txt')).toBe('short');
    expect(await text('runs/a/empty')).toBe('');
    expect(await store.size('runs/a/nothing')).toBe(0);
    expect(await store.size('runs/a/long')).toBe(long * 65_536);
    expect(await hashOf(await store.stream('runs/a/long'))).toBe(await hashOf(pieces(long)));
    expect((await store.bytes('runs/a/long')).length).toBe(long * 65_536);
  }, 60_000);

  it('lets a later put replace the earlier one', async () => {
    await put('a', 'one');
    await put('a', 'two');
    expect(await text('a')).toBe('two');
  });

  it.each([1, 300])('keeps the earlier content when a source fails after %d pieces', async (count) => {
    await put('b/kept', 'before');
    const broken = new Error('the line broke');
    await expect(store.put('b/kept', pieces(count, broken))).rejects.toThrow('the line broke');
    await expect(store.put('b/new', pieces(count, broken))).rejects.toThrow('the line broke');
    expect(await text('b/kept')).toBe('before');
    expect(await store.has('b/new')).toBe(false);
    expect(await store.list('b/')).toEqual(['b/kept']);
  });

  it('takes a finished local file over', async () => {
    const upload = path.join(folder, 'upload.part');
    writeFileSync(upload, 'uploaded');
    expect(await store.adopt('recordings/r/raw/imu', upload)).toEqual({ bytes: 8 });
    expect(await text('recordings/r/raw/imu')).toBe('uploaded');
    expect(existsSync(upload)).toBe(false);
  });

  it('tells that a key is missing', async () => {
    await expect(store.bytes('no/such')).rejects.toBeInstanceOf(StoreKeyMissing);
    await expect(store.stream('no/such')).rejects.toBeInstanceOf(StoreKeyMissing);
    await expect(store.size('no/such')).rejects.toBeInstanceOf(StoreKeyMissing);
    expect(await store.has('no/such')).toBe(false);
    expect(await store.list('no/')).toEqual([]);
    await expect(store.removePrefix('no/')).resolves.toBeUndefined();
  });

  it('removes what starts with a prefix and nothing else', async () => {
    for (const key of ['trial/1/a', 'trial/1/deep/b', 'trial/12/a', 'trial/2/a']) await put(key, 'x');
    await store.removePrefix('trial/1/');
    expect((await store.list('trial/')).sort()).toEqual(['trial/12/a', 'trial/2/a']);
    await store.removePrefix('trial/1');
    expect(await store.list('trial/')).toEqual(['trial/2/a']);
  });

  it('lists and removes many keys', async () => {
    const keys = Array.from({ length: 300 }, (_, i) => `many/${String(i).padStart(4, '0')}`);
    await Promise.all(keys.map((key) => put(key, 'x')));
    expect((await store.list('many/')).sort()).toEqual(keys);
    await store.removePrefix('many/');
    expect(await store.list('many/')).toEqual([]);
  }, 60_000);

  it.each(['../outside', '/etc/passwd', 'a//b', './a', 'a/.hidden', 'a\\b', 'a/b\0c', '', 'a/'])(
    'refuses the key %j',
    async (key) => {
      await expect(put(key, 'x')).rejects.toThrow('Not a key');
      await expect(store.bytes(key)).rejects.toThrow('Not a key');
      await expect(store.stream(key)).rejects.toThrow('Not a key');
      await expect(store.has(key)).rejects.toThrow('Not a key');
      await expect(store.adopt(key, path.join(folder, 'nothing'))).rejects.toThrow('Not a key');
    },
  );

  it('does not remove everything by an empty prefix', async () => {
    await expect(store.removePrefix('')).rejects.toThrow('Not a key');
    await expect(store.list('/')).rejects.toThrow('Not a key');
  });
});
