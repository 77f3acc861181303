import { createHash } from 'node:crypto';
import type { BaselineTrack, Recording, Series } from '@/shared/contracts/recordings';
import { type Api, problemOf, startApi, until } from '../support/api';
import {
  buildMember,
  buildRecording,
  buildVehicle,
  decoded,
  upload,
  uploadForm,
} from '../support/api-factories';
import { IMU_HEADER, smallLogs } from '../support/api-logs';
import { filesBelow } from '../support/api-traces';

const names = (body: unknown) => (body as { items: Recording[] }).items.map((item) => item.name);

describe('recordings', () => {
  let api: Api;
  beforeAll(async () => {
    api = await startApi();
  });
  afterAll(() => api.stop());

  it('are kept with their hashes, decoded, and seen by the whole workspace', async () => {
    const engineer = await buildMember(api, 'engineer');
    const uploaded = await upload(engineer, { name: 'Breakwater loop 3' });
    expect(['uploaded', 'decoding', 'ready']).toContain(uploaded.status);
    const { imu } = smallLogs();
    expect(uploaded.files).toEqual([
      {
        role: 'imu',
        name: 'imu.csv',
        bytes: imu.length,
        sha256: createHash('sha256').update(imu).digest('hex'),
      },
      expect.objectContaining({ role: 'gnss', name: 'gnss.csv' }),
    ]);
    const viewer = await buildMember(api, 'viewer', engineer.workspaceId);
    const ready = await decoded(viewer, uploaded.id);
    expect(ready).toMatchObject({ status: 'ready', progress: 1, hasReference: false, problems: [] });
    expect(ready.durationS).toBeCloseTo(80, 0);
    expect(ready.health?.imu.rateHz).toBeCloseTo(50, 1);
    expect(ready.strip?.gnssFixes.reduce((sum, count) => sum + count, 0)).toBeGreaterThan(150);
    const detail = await viewer.get(`/recordings/${uploaded.id}`);
    expect(detail.status).toBe(200);
    const again = await viewer.send('GET', `/recordings/${uploaded.id}`, undefined, {
      'If-None-Match': detail.headers.get('ETag') ?? '',
      'Cache-Control': 'max-age=0', // else fetch asks for a fresh copy
    });
    expect(again.status).toBe(304);
  });

  it('may name their parts in any order, and meta last', async () => {
    const engineer = await buildMember(api, 'engineer');
    const ordered = uploadForm({ name: 'Meta last' });
    const shuffled = new FormData();
    for (const part of ['gnss', 'imu', 'meta']) {
      const value = ordered.get(part);
      if (value !== null) shuffled.set(part, value);
    }
    expect((await engineer.post('/recordings', shuffled)).body).toMatchObject({ name: 'Meta last' });
  });

  it('show only the last part of a file name that carries a path', async () => {
    const engineer = await buildMember(api, 'engineer');
    const form = uploadForm();
    form.set('imu', new Blob([smallLogs().imu]), '../../etc/Größe.csv');
    const { files } = (await engineer.post('/recordings', form)).body as Recording;
    expect(files[0]?.name).toBe('Größe.csv');
  });

  it('are paged, sorted, searched and filtered', async () => {
    const engineer = await buildMember(api, 'engineer');
    const vehicle = await buildVehicle(engineer, { name: 'Slow barge' });
    for (const name of ['Loop b', 'Loop a', 'Quay']) await upload(engineer, { name });
    await upload(engineer, { name: 'Loop c', vehicleId: vehicle.id });
    const list = async (query: string) => (await engineer.get(`/recordings?${query}`)).body;
    expect(names(await list(''))).toEqual(['Loop c', 'Quay', 'Loop a', 'Loop b']);
    expect(names(await list('sort=name'))).toEqual(['Loop a', 'Loop b', 'Loop c', 'Quay']);
    expect(names(await list('search=loop&sort=-name'))).toEqual(['Loop c', 'Loop b', 'Loop a']);
    expect(names(await list(`vehicleId=${vehicle.id}`))).toEqual(['Loop c']);
    expect(names(await list('search=BARGE'))).toEqual(['Loop c']);
    expect(names(await list('status=uploaded,decoding,ready,needs-mapping,rejected'))).toHaveLength(4);
    expect((await engineer.get('/recordings?status=ready,lost')).status).toBe(422);
    const { items } = (await list('sort=createdAt')) as { items: Recording[] };
    expect(names(await list(`since=${encodeURIComponent(items[2]!.createdAt)}`))).toEqual(['Loop c', 'Quay']);
    expect((await engineer.get('/recordings?since=yesterday')).status).toBe(422);
    const pages: string[] = [];
    let cursor: string | null = '';
    while (cursor !== null) {
      const page = (await list(`sort=name&limit=3${cursor ? `&cursor=${cursor}` : ''}`)) as {
        nextCursor: string | null;
      };
      pages.push(...names(page));
      cursor = page.nextCursor;
    }
    expect(pages).toEqual(['Loop a', 'Loop b', 'Loop c', 'Quay']);
    expect((await engineer.get('/recordings?limit=0')).status).toBe(422);
    expect((await engineer.get('/recordings?order=name')).status).toBe(422);
  });

  it('are renamed, annotated and given a vehicle of the same workspace', async () => {
    const engineer = await buildMember(api, 'engineer');
    const { id } = await upload(engineer);
    const vehicle = await buildVehicle(engineer, { name: 'Crawler 2' });
    const patched = await engineer.patch(`/recordings/${id}`, { name: 'Quay', vehicleId: vehicle.id });
    expect(patched.body).toMatchObject({ name: 'Quay', vehicleName: 'Crawler 2', notes: '' });
    const foreign = await buildVehicle(await buildMember(api, 'engineer'));
    const refused = await engineer.patch(`/recordings/${id}`, { vehicleId: foreign.id });
    expect(problemOf(refused).errors?.[0]?.path).toBe('vehicleId');
    const bare = await engineer.patch(`/recordings/${id}`, { vehicleId: null });
    expect(bare.body).toMatchObject({ vehicleName: null });
  });

  it('are decoded again when the vehicle’s axes change', async () => {
    const engineer = await buildMember(api, 'engineer');
    const vehicle = await buildVehicle(engineer);
    const { id } = await buildRecording(engineer, { vehicleId: vehicle.id });
    const before = await api.ctx.db.Recording.findByPk(id, { rejectOnEmpty: true });
    const axes = { forward: '+y', right: '-x', down: '+z' };
    expect((await engineer.patch(`/vehicles/${vehicle.id}`, { axes })).status).toBe(200);
    const after = await until('it is decoded again', async () => {
      const row = await api.ctx.db.Recording.findByPk(id, { rejectOnEmpty: true });
      return row.generation > before.generation && row.status === 'ready' && row;
    });
    expect(after.sha256).not.toBe(before.sha256);
  });

  it('are mapped by hand where the headers say nothing, and decoded then', async () => {
    const engineer = await buildMember(api, 'engineer');
    const imu = smallLogs().imu.replace(IMU_HEADER, 'c0,c1,c2,c3,c4,c5,c6');
    const waiting = await decoded(engineer, (await upload(engineer, {}, { imu })).id);
    expect(waiting.status).toBe('needs-mapping');
    expect(waiting.problems[0]).toMatchObject({ file: 'imu' });
    expect(waiting.previews.find((preview) => preview.role === 'imu')?.headers).toContain('c0');
    const map = {
      imu: {
        time: { columns: ['c0'], base: 's' },
        gyro: { columns: ['c1', 'c2', 'c3'], unit: 'rad/s' },
        accel: { columns: ['c4', 'c5', 'c6'], unit: 'm/s^2' },
      },
    };
    const answer = await engineer.put(`/recordings/${waiting.id}/channel-map`, map);
    expect(answer.status).toBe(202);
    const ready = await decoded(engineer, waiting.id);
    expect(ready.status).toBe('ready');
    expect(ready.channelMap?.imu?.gyro.columns).toEqual(['c1', 'c2', 'c3']);
  });

  it('take the channel map with the upload as well', async () => {
    const engineer = await buildMember(api, 'engineer');
    const imu = smallLogs().imu.replace(IMU_HEADER, 'c0,c1,c2,c3,c4,c5,c6');
    const channelMap = {
      imu: {
        time: { columns: ['c0'], base: 's' },
        gyro: { columns: ['c1', 'c2', 'c3'], unit: 'rad/s' },
        accel: { columns: ['c4', 'c5', 'c6'], unit: 'm/s^2' },
      },
    };
    const { id } = await upload(engineer, { channelMap }, { imu });
    expect((await decoded(engineer, id)).status).toBe('ready');
  });

  it('refuse a channel map with an unknown unit and say where', async () => {
    const engineer = await buildMember(api, 'engineer');
    const { id } = await upload(engineer);
    const map = {
      imu: {
        time: { columns: ['t'], base: 's' },
        gyro: { columns: ['a', 'b', 'c'], unit: 'rpm' },
        accel: { columns: ['d', 'e', 'f'], unit: 'g' },
      },
    };
    const answer = await engineer.put(`/recordings/${id}/channel-map`, map);
    expect(answer.status).toBe(422);
    expect(problemOf(answer).errors?.[0]?.path).toBe('imu.gyro.unit');
  });

  it('answer thinned channels that keep extremes, and the track of GNSS alone', async () => {
    const engineer = await buildMember(api, 'engineer');
    const { id } = await buildRecording(engineer);
    const series = await engineer.get(
      `/recordings/${id}/series?channels=gyro_z,gnss_vn&points=100&from=5&to=70`,
    );
    expect(series.status).toBe(200);
    const { channels } = series.body as Series;
    expect(channels.map(({ name, unit }) => [name, unit])).toEqual([
      ['gyro_z', '°/s'],
      ['gnss_vn', 'm/s'],
    ]);
    for (const { timeS } of channels) {
      expect(timeS.length).toBeGreaterThan(10);
      expect(Math.min(...timeS)).toBeGreaterThanOrEqual(5);
      expect(Math.max(...timeS)).toBeLessThanOrEqual(70);
    }
    const track = (await engineer.get(`/recordings/${id}/baseline-track?points=50`)).body as BaselineTrack;
    expect(track.latDeg.length).toBe(track.timeS.length);
    expect(track.latDeg[0]).toBeCloseTo(47.21, 2);
    const unknown = await engineer.get(`/recordings/${id}/series?channels=gyro_q`);
    expect(unknown.status).toBe(422);
  });

  it('are not plotted before they are decoded', async () => {
    const engineer = await buildMember(api, 'engineer');
    const { id } = await decoded(engineer, (await upload(engineer, {}, { imu: 'time_s\n1\n2\n' })).id);
    const answer = await engineer.get(`/recordings/${id}/series?channels=gyro_z`);
    expect(answer.status).toBe(409);
    expect(problemOf(answer).detail).toMatch(/mapped|decoded/);
  });

  it('go with all their files and runs when deleted', async () => {
    const engineer = await buildMember(api, 'engineer');
    const { id } = await buildRecording(engineer);
    const run = (await engineer.post('/runs', { recordingId: id })).body as { id: string };
    await until('the run is done', async () => {
      const { state } = (await engineer.get(`/runs/${run.id}`)).body as { state: string };
      return state === 'done';
    });
    expect((await engineer.delete(`/recordings/${id}`)).status).toBe(204);
    expect((await engineer.get(`/recordings/${id}`)).status).toBe(404);
    expect((await engineer.get(`/runs/${run.id}`)).status).toBe(404);
    expect(await api.ctx.db.RecordingFile.count({ where: { recordingId: id } })).toBe(0);
    const left = filesBelow(api.dataDir).filter((file) => file.includes(id) || file.includes(run.id));
    expect(left).toEqual([]);
  });

  it('may be deleted while they are decoded, and leave nothing', async () => {
    const engineer = await buildMember(api, 'engineer');
    const { id } = await upload(engineer, {}, smallLogs({ durationS: 600, imuRateHz: 100 }));
    await until(
      'decoding begins',
      async () => (await api.ctx.db.Recording.findByPk(id))?.status !== 'uploaded',
    );
    expect((await engineer.delete(`/recordings/${id}`)).status).toBe(204);
    expect(await api.ctx.db.Recording.findByPk(id)).toBeNull();
    await until('its files are gone', () => filesBelow(api.dataDir).every((file) => !file.includes(id)));
  });

  it('stay while a version that was submitted rests on them, and say so', async () => {
    const engineer = await buildMember(api, 'engineer');
    const vehicleId = (await buildVehicle(engineer)).id;
    const drafted = async (name: string) => {
      const { id } = await upload(engineer);
      const version = { note: name, parameters: {}, recordingId: id };
      const set = (await engineer.post('/parameter-sets', { name, vehicleId, version })).body as {
        id: string;
      };
      return { id, path: `/parameter-sets/${set.id}/versions/1` };
    };
    const submitted = await drafted('Harbour set');
    await engineer.post(`${submitted.path}/submit`);
    const refused = await engineer.delete(`/recordings/${submitted.id}`);
    expect(refused.status).toBe(409);
    expect(problemOf(refused).detail).toContain('version 1 of “Harbour set”');
    const draft = await drafted('Open draft');
    expect((await engineer.delete(`/recordings/${draft.id}`)).status).toBe(204);
    expect((await engineer.get(draft.path)).body).toMatchObject({ recordingId: null, note: 'Open draft' });
  });

  it('of another workspace do not exist here, and a viewer changes none', async () => {
    const engineer = await buildMember(api, 'engineer');
    const { id } = await upload(engineer);
    const outsider = await buildMember(api, 'admin');
    const viewer = await buildMember(api, 'viewer', engineer.workspaceId);
    const routes = [
      ['PATCH', `/recordings/${id}`, { name: 'x' }],
      ['PUT', `/recordings/${id}/channel-map`, {}],
      ['DELETE', `/recordings/${id}`, undefined],
    ] as const;
    for (const [method, route, body] of routes) {
      expect((await outsider.send(method, route, body)).status).toBe(404);
      expect((await viewer.send(method, route, body)).status).toBe(403);
    }
    expect((await outsider.get(`/recordings/${id}`)).status).toBe(404);
    expect((await outsider.get(`/recordings/${id}/series?channels=gyro_x`)).status).toBe(404);
    expect((await viewer.post('/recordings', uploadForm())).status).toBe(403);
    expect((await viewer.get(`/recordings/${id}`)).status).toBe(200);
  });

  it('are simulated on request, with truth', async () => {
    const engineer = await buildMember(api, 'engineer');
    const scenario = { durationS: 30, imuRateHz: 50, gnssRateHz: 1, staticStartS: 5 };
    const made = await engineer.post('/scenarios', { name: 'Simulated', scenario });
    expect(made.status).toBe(201);
    const ready = await decoded(engineer, (made.body as Recording).id);
    expect(ready).toMatchObject({ status: 'ready', hasReference: true });
    expect(ready.files.map((file) => file.role)).toEqual(['imu', 'gnss', 'reference']);
    const bad = await engineer.post('/scenarios', { name: 'x', scenario: { durationS: 1 } });
    expect(problemOf(bad).errors?.[0]?.path).toBe('scenario.durationS');
  });
});
