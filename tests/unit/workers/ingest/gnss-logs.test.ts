/** Receivers' own logs, NMEA 0183 and GPX: each lands on the same fixes as the clean twin, or is refused by name. */
import { gzipSync } from 'node:zlib';
import type { ChannelMap } from '@/shared/contracts/recordings';
import { KNOT_M_S, RAD_PER_DEG } from '@/shared/units';
import { loadRecording } from '@/workers/recordings/load';
import { csvText, decodeLogs, IMU_HEADER, ready, testStore, type TestStore } from '../support';
import {
  decodedLogs, expectClose, expectSameImu, expectSamePositions, GNSS, IMU, PLAIN_IMU, UNIX_S, type Tolerances,
} from './twin'; // prettier-ignore

jest.setTimeout(60_000);

let at: TestStore;
beforeAll(() => {
  at = testStore();
});
afterAll(() => at.remove());

const iso = (t: number) => new Date(Math.round((UNIX_S + t) * 1000)).toISOString();
const UTC_IMU = csvText(IMU_HEADER.replace('time_s', 'utc'), IMU.map((row) => [iso(row[0]!), ...row.slice(1)])); // prettier-ignore
const CLOCK_IMU = csvText(IMU_HEADER.replace('time_s', 'time_of_day'), IMU.map((row) => [iso(row[0]!).slice(11, 23), ...row.slice(1)])); // prettier-ignore

function sentence(body: string): string {
  let sum = 0;
  for (const char of body) sum ^= char.charCodeAt(0);
  return `$${body}*${sum.toString(16).toUpperCase().padStart(2, '0')}`;
}
const clock = (t: number) => iso(t).slice(11, 22).replaceAll(':', '');
const angle = (deg: number, digits: number) =>
  `${String(Math.floor(Math.abs(deg))).padStart(digits, '0')}${((Math.abs(deg) % 1) * 60).toFixed(7).padStart(10, '0')}`;
const place = (r: readonly number[]) => `${angle(r[1]!, 2)},N,${angle(r[2]!, 3)},W`;
const SPEED = Math.hypot(0.5, 0.7);
const COURSE = Math.atan2(0.7, 0.5) / RAD_PER_DEG;
const SEPARATION_M = 54.7;

const gga = (r: readonly number[], quality = 4) =>
  sentence(
    `GNGGA,${clock(r[0]!)},${place(r)},${quality},12,0.8,${(r[3]! - SEPARATION_M).toFixed(4)},M,${SEPARATION_M},M,1.0,0000`,
  );
const rmc = (r: readonly number[], status = 'A') =>
  sentence(
    `GNRMC,${clock(r[0]!)},${status},${place(r)},${(SPEED / KNOT_M_S).toFixed(9)},${COURSE.toFixed(9)},010326,,,A`,
  );
const vtg = () =>
  sentence(
    `GNVTG,${COURSE.toFixed(9)},T,,M,${(SPEED / KNOT_M_S).toFixed(9)},N,${(SPEED * 3.6).toFixed(9)},K,A`,
  );
const gst = (r: readonly number[]) => sentence(`GNGST,${clock(r[0]!)},1.5,,,,0.3,0.4,0.9`);
const gsa = (mode: number) => sentence(`GNGSA,A,${mode},05,07,,,,,,,,,,,1.9,0.8,1.7`);
const zda = (r: readonly number[]) => sentence(`GNZDA,${clock(r[0]!)},01,03,2026,00,00`);
const log = (epoch: (r: readonly number[], k: number) => string[], end = '\r\n') =>
  GNSS.flatMap(epoch).join(end) + end;
const spoilt = (text: string) => text.replace(/\*../, '*00').replace(',N,', ',S,');

/** 1e-7 minutes are 3e-11 rad; the clock has hundredths. */
const WRITTEN: Tolerances = { timeS: 1e-6, rad: 1e-10, heightM: 1e-4 };

