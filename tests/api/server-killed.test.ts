/** kill -9 of the server in the middle of things; a new one on the same database and folder takes over. */
import { randomUUID } from 'node:crypto';
import fs from 'node:fs';
import http from 'node:http';
import os from 'node:os';
import path from 'node:path';
import { pino } from 'pino';
import type { Recording } from '@/shared/contracts/recordings';
import type { Run } from '@/shared/contracts/runs';
import { type Database, openDatabase } from '@/server/models';
import { type Caller, until } from '../support/api';
import { decoded, PASSWORD, upload } from '../support/api-factories';
import { smallLogs } from '../support/api-logs';
import { type ServerProcess, startProcess } from '../support/api-process';
import { filesBelow } from '../support/api-traces';
import { createDatabase, type TestDatabase } from '../support/database';

describe('a server that is killed', () => {
  let database: TestDatabase;
  let db: Database;
  let dataDir: string;
  let server: ServerProcess;
  let admin: Caller;

  beforeAll(async () => {
    database = await createDatabase();
    db = openDatabase(database.url, pino({ level: 'silent' }));
    dataDir = fs.mkdtempSync(path.join(os.tmpdir(), 'driftwright-killed-'));
    server = await startProcess(database.url, dataDir);
    admin = server.stranger();
    const first = { email: 'ada@kelmar.example', password: PASSWORD, name: 'Ada', workspaceName: 'Crew' };
    expect((await admin.post('/installation/first-admin', first)).status).toBe(201);
  });
  afterAll(async () => {
    await server.stop();
    await db.close();
    await database.drop();
    fs.rmSync(dataDir, { recursive: true, force: true });
  });

  /** Kills, starts anew, and is the same person with the same cookie there. */
  const killAndRestart = async () => {
    await server.kill();
    server = await startProcess(database.url, dataDir);
    const { cookie } = admin;
    admin = server.stranger();
    admin.cookie = cookie;
  };
  const long = () => smallLogs({ durationS: 900, imuRateHz: 100 });
  const stored = () => filesBelow(path.join(dataDir, 'store'));

  it('in an upload: what was confirmed is kept, of the rest nothing', async () => {
    const confirmed = await upload(admin, { name: 'Confirmed' });
    const cut = await halfAnUpload(admin);
    await until('half of it has arrived', () => filesBelow(path.join(dataDir, 'uploads')).length > 0);
    await killAndRestart();
    await expect(cut.answer).rejects.toThrow();
    expect(filesBelow(path.join(dataDir, 'uploads'))).toEqual([]);
    expect((await decoded(admin, confirmed.id)).status).toBe('ready');
    const { items } = (await admin.get('/recordings')).body as { items: Recording[] };
    expect(items.map((item) => item.name)).toEqual(['Confirmed']);
    expect(await db.Recording.count()).toBe(1);
    await until('nothing else is left', () => stored().every((key) => key.includes(confirmed.id)));
  });

  it('between keeping the files and confirming: they are cleared away', async () => {
    const [user] = await db.User.findAll();
    const [workspace] = await db.Workspace.findAll();
    const id = randomUUID();
    const raw = path.join(dataDir, 'store', 'recordings', id, 'raw');
    await db.Recording.create({
      id,
      name: 'Half',
      workspaceId: workspace?.id ?? '',
      createdById: user?.id ?? '',
      vehicleId: null,
      instanceId: randomUUID(), // of a server that is no more
    });
    fs.mkdirSync(raw, { recursive: true });
    fs.writeFileSync(path.join(raw, 'imu'), 'time_s\n');
    expect((await admin.get(`/recordings/${id}`)).status).toBe(404);
    await killAndRestart();
    expect(await db.Recording.findByPk(id)).toBeNull();
    expect(stored().filter((key) => key.includes(id))).toEqual([]);
  });

  it('in a deletion: it is finished', async () => {
    const { id } = await decoded(admin, (await upload(admin)).id);
    await db.Recording.update({ deletedAt: new Date() }, { where: { id } });
    expect((await admin.get(`/recordings/${id}`)).status).toBe(404);
    await killAndRestart();
    expect(await db.Recording.findByPk(id)).toBeNull();
    expect(stored().filter((key) => key.includes(id))).toEqual([]);
  });

  it('in decoding: it is taken up again at once', async () => {
    const { id } = await upload(admin, {}, long());
    await until('it is being decoded', async () => (await db.Recording.findByPk(id))?.status === 'decoding');
    await killAndRestart();
    expect((await decoded(admin, id)).status).toBe('ready');
  });

  it('in runs: a bench’s says that it must be run again, any other is computed anew', async () => {
    const { id: recordingId } = await decoded(admin, (await upload(admin, {}, long())).id);
    const bench = (await admin.post('/runs', { recordingId, benchId: randomUUID() })).body as Run;
    const single = (await admin.post('/runs', { recordingId })).body as Run;
    expect((await db.Run.findByPk(single.id))?.state).toMatch(/queued|running/);
    await killAndRestart();
    const failed = await until('the bench’s run has ended', async () => {
      const run = (await admin.get(`/runs/${bench.id}`)).body as Run;
      return run.state !== 'queued' && run.state !== 'running' && run;
    });
    if (failed.state === 'failed') expect(failed.failure).toContain('The server was restarted');
    else expect(failed.state).toBe('done'); // it was quicker than the kill
    await until('the other is done', async () => (await db.Run.findByPk(single.id))?.state === 'done');
    const [row] = await db.Run.findAll({ where: { id: single.id } });
    expect(row?.hasSeries).toBe(true);
  });
});

/** Sends half of a large file and waits; the answer never comes. */
async function halfAnUpload(caller: Caller): Promise<{ answer: Promise<never> }> {
  const request = http.request(`${caller.url}/api/v1/recordings`, {
    method: 'POST',
    headers: {
      Cookie: caller.cookie,
      'X-Driftwright': '1',
      'Content-Type': 'multipart/form-data; boundary=half',
      'Content-Length': '40000000',
    },
  });
  const answer = new Promise<never>((_resolve, reject) => {
    request.on('error', reject);
    request.on('response', () => reject(new Error('It was answered.')));
  });
  answer.catch(() => undefined); // looked at later
  request.write('--half\r\nContent-Disposition: form-data; name="imu"; filename="imu.csv"\r\n\r\n');
  await new Promise((resolve) => request.write(Buffer.alloc(5_000_000, '1'), resolve));
  return { answer };
}
