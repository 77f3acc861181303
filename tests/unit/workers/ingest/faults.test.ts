/** Bad files: each is refused with its reason, its place and a remedy, or taken with a finding that says what was wrong. */
import { gzipSync } from 'node:zlib';
import type { ChannelMap, HealthFinding } from '@/shared/contracts/recordings';
import { loadRecording } from '@/workers/recordings/load';
import {
  cleanLogs, csvText, decodeLogs, GNSS_HEADER, gnssRows, IMU_HEADER, imuRows, ready, testStore, type TestStore,
} from '../support'; // prettier-ignore

jest.setTimeout(60_000);

let at: TestStore;
beforeEach(() => {
  at = testStore();
});
afterEach(() => at.remove());

const CLEAN = cleanLogs();
const withImu = (imu: string | Uint8Array, channelMap?: ChannelMap) =>
  decodeLogs(at.store, { imu, gnss: CLEAN.gnss }, channelMap ? { channelMap } : {});
const withGnss = (gnss: string | Uint8Array) => decodeLogs(at.store, { imu: CLEAN.imu, gnss });
const edited = (edit: (row: (number | string)[], k: number) => (number | string)[]) =>
  csvText(IMU_HEADER, imuRows().map((row, k) => edit(row, k))); // prettier-ignore
const replaced = (row: (number | string)[], column: number, cell: number | string) =>
  row.map((old, c) => (c === column ? cell : old));

const bytes = Uint8Array.from({ length: 5000 }, (_, i) => (i * 37) % 256);
const noise = (length: number) => Uint8Array.from({ length }, (_, i) => (i * i * 31 + (i >> 3) * 7) & 0xff);
const bomb = gzipSync(Buffer.concat([Buffer.from(CLEAN.imu), Buffer.alloc(96 * 1024 * 1024, '# 0\n')]));
const wide = `time_s,${Array.from({ length: 5000 }, (_, i) => `c${i}`).join(',')}\n0\n1\n`;

const REFUSED: [string, string | Uint8Array, string, object][] = [
  ['nothing but blank lines', '\n\n  \n', 'empty', {}],
  ['nothing but comments', '# one\n# two\n', 'no-rows', {}],
  ['a binary file', bytes, 'binary', {}],
  ['a ZIP archive', Buffer.concat([Buffer.from('PK\x03\x04'), noise(4000)]), 'binary', { message: 'The IMU file is a ZIP archive or a spreadsheet, not text.' }],
  ['a gzip that was cut off', gzipSync(CLEAN.imu).subarray(0, 900), 'gzip-damaged', {}],
  ['a gzip of a binary', gzipSync(bytes), 'binary', {}],
  ['a gzip that grows without end', bomb, 'gzip-expands', {}],
  ['thousands of columns', wide, 'too-many-columns', { line: 1 }],
  ['a line without end', 'x'.repeat(2_000_000), 'line-too-long', { line: 1 }],
  ['a line without end further down', `${CLEAN.imu}${'1'.repeat(3_000_000)}`, 'line-too-long', { line: 302 }],
  ['more cells than columns', edited((row, k) => (k === 20 ? [...row, 7] : row)), 'too-many-cells', { line: 22 }],
  ['text in a number', edited((row, k) => (k === 250 ? replaced(row, 6, '9,81x') : row)).replace('9,81x', '9.81x'), 'not-a-number', { line: 252, column: 'accel_z_m_s2' }],
  ['a hexadecimal number', edited((row, k) => (k === 3 ? replaced(row, 2, '0x1F') : row)), 'not-a-number', { line: 5, column: 'gyro_y_rad_s' }],
  ['text in the time', edited((row, k) => (k === 30 ? replaced(row, 0, 'noon') : row)), 'not-a-time', { line: 32, column: 'time_s' }],
  ['time that runs backwards', edited((row, k) => (k === 30 ? replaced(row, 0, 0.1) : row)), 'time-backwards', { line: 32 }],
]; // prettier-ignore

test.each(REFUSED)('IMU: %s', async (_, imu, code, place) => {
  const result = await withImu(imu);

  expect(result).toMatchObject({ outcome: 'rejected', problems: [{ code, file: 'imu', ...place }] });
  if (result.outcome !== 'rejected') return;
  expect(result.problems[0]!.message.length).toBeGreaterThan(20);
  expect(result.problems[0]!.remedy.length).toBeGreaterThan(20);
  expect(await at.store.list('recordings/rec/imu')).toEqual([]);
});

test('lines are counted rightly past comments, blank lines and quoted line breaks', async () => {
  const rows = imuRows().map((row) => [...row, '"two\nlines"']);
  rows[10]![1] = 'broken';
  const imu = `# unit 7\n\n${csvText(`${IMU_HEADER},note`, rows).replace('\n0.03,', '\n# remark\n0.03,')}`;
  // Two lines before the header, the header, two a row for ten rows, one remark.
  expect(await withImu(imu)).toMatchObject({
    problems: [{ code: 'not-a-number', line: 3 + 2 * 10 + 1 + 1 }],
  });
});