const DATED: [string, string | Uint8Array][] = [
  ['GGA and RMC', log((r) => [gga(r), rmc(r)])],
  ['RMC before GGA', log((r) => [rmc(r), gga(r)])],
  ['GGA, VTG and a ZDA now and then', log((r, k) => [...(k % 5 === 0 ? [zda(r)] : []), gga(r), vtg()])],
  ['all of GGA, GSA, GST, RMC, VTG, ZDA', log((r) => [gga(r), gsa(3), gst(r), rmc(r), vtg(), zda(r)], '\n')],
  ['sentences of other kinds between', log((r) => [sentence('GPGSV,1,1,00'), gga(r), sentence('PXYZ,1,2,3'), rmc(r)])],
  ['stamps of a logger in front', log((r) => [`[10:00:01.2] ${gga(r)}`, `[10:00:01.3] ${rmc(r)}`])],
  ['two sentences run together', log((r) => [gga(r) + rmc(r)])],
  ['no checksums at all', log((r) => [gga(r), rmc(r)]).replace(/\*../g, '')],
  ['the same epoch twice', log((r) => [gga(r), rmc(r), gga(r), rmc(r)])],
  ['gzip', gzipSync(log((r) => [gga(r), rmc(r)]))],
]; // prettier-ignore

test.each(DATED)('NMEA: %s', async (_, gnss) => {
  const result = ready(await decodeLogs(at.store, { imu: UTC_IMU, gnss }));
  expect(result.timeOrigin.utc).toBe('2026-03-01T10:00:00.000Z');
  const { columns } = await loadRecording(at.store, 'rec');
  expectSameImu(columns, 0, { timeS: 1e-6 });
  expectSamePositions(columns, 0, WRITTEN);
  expectClose(columns.gnss.velocityNed[0], GNSS.map((row) => row[4]!), 1e-8);
  expectClose(columns.gnss.velocityNed[1], GNSS.map((row) => row[5]!), 1e-8);
}); // prettier-ignore

test('NMEA: accuracies of GST, height only where GSA says the fix is in space', async () => {
  const gnss = log((r, k) => [gga(r), gsa(k === 3 ? 2 : 3), gst(r), rmc(r)]);
  const columns = await decodedLogs(at, { imu: UTC_IMU, gnss });
  expect(columns.gnss.positionSigma.map((axis) => axis[2])).toEqual([0.3, 0.4, 0.9]);
  expect(columns.gnss.heightM[3]).toBeNaN();
  expect(columns.gnss.heightM[4]).toBeCloseTo(40, 3);
});

test('NMEA: damaged sentences drop out, are counted, and falsify nothing', async () => {
  const gnss = log((r, k) => [k % 4 === 1 ? spoilt(gga(r)) : gga(r), k === 6 ? rmc(r).slice(0, 30) : rmc(r)]);
  const result = ready(await decodeLogs(at.store, { imu: UTC_IMU, gnss }));
  expect(result.health.findings).toContainEqual(
    expect.objectContaining({ code: 'damaged-sentences', figure: { value: 5, unit: 'sentences' } }),
  );
  const { columns } = await loadRecording(at.store, 'rec');
  expectClose(columns.gnss.latRad, GNSS.map((row) => row[1]! * RAD_PER_DEG), 1e-10);
  // Where GGA was lost, RMC still gives the place, but no height.
  expect(columns.gnss.heightM[1]).toBeNaN();
}); // prettier-ignore

test('NMEA: empty fields are missing values, not zeros; epochs without a fix are left out', async () => {
  const none = (r: readonly number[]) => [sentence(`GNGGA,${clock(r[0]!)},,,,,0,00,99.9,,,,,,`), sentence(`GNRMC,${clock(r[0]!)},V,,,,,,,010326,,,N`)]; // prettier-ignore
  const gnss = log((r, k) => (k < 5 ? none(r) : [gga(r), rmc(r)]));
  const columns = await decodedLogs(at, { imu: UTC_IMU, gnss });
  expectClose(columns.gnss.timeS, GNSS.slice(5).map((row) => row[0]!), 1e-6);
  expect(Math.min(...columns.gnss.latRad)).toBeGreaterThan(0.8);
}); // prettier-ignore

