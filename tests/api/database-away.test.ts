/** kill -9 of PostgreSQL in mid-run: plain words meanwhile, nothing confirmed is lost, and all goes on by itself. */
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import type { Run } from '@/shared/contracts/runs';
import { type LocalPostgres, startLocalPostgres } from '@/scripts/local-postgres';
import { runningServer } from '@/scripts/postgres/cluster';
import { type Api, problemOf, startApiOn, until } from '../support/api';
import { buildMember, buildRecording, buildVehicle, decoded, upload } from '../support/api-factories';
import { connectLive } from '../support/api-live';
import { smallLogs } from '../support/api-logs';

describe('a database that is killed', () => {
  const given = process.env.DATABASE_URL;
  let folder: string;
  let postgres: LocalPostgres;
  let api: Api;

  beforeAll(async () => {
    delete process.env.DATABASE_URL; // else that database is taken
    folder = fs.mkdtempSync(path.join(os.tmpdir(), 'driftwright-away-'));
    fs.chmodSync(folder, 0o755);
    postgres = await startLocalPostgres({ folder: path.join(folder, 'postgres') });
    api = await startApiOn(postgres.url);
  });
  afterAll(async () => {
    await api.stop();
    await postgres.stop();
    fs.rmSync(folder, { recursive: true, force: true });
    if (given !== undefined) process.env.DATABASE_URL = given;
  });

  const kill = async () => {
    const running = runningServer(path.join(folder, 'postgres', 'data'));
    if (!running) throw new Error('PostgreSQL is not running.');
    process.kill(running.pid, 'SIGKILL');
    await postgres.ended;
  };

  it('is waited for', async () => {
    const engineer = await buildMember(api, 'engineer');
    const vehicle = await buildVehicle(engineer);
    const short = await buildRecording(engineer, { vehicleId: vehicle.id });
    const long = await decoded(
      engineer,
      (await upload(engineer, {}, smallLogs({ durationS: 900, imuRateHz: 100 }))).id,
    );
    const live = await connectLive(engineer);
    const { id } = (await engineer.post('/runs', { recordingId: long.id })).body as Run;
    await live.follow(id);
    await until('a frame comes', () => live.frames[0]);
    await kill();

    const refused = await engineer.get('/recordings');
    expect(refused.status).toBe(503);
    expect(problemOf(refused).detail).toContain('database');
    expect(refused.headers.get('Retry-After')).not.toBeNull();
    expect((await engineer.post('/vehicles', { name: 'Crawler 9' })).status).toBe(503);
    const health = await api.stranger().get('/health');
    expect(health.status).toBe(200);
    expect(health.body).toMatchObject({ status: 'degraded', database: 'down', queue: 'down' });

    postgres = await startLocalPostgres({ folder: path.join(folder, 'postgres') });
    await until('health is well again', async () => {
      const { body } = await api.stranger().get('/health');
      return (body as { status: string }).status === 'ok';
    });
    const run = await until('the run is done', async () => {
      const { status, body } = await engineer.get(`/runs/${id}`);
      return status === 200 && (body as Run).state === 'done' && (body as Run);
    });
    expect(run).toMatchObject({ hasSeries: true, failure: null });
    await until('the summary is told', () => live.summaries[0]);
    expect((await engineer.get(`/recordings/${short.id}`)).body).toMatchObject({
      status: 'ready',
      vehicleId: vehicle.id,
    });
    expect((await engineer.get(`/runs/${id}/series`)).status).toBe(200);
    await buildRecording(engineer); // the queue works again, too
    live.close();
  });
});