const GNSS_REFUSED: [string, string, string, object][] = [
  ['a latitude beyond the pole', CLEAN.gnss.replace('47.210003', '97.210003'), 'position-absurd', { line: 5, column: 'lat_deg' }],
  ['a longitude beyond the full circle', CLEAN.gnss.replace('-14.629996', '-1462.9996'), 'position-absurd', { line: 4, column: 'lon_deg' }],
  ['no fix at all', csvText(GNSS_HEADER, gnssRows().map((r) => [r[0]!, 0, 0, 0, 0, 0, 0])), 'no-fix', {}],
  ['one fix', csvText(GNSS_HEADER, gnssRows(1)), 'no-rows', {}],
  ['another day', csvText(GNSS_HEADER, gnssRows().map((r) => [r[0]! + 86_400, ...r.slice(1)])), 'no-overlap', {}],
]; // prettier-ignore

test.each(GNSS_REFUSED)('GNSS: %s', async (_, gnss, code, place) => {
  expect(await withGnss(gnss)).toMatchObject({
    outcome: 'rejected',
    problems: [{ code, file: 'gnss', ...place }],
  });
});

test('a reference that belongs to another drive is refused', async () => {
  const reference = csvText('time_s,lat_deg,lon_deg', gnssRows().map((r) => [r[0]! + 900, r[1]!, r[2]!])); // prettier-ignore
  const result = await decodeLogs(at.store, { ...CLEAN, reference });
  expect(result).toMatchObject({
    outcome: 'rejected',
    problems: [{ code: 'no-overlap', file: 'reference' }],
  });
});

test('a channel map that names a column the file does not have asks again, and says which there are', async () => {
  const channelMap: ChannelMap = {
    imu: {
      time: { columns: ['clock'], base: 's', offsetS: 0, stamp: 'end' },
      gyro: { columns: ['gyro_x_rad_s', 'gyro_y_rad_s', 'gyro_z_rad_s'], unit: 'rad/s' },
      accel: {
        columns: ['accel_x_m_s2', 'accel_y_m_s2', 'accel_z_m_s2'],
        unit: 'm/s^2',
        sign: 'specific-force',
      },
      sampling: 'mean-rate',
    },
  };
  const result = await withImu(CLEAN.imu, channelMap);
  expect(result).toMatchObject({
    outcome: 'needs-mapping',
    problems: [{ code: 'column-unknown', column: 'clock' }],
  });
  if (result.outcome === 'needs-mapping') expect(result.problems[0]!.remedy).toContain('time_s');
});

test('units that contradict the sampling are refused', async () => {
  const channelMap: ChannelMap = {
    imu: {
      time: { columns: ['time_s'], base: 's', offsetS: 0, stamp: 'end' },
      gyro: { columns: ['gyro_x_rad_s', 'gyro_y_rad_s', 'gyro_z_rad_s'], unit: 'rad/s' },
      accel: {
        columns: ['accel_x_m_s2', 'accel_y_m_s2', 'accel_z_m_s2'],
        unit: 'm/s^2',
        sign: 'specific-force',
      },
      sampling: 'increment',
    },
  };
  expect(await withImu(CLEAN.imu, channelMap)).toMatchObject({ problems: [{ code: 'sampling' }] });
});

test.each([
  ['gyro columns of an unknown unit', IMU_HEADER.replaceAll('rad_s', 'furlongs'), ['gyro x', 'gyro y', 'gyro z']],
  ['a missing axis', IMU_HEADER.replace('accel_y_m_s2', 'temperature'), ['accelerometer y']],
  ['nothing known', 'a1,a2,a3,a4,a5,a6,a7', ['time', 'gyro x', 'gyro y', 'gyro z', 'accelerometer x', 'accelerometer y', 'accelerometer z']],
])('%s: asks for a mapping and names what is missing', async (_, header, missing) => {
  const result = await withImu(csvText(header, imuRows()));
  expect(result.outcome).toBe('needs-mapping');
  if (result.outcome === 'needs-mapping') expect(result.previews[0]!.missing).toEqual(missing);
}); // prettier-ignore

const findingOf = async (
  logs: { imu?: string; gnss?: string },
  code: string,
): Promise<HealthFinding | undefined> => {
  const { health } = ready(await decodeLogs(at.store, { ...CLEAN, ...logs }));
  return health.findings.find((finding) => finding.code === code);
};

test('a clean pair is usable without a word', async () => {
  const gnss = csvText(
    `${GNSS_HEADER},sigma_n_m,sigma_e_m,sigma_d_m`,
    gnssRows().map((row) => [...row, 1, 1, 2]),
  );
  expect(ready(await withGnss(gnss)).health).toMatchObject({ verdict: 'usable', findings: [] });
});

