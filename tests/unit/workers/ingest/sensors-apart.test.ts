/** Gyro and accelerometer in files or rows of their own, and one log for IMU and GNSS: all land on their clean twin. */
import { gzipSync } from 'node:zlib';
import type { ChannelMap } from '@/shared/contracts/recordings';
import { RAD_PER_DEG } from '@/shared/units';
import {
  csvText,
  decodeLogs,
  IMU_HEADER,
  imuRows,
  ready,
  testStore,
  type Logs,
  type TestStore,
} from '../support';
import {
  decodedLogs, expectClose, expectSameGnss, expectSameImu, expectSamePositions, GNSS, IMU, PLAIN_GNSS, PLAIN_IMU, UNIX_S,
  type DecodeOptions,
} from './twin'; // prettier-ignore

jest.setTimeout(60_000);

let at: TestStore;
beforeAll(() => {
  at = testStore();
});
afterAll(() => at.remove());

const rowsOf = (from: number) => IMU.map((row) => [row[0]!, ...row.slice(from, from + 3)]);
const GYRO = csvText('time_s,gyro_x_rad_s,gyro_y_rad_s,gyro_z_rad_s', rowsOf(1));
const ACCEL = csvText('time_s,accel_x_m_s2,accel_y_m_s2,accel_z_m_s2', rowsOf(4));
const BARE = (from: number) => csvText('time,x,y,z', rowsOf(from));
const gnss = PLAIN_GNSS;

const FILES: [string, Logs, DecodeOptions['names']][] = [
  ['gyro first', { imu: GYRO, imu2: ACCEL, gnss }, undefined],
  ['accelerometer first', { imu: ACCEL, imu2: GYRO, gnss }, undefined],
  ['one packed with gzip, one with semicolons', { imu: gzipSync(GYRO), imu2: ACCEL.replaceAll(',', ';'), gnss }, undefined],
  ['x, y, z told by the names of the files', { imu: BARE(4), imu2: BARE(1), gnss }, { imu: 'Accelerometer.csv', imu2: 'Gyroscope.csv' }],
  ['x, y, z told by the size of gravity', { imu: BARE(1), imu2: BARE(4), gnss }, undefined],
]; // prettier-ignore

test.each(FILES)('two files: %s', async (_, logs, names) => {
  const columns = await decodedLogs(at, logs, names ? { names } : {});
  expectSameImu(columns);
  expectSameGnss(columns);
});

/** Straight lines in time, so that what lies between two samples is known exactly. */
const line = (t: number) => [0.3 - 0.1 * t, 0.2 * t, -9.81 + 0.05 * t];
const accelAt = (times: readonly number[]) => csvText('time_s,ax,ay,az', times.map((t) => [t, ...line(t)])); // prettier-ignore
const steps = (count: number, everyS: number, fromS = 0) =>
  Array.from({ length: count }, (_, k) => fromS + k * everyS);

test.each([
  ['another rate', steps(80, 0.04, -0.01)],
  ['a higher rate', steps(1200, 0.003, -0.1)],
  ['other stamps', steps(310, 0.01, -0.0037)],
])('two clocks, %s: samples come between by straight lines', async (_, times) => {
  const columns = await decodedLogs(at, { imu: GYRO, imu2: accelAt(times), gnss });
  expectClose(columns.imu.timeS, IMU.map((row) => row[0]!), 1e-12);
  for (let i = 0; i < 3; i += 1)
    expectClose(columns.imu.accel[i]!, IMU.map((row) => line(row[0]!)[i]!), 1e-12);
}); // prettier-ignore

test('where the accelerometer has a gap or has not begun, the gyro’s samples drop out and are counted', async () => {
  const times = [...steps(100, 0.01, 0.5), ...steps(101, 0.01, 2)];
  const result = ready(await decodeLogs(at.store, { imu: GYRO, imu2: accelAt(times), gnss }));
  // 0.5 … 1.49 s and 2 … 2.99 s of 0 … 2.99 s are covered.
  expect(result.health.imu.samples).toBe(200);
  expect(result.health.findings).toContainEqual(
    expect.objectContaining({ code: 'unpaired', severity: 'warn', figure: { value: 100, unit: 'samples' } }),
  );
});

test('the accelerometer’s own clock may be stated: another unit and an offset', async () => {
  const imu2 = csvText('t,x,y,z', IMU.map((row) => [Math.round(row[0]! * 1000) + 5000, ...row.slice(4)])); // prettier-ignore
  const channelMap: ChannelMap = {
    imu: {
      time: { columns: ['time_s'], base: 's', offsetS: 0, stamp: 'end' },
      gyro: { columns: ['gyro_x_rad_s', 'gyro_y_rad_s', 'gyro_z_rad_s'], unit: 'rad/s' },
      accel: { columns: ['x', 'y', 'z'], unit: 'm/s^2', sign: 'specific-force' },
      accelTime: { columns: ['t'], base: 'ms', offsetS: -5, stamp: 'end' },
      sampling: 'mean-rate',
    },
  };
  expectSameImu(await decodedLogs(at, { imu: GYRO, imu2, gnss }, { channelMap }));
});

