/** Every way to tell time lands on the same axis as the clean twin. */
import type { ChannelMap, TimeMap } from '@/shared/contracts/recordings';
import { csvText, decodeLogs, ready, testStore, type TestStore } from '../support';
import { loadRecording } from '@/workers/recordings/load';
import {
  decodedLogs, expectSameGnss, expectSameImu, GNSS, GNSS_VALUES, GPS, IMU, IMU_VALUES, PLAIN_GNSS, PLAIN_IMU, UNIX_S, withTime,
} from './twin'; // prettier-ignore

jest.setTimeout(60_000);

let at: TestStore;
beforeAll(() => {
  at = testStore();
});
afterAll(() => at.remove());

type Stamp = (t: number) => (number | string)[];
const imuLog = (names: string, stamp: Stamp) => csvText(`${names},${IMU_VALUES}`, withTime(IMU, stamp));
const gnssLog = (names: string, stamp: Stamp) => csvText(`${names},${GNSS_VALUES}`, withTime(GNSS, stamp));

const pad = (value: number, length = 2) => String(value).padStart(length, '0');
const parts = (t: number) => {
  const at = new Date(Math.round((UNIX_S + t) * 1000));
  return {
    y: at.getUTCFullYear(),
    mo: pad(at.getUTCMonth() + 1),
    d: pad(at.getUTCDate()),
    h: at.getUTCHours(),
    clock: `${pad(at.getUTCMinutes())}:${pad(at.getUTCSeconds())}.${pad(at.getUTCMilliseconds(), 3)}`,
  };
};
/** Local time of a zone, written in any order of the date. */
const written = (order: (p: ReturnType<typeof parts>) => string, aheadS = 0): Stamp => (t) => [order(parts(t + aheadS))]; // prettier-ignore
const gpsS = UNIX_S - GPS.epochS + GPS.leapS;

/** Absolute clocks: the axis counts from the whole second before the first sample, which is UNIX_S. */
const ABSOLUTE: [string, string, Stamp][] = [
  ['seconds of GPS time', 'gps_time_s', (t) => [(gpsS + t).toFixed(3)]],
  ['GPS week and seconds', 'gps_week,tow_s', (t) => [GPS.week, (GPS.towS + t).toFixed(3)]],
  ['a GPS week of ten bits', 'week,tow', (t) => [GPS.week - 2048, (GPS.towS + t).toFixed(3)]],
  ['day, month, year with dots', 'time', written((p) => `${p.d}.${p.mo}.${p.y} ${pad(p.h)}:${p.clock}`)],
  ['year first with slashes', 'time', written((p) => `${p.y}/${p.mo}/${p.d} ${pad(p.h)}:${p.clock}`)],
  ['ISO 8601 with a zone of hours alone', 'time', written((p) => `${p.y}-${p.mo}-${p.d}T${pad(p.h)}:${p.clock}+02`, 7200)],
  ['ISO 8601, basic form', 'utc', written((p) => `${p.y}${p.mo}${p.d}T${pad(p.h)}${p.clock.replace(':', '')}Z`)],
  ['date and time of day in two columns', 'date,time', (t) => [`${parts(t).y}-${parts(t).mo}-${parts(t).d}`, `${pad(parts(t).h)}:${parts(t).clock}`]],
  ['date and time of day as receivers pack them', 'date_ddmmyy,utc_time', (t) => [`${parts(t).d}${parts(t).mo}${String(parts(t).y).slice(2)}`, `${pad(parts(t).h)}${parts(t).clock.replace(':', '')}`]],
  ['UNIX microseconds', 'timestamp_us', (t) => [`${UNIX_S + Math.floor(t)}${pad(Math.round((t % 1) * 1e6), 6)}`]],
  ['seconds and nanoseconds', 'sec,nanosec', (t) => [UNIX_S + Math.floor(t + 1e-9), Math.round(((t + 1e-9) % 1) * 1e9) % 1e9]],
]; // prettier-ignore

test.each(ABSOLUTE)('%s', async (_, names, stamp) => {
  const logs = { imu: imuLog(names, stamp), gnss: gnssLog(names, stamp) };
  const result = ready(await decodeLogs(at.store, logs));
  expect(result.timeOrigin).toMatchObject({
    utc: '2026-03-01T10:00:00.000Z',
    gpsWeek: GPS.week,
    gpsTowS: GPS.towS,
  });
  const { columns } = await loadRecording(at.store, 'rec');
  expectSameImu(columns, 0, { timeS: 1e-6 });
  expectSameGnss(columns, 0, { timeS: 1e-6 });
});

const IMU_MAP: NonNullable<ChannelMap['imu']> = {
  time: { columns: ['t'], base: 's', offsetS: 0, stamp: 'end' },
  gyro: { columns: ['gyro_x_rad_s', 'gyro_y_rad_s', 'gyro_z_rad_s'], unit: 'rad/s' },
  accel: { columns: ['accel_x_m_s2', 'accel_y_m_s2', 'accel_z_m_s2'], unit: 'm/s^2', sign: 'specific-force' },
  sampling: 'mean-rate',
};
const timed = (time: Partial<TimeMap>): ChannelMap => ({
  imu: { ...IMU_MAP, time: { ...IMU_MAP.time, ...time } },
});
const UTC_GNSS = gnssLog('utc', (t) => [new Date(Math.round((UNIX_S + t) * 1000)).toISOString()]);