test('rows with empty or NaN cells drop out and are reported', async () => {
  const imu = edited((row, k) => (k === 5 ? replaced(row, 1, '') : k === 6 ? replaced(row, 4, 'NaN') : row));
  const finding = await findingOf({ imu }, 'incomplete-rows');
  expect(finding).toMatchObject({ severity: 'warn', figure: { value: 2, unit: 'rows' } });
  expect(finding?.sentence).toContain('first in line 7');
  expect((await loadRecording(at.store, 'rec')).columns.imu.timeS).toHaveLength(298);
});

test('a repeated stamp with other values drops out and is reported', async () => {
  const finding = await findingOf(
    { imu: edited((row, k) => (k === 9 ? replaced(row, 0, 0.08) : row)) },
    'repeated-stamps',
  );
  expect(finding).toMatchObject({ severity: 'warn', figure: { value: 1 } });
});

test('exact duplicates drop out and are reported', async () => {
  const rows = imuRows();
  const finding = await findingOf(
    { imu: csvText(IMU_HEADER, [...rows.slice(0, 9), rows[8]!, ...rows.slice(9)]) },
    'duplicates',
  );
  expect(finding).toMatchObject({ severity: 'info', figure: { value: 1 } });
});

test('a gap is found where it is', async () => {
  const imu = csvText(IMU_HEADER, imuRows().filter((_, k) => k < 100 || k >= 150)); // prettier-ignore
  const finding = await findingOf({ imu }, 'imu-gaps');
  expect(finding?.severity).toBe('warn');
  expect(finding?.intervalsS).toEqual([[0.99, 1.5]]);
  expect(finding?.figure?.value).toBeCloseTo(0.51, 9);
});

test('a flat top is found where it is', async () => {
  const imu = edited((row, k) => (k >= 120 && k < 130 ? replaced(row, 4, 39.2266) : row));
  expect((await findingOf({ imu }, 'clipped'))?.intervalsS).toEqual([[1.2, 1.29]]);
});

test.each([
  ['g read as m/s²', 1 / 9.80665, 'set its unit to g'],
  ['mg read as m/s²', 1000 / 9.80665, 'set its unit to mg'],
])('%s stops with the unit that fits', async (_, factor, remedy) => {
  const imu = edited((row) => row.map((cell, c) => (c >= 4 ? Number(cell) * factor : cell)));
  const { health } = ready(await withImu(imu));
  expect(health.verdict).toBe('not-usable');
  const finding = health.findings.find((one) => one.code === 'gravity-size');
  expect(finding?.severity).toBe('stop');
  expect(finding?.remedy).toContain(remedy);
});

test('an IMU mounted upside down, or on its side, is noticed', async () => {
  const upsideDown = edited((row) => [...row.slice(0, 5), -row[5]!, -row[6]!]);
  const onItsSide = edited((row) => [...row.slice(0, 4), row[6]!, row[5]!, -row[4]!]);
  expect(await findingOf({ imu: upsideDown }, 'upside-down')).toMatchObject({ severity: 'warn' });
  expect(await findingOf({ imu: onItsSide }, 'axes')).toMatchObject({ severity: 'warn' });
});

test('GNSS over a part of the time only is noticed', async () => {
  const finding = await findingOf({ gnss: csvText(GNSS_HEADER, gnssRows(5)) }, 'overlap');
  expect(finding?.figure?.value).toBeCloseTo((0.8 / 2.99) * 100, 6);
});

test('gaps and missing parts of GNSS are told', async () => {
  const imu = csvText(IMU_HEADER, imuRows(1200));
  const gnss = csvText('time_s,lat_deg,lon_deg', gnssRows(60).filter((_, k) => k < 20 || k > 40).map((r) => r.slice(0, 3))); // prettier-ignore
  const { health } = ready(await decodeLogs(at.store, { imu, gnss }));
  const codes = health.findings.map((finding) => finding.code);
  expect(codes).toEqual(expect.arrayContaining(['gnss-gaps', 'no-height', 'no-velocity', 'no-sigma']));
  expect(health.findings.find((one) => one.code === 'gnss-gaps')?.intervalsS).toEqual([[3.8, 8.2]]);
});

test('a second fix of one stamp drops out and is reported', async () => {
  const rows = gnssRows().flatMap((row, k) => (k % 3 === 0 ? [row, row] : [row]));
  expect(await findingOf({ gnss: csvText(GNSS_HEADER, rows) }, 'gnss-duplicates')).toMatchObject({
    severity: 'warn',
    figure: { value: 5, unit: 'rows' },
  });
});

test('what was taken for granted is told', async () => {
  const finding = await findingOf({ imu: csvText('t,wx,wy,wz,ax,ay,az', imuRows()) }, 'assumed');
  expect(finding?.sentence).toContain('taken as');
});
