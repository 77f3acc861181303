/** Units, signs, axes and places in every notation land on the same physical series as the clean twin. */
import type { ChannelMap } from '@/shared/contracts/recordings';
import { RAD_PER_DEG, STANDARD_GRAVITY_M_S2 } from '@/shared/units';
import { geodeticToEcef } from '@/workers/engine/geodesy';
import { csvText, decodeLogs, GNSS_HEADER, IMU_HEADER, testStore, type TestStore } from '../support';
import {
  decodedLogs, expectClose, expectSameGnss, expectSameImu, expectSamePositions, GNSS, IMU, PLAIN_GNSS, PLAIN_IMU, type Tolerances,
} from './twin'; // prettier-ignore

jest.setTimeout(60_000);

let at: TestStore;
beforeAll(() => {
  at = testStore();
});
afterAll(() => at.remove());

const MAP: NonNullable<ChannelMap['imu']> = {
  time: { columns: ['time_s'], base: 's', offsetS: 0, stamp: 'end' },
  gyro: { columns: ['gyro_x_rad_s', 'gyro_y_rad_s', 'gyro_z_rad_s'], unit: 'rad/s' },
  accel: { columns: ['accel_x_m_s2', 'accel_y_m_s2', 'accel_z_m_s2'], unit: 'm/s^2', sign: 'specific-force' },
  sampling: 'mean-rate',
};
type ImuEdit = (gyro: number[], accel: number[]) => number[];
const imuLog = (edit: ImuEdit) =>
  csvText(
    IMU_HEADER,
    IMU.map((r) => [r[0]!, ...edit(r.slice(1, 4), r.slice(4, 7))]),
  );

/** Sensor readings of a body vector, for a sensor turned by yaw, pitch and roll: the transpose of body ← sensor. */
function mounted([x, y, z]: number[], rollDeg: number, pitchDeg: number, yawDeg: number): number[] {
  const turn = (a: number, b: number, deg: number) => {
    const [c, s] = [Math.cos(deg * RAD_PER_DEG), Math.sin(deg * RAD_PER_DEG)];
    return [c * a + s * b, c * b - s * a] as const;
  };
  const [x1, y1] = turn(x!, y!, yawDeg);
  const [z1, x2] = turn(z!, x1, pitchDeg);
  const [y2, z2] = turn(y1, z1, rollDeg);
  return [x2, y2, z2];
}

const COUNTS = { gyro: RAD_PER_DEG / 16.4, accel: STANDARD_GRAVITY_M_S2 / 2048 };
const IMU_WAYS: [string, ImuEdit, Partial<typeof MAP>][] = [
  ['raw counts of a stated scale', (g, a) => [...g.map((v) => v / COUNTS.gyro), ...a.map((v) => v / COUNTS.accel)], { gyro: { ...MAP.gyro, unit: 'deg/s', scale: 1 / 16.4 }, accel: { ...MAP.accel, unit: 'g', scale: 1 / 2048 } }],
  ['single columns turned round', ([x, y, z], [a, b, c]) => [-x!, y!, -z!, a!, -b!, c!], { gyro: { ...MAP.gyro, signs: [-1, 1, -1] }, accel: { ...MAP.accel, signs: [1, -1, 1] } }],
  ['a left-handed sensor: one axis mirrored for both', ([x, y, z], [a, b, c]) => [x!, -y!, z!, a!, -b!, c!], { gyro: { ...MAP.gyro, signs: [1, -1, 1] }, accel: { ...MAP.accel, signs: [1, -1, 1] } }],
  ['columns in another order', ([x, y, z], [a, b, c]) => [z!, x!, y!, c!, a!, b!], { gyro: { ...MAP.gyro, columns: ['gyro_y_rad_s', 'gyro_z_rad_s', 'gyro_x_rad_s'] }, accel: { ...MAP.accel, columns: ['accel_y_m_s2', 'accel_z_m_s2', 'accel_x_m_s2'] } }],
  ['axes and signs together', ([x, y, z], [a, b, c]) => [x!, -y!, z!, a!, -b!, c!], { axes: { forward: '+x', right: '-y', down: '-z' }, gyro: { ...MAP.gyro, signs: [1, 1, -1] }, accel: { ...MAP.accel, signs: [1, 1, -1] } }],
  ['a measured mounting', (g, a) => [...mounted(g, 2, -3, 25), ...mounted(a, 2, -3, 25)], { mounting: { rollDeg: 2, pitchDeg: -3, yawDeg: 25 } }],
  ['gravity in place of specific force', (g, a) => [...g, ...a.map((v) => -v)], { accel: { ...MAP.accel, sign: 'opposite' } }],
]; // prettier-ignore

