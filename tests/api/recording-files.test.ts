/** What the intake made of a recording, as files; and stopping it. */
import { createHash } from 'node:crypto';
import { gzipSync } from 'node:zlib';
import { tableFromIPC } from 'apache-arrow';
import { healthFileSchema } from '@/shared/contracts/recording-files';
import { recordingSchema, type Recording } from '@/shared/contracts/recordings';
import { type Answer, type Api, type Caller, problemOf, startApi, until } from '../support/api';
import { buildMember, buildRecording, decoded, upload, uploadForm } from '../support/api-factories';
import { smallLogs } from '../support/api-logs';
import { filesBelow } from '../support/api-traces';

let api: Api;
let engineer: Caller;
beforeAll(async () => {
  api = await startApi();
  engineer = await buildMember(api, 'engineer');
});
afterAll(() => api.stop());

const rowsOf = (answer: Answer) =>
  answer.bytes.toString('utf8').trimEnd().split('\n').map((line) => line.split(',')); // prettier-ignore

describe('downloads of a decoded recording', () => {
  let recording: Recording;
  beforeAll(async () => {
    const form = uploadForm({ name: 'Breakwater, north/2' });
    form.set('reference', new Blob([referenceOf(smallLogs().gnss)]), 'reference.csv');
    const answer = await engineer.post('/recordings', form);
    recording = await decoded(engineer, recordingSchema.parse(answer.body).id);
    expect(recording).toMatchObject({ status: 'ready', hasReference: true });
  });
  const get = (file: string) => engineer.get(`/recordings/${recording.id}/${file}`);

  it.each(['imu', 'gnss', 'reference'])(
    '%s: Arrow and CSV hold the same numbers, units in the names',
    async (channel) => {
      const arrow = await get(`decoded.arrow?channel=${channel}`);
      expect(arrow.status).toBe(200);
      expect(arrow.headers.get('Content-Type')).toBe('application/vnd.apache.arrow.file');
      expect(arrow.headers.get('Content-Disposition')).toBe(
        `attachment; filename=Breakwater-north-2-${channel}.arrow`,
      );
      expect(Number(arrow.headers.get('Content-Length'))).toBe(arrow.bytes.length);
      const table = tableFromIPC(arrow.bytes);
      const csv = await get(`decoded.csv?channel=${channel}`);
      expect(csv.headers.get('Content-Type')).toBe('text/csv; charset=utf-8');
      const [header = [], ...rows] = rowsOf(csv);
      expect(header).toEqual(table.schema.fields.map((field) => field.name));
      expect(header.every((name) => /_(s|m|deg|rad_s|m_s2?)$/.test(name))).toBe(true);
      expect(rows).toHaveLength(table.numRows);
      for (const [at, name] of header.entries()) {
        const values = Array.from(table.getChild(name)?.toArray() as Float64Array);
        expect(rows.map((row) => (row[at] === '' ? NaN : Number(row[at])))).toEqual(values);
      }
    },
  );

  it('are the IMU’s where no channel is named, and the same bytes each time', async () => {
    const [plain, named] = [await get('decoded.csv'), await get('decoded.csv?channel=imu')];
    expect(plain.bytes.equals(named.bytes)).toBe(true);
    expect(rowsOf(plain)[0]?.[1]).toBe('gyro_x_rad_s');
  });

  it('the health report stands by itself: hashes, map, findings', async () => {
    const answer = await get('health.json');
    expect(answer.headers.get('Content-Disposition')).toBe(
      'attachment; filename=Breakwater-north-2-health.json',
    );
    const file = healthFileSchema.parse(answer.body);
    expect(file).toMatchObject({
      recordingId: recording.id,
      health: recording.health,
      files: recording.files,
    });
    expect(file.channelMap).toEqual(recording.channelMap);
    const note = await api.ctx.db.Recording.findByPk(recording.id);
    expect(file.decodedSha256).toBe(note?.sha256);
  });

  it('are refused in words where there is nothing to fetch', async () => {
    expect((await get('decoded.csv?channel=video')).status).toBe(422);
    const { id } = await buildRecording(engineer);
    const missing = await engineer.get(`/recordings/${id}/decoded.csv?channel=reference`);
    expect(missing.status).toBe(404);
    expect(problemOf(missing).detail).toContain('has no reference trajectory');
    const { imu } = smallLogs();
    const bad = await decoded(engineer, (await upload(engineer, {}, { imu: imu.slice(0, 200) })).id);
    expect((await engineer.get(`/recordings/${bad.id}/decoded.arrow`)).status).toBe(409);
    expect(problemOf(await engineer.get(`/recordings/${bad.id}/health.json`)).detail).toContain(
      'no health report',
    );
    const stranger = await buildMember(api, 'admin');
    expect((await stranger.get(`/recordings/${recording.id}/decoded.arrow`)).status).toBe(404);
  });
});

