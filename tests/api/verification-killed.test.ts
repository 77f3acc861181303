/** A verification computed by a server and a process beside it: kill -9 of either leaves the same verdicts, none twice. */
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { pino } from 'pino';
import { type Database, openDatabase } from '@/server/models';
import type { Me } from '@/shared/contracts/accounts';
import type { Verification } from '@/shared/contracts/verification';
import { type Caller, until } from '../support/api';
import { buildVehicle, decoded, upload } from '../support/api-factories';
import { smallLogs } from '../support/api-logs';
import {
  type OwnProcess,
  type ServerProcess,
  startConsumerProcess,
  startProcess,
} from '../support/api-process';
import { filesBelow } from '../support/api-traces';
import { buildDraft, buildRequirement, every, verificationEnds, verified } from '../support/api-verification';
import { createDatabase, type TestDatabase } from '../support/database';

describe('a verification in two processes', () => {
  let database: TestDatabase;
  let dataDir: string;
  let db: Database;
  let server: ServerProcess;
  let consumer: OwnProcess;
  let admin: Caller;
  let calm: Verification;
  const person = { email: 'ada@kelmar.example', password: 'lighthouse-22' };
  beforeAll(async () => {
    database = await createDatabase();
    dataDir = fs.mkdtempSync(path.join(os.tmpdir(), 'driftwright-verification-'));
    db = openDatabase(database.url, pino({ level: 'silent' }));
    server = await startProcess(database.url, dataDir);
    consumer = await startConsumerProcess(database.url, dataDir);
    admin = server.stranger();
    const made = await admin.post('/installation/first-admin', {
      ...person,
      name: 'Ada',
      workspaceName: 'Crew',
    });
    admin.workspaceId = (made.body as Me).workspaces[0]!.id;
    const ids = [];
    for (const seed of [21, 22]) {
      const logs = smallLogs({ durationS: 900, imuRateHz: 100, seed });
      ids.push((await decoded(admin, (await upload(admin, { name: `Loop ${seed}` }, logs)).id)).id);
    }
    for (const [everyS, limit] of [
      [60, 1e6],
      [90, 5],
      [120, 1e-6],
    ]) {
      await buildRequirement(admin, ids, { limit, schedule: every(everyS!, 30) }); // prettier-ignore
    }
    calm = await verified(admin, (await buildDraft(admin, (await buildVehicle(admin)).id)).path);
  });
  afterAll(async () => {
    await consumer.stop();
    await server.stop();
    await db.close();
    await database.drop();
    fs.rmSync(dataDir, { recursive: true, force: true });
  });

  /** Verdicts and values, without what differs between two runs of the same. */
  const figures = ({ cells }: Verification) =>
    cells.map(({ requirementId, recordingId, verdict, value }) => ({
      requirementId,
      recordingId,
      verdict,
      value,
    }));
  const MOST_ROUNDS = 8;
  /** Who takes which run is for them to settle: verifications are begun until one of its runs falls to `who`. */
  const beginIn = async ({ instanceId }: OwnProcess) => {
    for (let round = 0; round < MOST_ROUNDS; round += 1) {
      const { path: of, setId } = await buildDraft(admin, (await buildVehicle(admin)).id);
      await admin.post(`${of}/verify`);
      const { id: versionId } = (await db.SetVersion.findOne({ where: { setId } }))!;
      const seen = await until('somebody computes', async () => {
        const rows = await db.VerificationRun.findAll({ where: { versionId } });
        if (rows.some((row) => row.state === 'running' && row.instanceId === instanceId)) return 'here';
        return rows.every(({ state }) => state === 'done') && 'elsewhere';
      });
      if (seen === 'here') return { of, versionId };
    }
    throw new Error(`In ${MOST_ROUNDS} rounds the process took nothing.`);
  };
  const expectOnce = async (versionId: string) => {
    const rows = await db.VerificationRun.findAll({ where: { versionId } });
    expect(rows.map(({ state }) => state)).toEqual(Array(6).fill('done'));
    expect(rows.every(({ instanceId }) => instanceId === null)).toBe(true);
    const runIds = rows.map(({ runId }) => runId!);
    expect(new Set(runIds).size).toBe(6);
    expect(await db.Run.count({ where: { id: runIds, state: 'done', hasSeries: true } })).toBe(6);
    const all = await db.Run.count();
    expect(all % 6).toBe(0); // no run but those: nothing was made twice
    for (const id of runIds) {
      expect(filesBelow(`${dataDir}/store/runs/${id}`)).toContain('solution.arrow');
    }
  };

  it('has verdicts of every kind to compare', () => {
    expect(calm.counts).toMatchObject({ cells: 6, going: 0, failed: 0 });
    expect(calm.counts.pass).toBeGreaterThan(1);
    expect(calm.counts.fail).toBeGreaterThan(1);
  });

  it('ends with the same verdicts when the process beside is killed', async () => {
    const { of, versionId } = await beginIn(consumer);
    await consumer.kill();
    expect(figures(await verificationEnds(admin, of))).toEqual(figures(calm));
    await expectOnce(versionId);
    consumer = await startConsumerProcess(database.url, dataDir);
  });

  it('ends with the same verdicts when the server is killed', async () => {
    const { of, versionId } = await beginIn(server);
    await server.kill();
    await until(
      'the process beside has ended it',
      async () => (await db.VerificationRun.count({ where: { versionId, state: 'done' } })) === 6,
      110_000,
    );
    server = await startProcess(database.url, dataDir);
    const again = server.stranger();
    await again.post('/sessions', person);
    expect(figures(await verificationEnds(again, of))).toEqual(figures(calm));
    await expectOnce(versionId);
  });
});