test.each(IMU_WAYS)('IMU: %s', async (_, edit, part) => {
  const channelMap = { imu: { ...MAP, ...part } };
  expectSameImu(await decodedLogs(at, { imu: imuLog(edit), gnss: PLAIN_GNSS }, { channelMap }), 0, { imu: 1e-12 });
}); // prettier-ignore

test('increments in ° and g·s become rad and m/s an interval', async () => {
  const edit: ImuEdit = (g, a) => [...g.map((v) => (v / RAD_PER_DEG) * 0.01), ...a.map((v) => (v / STANDARD_GRAVITY_M_S2) * 0.01)]; // prettier-ignore
  const channelMap: ChannelMap = {
    imu: {
      ...MAP,
      gyro: { ...MAP.gyro, unit: 'deg' },
      accel: { ...MAP.accel, unit: 'g*s' },
      sampling: 'increment',
    },
  };
  const { imu } = await decodedLogs(at, { imu: imuLog(edit), gnss: PLAIN_GNSS }, { channelMap });
  expect(imu.sampling).toBe('increment');
  for (let i = 0; i < 3; i += 1) {
    expectClose(imu.gyro[i]!, IMU.map((row) => row[1 + i]! * 0.01), 1e-15);
    expectClose(imu.accel[i]!, IMU.map((row) => row[4 + i]! * 0.01), 1e-14);
  }
}); // prettier-ignore

const ecef = (row: readonly number[]) => [
  ...geodeticToEcef(row[1]! * RAD_PER_DEG, row[2]! * RAD_PER_DEG, row[3]!, new Float64Array(3)),
];
function earthVelocity(row: readonly number[]): number[] {
  const [lat, lon] = [row[1]! * RAD_PER_DEG, row[2]! * RAD_PER_DEG];
  const [n, e, d] = [row[4]!, row[5]!, row[6]!];
  const outward = -Math.sin(lat) * n - Math.cos(lat) * d;
  return [Math.cos(lon) * outward - Math.sin(lon) * e, Math.sin(lon) * outward + Math.cos(lon) * e, Math.cos(lat) * n - Math.sin(lat) * d];
} // prettier-ignore
const minutes = (deg: number, digits: number) =>
  `${String(Math.floor(Math.abs(deg))).padStart(digits, '0')}${((Math.abs(deg) % 1) * 60).toFixed(9).padStart(12, '0')}`;
const sexagesimal = (deg: number) => {
  const seconds = Math.abs(deg) * 3600;
  return `${Math.floor(seconds / 3600)}°${Math.floor((seconds % 3600) / 60)}'${(seconds % 60).toFixed(8)}""`;
};
const gnssLog = (header: string, edit: (row: number[]) => (number | string)[]) => csvText(`time_s,${header}`, GNSS.map((row) => [row[0]!, ...edit(row)])); // prettier-ignore
const REST = 'height_m,vn_m_s,ve_m_s,vd_m_s';

const GNSS_WAYS: [string, string, Tolerances][] = [
  ['degrees and minutes with hemispheres', gnssLog(`lat,ns,lon,ew,${REST}`, (r) => [minutes(r[1]!, 2), 'N', minutes(r[2]!, 3), 'W', ...r.slice(3)]), { rad: 1e-11 }],
  ['degrees and minutes with a letter behind', gnssLog(`lat,lon,${REST}`, (r) => [`${minutes(r[1]!, 2)}N`, `${minutes(r[2]!, 3)}W`, ...r.slice(3)]), { rad: 1e-11 }],
  ['degrees with a letter in front', gnssLog(`lat,lon,${REST}`, (r) => [`N ${r[1]}`, `W ${-r[2]!}`, ...r.slice(3)]), {}],
  ['degrees, minutes and seconds', gnssLog(`lat,lon,${REST}`, (r) => [`"${sexagesimal(r[1]!)}N"`, `"${sexagesimal(r[2]!)}W"`, ...r.slice(3)]), { rad: 1e-11 }],
  ['whole 10⁻⁷ degrees and mm', gnssLog('lat,lon,height_mm,vn_mm_s,ve_mm_s,vd_mm_s', (r) => [Math.round(r[1]! * 1e7), Math.round(r[2]! * 1e7), ...r.slice(3).map((v) => v * 1000)]), { rad: 1e-9 }],
  ['radians that no header names', gnssLog(`lat,lon,${REST}`, (r) => [r[1]! * RAD_PER_DEG, r[2]! * RAD_PER_DEG, ...r.slice(3)]), {}],
  ['Earth-fixed positions and velocities', gnssLog('ecef_x_m,ecef_y_m,ecef_z_m,ecef_vx_m_s,ecef_vy_m_s,ecef_vz_m_s', (r) => [...ecef(r), ...earthVelocity(r)]), { heightM: 1e-8 }],
  ['feet', gnssLog('lat,lon,height_ft,vn_m_s,ve_m_s,vd_m_s', (r) => [r[1]!, r[2]!, r[3]! / 0.3048, ...r.slice(4)]), {}],
  ['speed, course and climb', gnssLog('lat,lon,height_m,speed_m_s,course_deg,climb_m_s', (r) => [...r.slice(1, 4), Math.hypot(r[4]!, r[5]!), Math.atan2(r[5]!, r[4]!) / RAD_PER_DEG, -r[6]!]), {}],
  ['fix words in place of numbers', gnssLog(`lat,lon,${REST},fix_type`, (r) => [...r.slice(1), '3D']), {}],
]; // prettier-ignore

