/** A process without an HTTP side beside the server: it decodes while the server is busy, and when it is dead. */
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { pino } from 'pino';
import { type Database, openDatabase } from '@/server/models';
import type { Recording } from '@/shared/contracts/recordings';
import { type Caller, until } from '../support/api';
import { decoded, upload } from '../support/api-factories';
import { connectLive } from '../support/api-live';
import { smallLogs } from '../support/api-logs';
import {
  type OwnProcess,
  type ServerProcess,
  startConsumerProcess,
  startProcess,
} from '../support/api-process';
import { filesBelow } from '../support/api-traces';
import { createDatabase, type TestDatabase } from '../support/database';

const MOST_ROUNDS = 8;

describe('a second process on the queue', () => {
  let database: TestDatabase;
  let dataDir: string;
  let db: Database;
  let server: ServerProcess;
  let consumer: OwnProcess;
  let admin: Caller;
  beforeAll(async () => {
    database = await createDatabase();
    dataDir = fs.mkdtempSync(path.join(os.tmpdir(), 'driftwright-second-'));
    db = openDatabase(database.url, pino({ level: 'silent' }));
    server = await startProcess(database.url, dataDir);
    consumer = await startConsumerProcess(database.url, dataDir);
    admin = server.stranger();
    const first = {
      email: 'ada@kelmar.example',
      password: 'lighthouse-22',
      name: 'Ada',
      workspaceName: 'Crew',
    };
    await admin.post('/installation/first-admin', first);
  });
  afterAll(async () => {
    await consumer.stop();
    await server.stop();
    await db.close();
    await database.drop();
    fs.rmSync(dataDir, { recursive: true, force: true });
  });

  const long = () => smallLogs({ durationS: 1200, imuRateHz: 100 });
  const holderOf = async (id: string) => (await db.Recording.findByPk(id))?.instanceId ?? null;
  const heldBy = (id: string, who: OwnProcess) =>
    until('it is in hand', async () => (await holderOf(id)) === who.instanceId);
  /** Of two recordings the one that the process beside has in hand, if it takes one before both are decoded. */
  const takenBeside = async (ids: readonly string[]) => {
    const rows = await db.Recording.findAll({ where: { id: [...ids] } });
    const taken = rows.find((row) => row.instanceId === consumer.instanceId && row.status === 'decoding');
    if (taken) return { taken: taken.id };
    return rows.every((row) => row.status === 'ready') && { taken: null };
  };
  /** Who takes which is for them to settle: two are sent until one of them falls to the process beside. */
  const uploadTwo = async () => {
    for (let round = 1; round <= MOST_ROUNDS; round += 1) {
      const one = await upload(admin, { name: `One of ${round}` }, long());
      const two = await upload(admin, { name: `Two of ${round}` }, long());
      const ids = [one.id, two.id];
      const { taken } = await until('it is in hand', () => takenBeside(ids));
      if (taken !== null) return { there: taken, here: ids.find((id) => id !== taken)! };
    }
    throw new Error(`In ${MOST_ROUNDS} rounds the process beside the server took nothing.`);
  };
  const expectWhole = (id: string) => {
    const names = ['decoded.json', 'gnss-only.arrow', 'gnss.arrow', 'imu.arrow', 'raw/gnss', 'raw/imu'];
    expect(filesBelow(`${dataDir}/store/recordings/${id}`)).toEqual(names);
    expect(filesBelow(`${dataDir}/store/.incoming`)).toEqual([]);
  };

  it('decodes while the server is busy, and the page hears how far it is', async () => {
    const live = await connectLive(admin);
    const { here, there } = await uploadTwo();
    expect((await decoded(admin, there)).status).toBe('ready');
    expect((await decoded(admin, here)).status).toBe('ready');
    const heard = await until('its end is heard', () => {
      const own = live.recordings.filter(({ recordingId }) => recordingId === there);
      return own.some(({ status }) => status === 'ready') && own;
    });
    expect(heard.some(({ status, progress }) => status === 'decoding' && progress > 0)).toBe(true);
    live.close();
    expectWhole(there);
  });

  it('is killed in the middle of decoding: the server takes it up, and one recording stands at the end', async () => {
    const { there } = await uploadTwo();
    await consumer.kill();
    expect(await decoded(admin, there)).toMatchObject({ status: 'ready', problems: [] });
    const { items } = (await admin.get('/recordings')).body as { items: Recording[] };
    expect(items.filter(({ id }) => id === there)).toHaveLength(1);
    await until('no temporary file is left', () => filesBelow(`${dataDir}/store/.incoming`).length === 0);
    expectWhole(there);
    consumer = await startConsumerProcess(database.url, dataDir);
  });

  it('stops what the server is told to stop, and lets go of it for the next mapping', async () => {
    const { here, there } = await uploadTwo();
    const stopped = (await admin.post(`/recordings/${there}/cancel`)).body as Recording;
    expect(stopped).toMatchObject({ status: 'rejected', problems: [{ code: 'stopped' }] });
    await until('it has let go', async () => (await holderOf(there)) === null);
    expect((await admin.put(`/recordings/${there}/channel-map`, {})).status).toBe(202);
    expect((await decoded(admin, there)).status).toBe('ready');
    expectWhole(there);
    await decoded(admin, here);
  });

  it('goes on when the server is killed in the middle of decoding', async () => {
    const { id } = await upload(admin, {}, long());
    await heldBy(id, server);
    await server.kill();
    const row = await until('it is decoded', async () => {
      const found = await db.Recording.findByPk(id);
      return found?.status === 'ready' && found;
    });
    expect(row.instanceId).toBeNull();
    expect(await db.Recording.count({ where: { id } })).toBe(1);
    await until('no temporary file is left', () => filesBelow(`${dataDir}/store/.incoming`).length === 0);
    expectWhole(id);
    server = await startProcess(database.url, dataDir);
  });

  it('stops cleanly', async () => {
    expect(await consumer.stop()).toBe(0);
    consumer = await startConsumerProcess(database.url, dataDir);
  });
});
