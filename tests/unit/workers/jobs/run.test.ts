import { decodeFrame, type Frame } from '@/shared/contracts/frames';
import { INNOVATION_COLUMNS, SOLUTION_COLUMNS } from '@/shared/contracts/runs';
import { scenarioSchema } from '@/shared/contracts/scenarios';
import { IDENTITY_AXES } from '@/shared/contracts/vehicles';
import { decode } from '@/workers/jobs/decode';
import { canonicalJson } from '@/workers/jobs/hashes';
import { run } from '@/workers/jobs/run';
import { runExport } from '@/workers/jobs/run-export';
import { runSeries } from '@/workers/jobs/run-series';
import { scenario } from '@/workers/jobs/scenario';
import type { RunExportJob, RunJob, RunJobResult } from '@/workers/protocol';
import { readRunTables } from '@/workers/recordings/results';
import { storeKeys } from '@/workers/store/types';
import { runOf } from '../static-recording';
import { testHelpers, testStore, type TestHelpers, type TestStore } from '../support';

jest.setTimeout(60_000);

let at: TestStore;
let helpers: TestHelpers;
let job: RunJob;
let result: RunJobResult;

/** A minute and a half of a simulated road drive, decoded from its raw files, run once with an outage. */
beforeAll(async () => {
  at = testStore();
  helpers = testHelpers(at.store);
  const spec = scenarioSchema.parse({ motion: 'road', durationS: 90, staticStartS: 10, seed: 11 });
  const { files } = await scenario({ kind: 'scenario', recordingId: 'rec', scenario: spec }, helpers);
  await decode(
    { kind: 'decode', recordingId: 'rec', files, channelMap: null, vehicleAxes: IDENTITY_AXES },
    helpers,
  );
  helpers.events.length = 0;
  const outages = [{ startS: 60, endS: 75, withhold: 'gnss' as const }];
  job = runOf('rec', 'run', { outages, framePoints: 200, outputRateHz: 10 });
  result = await run(job, helpers);
}, 60_000);
afterAll(() => at.remove());

const frames = (): Frame[] =>
  helpers.events.flatMap((event) => (event.type === 'frame' ? [decodeFrame(event.frame)] : []));
const textOf = async (key: string) => Buffer.from(await at.store.bytes(key)).toString();
const exported = async (format: RunExportJob['format'], changes: Partial<RunExportJob> = {}) => {
  const { key, bytes } = await runExport(
    {
      kind: 'run-export',
      run: job,
      format,
      rateHz: null,
      smoothed: false,
      name: 'Loop <3> & back.txt',
      utcOrigin: null,
      ...changes,
    },
    helpers,
  );
  const text = await textOf(key);
  expect(Buffer.byteLength(text)).toBe(bytes);
  return text;
};

test('a run is summed up against the truth and says where it came from', () => {
  expect(result.summary.truth?.horizontalRmseM).toBeLessThan(3);
  expect(result.summary.outages).toHaveLength(1);
  expect(result.summary.computeS).toBeGreaterThan(0);
  expect(result.provenance.recordingSha256).toMatch(/^[0-9a-f]{64}$/);
  expect(result.provenance.parametersSha256).toMatch(/^[0-9a-f]{64}$/);
});

test('frames together are the thinned run, in order, without repeats', () => {
  const all = frames();
  const state = all.flatMap((frame) => [...(frame.tables.state?.time_s ?? [])]);
  const position = all.flatMap((frame) => [...(frame.tables.position?.time_s ?? [])]);
  expect(all.map((frame) => frame.head.seq)).toEqual(all.map((_, i) => i));
  expect(all.at(-1)!.head).toMatchObject({ runId: 'run', progress: 1, extentS: [0, 90] });
  expect(new Set(state).size).toBe(state.length);
  expect(state).toEqual([...state].sort((a, b) => a - b));
  expect(state.length).toBeGreaterThan(150);
  expect(state.length).toBeLessThan(400);
  expect(state.at(-1)).toBe(90);
  expect(new Set(position).size).toBe(position.length);
});