test('two files of absolute times', async () => {
  const stamped = (from: number, name: string) =>
    csvText(`timestamp_ms,${name}_x,${name}_y,${name}_z`, rowsOf(from).map((row) => [Math.round((UNIX_S + row[0]!) * 1000), ...row.slice(1)])); // prettier-ignore
  const fixes = csvText('timestamp_ms,lat,lon,height_m,vn,ve,vd', GNSS.map((row) => [Math.round((UNIX_S + row[0]!) * 1000), ...row.slice(1)])); // prettier-ignore
  const columns = await decodedLogs(at, { imu: stamped(1, 'gyro'), imu2: stamped(4, 'accel'), gnss: fixes });
  expectSameImu(columns);
  expectSameGnss(columns);
});

const EMPTY = ['', '', ''];
test('rows of gyro and rows of accelerometer in turn in one file', async () => {
  const rows = IMU.flatMap((row) => [
    [row[0]!, ...row.slice(1, 4), ...EMPTY],
    [row[0]!, ...EMPTY, ...row.slice(4)],
  ]);
  expectSameImu(await decodedLogs(at, { imu: csvText(IMU_HEADER, rows), gnss }));
});

const MERGED = `${IMU_HEADER},lat_deg,lon_deg,height_m,vn_m_s,ve_m_s,vd_m_s`;
const SIX = ['', '', '', '', '', ''];
const byTime = (rows: (number | string)[][]) => [...rows].sort((a, b) => Number(a[0]) - Number(b[0]));
const isEpoch = (k: number) => k % 20 === 0;
const fixAt = (k: number) => GNSS[Math.min(GNSS.length - 1, Math.floor(k / 20))]!.slice(1);

const ONE_LOG: [string, string][] = [
  ['rows of their own on one clock', csvText(MERGED, byTime([...IMU.map((r) => [...r, ...SIX]), ...GNSS.map((r) => [r[0]!, ...SIX, ...r.slice(1)])]))],
  ['fixes beside the sample of their epoch', csvText(MERGED, IMU.map((r, k) => [...r, ...(isEpoch(k) ? fixAt(k) : SIX)]))],
  ['milliseconds of one column, whose unit only the IMU tells', csvText(MERGED.replace('time_s', 'timestamp'), IMU.map((r, k) => [r[0]! * 1000, ...r.slice(1), ...fixAt(k)]))],
  ['each fix held until the next', csvText(MERGED, IMU.map((r, k) => [...r, ...fixAt(k)]))],
]; // prettier-ignore

test.each(ONE_LOG)('one log for IMU and GNSS: %s', async (_, imu) => {
  const result = ready(await decodeLogs(at.store, { imu }));
  const columns = await decodedLogs(at, { imu });
  expectSameImu(columns);
  expectSameGnss(columns);
  expect(result.health.findings.map(({ code }) => code)).toEqual(expect.not.arrayContaining(['incomplete-rows', 'gnss-duplicates', 'gnss-no-fix'])); // prettier-ignore
});

const GYR = (r: number[]) => ['GYR', r[0]!, ...r.slice(1, 4)];
const ACC = (r: number[]) => ['ACC', r[0]!, ...r.slice(4)];
const FIX = (r: number[]) => ['GPS', r[0]!, ...r.slice(1, 4)];
const inTurn = (...kinds: [number[][], (r: number[]) => (number | string)[]][]) =>
  kinds.flatMap(([rows, cells]) => rows.map(cells)).sort((a, b) => Number(a[1]) - Number(b[1]));

test('rows that name their sensor and share columns x, y, z', async () => {
  const imu = csvText('sensor,time_s,x,y,z', inTurn([IMU, GYR], [IMU, ACC]));
  const columns = await decodedLogs(at, { imu, gnss });
  expectSameImu(columns);
});

test('rows that name their sensor, fixes among them, without a header: by a map', async () => {
  const imu = inTurn([IMU, GYR], [IMU, ACC], [GNSS, FIX])
    .map((row) => row.join(','))
    .join('\n');
  const time = { columns: ['column 2'], base: 's' as const, offsetS: 0, stamp: 'end' as const };
  const of = (tag: string): [string, string, string] => [
    `${tag} column 3`,
    `${tag} column 4`,
    `${tag} column 5`,
  ];
  const [lat, lon, height] = of('GPS');
  const channelMap: ChannelMap = {
    imu: {
      time,
      gyro: { columns: of('GYR'), unit: 'rad/s' },
      accel: { columns: of('ACC'), unit: 'm/s^2', sign: 'specific-force' },
      accelTime: time,
      sampling: 'mean-rate',
    },
    gnss: { time, position: { lat, lon, height, unit: 'deg', heightUnit: 'm', heightDatum: 'ellipsoid' } },
  };
  const columns = await decodedLogs(at, { imu }, { channelMap });
  expectSameImu(columns);
  expectSamePositions(columns);
});

