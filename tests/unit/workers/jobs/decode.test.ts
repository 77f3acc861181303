import { LOGS, type LogName } from '@/fixtures/logs';
import { loadRecording } from '@/workers/recordings/load';
import { storeKeys } from '@/workers/store/types';
import { cleanLogs, decodeLogs, ready, testHelpers, testStore, type TestStore } from '../support';

jest.setTimeout(60_000);

let at: TestStore;
beforeEach(() => {
  at = testStore();
});
afterEach(() => at.remove());

const decodeNamed = (imu: LogName, gnss: LogName, reference?: LogName) =>
  decodeLogs(at.store, {
    imu: LOGS[imu],
    gnss: LOGS[gnss],
    ...(reference ? { reference: LOGS[reference] } : {}),
  });
const decodedKeys = async () =>
  (await at.store.list('recordings/rec/')).filter((key) => !key.includes('/raw/'));

test('a pair of plain logs becomes a recording with its report, strip and hash', async () => {
  const result = ready(await decodeNamed('imu-plain.csv', 'gnss-plain.csv', 'reference-plain.csv'));

  expect(result).toMatchObject({
    startS: 0,
    endS: 0.5,
    hasReference: true,
    timeOrigin: { sourceS: 0, utc: null, gpsWeek: null, gpsTowS: null },
  });
  expect(result.sha256).toMatch(/^[0-9a-f]{64}$/);
  expect(result.health).toMatchObject({
    imu: { samples: 11, rateHz: 20, gaps: 0 },
    gnss: { epochs: 6, rateHz: 10, hasVelocity: true, hasPositionSigma: false },
    overlapS: [0, 0.5],
  });
  expect(result.strip.gnssFixes).toHaveLength(600);
  expect(result.strip.gnssFixes.reduce((sum, count) => sum + count, 0)).toBe(6);
  expect(Math.max(...result.strip.speedMPerS.map((speed) => speed ?? 0))).toBeCloseTo(
    Math.hypot(1.2, 0.8),
    3,
  );
  expect((await decodedKeys()).sort()).toEqual(
    ['imu.arrow', 'gnss.arrow', 'reference.arrow', 'gnss-only.arrow', 'decoded.json']
      .map((name) => `recordings/rec/${name}`)
      .sort(),
  );
});

test('what is loaded is what the files say, in radians and body axes', async () => {
  await decodeNamed('imu-plain.csv', 'gnss-plain.csv', 'reference-plain.csv');

  const { columns, bytes } = await loadRecording(at.store, 'rec');

  expect([...columns.imu.timeS]).toEqual(Array.from({ length: 11 }, (_, k) => k / 20));
  expect(columns.imu.gyro.map((axis) => axis[2])).toEqual([0.002, -0.002, 0.102]);
  expect(columns.imu.accel.map((axis) => axis[2])).toEqual([0.22, -0.1, -9.8]);
  expect(columns.imu.sampling).toBe('mean-rate');
  expect(columns.gnss.latRad[1]).toBeCloseTo((47.210002 * Math.PI) / 180, 14);
  expect(columns.gnss.heightM[1]).toBe(41.1);
  expect(columns.gnss.velocityNed.map((axis) => axis[1])).toEqual([1.2, 0.8, -0.1]);
  expect(columns.gnss.positionSigma.map((axis) => axis[1])).toEqual([NaN, NaN, NaN]);
  expect(columns.reference?.attitude[2][0]).toBeCloseTo((33.7 * Math.PI) / 180, 14);
  expect(bytes).toBe(8 * (11 * 7 + 6 * 13 + 6 * 10));
});

test('the same files give the same hash, other values another', async () => {
  const one = ready(await decodeNamed('imu-plain.csv', 'gnss-plain.csv'));
  const two = ready(await decodeNamed('imu-plain.csv', 'gnss-plain.csv'));
  const changed = LOGS['imu-plain.csv'].replace('-9.81', '-9.82');
  const other = ready(await decodeLogs(at.store, { imu: changed, gnss: LOGS['gnss-plain.csv'] }));
  expect(two.sha256).toBe(one.sha256);
  expect(other.sha256).not.toBe(one.sha256);
});

