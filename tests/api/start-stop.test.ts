import { spawnSync } from 'node:child_process';
import { randomUUID } from 'node:crypto';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { loadConfig } from '@/server/config';
import { migrate, MIGRATIONS } from '@/server/migrations';
import { revertMigrations } from '@/server/migrations/runner';
import { startServer } from '@/server/start';
import { inRoot } from '@/scripts/lib/project';
import type { Recording } from '@/shared/contracts/recordings';
import type { Run } from '@/shared/contracts/runs';
import { type Api, apiEnvironment, startApi, until } from '../support/api';
import { buildMember, buildRecording } from '../support/api-factories';
import { startProcess } from '../support/api-process';
import { createDatabase, type TestDatabase } from '../support/database';

describe('starting', () => {
  let database: TestDatabase;
  let dataDir: string;
  beforeAll(async () => {
    database = await createDatabase();
    dataDir = fs.mkdtempSync(path.join(os.tmpdir(), 'driftwright-start-'));
  });
  afterAll(async () => {
    await database.drop();
    fs.rmSync(dataDir, { recursive: true, force: true });
  });

  const config = (env: Record<string, string>) => loadConfig(apiEnvironment(database.url, dataDir, env));

  it('says in one line that a port is taken, and leaves nothing open', async () => {
    const server = await startServer(config({}));
    const { port } = new URL(server.url);
    await expect(startServer(config({ PORT: port }))).rejects.toThrow(
      `Port ${port} of 127.0.0.1 is taken by another program: free it, or choose another by PORT.`,
    );
    await server.stop();
  });

  it('says in one line, on the terminal, what is wrong with the configuration', () => {
    const { status, stderr } = spawnSync(process.execPath, ['--import', 'tsx', inRoot('server/index.ts')], {
      cwd: inRoot(),
      env: { ...process.env, DATABASE_URL: 'mysql://x', PORT: 'http' },
      encoding: 'utf8',
    });
    expect(status).toBe(1);
    expect(stderr.trim().split('\n')).toHaveLength(1);
    expect(stderr).toMatch(/PORT .*DATABASE_URL must be a postgres:\/\/ address/);
  });

  it('says that the worker bundle is missing', async () => {
    const missing = startServer(config({ WORKER_ENTRY: path.join(dataDir, 'none.js') }));
    await expect(missing).rejects.toThrow(/worker bundle .*none\.js is missing: npm run build/);
  });

  it('keeps the session secret, so that a restart signs nobody out', () => {
    expect(config({}).sessionSecret).toBe(config({}).sessionSecret);
    expect(fs.statSync(path.join(dataDir, 'session-secret')).mode & 0o077).toBe(0);
  });

  it('migrates up and down again without a trace', async () => {
    const fresh = await createDatabase();
    expect(await migrate(fresh.url)).toEqual([]);
    const names = MIGRATIONS.map((migration) => migration.name);
    expect(await revertMigrations(fresh.url, MIGRATIONS, names.length)).toEqual([...names].reverse());
    expect(await migrate(fresh.url)).toEqual(names);
    await fresh.drop();
  });
});

describe('stopping', () => {
  it('ends cleanly with runs going: a bench’s is told as failed, any other is computed by the next server', async () => {
    const database = await createDatabase();
    const dataDir = fs.mkdtempSync(path.join(os.tmpdir(), 'driftwright-stop-'));
    const server = await startProcess(database.url, dataDir);
    const admin = server.stranger();
    const first = {
      email: 'ada@kelmar.example',
      password: 'lighthouse-22',
      name: 'Ada',
      workspaceName: 'Crew',
    };
    await admin.post('/installation/first-admin', first);
    const scenario = { durationS: 900, imuRateHz: 100 };
    const { id } = (await admin.post('/scenarios', { name: 'x', scenario })).body as Recording;
    await until('it is ready', async () => {
      return ((await admin.get(`/recordings/${id}`)).body as Recording).status === 'ready';
    });
    const bench = (await admin.post('/runs', { recordingId: id, benchId: randomUUID() })).body as Run;
    const single = (await admin.post('/runs', { recordingId: id })).body as Run;
    expect(await server.stop()).toBe(0);
    const again = await startProcess(database.url, dataDir);
    const same = again.stranger();
    same.cookie = admin.cookie;
    const done = await until('the single run is done', async () => {
      const run = (await same.get(`/runs/${single.id}`)).body as Run;
      return run.state === 'done' && run;
    });
    expect(done.hasSeries).toBe(true);
    const told = (await same.get(`/runs/${bench.id}`)).body as Run;
    expect(['failed', 'done']).toContain(told.state);
    if (told.state === 'failed') expect(told.failure).toContain('The server was restarted');
    await again.stop();
    await database.drop();
    fs.rmSync(dataDir, { recursive: true, force: true });
  });
});

describe('two servers on one database', () => {
  let first: Api;
  beforeAll(async () => {
    first = await startApi();
  });
  afterAll(() => first.stop());

  it('leave each other’s work alone and share what is kept', async () => {
    const engineer = await buildMember(first, 'engineer');
    const recording = await buildRecording(engineer);
    await first.ctx.db.Run.create({
      workspaceId: engineer.workspaceId,
      recordingId: recording.id,
      createdById: engineer.userId,
      benchId: randomUUID(),
      state: 'running',
      parameters: {} as never,
      leverArmM: [0, 0, 0],
      outages: [],
      outputRateHz: 10,
      instanceId: first.ctx.instance.id,
    });
    const second = await startServer({ ...first.ctx.config, port: 0 });
    const [run] = await second.ctx.db.Run.findAll({ where: { recordingId: recording.id } });
    expect(run?.state).toBe('running');
    expect(await second.ctx.db.Recording.count()).toBe(1);
    expect(await first.ctx.instance.deadAmong([second.ctx.instance.id])).toEqual([]);
    await second.stop();
    expect(await first.ctx.instance.deadAmong([second.ctx.instance.id])).toEqual([second.ctx.instance.id]);
  });
});
