/** The main path with everything in object storage: upload, decode, run, export, delete. */
import fs from 'node:fs';
import path from 'node:path';
import { loadConfig } from '@/server/config';
import { startServer } from '@/server/start';
import type { Recording } from '@/shared/contracts/recordings';
import type { Run } from '@/shared/contracts/runs';
import { type Api, apiEnvironment, type Caller, startApi, until } from '../support/api';
import { buildMember, buildRecording } from '../support/api-factories';
import { filesBelow } from '../support/api-traces';
import { type ObjectStorage, startObjectStorage } from '../support/object-storage';

describe('with object storage', () => {
  let storage: ObjectStorage;
  let api: Api;
  let engineer: Caller;
  let recording: Recording;
  beforeAll(async () => {
    storage = await startObjectStorage();
    api = await startApi(storage.env);
    engineer = await buildMember(api, 'engineer');
    recording = await buildRecording(engineer);
  });
  afterAll(async () => {
    await api.stop();
    await storage.stop();
  });

  it('keeps an upload and what is decoded of it there, and nothing on the disk', async () => {
    const names = ['decoded.json', 'gnss-only.arrow', 'gnss.arrow', 'imu.arrow', 'raw/gnss', 'raw/imu'];
    expect(await storage.keys()).toEqual(names.map((name) => `recordings/${recording.id}/${name}`));
    expect(fs.existsSync(path.join(api.dataDir, 'store'))).toBe(false);
    expect(filesBelow(path.join(api.dataDir, 'uploads'))).toEqual([]);
  });

  it('runs the filter over it and exports the solution', async () => {
    const { id } = (await engineer.post('/runs', { recordingId: recording.id })).body as Run;
    await until('the run is done', async () => {
      const { state, failure } = (await engineer.get(`/runs/${id}`)).body as Run;
      if (state === 'failed') throw new Error(failure ?? 'failed');
      return state === 'done';
    });
    const answer = await engineer.get(`/runs/${id}/solution.csv`);
    expect(answer.status).toBe(200);
    expect(answer.bytes.toString('utf8').split('\n').length).toBeGreaterThan(100);
    expect(await storage.keys()).toContain(`runs/${id}/solution.arrow`);
  });

  it('removes it all with the recording', async () => {
    const { id } = await buildRecording(engineer);
    expect((await engineer.delete(`/recordings/${id}`)).status).toBe(204);
    expect((await storage.keys()).filter((key) => key.includes(id))).toEqual([]);
  });

  it('does not start where the bucket is missing, and says so in one line', async () => {
    const env = { ...storage.env, STORE_URL: 's3://nowhere/lab' };
    const start = startServer(loadConfig(apiEnvironment(api.databaseUrl, api.dataDir, env)));
    await expect(start).rejects.toThrow(
      /^The object storage .*there is no such bucket\. Make it, or correct STORE_URL\.$/,
    );
  });
});