test.each(GNSS_WAYS)('GNSS: %s', async (_, gnss, tolerances) => {
  expectSameGnss(await decodedLogs(at, { imu: PLAIN_IMU, gnss }), 0, tolerances);
});

const north = (k: number) => 47.21 + (2 * k) / 5 / 111_320;
const east = (k: number) => -14.63 + (1 * k) / 5 / (111_320 * Math.cos(47.21 * RAD_PER_DEG));
const FRAMES: [string, number, number, number][] = [['ned', 2, 1, 0.01], ['enu', 1, 2, -0.01]]; // prettier-ignore

test.each(FRAMES)('velocity columns x, y, z are told by the motion to be %s', async (frame, x, y, z) => {
  const rows = Array.from({ length: 40 }, (_, k) => [k / 5, north(k), east(k), 40, x, y, z]);
  const result = await decodeLogs(at.store, { imu: PLAIN_IMU, gnss: csvText('time_s,lat,lon,height_m,vx,vy,vz', rows) });
  expect(result.channelMap?.gnss?.velocity).toMatchObject({ frame, columns: ['vx', 'vy', 'vz'] });
}); // prettier-ignore

test('velocity columns x, y, z of a receiver at rest stay out, and that is said', async () => {
  const rows = GNSS.map((row) => [row[0]!, 47.21, -14.63, 40, 0, 0, 0]);
  const { imu } = { imu: PLAIN_IMU };
  const result = await decodeLogs(at.store, { imu, gnss: csvText('time_s,lat,lon,height_m,vx,vy,vz', rows) });
  expect(result.channelMap?.gnss?.velocity).toBeUndefined();
  expect(result).toMatchObject({ outcome: 'ready', health: { gnss: { hasVelocity: false } } });
  if (result.outcome === 'ready')
    expect(result.health.findings.some(({ sentence }) => sentence.includes('whose axes'))).toBe(true);
});

test('heights above sea level of a map of degrees and minutes are raised by the geoid', async () => {
  const gnss = gnssLog(`lat,ns,lon,ew,altitude_msl_m`, (r) => [minutes(r[1]!, 2), 'N', minutes(r[2]!, 3), 'W', r[3]!]);
  const columns = await decodedLogs(at, { imu: PLAIN_IMU, gnss });
  const raised = columns.gnss.heightM.map((height, i) => height - GNSS[i]![3]!);
  expect(Math.min(...raised)).toBeGreaterThan(50);
  expect(Math.max(...raised)).toBeLessThan(60);
}); // prettier-ignore

test.each([
  ['Earth-fixed places in kilometres', gnssLog('ecef_x,ecef_y,ecef_z', (r) => ecef(r).map((v) => v / 1000)), 'position-absurd'],
  ['a hemisphere that is none', gnssLog('lat,ns,lon,ew', (r) => [minutes(r[1]!, 2), r[0] === 1 ? 'Q' : 'N', minutes(r[2]!, 3), 'W']), 'not-a-number'],
])('refused: %s', async (_, gnss, code) => {
  expect(await decodeLogs(at.store, { imu: PLAIN_IMU, gnss })).toMatchObject({ outcome: 'rejected', problems: [{ code, file: 'gnss' }] });
}); // prettier-ignore

test('the header of the twin is the one that all others are held against', async () => {
  expectSamePositions(await decodedLogs(at, { imu: PLAIN_IMU, gnss: csvText(GNSS_HEADER, GNSS) }));
});
