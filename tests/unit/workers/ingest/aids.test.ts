/** Barometer, heading and odometer: found, brought to SI and onto the recording's axis, stored, and given to the engine. */
import type { ChannelMap } from '@/shared/contracts/recordings';
import { RAD_PER_DEG } from '@/shared/units';
import { csvText, decodeLogs, IMU_HEADER, ready, testStore, type TestStore } from '../support';
import { decodedLogs, expectClose, expectSameImu, GNSS, IMU, PLAIN_GNSS, PLAIN_IMU, UNIX_S } from './twin';

jest.setTimeout(60_000);

let at: TestStore;
beforeAll(() => {
  at = testStore();
});
afterAll(() => at.remove());

const TIMES = Array.from({ length: 30 }, (_, k) => k / 10);
const heightM = (t: number) => 40 + 0.5 * t;
const headingDeg = (t: number) => 350 + 10 * t;
const speedMPerS = (t: number) => 0.8 + 0.1 * t;
/** Pressure at a height in the International Standard Atmosphere, hPa. */
const pressureHPa = (height: number) => 1013.25 * (1 - (0.0065 * height) / 288.15) ** 5.2558797;

const own = (header: string, values: (t: number) => number[]) => csvText(`time_s,${header}`, TIMES.map((t) => [t, ...values(t)])); // prettier-ignore
const decoded = (aids: string, channelMap?: ChannelMap) =>
  decodedLogs(at, { imu: PLAIN_IMU, gnss: PLAIN_GNSS, aids }, channelMap ? { channelMap } : {});

test.each([
  ['a height in m', own('height_m', (t) => [heightM(t)]), 1e-12],
  ['a pressure altitude in ft', own('pressure_altitude_ft', (t) => [heightM(t) / 0.3048]), 1e-12],
  ['a pressure in hPa', own('pressure_hpa', (t) => [pressureHPa(heightM(t))]), 1e-3],
  ['a pressure that names no unit', own('pressure', (t) => [pressureHPa(heightM(t)) * 100]), 1e-3],
])('barometer: %s', async (_, aids, toleranceM) => {
  const { aids: columns } = await decoded(aids);
  expectClose(columns!.barometer!.timeS, TIMES, 1e-12);
  expectClose(columns!.barometer!.heightM, TIMES.map(heightM), toleranceM);
  expect(columns!.barometer!.sigmaM).toBeNull();
}); // prettier-ignore

test('heading turns over north; a stated declination is added', async () => {
  const aids = own('mag_heading_deg', (t) => [headingDeg(t) - 3.5]);
  const channelMap: ChannelMap = {
    aids: { heading: { column: 'mag_heading_deg', unit: 'deg', offsetDeg: 3.5 } },
  };
  const { heading } = (await decoded(aids, channelMap)).aids!;
  expectClose(heading!.headingRad, TIMES.map((t) => (headingDeg(t) % 360) * RAD_PER_DEG), 1e-12);
}); // prettier-ignore

test('odometer: a speed, with its σ', async () => {
  const aids = own('wheel_speed_km_h,accuracy', (t) => [speedMPerS(t) * 3.6, 0.36]);
  const channelMap: ChannelMap = {
    aids: { odometer: { column: 'wheel_speed_km_h', unit: 'km/h', sigma: 'accuracy' } },
  };
  const { odometer } = (await decoded(aids, channelMap)).aids!;
  expectClose(odometer!.speedMPerS, TIMES.map(speedMPerS), 1e-12);
  expectClose(odometer!.sigmaMPerS!, TIMES.map(() => 0.1), 1e-12);
}); // prettier-ignore

test.each([
  ['m', 1, 1],
  ['count', 0.02, 50],
] as const)('odometer: distance in %s gives the mean speed in the middle between readings', async (unit, scale, perMetre) => {
  const distance = (t: number) => (0.8 * t + 0.05 * t * t) * perMetre;
  const aids = own('odo', (t) => [distance(t)]);
  const { odometer } = (await decoded(aids, { aids: { odometer: { column: 'odo', unit, scale } } })).aids!;
  const middles = TIMES.slice(1).map((t) => t - 0.05);
  expectClose(odometer!.timeS, middles, 1e-12);
  expectClose(odometer!.speedMPerS, middles.map(speedMPerS), 1e-9);
}); // prettier-ignore

test('readings held beside every IMU sample are thinned to what is new', async () => {
  const imu = csvText(`${IMU_HEADER},baro_height_m`, IMU.map((row) => [...row, heightM(Math.floor(row[0]! * 10 + 1e-9) / 10)])); // prettier-ignore
  const columns = await decodedLogs(at, { imu, gnss: PLAIN_GNSS });
  expectSameImu(columns);
  expectClose(columns.aids!.barometer!.timeS, TIMES, 1e-12);
  expectClose(columns.aids!.barometer!.heightM, TIMES.map(heightM), 1e-12);
});

test('sensors in their own file of another clock base, text among them', async () => {
  const iso = (t: number) => new Date(Math.round((UNIX_S + t) * 1000)).toISOString();
  const imu = csvText(IMU_HEADER.replace('time_s', 'utc'), IMU.map((row) => [iso(row[0]!), ...row.slice(1)])); // prettier-ignore
  const gnss = csvText('utc,lat,lon,height_m', GNSS.map((row) => [iso(row[0]!), ...row.slice(1, 4)])); // prettier-ignore
  const aids = csvText('unix_ms;altitude_m;heading_deg'.replaceAll(';', ','), TIMES.map((t, k) => [Math.round((UNIX_S + t) * 1000), heightM(t), k === 4 ? 'lost' : 90])); // prettier-ignore
  const columns = await decodedLogs(at, { imu, gnss, aids });
  expectClose(columns.aids!.barometer!.timeS, TIMES, 1e-6);
  expect(columns.aids!.heading!.headingRad.every((value) => Math.abs(value - Math.PI / 2) < 1e-12)).toBe(
    true,
  );
  expect(columns.aids!.heading!.timeS).not.toContain(0.4);
});

test('a recording without any has none; a later decoding without them leaves none behind', async () => {
  await decoded(own('height_m', (t) => [heightM(t)]));
  expect((await at.store.list('recordings/rec/aid-')).length).toBe(1);
  await at.store.removePrefix('recordings/rec/raw');
  const { aids } = await decodedLogs(at, { imu: PLAIN_IMU, gnss: PLAIN_GNSS });
  expect(aids).toBeNull();
  expect(await at.store.list('recordings/rec/aid-')).toEqual([]);
});

test('an empty column is told; a column or file that is not there asks for a mapping', async () => {
  const empty = own('height_m,odo', (t) => [heightM(t), NaN]);
  const logs = { imu: PLAIN_IMU, gnss: PLAIN_GNSS, aids: empty };
  const map = (column: string, file?: 'reference'): ChannelMap => ({ aids: { odometer: { column, unit: 'm', file } } }); // prettier-ignore
  const told = ready(await decodeLogs(at.store, logs, { channelMap: map('odo') }));
  expect(told.health.findings.map(({ code }) => code)).toContain('aid-empty');
  expect(await decodeLogs(at.store, logs, { channelMap: map('wheel') })).toMatchObject({
    outcome: 'needs-mapping',
    problems: [{ code: 'column-unknown', file: 'aids', column: 'wheel' }],
  });
  expect(await decodeLogs(at.store, logs, { channelMap: map('odo', 'reference') })).toMatchObject({
    outcome: 'needs-mapping',
    problems: [{ code: 'file-missing', file: 'reference' }],
  });
});
