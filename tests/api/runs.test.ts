import { randomUUID } from 'node:crypto';
import { decodeFrame } from '@/shared/contracts/frames';
import {
  INNOVATION_COLUMNS,
  type Run,
  type RunListItem,
  runSchema,
  type RunState,
  SOLUTION_COLUMNS,
} from '@/shared/contracts/runs';
import type { Recording } from '@/shared/contracts/recordings';
import { type Api, type Caller, problemOf, startApi, until } from '../support/api';
import { buildMember, buildRecording, buildVehicle, decoded, upload } from '../support/api-factories';
import { connectLive } from '../support/api-live';
import { smallLogs } from '../support/api-logs';
import { filesBelow } from '../support/api-traces';

const ENDED: RunState[] = ['done', 'failed', 'cancelled', 'superseded'];

describe('runs', () => {
  let api: Api;
  let engineer: Awaited<ReturnType<typeof buildMember>>;
  let recording: Recording;
  beforeAll(async () => {
    api = await startApi({ WORKERS: '2' });
    engineer = await buildMember(api, 'engineer');
    recording = await buildRecording(engineer);
  });
  afterAll(() => api.stop());

  const start = async (body: object = {}, caller: Caller = engineer): Promise<Run> => {
    const answer = await caller.post('/runs', { recordingId: recording.id, ...body });
    if (answer.status !== 202) throw new Error(`POST /runs was answered ${answer.status}: ${answer.bytes}`);
    return runSchema.parse(answer.body);
  };
  const ended = (id: string): Promise<Run> =>
    until('the run ends', async () => {
      const run = (await engineer.get(`/runs/${id}`)).body as Run;
      return ENDED.includes(run.state) && run;
    });

  it('are taken at once, computed, and answer summary and provenance', async () => {
    const made = await start({
      parameters: { gnss: { positionScale: 1.2 } },
      outages: [{ startS: 40, endS: 60 }],
    });
    expect(made).toMatchObject({ state: 'queued', recordingName: recording.name, summary: null });
    expect(made.parameters.gnss).toMatchObject({ positionScale: 1.2, velocityScale: 1 });
    const run = await ended(made.id);
    expect(run).toMatchObject({ state: 'done', progress: 1, hasSeries: true, failure: null });
    expect(run.summary?.outages[0]).toMatchObject({ startS: 40, endS: 60, reference: 'aided' });
    expect(run.summary?.groups.map((group) => group.group)).toEqual(['position', 'velocity']);
    expect(run.provenance?.files.map((file) => file.sha256)).toEqual(
      recording.files.map((file) => file.sha256),
    );
    expect(run.provenance?.resultSha256).toMatch(/^[0-9a-f]{64}$/);
    expect(run.finishedAt).not.toBeNull();
  });

  it('give the same bytes for the same question', async () => {
    const runs = [await start(), await start()];
    const hashes = await Promise.all(runs.map(async ({ id }) => (await ended(id)).provenance?.resultSha256));
    expect(hashes[0]).toBe(hashes[1]);
    const csv = await Promise.all(runs.map(({ id }) => engineer.get(`/runs/${id}/solution.csv`)));
    expect(csv[0]?.bytes.equals(csv[1]?.bytes ?? Buffer.alloc(0))).toBe(true);
  });

  it('take the lever arm of the parameters, else the vehicle’s, else none', async () => {
    const vehicle = await buildVehicle(engineer, { leverArmM: [1, 0.5, -2] });
    const mounted = await buildRecording(engineer, { vehicleId: vehicle.id });
    const arms = [];
    for (const body of [{}, { recordingId: mounted.id }, { parameters: { leverArmM: [3, 3, 3] } }]) {
      const { id } = await start(body);
      arms.push((await api.ctx.db.Run.findByPk(id))?.leverArmM);
    }
    expect(arms).toEqual([
      [0, 0, 0],
      [1, 0.5, -2],
      [3, 3, 3],
    ]);
  });

  it('are fetched as files with proper types and names', async () => {
    const { id } = await start();
    const early = await engineer.get(`/runs/${id}/solution.csv`);
    if (early.status === 409) expect(problemOf(early).detail).toContain('still going');
    await ended(id);
    const files = [
      ['solution.csv', 'text/csv; charset=utf-8', SOLUTION_COLUMNS.join(',')],
      ['solution.csv?rate=1', 'text/csv; charset=utf-8', SOLUTION_COLUMNS.join(',')],
      ['innovations.csv', 'text/csv; charset=utf-8', INNOVATION_COLUMNS.join(',')],
      ['track.geojson', 'application/geo+json', '{"type":'],
      ['track.kml', 'application/vnd.google-earth.kml+xml', '<?xml'],
      ['track.gpx', 'application/gpx+xml', '<?xml'],
    ] as const;
    for (const [file, type, beginning] of files) {
      const answer = await engineer.get(`/runs/${id}/${file}`);
      expect(answer.status).toBe(200);
      expect(answer.headers.get('Content-Type')).toBe(type);
      expect(answer.headers.get('Content-Disposition')).toMatch(/^attachment; filename="?[\w.-]+"?$/);
      expect(answer.bytes.toString('utf8').startsWith(beginning)).toBe(true);
    }
    const rows = (await engineer.get(`/runs/${id}/solution.csv?rate=1`)).bytes
      .toString('utf8')
      .trim()
      .split('\n');
    expect(rows.length).toBeGreaterThan(60);
    expect(rows.length).toBeLessThan(90);
  });

  it('smooth and split the error by its sources where asked', async () => {
    const { id } = await start({ outages: [{ startS: 40, endS: 60 }], smooth: true, errorBudget: true });
    const run = await ended(id);
    expect(run).toMatchObject({ state: 'done', smooth: true, errorBudget: true });
    const [window] = run.summary!.outages;
    for (const [at, { shares }] of window!.budget!.entries()) {
      const sum = Math.hypot(...shares.map(({ horizontalM }) => horizontalM));
      expect(sum / window!.points[at]!.predictedHorizontalM).toBeCloseTo(1, 3);
    }
    const text = async (query: string) =>
      (await engineer.get(`/runs/${id}/solution.csv${query}`)).bytes.toString('utf8').trim().split('\n');
    const [filtered, smoothed] = [await text(''), await text('?smoothed=true')];
    expect(smoothed[0]).toBe(filtered[0]);
    expect(smoothed).toHaveLength(filtered.length);
    const sigmaNorth = (line: string) => Number(line.split(',')[SOLUTION_COLUMNS.indexOf('sigma_n_m')]);
    expect(sigmaNorth(smoothed[300]!)).toBeLessThan(sigmaNorth(filtered[300]!));
  });

  it('are smoothed afterwards as well: what was not kept is computed', async () => {
    const [plain, smooth] = [await start(), await start({ smooth: true })];
    const file = async (id: string) => {
      await ended(id);
      return (await engineer.get(`/runs/${id}/solution.csv?smoothed=true`)).bytes.toString('utf8');
    };
    expect(await file(plain.id)).toBe(await file(smooth.id));
  });

  it('answer their curves as one frame, whole or a part', async () => {
    const { id } = await start({ outages: [{ startS: 40, endS: 60 }] });
    await ended(id);
    const answer = await engineer.get(`/runs/${id}/series?points=200`);
    expect(answer.headers.get('Content-Type')).toBe('application/octet-stream');
    const whole = decodeFrame(answer.bytes);
    expect(whole.head.runId).toBe(id);
    expect(whole.tables.state?.time_s.length).toBeGreaterThan(50);
    expect(whole.tables.coasting?.time_s.length).toBeGreaterThan(0);
    const part = decodeFrame((await engineer.get(`/runs/${id}/series?from=45&to=50`)).bytes);
    const times = part.tables.state?.time_s ?? new Float64Array();
    expect(times.length).toBeGreaterThan(0);
    expect(Math.min(...times)).toBeGreaterThanOrEqual(44);
    expect(Math.max(...times)).toBeLessThanOrEqual(51);
  });

  it('are listed newest first, by recording and state, page by page', async () => {
    const other = await buildRecording(engineer);
    const ids = [];
    for (let i = 0; i < 3; i++) ids.push((await start({ recordingId: other.id })).id);
    await Promise.all(ids.map(ended));
    const list = async (query: string) =>
      (await engineer.get(`/runs?recordingId=${other.id}&${query}`)).body as {
        items: RunListItem[];
        nextCursor: string | null;
      };
    const first = await list('limit=2&state=done');
    const second = await list(`limit=2&state=done&cursor=${first.nextCursor}`);
    expect([...first.items, ...second.items].map((run) => run.id)).toEqual(ids.reverse());
    expect(second.nextCursor).toBeNull();
    expect(first.items[0]).not.toHaveProperty('parameters');
    expect((await list('state=failed')).items).toEqual([]);
  });

  it('of a bench give way to newer ones, and only the newest is done', async () => {
    const benchId = randomUUID();
    const long = await decoded(engineer, (await upload(engineer, {}, longLogs())).id);
    const runs = [];
    for (let i = 0; i < 6; i++) {
      const parameters = { gnss: { positionScale: 1 + i / 10 } };
      runs.push(await start({ recordingId: long.id, benchId, parameters }));
    }
    const states = await Promise.all(runs.map(async ({ id }) => (await ended(id)).state));
    expect(states[5]).toBe('done');
    expect(new Set(states.slice(0, 4))).toEqual(new Set(['superseded']));
    const left = filesBelow(`${api.dataDir}/store/runs`);
    for (const { id } of runs.slice(0, 4)) expect(left.filter((file) => file.includes(id))).toEqual([]);
  });

  it('of a bench keep the series of the newest twenty and of those that a version names', async () => {
    const benchId = randomUUID();
    const version = { note: 'Good one.', parameters: {} };
    const ids: string[] = [];
    for (let i = 0; i < 23; i++) {
      const { id } = await start({ benchId });
      await ended(id);
      if (i === 0) {
        const set = { name: `Set ${id}`, version: { ...version, runId: id } };
        expect((await engineer.post('/parameter-sets', set)).status).toBe(201);
      }
      ids.push(id);
    }
    const kept = await until('older series are gone', async () => {
      const rows = await api.ctx.db.Run.findAll({ where: { benchId, hasSeries: true } });
      return rows.length === 21 && rows.map((row) => row.id);
    });
    expect(kept).toContain(ids[0]);
    expect(kept).not.toContain(ids[1]);
    expect(kept).not.toContain(ids[2]);
    const summaryOnly = await engineer.get(`/runs/${ids[1]}`);
    expect(summaryOnly.body).toMatchObject({ state: 'done', hasSeries: false });
    const series = await engineer.get(`/runs/${ids[1]}/series`);
    expect(problemOf(series).detail).toContain('Run it again');
  });

  it('stop when they are cancelled, and leave no files', async () => {
    const long = await decoded(engineer, (await upload(engineer, {}, longLogs())).id);
    const { id } = await start({ recordingId: long.id, benchId: randomUUID() });
    const cancelled = (await engineer.post(`/runs/${id}/cancel`)).body as Run;
    expect(cancelled.state).toBe('cancelled');
    expect(cancelled.failure).toMatch(/cancel/i);
    await until('its files are gone', () => filesBelow(api.dataDir).every((file) => !file.includes(id)));
    const again = (await engineer.post(`/runs/${id}/cancel`)).body as Run;
    expect(again.state).toBe('cancelled');
  });

  it('leave no files when their recording is deleted meanwhile', async () => {
    const long = await decoded(engineer, (await upload(engineer, {}, longLogs())).id);
    const { id } = await start({ recordingId: long.id });
    expect((await engineer.delete(`/recordings/${long.id}`)).status).toBe(204);
    expect((await engineer.get(`/runs/${id}`)).status).toBe(404);
    await until('nothing of either is left', () =>
      filesBelow(api.dataDir).every((file) => !file.includes(id) && !file.includes(long.id)),
    );
  });

  it('that the data do not allow fail with what is missing', async () => {
    const parameters = { gnss: { usePosition: false, useVelocity: false } };
    const run = await ended((await start({ parameters })).id);
    if (run.state === 'failed') expect(run.failure?.length).toBeGreaterThan(20);
    else expect(run.summary?.groups.every((group) => group.used === 0)).toBe(true);
  });

  it('refuse what cannot be run, field by field', async () => {
    const refuse = async (body: object) => {
      const answer = await engineer.post('/runs', { recordingId: recording.id, ...body });
      return { status: answer.status, path: problemOf(answer).errors?.[0]?.path };
    };
    expect(await refuse({ parameters: { gate: { probability: 2 } } })).toEqual({
      status: 422,
      path: 'parameters.gate.probability',
    });
    expect(await refuse({ parameters: { gyro: { whiteNoise: 1 } } })).toEqual({
      status: 422,
      path: 'parameters.gyro.whiteNoise',
    });
    expect(await refuse({ outages: [{ startS: 20, endS: 10 }] })).toEqual({
      status: 422,
      path: 'outages.0.endS',
    });
    expect(await refuse({ outages: [{ startS: 900, endS: 910 }] })).toEqual({
      status: 422,
      path: 'outages.0',
    });
    expect(await refuse({ smooth: 'yes' })).toEqual({ status: 422, path: 'smooth' });
    expect(await refuse({ recordingId: 'x' })).toEqual({ status: 422, path: 'recordingId' });
    expect((await engineer.post('/runs', { recordingId: randomUUID() })).status).toBe(404);
  });

  it('are made by nobody but who may, and seen by nobody else', async () => {
    const viewer = await buildMember(api, 'viewer', engineer.workspaceId);
    const outsider = await buildMember(api, 'admin');
    const { id } = await start();
    expect((await viewer.post('/runs', { recordingId: recording.id })).status).toBe(403);
    expect((await viewer.post(`/runs/${id}/cancel`)).status).toBe(403);
    expect((await viewer.get(`/runs/${id}`)).status).toBe(200);
    expect((await outsider.post('/runs', { recordingId: recording.id })).status).toBe(404);
    for (const route of ['', '/series', '/solution.csv', '/innovations.csv', '/track.kml']) {
      expect((await outsider.get(`/runs/${id}${route}`)).status).toBe(404);
    }
    expect((await outsider.post(`/runs/${id}/cancel`)).status).toBe(404);
  });

  it('stream frames that follow one another without a gap, then the summary', async () => {
    const live = await connectLive(engineer);
    const { id } = await start({ benchId: randomUUID() });
    expect(await live.follow(id)).toEqual({ ok: true });
    const message = await until('the summary comes', () => live.summaries[0]);
    expect(message).toMatchObject({ runId: id, hasSeries: true });
    expect(live.frames.length).toBeGreaterThan(0);
    expect(live.frames.map((frame) => frame.head.seq)).toEqual(live.frames.map((_, i) => i));
    expect(live.frames.every((frame) => frame.head.runId === id)).toBe(true);
    live.close();
  });
});

const longLogs = () => smallLogs({ durationS: 600, imuRateHz: 100 });
