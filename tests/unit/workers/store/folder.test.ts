import { spawn } from 'node:child_process';
import { mkdirSync, readdirSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { Readable } from 'node:stream';
import { FolderStore } from '@/workers/store/folder';
import { StoreFailed } from '@/workers/store/types';
import { testStore, type TestStore } from '../support';

let at: TestStore;
beforeEach(() => {
  at = testStore();
});
afterEach(() => at.remove());

const text = async (key: string) => Buffer.from(await at.store.bytes(key)).toString();
const leftovers = () => readdirSync(path.join(at.root, '.incoming'));

test('what is put can be read whole, streamed, sized and listed', async () => {
  const pieces = Array.from({ length: 50 }, (_, i) => Buffer.from(`piece ${i}\n`));

  const written = await at.store.put('runs/a/long.txt', Readable.from(pieces, { objectMode: false }));
  await at.store.put('runs/a/short.txt', Buffer.from('short'));

  const whole = Buffer.concat(pieces);
  expect(written.bytes).toBe(whole.length);
  expect(await text('runs/a/long.txt')).toBe(whole.toString());
  const streamed: Buffer[] = [];
  for await (const chunk of await at.store.stream('runs/a/long.txt')) streamed.push(chunk as Buffer);
  expect(Buffer.concat(streamed)).toEqual(whole);
  expect(await at.store.size('runs/a/short.txt')).toBe(5);
  expect((await at.store.list('runs/a/')).sort()).toEqual(['runs/a/long.txt', 'runs/a/short.txt']);
  expect(leftovers()).toEqual([]);
});

test('a source that fails leaves the earlier content and no temporary file', async () => {
  await at.store.put('a/b', Buffer.from('before'));
  const failing = Readable.from(
    (async function* () {
      yield Buffer.from('half');
      throw new Error('the line broke');
    })(),
    { objectMode: false },
  );

  await expect(at.store.put('a/b', failing)).rejects.toThrow('the line broke');

  expect(await text('a/b')).toBe('before');
  expect(leftovers()).toEqual([]);
});

test('a process killed in the middle of a put leaves nothing under the key, and its remains are swept', async () => {
  const writer = spawn(
    process.execPath,
    ['--import', 'tsx', path.join(__dirname, 'endless-put.ts'), at.root],
    {
      stdio: ['ignore', 'pipe', 'inherit'],
    },
  );
  await new Promise((resolve) => writer.stdout.once('data', resolve));
  expect(leftovers()).toHaveLength(1);

  writer.kill('SIGKILL');
  await new Promise((resolve) => writer.once('exit', resolve));

  expect(await at.store.has('runs/killed')).toBe(false);
  expect(await at.store.list('runs/')).toEqual([]);
  await at.store.sweep();
  expect(leftovers()).toEqual([]);
}, 30_000);

test('a sweep leaves the files of living processes alone', async () => {
  let release = () => {};
  const gate = new Promise<void>((resolve) => (release = resolve));
  const slow = Readable.from(
    (async function* () {
      yield Buffer.from('first, ');
      await gate;
      yield Buffer.from('second');
    })(),
    { objectMode: false },
  );
  const put = at.store.put('slow', slow);
  while (!readdirSync(at.root).includes('.incoming') || leftovers().length === 0)
    await new Promise((resolve) => setImmediate(resolve));

  await at.store.sweep();
  release();
  await put;

  expect(await text('slow')).toBe('first, second');
});

test('no key reaches the folder of temporary files', async () => {
  await expect(at.store.put('.incoming/x', Buffer.from('x'))).rejects.toThrow('Not a key');
  await expect(at.store.bytes('.incoming/x')).rejects.toThrow('Not a key');
});

test('a full disk is told in plain words, with what to do', async () => {
  const full = Readable.from(
    (async function* () {
      yield Buffer.from('x');
      throw Object.assign(new Error('ENOSPC: no space left on device, write'), { code: 'ENOSPC' });
    })(),
    { objectMode: false },
  );

  const failure = at.store.put('a', full);

  await expect(failure).rejects.toBeInstanceOf(StoreFailed);
  await expect(failure).rejects.toThrow(
    'The file store could not write a file: the disk is full. Free some space',
  );
  expect(leftovers()).toEqual([]);
});

test('a file where a folder belongs is told in plain words', async () => {
  mkdirSync(at.root, { recursive: true });
  writeFileSync(path.join(at.root, 'blocked'), '');
  const store = new FolderStore(path.join(at.root, 'blocked'));
  await expect(store.put('a', Buffer.from('x'))).rejects.toThrow('a file stands where a folder belongs');
});

test('a folder is removed although somebody still puts files into it', async () => {
  for (let i = 0; i < 200; i++) await at.store.put(`runs/a/${i}.txt`, Buffer.from('x'));
  let late = 0;
  const writing = (async () => {
    for (; late < 60; late++)
      await at.store.put(`runs/a/late-${late}.txt`, Buffer.from('x')).catch(() => undefined);
  })();
  await at.store.removePrefix('runs/a/');
  await writing;
  await at.store.removePrefix('runs/a/');
  expect(late).toBe(60);
  expect(await at.store.list('runs/a/')).toEqual([]);
});