test('NMEA without a date tells the time of day', async () => {
  const columns = await decodedLogs(at, { imu: CLOCK_IMU, gnss: log((r) => [gga(r)]) });
  expectSameImu(columns, 36_000, { timeS: 1e-6 });
  expectSamePositions(columns, 36_000, WRITTEN);
});

test('NMEA: the day turns at midnight though the date is told only once', async () => {
  const midnight = 1_772_409_599; // 2026-03-01T23:59:59Z
  const late = (t: number) => new Date(Math.round((midnight + t) * 1000)).toISOString();
  const at8 = (t: number) => late(t).slice(11, 22).replaceAll(':', '');
  const epochs = GNSS.map((r, k) => [
    ...(k === 0 ? [sentence(`GNZDA,${at8(r[0]!)},01,03,2026,00,00`)] : []),
    sentence(`GNGGA,${at8(r[0]!)},${place(r)},4,12,0.8,-14.7,M,54.7,M,,`),
  ]);
  const imu = csvText(IMU_HEADER.replace('time_s', 'utc'), IMU.map((row) => [late(row[0]!), ...row.slice(1)]));
  const columns = await decodedLogs(at, { imu, gnss: epochs.flat().join('\n') });
  expectSamePositions(columns, 0, WRITTEN);
}); // prettier-ignore

const trackpoint = (r: readonly number[], extra = '') => `<trkpt lat="${r[1]}" lon="${r[2]}"><ele>${r[3]! - SEPARATION_M}</ele><time>${iso(r[0]!)}</time>${extra}</trkpt>`; // prettier-ignore
const gpx = (points: string) =>
  `<?xml version="1.0" encoding="UTF-8"?>\n<gpx version="1.1" creator="a logger" xmlns="http://www.topografix.com/GPX/1/1">\n<wpt lat="1" lon="2"><name>Quay</name></wpt>\n<trk><name>Drive &amp; back</name><trkseg>\n${points}\n</trkseg></trk></gpx>\n`;
const GEOID = `<geoidheight>${SEPARATION_M}</geoidheight>`;
const MOTION = `<speed>${SPEED}</speed><course>${COURSE}</course>`;
const EXTENDED = `${GEOID}<extensions><tpx:TrackPointExtension xmlns:tpx="urn:x"><tpx:speed>${SPEED}</tpx:speed><tpx:course>${COURSE}</tpx:course></tpx:TrackPointExtension></extensions>`;
const points = (extra: string, between = '\n') => GNSS.map((r) => trackpoint(r, extra)).join(between);

test.each([
  ['version 1.1 with speed in extensions', gpx(points(EXTENDED))],
  ['version 1.0 with speed and course', gpx(points(GEOID + MOTION)).replace('version="1.1"', 'version="1.0"')],
  ['everything in one line', gpx(points(EXTENDED, ''))],
  ['two segments', gpx(points(EXTENDED).replace(/(<trkpt.*\n){5}/, '$&</trkseg><trkseg>'))],
  ['gzip', gzipSync(gpx(points(EXTENDED)))],
])('GPX: %s', async (_, gnss) => {
  const columns = await decodedLogs(at, { imu: UTC_IMU, gnss });
  expectSamePositions(columns, 0, { timeS: 1e-6, heightM: 1e-9 });
  expectClose(columns.gnss.velocityNed[0], GNSS.map((row) => row[4]!), 1e-12);
  expectClose(columns.gnss.velocityNed[1], GNSS.map((row) => row[5]!), 1e-12);
}); // prettier-ignore

