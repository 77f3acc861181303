import http from 'node:http';
import type { AddressInfo } from 'node:net';
import { S3Store } from '@/workers/store/s3';
import { StoreFailed, type S3StoreConfig } from '@/workers/store/types';
import { type ObjectStorage, startObjectStorage } from '../../../support/object-storage';

let storage: ObjectStorage;
beforeAll(async () => {
  storage = await startObjectStorage();
});
afterAll(() => storage.stop());

const withConfig = (changes: Partial<S3StoreConfig>) => new S3Store({ ...storage.config, ...changes });
const put = (store: S3Store) => store.put('a', Buffer.from('x'));

test('keys lie below the prefix: two stores of one bucket do not see one another', async () => {
  const [one, two] = [withConfig({ prefix: 'lab/one' }), withConfig({ prefix: 'lab/one-more' })];
  await one.put('runs/1/a', Buffer.from('first'));
  await two.put('runs/1/a', Buffer.from('second'));
  expect(await one.list('runs/')).toEqual(['runs/1/a']);
  await two.removePrefix('runs/');
  expect(Buffer.from(await one.bytes('runs/1/a')).toString()).toBe('first');
});

test('a bucket that is not there is told as such, not as a missing key', async () => {
  const store = withConfig({ bucket: 'nowhere' });
  const failure = store.bytes('a');
  await expect(failure).rejects.toBeInstanceOf(StoreFailed);
  await expect(failure).rejects.toThrow('there is no such bucket. Make it, or correct STORE_URL.');
  await expect(store.list('a')).rejects.toThrow('could not read a file: there is no such bucket');
  await expect(put(store)).rejects.toThrow('could not write a file: there is no such bucket');
});

test('an unknown access key is told with the name of what to correct', async () => {
  const credentials = { accessKeyId: 'stranger', secretAccessKey: 'S3RVER' };
  await expect(put(withConfig({ credentials }))).rejects.toThrow('Correct AWS_ACCESS_KEY_ID');
});

test('a storage that is away is told as such', async () => {
  const failure = put(withConfig({ endpoint: 'http://127.0.0.1:9' }));
  await expect(failure).rejects.toBeInstanceOf(StoreFailed);
  await expect(failure).rejects.toMatchObject({ code: 'store-unreachable' });
}, 30_000);

/** A server that only ever does `answer`, and a store of it. */
async function against<T>(answer: http.RequestListener, ask: (store: S3Store) => Promise<T>): Promise<T> {
  const server = http.createServer(answer);
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as AddressInfo;
  try {
    return await ask(withConfig({ endpoint: `http://127.0.0.1:${port}` }));
  } finally {
    server.closeAllConnections();
    await new Promise((resolve) => server.close(resolve));
  }
}

const xml = (res: http.ServerResponse, status: number, body: string) => {
  res.writeHead(status, { 'Content-Type': 'application/xml' });
  res.end(`<?xml version="1.0"?>${body}`);
};

test.each([
  [507, 'InsufficientStorage', 'ENOSPC', 'it is full'],
  [403, 'QuotaExceeded', 'ENOSPC', 'it is full'],
  [403, 'AccessDenied', 'store-refused', 'may not do that in this bucket'],
  [403, 'SignatureDoesNotMatch', 'store-refused', 'Correct AWS_SECRET_ACCESS_KEY'],
  [503, 'SlowDown', 'store-unreachable', 'does not answer just now'],
  [418, 'Teapot', 'store-refused', 'it answered “Teapot” (HTTP 418).'],
])(
  'an answer %d %s is told in plain words',
  async (status, name, code, words) => {
    const refuse: http.RequestListener = (req, res) => {
      req.resume();
      xml(res, status, `<Error><Code>${name}</Code><Message>no</Message></Error>`);
    };
    const failure = await against(refuse, (store) => put(store).catch((error: unknown) => error));
    expect(failure).toBeInstanceOf(StoreFailed);
    expect(failure).toMatchObject({ code, message: expect.stringContaining(words) });
  },
  30_000,
);

test('a reader hears that what it reads is cut off in the middle', async () => {
  const cut: http.RequestListener = (_req, res) => {
    res.writeHead(200, { 'Content-Length': '1000' });
    res.write('half', () => res.destroy());
  };
  const read = async (store: S3Store) => {
    let bytes = 0;
    for await (const piece of await store.stream('a')) bytes += (piece as Buffer).length;
    return bytes;
  };
  await expect(against(cut, read)).rejects.toThrow(/aborted|hang up|ECONNRESET/);
}, 30_000);

test('keys that one answer does not hold are asked for after the last', async () => {
  const all = ['a/1', 'a/2', 'a/3', 'a/4', 'a/5'];
  const twoAtATime: http.RequestListener = (req, res) => {
    const after = new URL(req.url ?? '', 'http://x').searchParams.get('start-after') ?? '';
    const rest = all.map((key) => `lab/one/${key}`).filter((key) => key > after);
    const contents = rest.slice(0, 2).map((key) => `<Contents><Key>${key}</Key></Contents>`);
    const isTruncated = `<IsTruncated>${rest.length > 2}</IsTruncated>`;
    xml(res, 200, `<ListBucketResult>${isTruncated}${contents.join('')}</ListBucketResult>`);
  };
  expect(await against(twoAtATime, (store) => store.list('a/'))).toEqual(all);
}, 30_000);

test('a removal that leaves something says so', async () => {
  const key = '<Key>lab/one/a</Key>';
  const keep: http.RequestListener = (req, res) => {
    req.resume();
    const list = `<ListBucketResult><IsTruncated>false</IsTruncated><Contents>${key}</Contents></ListBucketResult>`;
    const left = `<DeleteResult><Error>${key}<Code>AccessDenied</Code><Message>no</Message></Error></DeleteResult>`;
    xml(res, 200, req.method === 'GET' ? list : left);
  };
  const removal = against(keep, (store) => store.removePrefix('a'));
  await expect(removal).rejects.toThrow('could not remove a file: these credentials may not do that');
}, 30_000);
