import { spawn } from 'node:child_process';
import { readdirSync } from 'node:fs';
import path from 'node:path';
import { decodeFrame } from '@/shared/contracts/frames';
import { IDENTITY_AXES } from '@/shared/contracts/vehicles';
import { createPool, type WorkerPool } from '@/workers/pool';
import { JobCancelled, JobFailed, WorkerCrashed, type JobEvent } from '@/workers/protocol';
import { storeKeys } from '@/workers/store/types';
import { runOf, writeStaticRecording } from './static-recording';
import {
  cleanLogs, csvText, GNSS_HEADER, gnssRows, IMU_HEADER, imuRows, testStore, type TestStore,
} from './support'; // prettier-ignore
import { buildWorkerBundle } from './worker-bundle';

const silent = { info: () => undefined, warn: () => undefined, error: () => undefined };
/** Long enough that a run is still going when its first frame has arrived. */
const LONG_S = 1200;

let bundle: ReturnType<typeof buildWorkerBundle>;
let at: TestStore;
let pool: WorkerPool | null = null;

beforeAll(async () => {
  bundle = buildWorkerBundle();
  at = testStore();
  await writeStaticRecording(at.store, 'long', LONG_S);
  await writeStaticRecording(at.store, 'short', 60);
}, 60_000);
afterEach(async () => {
  await pool?.close();
  pool = null;
});
afterAll(() => {
  at.remove();
  bundle.remove();
});

const open = (size: number, entry = bundle.entry): WorkerPool => {
  pool = createPool({ size, entry, store: { kind: 'folder', root: at.root }, log: silent });
  return pool;
};

const until = async (condition: () => boolean) => {
  while (!condition()) await new Promise((resolve) => setTimeout(resolve, 5));
};

const isAlive = (pid: number) => {
  try {
    process.kill(pid, 0);
    return true;
  } catch {
    return false;
  }
};

/** Resolves with the first frame of a job, so that it is certain to be in the middle. */
function firstFrame() {
  let seen: (event: JobEvent) => void = () => undefined;
  const arrived = new Promise<void>((resolve) => {
    seen = (event) => event.type === 'frame' && resolve();
  });
  return { arrived, onEvent: (event: JobEvent) => seen(event) };
}

test('a run reports progress and frames, and its result lies in the store', async () => {
  const events: JobEvent[] = [];

  const { result } = open(1).submit(runOf('long', 'run-a'), { onEvent: (event) => events.push(event) });
  const { summary, resultSha256 } = await result;

  expect(summary.imuSamples).toBe(LONG_S * 100);
  expect(summary.computeS).toBeGreaterThan(0);
  expect(resultSha256).toMatch(/^[0-9a-f]{64}$/);
  expect(await at.store.has(storeKeys.solution('run-a'))).toBe(true);
  const frames = events.flatMap((event) => (event.type === 'frame' ? [decodeFrame(event.frame)] : []));
  expect(frames.length).toBeGreaterThan(1);
  expect(frames.map((frame) => frame.head.seq)).toEqual(frames.map((_, i) => i));
  const times = frames.flatMap((frame) => [...(frame.tables.state?.time_s ?? [])]);
  expect(times).toEqual([...times].sort((a, b) => a - b));
  expect(times.length).toBeLessThan(600);
  expect(times.at(-1)).toBeCloseTo(LONG_S - 0.01, 6);
  const shares = events.flatMap((event) => (event.type === 'progress' ? [event.progress] : []));
  expect(shares).toEqual([...shares].sort((a, b) => a - b));
}, 60_000);

test('the same run gives the same bytes, in whichever process', async () => {
  const two = open(2);
  const hashes = await Promise.all(
    ['a', 'b'].map((id) => two.submit(runOf('short', `same-${id}`), { latestKey: id }).result),
  );
  expect(hashes[0]!.resultSha256).toBe(hashes[1]!.resultSha256);
}, 60_000);

test('the newest of one key wins: older ones are superseded, waiting or running, and say nothing more', async () => {
  const one = open(1);
  const first = firstFrame();
  const late: JobEvent[] = [];
  let superseded = false;
  const running = one.submit(runOf('long', 'old'), {
    latestKey: 'bench',
    onEvent: (event) => (superseded ? late.push(event) : first.onEvent(event)),
  });
  await first.arrived;

  superseded = true;
  const waiting = one.submit(runOf('long', 'older'), { latestKey: 'bench' });
  const newest = one.submit(runOf('short', 'new'), { latestKey: 'bench' });

  await expect(running.result).rejects.toMatchObject({ name: 'JobCancelled', superseded: true });
  await expect(waiting.result).rejects.toMatchObject({ name: 'JobCancelled', superseded: true });
  expect((await newest.result).summary.durationS).toBeGreaterThan(50);
  expect(late).toEqual([]);
  expect(await at.store.has(storeKeys.solution('old'))).toBe(false);
}, 60_000);