test('GPX: heights without a geoid are above sea level and raised', async () => {
  const columns = await decodedLogs(at, { imu: UTC_IMU, gnss: gpx(points('')) });
  // EGM96 at 47.21° N, 14.63° W lies about 55 m above the ellipsoid.
  expect(columns.gnss.heightM[0]! - (40 - SEPARATION_M)).toBeGreaterThan(50);
  expect(columns.gnss.heightM[0]! - (40 - SEPARATION_M)).toBeLessThan(60);
});

test('GPX: points without a fix or without a time are left out', async () => {
  const some = GNSS.map((r, k) => (k === 2 ? `<trkpt lat="${r[1]}" lon="${r[2]}"/>` : trackpoint(r, k === 4 ? '<fix>none</fix>' : '<fix>3d</fix>')));
  const columns = await decodedLogs(at, { imu: UTC_IMU, gnss: gpx(some.join('\n')) });
  expect(columns.gnss.timeS).toHaveLength(GNSS.length - 2);
}); // prettier-ignore

const REFUSED: [string, string, object][] = [
  ['NMEA with every checksum wrong', log((r) => [spoilt(gga(r)), spoilt(rmc(r))]), { code: 'nmea-damaged', line: 1 }],
  ['NMEA without one fix', log((r) => [gga([r[0]!, 0, 0, 0], 0)]), { code: 'no-fix' }],
  ['GPX of a plan without times', gpx(GNSS.map((r) => `<trkpt lat="${r[1]}" lon="${r[2]}"/>`).join('')), { code: 'gpx-no-time' }],
  ['GPX without a track', gpx(''), { code: 'gpx-no-time' }],
  ['GPX whose track point never ends', gpx(`${points('')}<trkpt lat="1" lon="2">${'<x/>'.repeat(80_000)}`).replace(/<\/trkseg>.*$/s, ''), { code: 'gpx-damaged' }],
  ['a latitude beyond the pole', gpx(points('').replace('47.210006', '147.21')), { code: 'position-absurd' }],
  ['text in a latitude', gpx(points('').replace('47.210006', 'north')), { code: 'not-a-number', line: 11 }],
]; // prettier-ignore

test.each(REFUSED)('refused: %s', async (_, gnss, problem) => {
  const imu = gnss.startsWith('$') && !gnss.includes('RMC') ? CLOCK_IMU : UTC_IMU;
  const result = await decodeLogs(at.store, { imu, gnss });
  expect(result).toMatchObject({ outcome: 'rejected', problems: [{ file: 'gnss', ...problem }] });
  if (result.outcome === 'rejected') expect(result.problems[0]!.remedy.length).toBeGreaterThan(20);
});

test('sentences among the rows of an IMU’s table: one log for both', async () => {
  const rows = PLAIN_IMU.trimEnd().split('\n');
  const imu = rows.flatMap((row, k) => (k % 20 === 1 ? [gga(GNSS[(k - 1) / 20]!), row] : [row])).join('\n');
  const channelMap: ChannelMap = {
    gnss: {
      time: { columns: ['time_of_day'], base: 'time-of-day', offsetS: -36_000, stamp: 'end' },
      position: {
        lat: 'latitude_deg',
        lon: 'longitude_deg',
        height: 'height_ellipsoid_m',
        unit: 'deg',
        heightUnit: 'm',
        heightDatum: 'ellipsoid',
      },
    },
  };
  const columns = await decodedLogs(at, { imu }, { channelMap });
  expectSameImu(columns);
  expectSamePositions(columns, 0, WRITTEN);
});

test('an NMEA log in the place of the IMU is not taken for one', async () => {
  const result = await decodeLogs(at.store, { imu: log((r) => [gga(r), rmc(r)]), gnss: PLAIN_IMU });
  expect(result).toMatchObject({ outcome: 'needs-mapping' });
  expect(result.outcome !== 'ready' && result.problems.map(({ code }) => code)).toContain('columns-missing');
});
