/** Nothing of a refused upload is kept; a file that arrived whole but cannot be decoded says what, where and what to do. */
import http from 'node:http';
import { randomBytes } from 'node:crypto';
import type { Recording } from '@/shared/contracts/recordings';
import { StoreFailed } from '@/workers';
import { type Api, type Caller, problemOf, startApi, until } from '../support/api';
import { buildMember, decoded, upload, uploadForm } from '../support/api-factories';
import { GNSS_HEADER, IMU_HEADER, type Logs, smallLogs } from '../support/api-logs';
import { filesBelow, NOTHING, tracesOf } from '../support/api-traces';

describe('uploads that are refused', () => {
  let api: Api;
  let engineer: Caller;
  beforeAll(async () => {
    api = await startApi({ UPLOAD_LIMIT_MB: '5' });
    engineer = await buildMember(api, 'engineer');
  });
  afterEach(async () => expect(await tracesOf(api)).toEqual(NOTHING));
  afterAll(() => api.stop());

  const without = (...parts: string[]) => {
    const form = uploadForm();
    for (const part of parts) form.delete(part);
    return form;
  };

  it('for an empty file', async () => {
    const answer = await engineer.post('/recordings', uploadForm({}, { imu: '' }));
    expect(answer.status).toBe(422);
    expect(problemOf(answer).errors).toEqual([
      { path: 'imu', message: 'The file “imu.csv” is empty. Choose the log itself.' },
    ]);
  });

  it('for a missing file, each named', async () => {
    const answer = await engineer.post('/recordings', without('imu', 'gnss'));
    expect(answer.status).toBe(422);
    expect(problemOf(answer).errors?.map((error) => error.path)).toEqual(['imu', 'gnss']);
  });

  it('for missing, broken or wrong meta', async () => {
    expect(problemOf(await engineer.post('/recordings', without('meta'))).errors?.[0]?.path).toBe('meta');
    const broken = uploadForm();
    broken.set('meta', '{"name":');
    expect((await engineer.post('/recordings', broken)).status).toBe(400);
    const unnamed = await engineer.post('/recordings', uploadForm({ name: ' ' }));
    expect(problemOf(unnamed).errors?.[0]).toMatchObject({ path: 'name', message: 'Give it a name.' });
    const stranger = '7a2d9b0e-52c1-4f0e-9f0a-0d5a4a6b7c8d';
    const foreign = await engineer.post('/recordings', uploadForm({ vehicleId: stranger }));
    expect(problemOf(foreign).errors?.[0]?.path).toBe('vehicleId');
  });

  it('for a part that is not asked for, or a second one of a kind', async () => {
    const odd = uploadForm();
    odd.set('video', new Blob(['x']), 'video.mp4');
    expect(problemOf(await engineer.post('/recordings', odd)).detail).toContain('“video”');
    const double = uploadForm();
    double.append('imu', new Blob(['x']), 'imu2.csv');
    expect((await engineer.post('/recordings', double)).status).toBe(400);
  });

  it('for a body that is no upload', async () => {
    const answer = await engineer.post('/recordings', { name: 'x' });
    expect(answer.status).toBe(415);
    expect(problemOf(answer).detail).toContain('multipart/form-data');
  });

  it('for a file beyond the limit that no header announced', async () => {
    const rows = Buffer.alloc(6_000_000, '0.01,0,0,0,0,0,-9.81\n');
    const answer = await sendChunked(engineer, rows);
    expect(answer.status).toBe(413);
    expect(answer.body).toContain('urn:driftwright:problem:too-large');
  });

  it('at once for a Content-Length of 5 GB, before anything of it is read', async () => {
    const answer = await sendHead(engineer, { 'Content-Length': '5000000000' });
    expect(answer.status).toBe(413);
    expect(answer.body).toContain('says it has 5.00 GB');
  });

  it('when the caller hangs up in the middle', async () => {
    await hangUp(engineer);
    await until('the temporary files are gone', () => filesBelow(`${api.dataDir}/uploads`).length === 0);
  });

  it('when the store’s disk is full', async () => {
    const { store } = api.ctx;
    const { adopt } = store;
    store.adopt = async (key, localPath) => {
      if (!key.endsWith('gnss')) return adopt.call(store, key, localPath);
      throw new StoreFailed('ENOSPC', 'The disk of the store is full.');
    };
    const answer = await engineer.post('/recordings', uploadForm());
    store.adopt = adopt;
    expect(answer.status).toBe(507);
    expect(problemOf(answer).detail).toContain('full');
  });

  it('by whoever may not upload, before anything is read', async () => {
    const viewer = await buildMember(api, 'viewer');
    expect((await viewer.post('/recordings', uploadForm())).status).toBe(403);
    expect((await api.stranger().post('/recordings', uploadForm())).status).toBe(401);
  });
});