test('other keys are left alone', async () => {
  const one = open(1);
  const a = one.submit(runOf('short', 'key-a'), { latestKey: 'a' });
  const b = one.submit(runOf('short', 'key-b'), { latestKey: 'b' });
  await expect(Promise.all([a.result, b.result])).resolves.toHaveLength(2);
}, 60_000);

test('a cancelled job ends and its process lives on', async () => {
  const one = open(1);
  const first = firstFrame();
  const job = one.submit(runOf('long', 'cancelled'), { onEvent: first.onEvent });
  await first.arrived;
  const pids = one.pids;

  job.cancel();

  await expect(job.result).rejects.toBeInstanceOf(JobCancelled);
  await until(() => one.stats.busy === 0);
  expect(one.pids).toEqual(pids);
  await expect(one.submit(runOf('short', 'after'), {}).result).resolves.toBeDefined();
}, 60_000);

test('kill -9 in the middle of a run: the job fails as crashed, the process is replaced, nothing half-written stays', async () => {
  const one = open(1);
  const first = firstFrame();
  const job = one.submit(runOf('long', 'killed'), { onEvent: first.onEvent });
  await first.arrived;
  const [pid] = one.pids;

  process.kill(pid!, 'SIGKILL');

  await expect(job.result).rejects.toBeInstanceOf(WorkerCrashed);
  await expect(one.submit(runOf('short', 'next')).result).resolves.toBeDefined();
  expect(one.pids).not.toContain(pid);
  expect(await at.store.list('runs/killed/')).toEqual([]);
}, 60_000);

test('kill -9 with retryOnCrash: the run is done again and gives what an undisturbed one gives', async () => {
  const one = open(1);
  const undisturbed = await one.submit(runOf('long', 'undisturbed')).result;
  const first = firstFrame();
  const job = one.submit(runOf('long', 'again'), { onEvent: first.onEvent, retryOnCrash: true });
  await first.arrived;

  process.kill(one.pids[0]!, 'SIGKILL');

  expect((await job.result).resultSha256).toBe(undisturbed.resultSha256);
}, 90_000);

test('a job given to processes that are already dead is not counted against it', async () => {
  const two = open(2);
  await two.ready();
  const dead = two.pids;

  for (const pid of dead) process.kill(pid, 'SIGKILL');
  const job = two.submit(runOf('short', 'after-deaths'));

  await expect(job.result).resolves.toBeDefined();
  expect(two.pids.filter((pid) => dead.includes(pid))).toEqual([]);
}, 60_000);

test('kill -9 of every process at once: the run that one of them computed is done again', async () => {
  const two = open(2);
  await two.ready();
  const first = firstFrame();
  const job = two.submit(runOf('long', 'all-killed'), { onEvent: first.onEvent, retryOnCrash: true });
  await first.arrived;

  for (const pid of two.pids) process.kill(pid, 'SIGKILL');

  await expect(job.result).resolves.toBeDefined();
}, 90_000);

test('people at a screen go before bulk work', async () => {
  const one = open(1);
  const order: string[] = [];
  const note = (name: string) => () => order.push(name);
  const first = firstFrame();
  const running = one.submit(runOf('long', 'first'), { onEvent: first.onEvent });
  await first.arrived;

  const bulk = one.submit(runOf('short', 'bulk')).result.then(note('bulk'));
  const bench = one.submit(runOf('short', 'bench'), { latestKey: 'bench' }).result.then(note('bench'));
  const plot = one
    .submit({
      kind: 'recording-series',
      recordingId: 'short',
      channels: ['accel_z'],
      fromS: null,
      toS: null,
      points: 100,
    })
    .result.then(note('plot'));
  running.cancel();
  await expect(running.result).rejects.toBeInstanceOf(JobCancelled);
  await Promise.all([bulk, bench, plot]);

  expect(order).toEqual(['bench', 'plot', 'bulk']);
}, 60_000);

test('bulk work never takes the last process', async () => {
  const two = open(2);
  await two.ready();

  const jobs = ['bulk-1', 'bulk-2'].map((id) => two.submit(runOf('long', id)));
  expect(two.stats).toEqual({ size: 2, busy: 1, waiting: 1 });
  const bench = two.submit(runOf('short', 'bench-2'), { latestKey: 'bench' });
  expect(two.stats).toEqual({ size: 2, busy: 2, waiting: 1 });

  await expect(bench.result).resolves.toBeDefined();
  for (const job of jobs) job.cancel();
  await Promise.allSettled(jobs.map((job) => job.result));
}, 60_000);