describe('stopping a decoding', () => {
  const long = () => smallLogs({ durationS: 1200, imuRateHz: 100 });

  it('rejects the recording with who stopped it, keeps its files, and a mapping decodes them', async () => {
    const { id } = await upload(engineer, {}, long());
    await until('it is being decoded', () => api.ctx.pool.stats.busy === 1);
    const answer = await engineer.post(`/recordings/${id}/cancel`);
    expect(answer.status).toBe(200);
    const stopped = recordingSchema.parse(answer.body);
    const user = await api.ctx.db.User.findOne({
      where: { id: (await api.ctx.db.Recording.findByPk(id))?.createdById },
    });
    expect(stopped).toMatchObject({ status: 'rejected', problems: [{ code: 'stopped', file: null }] });
    expect(stopped.problems[0]?.message).toBe(`Decoding was stopped by ${user?.name}.`);
    await until('the worker has stopped', () => api.ctx.pool.stats.busy === 0);
    expect(filesBelow(`${api.dataDir}/store/recordings/${id}`)).toEqual(['raw/gnss', 'raw/imu']);
    expect(filesBelow(`${api.dataDir}/store/.incoming`)).toEqual([]);
    expect((await decoded(engineer, id)).status).toBe('rejected');

    expect((await engineer.put(`/recordings/${id}/channel-map`, {})).status).toBe(202);
    expect(await decoded(engineer, id)).toMatchObject({ status: 'ready', problems: [] });
  });

  it('stops one that still waits, and is refused where nothing is under way', async () => {
    const first = await upload(engineer, {}, long());
    const second = await upload(engineer, {}, long());
    expect((await engineer.post(`/recordings/${second.id}/cancel`)).status).toBe(200);
    expect((await decoded(engineer, first.id)).status).toBe('ready');
    const late = await engineer.post(`/recordings/${first.id}/cancel`);
    expect(late.status).toBe(409);
    expect(problemOf(late).detail).toContain('there is nothing to stop');
    expect((await engineer.get(`/recordings/${second.id}`)).body).toMatchObject({ status: 'rejected' });
  });
});

describe('hard uploads', () => {
  const bomb = gzipSync(
    Buffer.concat([Buffer.from(smallLogs().imu), Buffer.alloc(96 * 1024 * 1024, '# 0\n')]),
  );
  it.each<[string, Uint8Array, string]>([
    ['a gzip that grows without end', bomb, 'gzip-expands'],
    ['ten million columns', gzipSync(`time_s${',gyro_x'.repeat(10_000_000)}\n0\n1\n`), 'too-many-columns'],
  ])('%s is rejected, and nothing of it but the upload is kept', async (_what, imu, code) => {
    const recording = await decoded(engineer, (await upload(engineer, {}, { imu })).id);
    expect(recording).toMatchObject({ status: 'rejected', problems: [{ code, file: 'imu' }] });
    expect(filesBelow(`${api.dataDir}/store/recordings/${recording.id}`)).toEqual(['raw/gnss', 'raw/imu']);
    expect((await engineer.delete(`/recordings/${recording.id}`)).status).toBe(204);
    expect(filesBelow(`${api.dataDir}/store/recordings/${recording.id}`)).toEqual([]);
  });

  it('a path in a file’s name leads nowhere: only its last part is shown', async () => {
    const form = uploadForm();
    const { imu } = smallLogs();
    form.set('imu', new Blob([imu]), '../../../../etc/cron.d/imu.csv');
    const recording = await decoded(
      engineer,
      recordingSchema.parse((await engineer.post('/recordings', form)).body).id,
    );
    expect(recording.status).toBe('ready');
    expect(recording.files.find(({ role }) => role === 'imu')?.name).toBe('imu.csv');
    expect(filesBelow(api.dataDir).filter((file) => file.includes('cron'))).toEqual([]);
  });

  it('the same file twice makes two recordings that stand by themselves', async () => {
    const [one, two] = [await buildRecording(engineer), await buildRecording(engineer)];
    expect(two.id).not.toBe(one.id);
    expect(two.files.map(({ sha256 }) => sha256)).toEqual(one.files.map(({ sha256 }) => sha256));
    expect(one.files[0]?.sha256).toBe(createHash('sha256').update(smallLogs().imu).digest('hex'));
    expect((await engineer.delete(`/recordings/${one.id}`)).status).toBe(204);
    expect((await engineer.get(`/recordings/${two.id}/decoded.arrow`)).status).toBe(200);
  });

  it('the same file as IMU and as GNSS is refused or asked about, never taken for both', async () => {
    const { imu } = smallLogs();
    const recording = await decoded(engineer, (await upload(engineer, {}, { gnss: imu })).id);
    expect(recording.status).toBe('needs-mapping');
    expect(recording.problems[0]?.file).toBe('gnss');
  });
});

/** A reference along the fixes: level, heading north. */
function referenceOf(gnss: string): string {
  const [header, ...rows] = gnss.trimEnd().split('\n');
  return [`${header},roll_deg,pitch_deg,yaw_deg`, ...rows.map((row) => `${row},0,0,0`)].join('\n');
}