test('the stored run as one frame holds what the live frames held', async () => {
  const stored = decodeFrame(
    await runSeries({ kind: 'run-series', runId: 'run', fromS: null, toS: null, points: 200 }, helpers),
  );
  // Between the strided rows both keep what stands out, the live ones by what they know of the ranges so far.
  const strided = (times: Iterable<number>) => [...times].filter((time) => Math.round(time * 10) % 5 === 0);
  const live = frames().flatMap((frame) => [...(frame.tables.state?.time_s ?? [])]);
  expect(strided(stored.tables.state!.time_s)).toEqual(strided(live));
  expect(strided(live)).toHaveLength(181);
  expect(stored.head).toMatchObject({ runId: 'run', progress: 1, extentS: [0, 90], whole: false });
  expect(stored.tables.state!.north_m[0]).toBeCloseTo(0, 6);
});

test('a stretch of the stored run comes at finer resolution', async () => {
  const stored = decodeFrame(
    await runSeries({ kind: 'run-series', runId: 'run', fromS: 60, toS: 70, points: 200 }, helpers),
  );
  const times = [...stored.tables.state!.time_s];
  expect(times[0]).toBe(60);
  expect(times.at(-1)).toBe(70);
  expect(times).toHaveLength(101);
  expect(stored.head.whole).toBe(true);
  expect([...stored.tables.coasting!.time_s].every((t) => t >= 60 && t <= 70)).toBe(true);
  expect(stored.tables.coasting!.time_s.length).toBeGreaterThan(50);
});

test('the smoothed track comes along where the run kept one', async () => {
  await run({ ...job, runId: 'smooth', smooth: true, framePoints: 0 }, testHelpers(at.store));
  const of = async (runId: string) =>
    decodeFrame(
      await runSeries({ kind: 'run-series', runId, fromS: null, toS: null, points: 2000 }, helpers),
    );
  const { tables } = await of('smooth');
  expect([...tables.smoothed!.time_s]).toEqual([...tables.state!.time_s]);
  const last = tables.state!.time_s.length - 1;
  expect(tables.smoothed!.north_m[last]).toBeCloseTo(tables.state!.north_m[last]!, 2);
  const middle = Math.floor(last / 2);
  expect(tables.smoothed!.sigma_n_m[middle]!).toBeLessThan(tables.state!.sigma_n_m[middle]!);
  expect((await of('run')).tables.smoothed).toBeUndefined();
});

test('the largest innovation survives the thinning', async () => {
  const { position } = await readRunTables(at.store, 'run');
  const largest = Math.max(...position.innovation[0].map(Math.abs));
  const frame = decodeFrame(
    await runSeries({ kind: 'run-series', runId: 'run', fromS: null, toS: null, points: 60 }, helpers),
  );
  expect(frame.tables.position!.time_s.length).toBeLessThan(position.timeS.length);
  expect(Math.max(...frame.tables.position!.n_m.map(Math.abs))).toBeCloseTo(largest, 5);
});

test('the same run again gives the same bytes; another window gives others', async () => {
  const again = await run({ ...job, runId: 'again' }, testHelpers(at.store));
  const other = await run({ ...job, runId: 'other', outages: [] }, testHelpers(at.store));
  expect(again.resultSha256).toBe(result.resultSha256);
  for (const key of [storeKeys.solution, storeKeys.innovations, storeKeys.coasting])
    expect(Buffer.compare(await at.store.bytes(key('again')), await at.store.bytes(key('run')))).toBe(0);
  expect(other.resultSha256).not.toBe(result.resultSha256);
  expect(other.provenance.parametersSha256).toBe(result.provenance.parametersSha256);
});

test('no frames are made where nobody looks', async () => {
  const quiet = testHelpers(at.store);
  await run({ ...job, runId: 'quiet', framePoints: 0 }, quiet);
  expect(quiet.events.filter((event) => event.type === 'frame')).toEqual([]);
});

test('a cancelled run writes nothing', async () => {
  const stopped = testHelpers(at.store);
  stopped.abort.abort();
  await expect(run({ ...job, runId: 'stopped' }, stopped)).rejects.toMatchObject({ name: 'JobCancelled' });
  expect(await at.store.list('runs/stopped/')).toEqual([]);
});

test('solution CSV: the agreed header, one row an output epoch, every digit', async () => {
  const lines = (await exported('solution-csv')).trimEnd().split('\n');
  const { solution } = await readRunTables(at.store, 'run');
  expect(lines[0]).toBe(SOLUTION_COLUMNS.join(','));
  expect(lines).toHaveLength(1 + solution.time_s!.length);
  const row = lines[400]!.split(',').map(Number);
  SOLUTION_COLUMNS.forEach((name, i) => expect(row[i]).toBe(solution[name]![399]));
});