test('jobs of one recording go to the process that holds it', async () => {
  const two = open(2);
  await two.ready();
  const [, second] = two.pids;
  const other = two.submit(runOf('short', 'home-1'), { latestKey: '1', affinity: 'short' });
  const home = two.submit(runOf('long', 'home-2'), { latestKey: '2', affinity: 'long' });
  await Promise.all([other.result, home.result]);
  expect(two.stats.busy).toBe(0);

  // Both are free: without affinity the first process would take it and outlive the second.
  const first = firstFrame();
  const again = two.submit(runOf('long', 'home-3'), {
    latestKey: '2',
    affinity: 'long',
    onEvent: first.onEvent,
  });
  await first.arrived;
  process.kill(second!, 'SIGKILL');

  await expect(again.result).rejects.toBeInstanceOf(WorkerCrashed);
}, 60_000);

test('a decode job goes through the pool like any other', async () => {
  const logs = cleanLogs();
  const files = [];
  for (const role of ['imu', 'gnss'] as const) {
    const key = storeKeys.raw('uploaded', role);
    await at.store.put(key, Buffer.from(logs[role]));
    files.push({ role, name: `${role}.csv`, key });
  }
  const job = {
    kind: 'decode' as const,
    recordingId: 'uploaded',
    files,
    channelMap: null,
    vehicleAxes: IDENTITY_AXES,
  };

  expect(await open(1).submit(job).result).toMatchObject({ outcome: 'ready', startS: 0 });
}, 60_000);

test('kill -9 in the middle of decoding: done again from the start it gives one whole recording and no remains', async () => {
  const logs = { imu: csvText(IMU_HEADER, imuRows(60_000)), gnss: csvText(GNSS_HEADER, gnssRows(3000)) };
  const files = [];
  for (const role of ['imu', 'gnss'] as const) {
    const key = storeKeys.raw('twice', role);
    await at.store.put(key, Buffer.from(logs[role]));
    files.push({ role, name: `${role}.csv`, key });
  }
  const one = open(1);
  let killed = false;
  const onEvent = () => {
    if (!killed) process.kill(one.pids[0]!, 'SIGKILL');
    killed = true;
  };
  const job = {
    kind: 'decode' as const,
    recordingId: 'twice',
    files,
    channelMap: null,
    vehicleAxes: IDENTITY_AXES,
  };

  const result = await one.submit(job, { onEvent, retryOnCrash: true }).result;

  expect(killed).toBe(true);
  expect(result).toMatchObject({ outcome: 'ready', health: { imu: { samples: 60_000 } } });
  await until(() => readdirSync(path.join(at.root, '.incoming')).length === 0);
  expect(await at.store.list('recordings/twice/')).toHaveLength(6);
}, 60_000);

test('what cannot be done is told in plain words', async () => {
  const job = open(1).submit(runOf('nowhere', 'x'));
  await expect(job.result).rejects.toBeInstanceOf(JobFailed);
  await expect(job.result).rejects.toThrow('The recording has not been decoded');
}, 60_000);

test('a listener that throws disturbs nobody', async () => {
  const throwing = () => {
    throw new Error('the socket is gone');
  };
  await expect(open(1).submit(runOf('long', 'loud'), { onEvent: throwing }).result).resolves.toBeDefined();
}, 60_000);

test('processes that cannot start fail the jobs instead of keeping them for ever', async () => {
  const job = open(2, path.join(at.root, 'no-such-file.js')).submit(runOf('short', 'never'));
  await expect(job.result).rejects.toMatchObject({ code: 'worker-start' });
}, 60_000);

test('close cancels what is under way and leaves no process', async () => {
  const two = open(2);
  const first = firstFrame();
  const running = two.submit(runOf('long', 'closing'), { onEvent: first.onEvent });
  const waiting = two.submit(runOf('long', 'closing-2'));
  await first.arrived;
  const pids = two.pids;
  const ended = Promise.allSettled([running.result, waiting.result]);

  await two.close();

  expect(pids).toHaveLength(2);
  expect(pids.filter(isAlive)).toEqual([]);
  expect((await ended).map((one) => one.status)).toEqual(['rejected', 'rejected']);
  await expect(two.submit(runOf('short', 'too late')).result).rejects.toBeInstanceOf(JobCancelled);
}, 60_000);

test('children end when their parent is killed', async () => {
  const script = path.join(__dirname, 'pool-parent.ts');
  const parent = spawn(process.execPath, ['--import', 'tsx', script, bundle.entry, at.root], {
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  const said = await new Promise<string>((resolve) =>
    parent.stdout.once('data', (data) => resolve(String(data))),
  );
  const pids = JSON.parse(said) as number[];
  expect(pids.filter(isAlive)).toHaveLength(2);

  parent.kill('SIGKILL');

  await until(() => !pids.some(isAlive));
}, 60_000);