const STATED: [string, Stamp, Partial<TimeMap>][] = [
  ['local text times of a stated zone', written((p) => `${p.y}-${p.mo}-${p.d} ${pad(p.h)}:${p.clock}`, 5400), { base: 'iso8601', zoneMin: 90 }],
  ['month first, with AM and PM', written((p) => `${p.mo}/${p.d}/${p.y} ${p.h % 12 || 12}:${p.clock} ${p.h < 12 ? 'AM' : 'PM'}`), { base: 'iso8601', dateOrder: 'mdy' }],
  ['text on the GPS scale', written((p) => `${p.y}-${p.mo}-${p.d} ${pad(p.h)}:${p.clock}`, GPS.leapS), { base: 'iso8601', scale: 'gps' }],
  ['UNIX seconds that leave out leap seconds', (t) => [(UNIX_S + GPS.leapS + t).toFixed(3)], { base: 's', scale: 'gps' }],
  ['times of a stated day', (t) => [`${pad(parts(t).h)}:${parts(t).clock}`], { base: 'time-of-day', date: '2026-03-01' }],
]; // prettier-ignore

test.each(STATED)('stated: %s, beside fixes in UTC', async (_, stamp, time) => {
  const columns = await decodedLogs(
    at,
    { imu: imuLog('t', stamp), gnss: UTC_GNSS },
    { channelMap: timed(time) },
  );
  expectSameImu(columns, 0, { timeS: 1e-6 });
  expectSameGnss(columns, 0, { timeS: 1e-6 });
});

const TWO32 = 2 ** 32;
/** Plain clocks that keep their zero; `shift` is where the first sample lies. */
const PLAIN: [string, string, Stamp, Partial<TimeMap> | null, number][] = [
  ['a counter of a stated rate', 't', (t) => [Math.round(t * 100)], { base: 'counter', rateHz: 100 }, 0],
  ['a counter of 8 bits that turns over', 't', (t) => [Math.round(t * 100) % 256], { base: 'counter', rateHz: 100, wrap: 256 }, 0],
  ['a counter of 16 bits that turns over', 't', (t) => [(65_500 + Math.round(t * 100)) % 65_536], { base: 'counter', rateHz: 100 }, 655],
  ['microseconds of 32 bits that turn over', 'time_us', (t) => [(TWO32 - 1e6 + Math.round(t * 1e6)) % TWO32], null, TWO32 / 1e6 - 1],
  ['the time of the GPS week in ms over its end', 'itow_ms', (t) => [(604_799_000 + Math.round(t * 1000)) % 604_800_000], null, 604_799],
]; // prettier-ignore

test.each(PLAIN)('%s', async (_, name, stamp, time, shiftS) => {
  const gnss = gnssLog('time_s', (t) => [t + shiftS]);
  const options = time ? { channelMap: timed(time) } : {};
  expectSameImu(await decodedLogs(at, { imu: imuLog(name, stamp), gnss }, options), shiftS, { timeS: 1e-6 });
});

test('times of day count on over midnight', async () => {
  const clock: Stamp = (t) => [new Date(Math.round((86_398.5 + t) * 1000)).toISOString().slice(11, 23)];
  const columns = await decodedLogs(at, { imu: imuLog('time', clock), gnss: gnssLog('time', clock) });
  expectSameImu(columns, 86_398.5, { timeS: 1e-6 });
  expectSameGnss(columns, 86_398.5, { timeS: 1e-6 });
});

test.each([['start', -0.2], ['middle', -0.1]] as const)('fixes stamped at the %s of their interval move to its end', async (stamp, early) => {
  const gnss = gnssLog('time_s', (t) => [t + early]);
  const channelMap: ChannelMap = {
    gnss: {
      time: { columns: ['time_s'], base: 's', offsetS: 0, stamp },
      position: { lat: 'lat_deg', lon: 'lon_deg', height: 'height_m', unit: 'deg', heightUnit: 'm', heightDatum: 'ellipsoid' },
      velocity: { frame: 'ned', columns: ['vn_m_s', 've_m_s', 'vd_m_s'], unit: 'm/s' },
    },
  };
  expectSameGnss(await decodedLogs(at, { imu: PLAIN_IMU, gnss }, { channelMap }));
}); // prettier-ignore

const REFUSED: [string, string, Stamp, string][] = [
  ['a date that is none', 'time', (t) => [t === 1 ? '2026-02-30 10:00:00' : parts(t).y + `-03-01 10:00:${pad(Math.floor(t))}.${pad(Math.round((t % 1) * 1000), 3)}`], 'not-a-time'],
  ['a clock that is set back in the middle', 'time_s', (t) => [t > 1.5 ? t - 1 : t], 'time-backwards'],
  ['seconds since start beside fixes in UTC', 'time_s', (t) => [t], 'clocks-differ'],
]; // prettier-ignore

test.each(REFUSED)('refused: %s', async (_, name, stamp, code) => {
  const gnss = name === 'time_s' && code === 'time-backwards' ? PLAIN_GNSS : UTC_GNSS;
  const result = await decodeLogs(at.store, { imu: imuLog(name, stamp), gnss });
  expect(result).toMatchObject({ outcome: 'rejected', problems: [{ code }] });
});