test('solution CSV at a higher rate runs the filter again and agrees where both have a row', async () => {
  const kept = (await exported('solution-csv')).trimEnd().split('\n');
  const fine = (await exported('solution-csv', { rateHz: 100 })).trimEnd().split('\n');
  expect(fine).toHaveLength(1 + 9001);
  expect(fine).toEqual(expect.arrayContaining([kept[1], kept[300], kept.at(-1)]));
});

test('solution CSV, smoothed: the same rows with less uncertainty, kept or computed now', async () => {
  await run({ ...job, runId: 'smooth', smooth: true, framePoints: 0 }, helpers);
  const { solution, smoothed } = await readRunTables(at.store, 'smooth');
  const kept = await exported('solution-csv', {
    run: { ...job, runId: 'smooth', smooth: true },
    smoothed: true,
  });
  const now = await exported('solution-csv', { smoothed: true, name: 'later.csv' });
  expect(now).toBe(kept);
  expect(smoothed!.time_s).toEqual(solution.time_s);
  expect(smoothed!.sigma_n_m![400]!).toBeLessThan(solution.sigma_n_m![400]!);
});

test('innovations CSV: long form in time order, NIS and acceptance of the group', async () => {
  const lines = (await exported('innovations-csv')).trimEnd().split('\n');
  const { position, velocity } = await readRunTables(at.store, 'run');
  expect(lines[0]).toBe(INNOVATION_COLUMNS.join(','));
  expect(lines).toHaveLength(1 + 3 * (position.timeS.length + velocity.timeS.length));
  const rows = lines.slice(1).map((line) => line.split(','));
  const times = rows.map((row) => Number(row[0]));
  expect(times).toEqual([...times].sort((a, b) => a - b));
  const first = rows.find((row) => row[1] === 'position_e_m')!;
  expect(first.slice(2).map(Number)).toEqual([
    position.innovation[1][0], position.sigma[1][0], position.nis[0], position.accepted[0],
  ]); // prettier-ignore
});

test('GeoJSON: a line of longitude, latitude, height', async () => {
  const parsed = JSON.parse(await exported('geojson')) as {
    type: string;
    features: { geometry: { type: string; coordinates: number[][] }; properties: { name: string } }[];
  };
  const { solution } = await readRunTables(at.store, 'run');
  const [feature] = parsed.features;
  expect(parsed.type).toBe('FeatureCollection');
  expect(feature!.geometry.type).toBe('LineString');
  expect(feature!.geometry.coordinates).toHaveLength(solution.time_s!.length);
  expect(feature!.geometry.coordinates[5]![0]).toBeCloseTo(solution.lon_deg![5]!, 9);
  expect(feature!.geometry.coordinates[5]![1]).toBeCloseTo(solution.lat_deg![5]!, 9);
  expect(feature!.geometry.coordinates[5]![2]).toBeCloseTo(solution.height_m![5]!, 3);
  expect(feature!.properties.name).toBe('Loop <3> & back');
});

test('KML and GPX: heights above sea level, names escaped, times where the clock is known', async () => {
  const { solution } = await readRunTables(at.store, 'run');
  const kml = await exported('kml');
  const gpx = await exported('gpx', { utcOrigin: '2026-03-01T10:00:00Z' });
  const timeless = await exported('gpx');
  expect(kml).toContain('<name>Loop &lt;3&gt; &amp; back</name>');
  const altitude = Number(/<coordinates>\n[^,]+,[^,]+,([-\d.]+)/.exec(kml)![1]);
  // EGM96 undulation at 47.21° N, 14.63° W: about 55 m.
  expect(solution.height_m![0]! - altitude).toBeGreaterThan(50);
  expect(solution.height_m![0]! - altitude).toBeLessThan(60);
  expect(gpx).toContain('<time>2026-03-01T10:00:00.100Z</time>');
  expect(gpx.match(/<trkpt /g)).toHaveLength(solution.time_s!.length);
  expect(timeless).not.toContain('<time>');
});

test('canonical JSON does not depend on the order of keys', () => {
  expect(canonicalJson({ b: [1, { d: null, c: 'x' }], a: undefined, e: 1.5 })).toBe(
    canonicalJson({ e: 1.5, b: [1, { c: 'x', d: null }] }),
  );
});