const REJECTED: [string, LogName, LogName, object][] = [
  ['an empty file', 'empty.csv', 'gnss-plain.csv', { code: 'empty', file: 'imu' }],
  ['a header without rows', 'imu-header-only.csv', 'gnss-plain.csv', { code: 'no-rows', file: 'imu' }],
  ['a single row', 'imu-one-row.csv', 'gnss-plain.csv', { code: 'no-rows', file: 'imu' }],
  [
    'text in a number',
    'imu-text-in-number.csv',
    'gnss-plain.csv',
    {
      code: 'not-a-number', file: 'imu', line: 7, column: 'gyro_z_rad_s',
      message: 'Line 7 of the IMU file has “ERROR” in the column “gyro_z_rad_s”; a number was expected.',
    },
  ],
  [
    'time that runs backwards',
    'imu-backwards.csv',
    'gnss-plain.csv',
    {
      code: 'time-backwards', file: 'imu', line: 9,
      message: 'In line 9 of the IMU file time runs backwards: 0.2 s after 0.3 s.',
    },
  ],
  [
    'GNSS and IMU that do not overlap',
    'imu-plain.csv',
    'gnss-later.csv',
    {
      code: 'no-overlap', file: 'gnss',
      message:
        'The GNSS file and the IMU file do not overlap in time: the IMU runs from 0 s to 0.5 s, the GNSS file from 500 s to 500.5 s on the same axis.',
    },
  ],
  [
    'latitude and longitude exchanged',
    'imu-plain.csv',
    'gnss-swapped.csv',
    {
      code: 'position-absurd', file: 'gnss', line: 2, column: 'lat_deg',
      remedy: 'Latitude and longitude look swapped: exchange the two columns on the mapping screen.',
    },
  ],
  ['clocks of two kinds', 'imu-absolute.csv', 'gnss-plain.csv', { code: 'clocks-differ', file: 'gnss' }],
]; // prettier-ignore

test.each(REJECTED)('%s is rejected with what, where and what to do; nothing decoded stays', async (_, imu, gnss, expected) => {
  await decodeNamed('imu-plain.csv', 'gnss-plain.csv');

  const result = await decodeNamed(imu, gnss);

  expect(result).toMatchObject({ outcome: 'rejected', problems: [expected] });
  if (result.outcome !== 'rejected') return;
  for (const problem of result.problems) expect(problem.remedy.length).toBeGreaterThan(10);
  expect(await decodedKeys()).toEqual([]);
}); // prettier-ignore

test('faults of both files are told at once', async () => {
  const result = await decodeNamed('empty.csv', 'empty.csv');
  expect(result).toMatchObject({
    outcome: 'rejected',
    problems: [
      { code: 'empty', file: 'imu' },
      { code: 'empty', file: 'gnss' },
    ],
  });
});

test('a file without a time column asks for a mapping, with what it shows and what was understood', async () => {
  const result = await decodeNamed('imu-no-time.csv', 'gnss-plain.csv');

  expect(result).toMatchObject({
    outcome: 'needs-mapping',
    problems: [{ code: 'no-time', file: 'imu', line: 1 }],
    channelMap: { gnss: { position: { lat: 'lat_deg' } } },
  });
  if (result.outcome !== 'needs-mapping') return;
  const preview = result.previews.find((one) => one.role === 'imu');
  expect(preview?.headers[0]).toBe('gyro_x_rad_s');
  expect(preview?.rows).toHaveLength(8);
  expect(preview?.missing).toEqual(['time']);
});

test('cancel in the middle leaves nothing decoded', async () => {
  const helpers = testHelpers(at.store);
  helpers.abort.abort();

  await expect(decodeLogs(at.store, cleanLogs(), { helpers })).rejects.toMatchObject({
    name: 'JobCancelled',
  });

  expect(await decodedKeys()).toEqual([]);
});

test('progress rises to 1', async () => {
  const helpers = testHelpers(at.store);
  await decodeLogs(at.store, cleanLogs(), { helpers });
  const shares = helpers.events.flatMap((event) => (event.type === 'progress' ? [event.progress] : []));
  expect(shares.at(-1)).toBe(1);
  expect(shares).toEqual([...shares].sort((a, b) => a - b));
});

test('a recording that is decoded anew is loaded anew', async () => {
  const helpers = testHelpers(at.store);
  await decodeLogs(at.store, cleanLogs(), { helpers });
  const before = await helpers.recordings.load('rec');
  expect(await helpers.recordings.load('rec')).toBe(before);

  await decodeLogs(at.store, { imu: LOGS['imu-plain.csv'], gnss: LOGS['gnss-plain.csv'] }, { helpers });

  expect((await helpers.recordings.load('rec')).columns.imu.timeS).toHaveLength(11);
  await at.store.removePrefix(storeKeys.decoded('rec'));
  await expect(helpers.recordings.load('rec')).rejects.toThrow('has not been decoded');
});