describe('files that arrive but cannot be decoded', () => {
  let api: Api;
  let engineer: Caller;
  beforeAll(async () => {
    api = await startApi();
    engineer = await buildMember(api, 'engineer');
  });
  afterAll(() => api.stop());

  const lines = (text: string) => text.trimEnd().split('\n');
  const { imu, gnss } = smallLogs();
  const edited = (text: string, edit: (rows: string[]) => string[]) => `${edit(lines(text)).join('\n')}\n`;
  const swapped = edited(imu, (rows) => [...rows.slice(0, 100), rows[60] ?? '', ...rows.slice(100)]);
  const lettered = edited(imu, (rows) =>
    rows.map((row, i) => (i === 20 ? row.replace(/,[^,]*$/, ',high') : row)),
  );
  const later = edited(gnss, (rows) =>
    rows.map((row, i) => (i === 0 ? row : row.replace(/^[^,]+/, (time) => String(Number(time) + 5000)))),
  );

  it.each<[string, Partial<Logs>, 'imu' | 'gnss' | null, RegExp]>([
    ['binary', { imu: randomBytes(4000) }, 'imu', /text|binary/i],
    ['one row of data', { imu: edited(imu, (rows) => rows.slice(0, 2)) }, 'imu', /row/i],
    ['a header alone', { gnss: `${GNSS_HEADER}\n` }, 'gnss', /row|header/i],
    ['text in numbers', { imu: lettered }, 'imu', /high/],
    ['time that runs backwards', { imu: swapped }, 'imu', /time|back/i],
    ['logs that do not overlap', { gnss: later }, null, /overlap/i],
  ])('%s: rejected with what, where and what to do', async (_what, logs, file, words) => {
    const recording = await decoded(engineer, (await upload(engineer, {}, logs)).id);
    expect(recording.status).toBe('rejected');
    const [problem] = recording.problems;
    expect(problem?.message).toMatch(words);
    expect(problem?.remedy.length).toBeGreaterThan(10);
    if (file) expect(problem?.file).toBe(file);
    expectRawOnly(recording);
  });

  it('text in numbers names the line and the column', async () => {
    const recording = await decoded(engineer, (await upload(engineer, {}, { imu: lettered })).id);
    expect(recording.problems[0]).toMatchObject({ line: 21, column: 'accel_z_m_s2' });
  });

  it('no time column: asks for a mapping, and is ready once it has one', async () => {
    const timeless = imu.replace(IMU_HEADER, IMU_HEADER.replace('time_s', 'lamp'));
    const waiting = await decoded(engineer, (await upload(engineer, {}, { imu: timeless })).id);
    expect(waiting.status).toBe('needs-mapping');
    expect(waiting.problems[0]?.message).toMatch(/time/i);
    expectRawOnly(waiting);
    const map = { imu: { ...waiting.channelMap?.imu, ...imuMap } };
    expect((await engineer.put(`/recordings/${waiting.id}/channel-map`, map)).status).toBe(202);
    expect((await decoded(engineer, waiting.id)).status).toBe('ready');
  });

  const imuMap = {
    time: { columns: ['lamp'], base: 's' },
    gyro: { columns: ['gyro_x_rad_s', 'gyro_y_rad_s', 'gyro_z_rad_s'], unit: 'rad/s' },
    accel: { columns: ['accel_x_m_s2', 'accel_y_m_s2', 'accel_z_m_s2'], unit: 'm/s^2' },
  };

  it('a run over one is refused with the reason', async () => {
    const recording = await decoded(engineer, (await upload(engineer, {}, { imu: lettered })).id);
    const answer = await engineer.post('/runs', { recordingId: recording.id });
    expect(answer.status).toBe(409);
    expect(problemOf(answer).detail).toContain('could not be decoded');
  });

  function expectRawOnly({ id }: Recording): void {
    const kept = filesBelow(`${api.dataDir}/store`).filter((key) => key.includes(id));
    expect(kept).toEqual([`recordings/${id}/raw/gnss`, `recordings/${id}/raw/imu`]);
    expect(filesBelow(`${api.dataDir}/uploads`)).toEqual([]);
  }
});

const BOUNDARY = 'driftwright-test-boundary';
const partHead = (name: string, file?: string) =>
  `--${BOUNDARY}\r\nContent-Disposition: form-data; name="${name}"${file ? `; filename="${file}"` : ''}\r\n\r\n`;

function open(caller: Caller, headers: Record<string, string>): http.ClientRequest {
  return http.request(`${caller.url}/api/v1/recordings`, {
    method: 'POST',
    agent: false,
    headers: {
      Cookie: caller.cookie,
      'X-Driftwright': '1',
      'Content-Type': `multipart/form-data; boundary=${BOUNDARY}`,
      ...headers,
    },
  });
}

function answerOf(request: http.ClientRequest): Promise<{ status: number; body: string }> {
  return new Promise((resolve, reject) => {
    request.on('error', reject);
    request.on('response', (response) => {
      let body = '';
      response.setEncoding('utf8');
      response.on('data', (chunk: string) => (body += chunk));
      response.on('end', () => resolve({ status: response.statusCode ?? 0, body }));
    });
  });
}

/** A claim without a body: only an answer that does not wait for one can come. */
async function sendHead(caller: Caller, headers: Record<string, string>) {
  const request = open(caller, headers);
  const answer = answerOf(request);
  request.flushHeaders();
  const got = await answer;
  request.destroy();
  return got;
}

async function sendChunked(caller: Caller, file: Buffer) {
  const request = open(caller, { 'Transfer-Encoding': 'chunked' });
  const answer = answerOf(request);
  request.write(partHead('imu', 'imu.csv'));
  request.write(file);
  request.end(`\r\n--${BOUNDARY}--\r\n`);
  return answer;
}

/** Sends half a file and cuts the connection. */
async function hangUp(caller: Caller): Promise<void> {
  const request = open(caller, { 'Content-Length': '3000000' });
  request.on('error', () => undefined);
  request.write(partHead('gnss', 'gnss.csv') + 'time_s\n1\n' + `\r\n${partHead('imu', 'imu.csv')}`);
  await new Promise((resolve) => request.write(Buffer.alloc(1_000_000, '1'), resolve));
  request.destroy();
}
