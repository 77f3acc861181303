import { RecordingCache } from '@/workers/recordings/cache';
import { loadRecording } from '@/workers/recordings/load';
import { writeStaticRecording } from '../static-recording';
import { testStore, type TestStore } from '../support';

let at: TestStore;
beforeAll(async () => {
  at = testStore();
  for (const id of ['a', 'b', 'c']) await writeStaticRecording(at.store, id, 20);
});
afterAll(() => at.remove());

test('the least recently used recording goes when there are too many bytes', async () => {
  const { bytes } = await loadRecording(at.store, 'a');
  const cache = new RecordingCache(at.store, 2 * bytes);
  const [a, b] = [await cache.load('a'), await cache.load('b')];
  expect(await cache.load('a')).toBe(a);

  await cache.load('c');

  expect(await cache.load('a')).toBe(a);
  expect(await cache.load('b')).not.toBe(b);
});

test('one recording is held even where it is larger than the bound', async () => {
  const cache = new RecordingCache(at.store, 1);
  const a = await cache.load('a');
  expect(await cache.load('a')).toBe(a);
});