test('a column of words that are no sensors leaves the table as it is', async () => {
  const fixes = csvText(
    'provider,time_s,lat,lon,height_m',
    GNSS.map((row, k) => [k % 2 === 0 ? 'gps' : 'network', ...row.slice(0, 4)]),
  );
  expectSamePositions(await decodedLogs(at, { imu: PLAIN_IMU, gnss: fixes }));
});

test('a file of fixes that holds each over many rows counts it once', async () => {
  const held = csvText(
    'time_s,lat_deg,lon_deg,height_m,vn_m_s,ve_m_s,vd_m_s',
    IMU.map((r, k) => [r[0]!, ...fixAt(k)]),
  );
  expectSameGnss(await decodedLogs(at, { imu: PLAIN_IMU, gnss: held }));
});

test('a fast receiver at rest keeps every fix', async () => {
  const rest = csvText(
    'time_s,lat_deg,lon_deg,height_m',
    Array.from({ length: 30 }, (_, k) => [k / 10, 47.21, -14.63, 40]),
  );
  const { gnss: fixes } = await decodedLogs(at, { imu: PLAIN_IMU, gnss: rest });
  expect(fixes.timeS).toHaveLength(30);
});

test('one log sent for both roles is the same as sent once', async () => {
  const imu = ONE_LOG[0]![1];
  expectSamePositions(await decodedLogs(at, { imu, gnss: imu }));
});

test('increments only go with increments of the same stamp', async () => {
  const gyroIncrements = csvText('time_s,dtheta_x_deg,dtheta_y_deg,dtheta_z_deg', rowsOf(1).map(([t, ...g]) => [t!, ...g.map((v) => (v / RAD_PER_DEG) * 0.01)])); // prettier-ignore
  const shifted = csvText('time_s,dv_x_m_s,dv_y_m_s,dv_z_m_s', rowsOf(4).map(([t, ...a]) => [t! + 0.005, ...a.map((v) => v * 0.01)])); // prettier-ignore
  const channelMap: ChannelMap = {
    imu: {
      time: { columns: ['time_s'], base: 's', offsetS: 0, stamp: 'end' },
      gyro: { columns: ['dtheta_x_deg', 'dtheta_y_deg', 'dtheta_z_deg'], unit: 'deg' },
      accel: { columns: ['dv_x_m_s', 'dv_y_m_s', 'dv_z_m_s'], unit: 'm/s', sign: 'specific-force' },
      sampling: 'increment',
    },
  };
  const refused = await decodeLogs(at.store, { imu: gyroIncrements, imu2: shifted, gnss }, { channelMap });
  expect(refused).toMatchObject({ outcome: 'rejected', problems: [{ code: 'sensors-apart', file: 'imu' }] });
  const same = shifted.replace(/^(\d[^,]*)/gm, (t) => String(Math.round((Number(t) - 0.005) * 100) / 100));
  const { imu } = await decodedLogs(at, { imu: gyroIncrements, imu2: same, gnss }, { channelMap });
  expectClose(imu.accel[2], IMU.map((row) => row[6]! * 0.01), 1e-14);
}); // prettier-ignore

const REFUSED: [string, Logs, object][] = [
  ['two gyros and no accelerometer', { imu: GYRO, imu2: GYRO, gnss }, { outcome: 'needs-mapping', problems: [{ code: 'columns-missing', file: 'imu' }] }],
  ['an accelerometer of another day', { imu: GYRO, imu2: accelAt(steps(300, 0.01, 9000)), gnss }, { outcome: 'rejected', problems: [{ code: 'sensors-apart' }] }],
  ['an accelerometer whose time runs backwards', { imu: GYRO, imu2: accelAt([...steps(100, 0.01), ...steps(100, 0.01)]), gnss }, { outcome: 'rejected', problems: [{ code: 'time-backwards', file: 'imu2', line: 102 }] }],
  ['an empty second file', { imu: GYRO, imu2: '', gnss }, { outcome: 'rejected', problems: [{ code: 'empty', file: 'imu2' }] }],
  ['text in the second file', { imu: GYRO, imu2: ACCEL.replace('\n0.5,', '\n0.5,oops'), gnss }, { outcome: 'rejected', problems: [{ code: 'not-a-number', file: 'imu2', line: 52 }] }],
]; // prettier-ignore

test.each(REFUSED)('told: %s', async (_, logs, expected) => {
  const result = await decodeLogs(at.store, logs);
  expect(result).toMatchObject(expected);
  expect(await at.store.list('recordings/rec/imu')).toEqual([]);
});

test('a long second file is read piece by piece', async () => {
  const rows = imuRows(20_000);
  const part = (from: number) => rows.map((row) => [row[0]!, ...row.slice(from, from + 3)]);
  const logs = {
    imu: csvText('time_s,gyro_x_rad_s,gyro_y_rad_s,gyro_z_rad_s', part(1)),
    imu2: csvText('time_s,accel_x_m_s2,accel_y_m_s2,accel_z_m_s2', part(4)),
    gnss,
  };
  const { imu } = await decodedLogs(at, logs);
  expectClose(imu.accel[0], rows.map((row) => row[4]!), 1e-13);
}); // prettier-ignore
