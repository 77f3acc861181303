/** kill -9 of worker processes in mid-work. */
import { randomUUID } from 'node:crypto';
import type { Run } from '@/shared/contracts/runs';
import type { WorkerPool } from '@/workers';
import { type Api, startApi, until } from '../support/api';
import { buildMember, decoded, upload } from '../support/api-factories';
import { connectLive } from '../support/api-live';
import { smallLogs } from '../support/api-logs';
import { filesBelow } from '../support/api-traces';

describe('a worker process that is killed', () => {
  let api: Api;
  beforeAll(async () => {
    api = await startApi();
  });
  afterAll(() => api.stop());

  const longLogs = () => smallLogs({ durationS: 900, imuRateHz: 100 });
  const killWorkers = () => {
    const { pids } = api.ctx.pool as WorkerPool;
    for (const pid of pids) process.kill(pid, 'SIGKILL');
    return pids;
  };

  it('in a run: another takes its place, and the run is computed once more', async () => {
    const engineer = await buildMember(api, 'engineer');
    const recording = await decoded(engineer, (await upload(engineer, {}, longLogs())).id);
    const live = await connectLive(engineer);
    const { id } = (await engineer.post('/runs', { recordingId: recording.id, benchId: randomUUID() }))
      .body as Run;
    await live.follow(id);
    await until('a frame comes', () => live.frames[0]);
    const killed = killWorkers();
    expect(killed.length).toBe(1);
    const message = await until('the summary comes', () => live.summaries[0]);
    expect(message.runId).toBe(id);
    expect(live.failures).toEqual([]);
    expect((await engineer.get(`/runs/${id}`)).body).toMatchObject({ state: 'done', hasSeries: true });
    expect((api.ctx.pool as WorkerPool).pids).not.toEqual(killed);
    live.close();
  });

  it('in a run, twice: the run fails with a plain reason, and the next one works', async () => {
    const engineer = await buildMember(api, 'engineer');
    const recording = await decoded(engineer, (await upload(engineer, {}, longLogs())).id);
    const live = await connectLive(engineer);
    const body = { recordingId: recording.id, benchId: randomUUID() };
    const { id } = (await engineer.post('/runs', body)).body as Run;
    await live.follow(id);
    await until('a frame comes', () => live.frames[0]);
    killWorkers();
    await until('the second try begins', () => live.frames.filter((frame) => frame.head.seq === 0)[1]);
    killWorkers();
    const failure = await until('the failure is told', () => live.failures[0]);
    expect(failure).toMatchObject({ runId: id, state: 'failed' });
    expect(failure.reason).toContain('Run it again');
    expect((await engineer.get(`/runs/${id}`)).body).toMatchObject({
      state: 'failed',
      failure: failure.reason,
    });
    await until('its files are gone', () => filesBelow(api.dataDir).every((file) => !file.includes(id)));
    const next = (await engineer.post('/runs', body)).body as Run;
    await until(
      'the next run is done',
      async () => (await api.ctx.db.Run.findByPk(next.id))?.state === 'done',
    );
    live.close();
  });

  it('in decoding: the job is taken up again, and one recording stands at the end', async () => {
    const engineer = await buildMember(api, 'engineer');
    const { id } = await upload(engineer, {}, longLogs());
    await until('it is being decoded', () => api.ctx.pool.stats.busy === 1);
    killWorkers();
    expect(await decoded(engineer, id)).toMatchObject({ status: 'ready', problems: [] });
    const { items } = (await engineer.get('/recordings')).body as { items: unknown[] };
    expect(items).toHaveLength(1);
    const files = filesBelow(`${api.dataDir}/store/recordings/${id}`);
    expect(files).toEqual([
      'decoded.json',
      'gnss-only.arrow',
      'gnss.arrow',
      'imu.arrow',
      'raw/gnss',
      'raw/imu',
    ]);
  });
});
