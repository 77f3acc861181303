/** One physical drive written in many ways: every one lands on the same columns as its plain twin. */
import { gzipSync } from 'node:zlib';
import type { ChannelMap } from '@/shared/contracts/recordings';
import type { AxisMap } from '@/shared/contracts/vehicles';
import { KNOT_M_S, RAD_PER_DEG, STANDARD_GRAVITY_M_S2 } from '@/shared/units';
import type { RecordingColumns } from '@/workers/engine/types';
import { loadRecording } from '@/workers/recordings/load';
import {
  csvText,
  decodeLogs,
  GNSS_HEADER,
  gnssRows,
  IMU_HEADER,
  imuRows,
  ready,
  testStore,
  type TestStore,
} from '../support';

jest.setTimeout(60_000);

let at: TestStore;
let plain: RecordingColumns;
const IMU = imuRows();
const GNSS = gnssRows();
const PLAIN_IMU = csvText(IMU_HEADER, IMU);
const PLAIN_GNSS = csvText(GNSS_HEADER, GNSS);
const UNIX_S = 1_772_359_200;

beforeAll(async () => {
  at = testStore();
  plain = await decoded(PLAIN_IMU, PLAIN_GNSS);
});
afterAll(() => at.remove());

async function decoded(
  imu: string | Uint8Array,
  gnss: string | Uint8Array,
  options: { channelMap?: ChannelMap; axes?: AxisMap } = {},
): Promise<RecordingColumns> {
  ready(await decodeLogs(at.store, { imu, gnss }, options));
  return (await loadRecording(at.store, 'rec')).columns;
}

function expectClose(actual: Float64Array, expected: Float64Array, tolerance: number): void {
  expect(actual).toHaveLength(expected.length);
  const worst = actual.reduce((most, value, i) => Math.max(most, Math.abs(value - expected[i]!)), 0);
  expect(worst).toBeLessThanOrEqual(tolerance);
}

function expectSameImu(actual: RecordingColumns, shiftS = 0): void {
  expectClose(
    actual.imu.timeS,
    plain.imu.timeS.map((t) => t + shiftS),
    1e-9,
  );
  // Rounding of a unit there and back: a few units in the last place of 10.
  for (let i = 0; i < 3; i += 1) {
    expectClose(actual.imu.gyro[i]!, plain.imu.gyro[i]!, 1e-14);
    expectClose(actual.imu.accel[i]!, plain.imu.accel[i]!, 1e-13);
  }
}

function expectSameGnss(actual: RecordingColumns, shiftS = 0): void {
  expectClose(
    actual.gnss.timeS,
    plain.gnss.timeS.map((t) => t + shiftS),
    1e-9,
  );
  // 1e-15 rad are 6 nm.
  expectClose(actual.gnss.latRad, plain.gnss.latRad, 1e-15);
  expectClose(actual.gnss.lonRad, plain.gnss.lonRad, 1e-15);
  expectClose(actual.gnss.heightM, plain.gnss.heightM, 1e-9);
  for (let i = 0; i < 3; i += 1) expectClose(actual.gnss.velocityNed[i]!, plain.gnss.velocityNed[i]!, 1e-12);
}

const gyro = (row: number[], factor: number) => row.slice(1, 4).map((value) => value / factor);
const accel = (row: number[], factor: number) => row.slice(4, 7).map((value) => value / factor);
const imuIn = (time: (t: number) => number | string, gyroUnit: number, accelUnit: number) =>
  IMU.map((row) => [time(row[0]!), ...gyro(row, gyroUnit), ...accel(row, accelUnit)]);
const asIs = (t: number) => t;

const IMU_WAYS: [string, string | Uint8Array][] = [
  ['°/s and g', csvText('time_s,gyro_x_deg_s,gyro_y_deg_s,gyro_z_deg_s,accel_x_g,accel_y_g,accel_z_g', imuIn(asIs, RAD_PER_DEG, STANDARD_GRAVITY_M_S2))],
  ['°/h and mg', csvText('time_s,gyro_x_deg_h,gyro_y_deg_h,gyro_z_deg_h,accel_x_mg,accel_y_mg,accel_z_mg', imuIn(asIs, RAD_PER_DEG / 3600, STANDARD_GRAVITY_M_S2 / 1000))],
  ['brackets, blanks, capitals', csvText('Time (s),Gyro X (deg/s),Gyro Y (deg/s),Gyro Z (deg/s),Accel X (g),Accel Y (g),Accel Z (g)', imuIn(asIs, RAD_PER_DEG, STANDARD_GRAVITY_M_S2))],
  ['square brackets and signs', csvText('Time [s],Gyro X [°/s],Gyro Y [°/s],Gyro Z [°/s],Acc X [m/s²],Acc Y [m/s²],Acc Z [m/s²]', imuIn(asIs, RAD_PER_DEG, 1))],
  ['a degree sign in Latin-1', Buffer.from(csvText('t,Gyro X (°/s),Gyro Y (°/s),Gyro Z (°/s),Acc X (g),Acc Y (g),Acc Z (g)', imuIn(asIs, RAD_PER_DEG, STANDARD_GRAVITY_M_S2)), 'latin1')],
  ['t, wx and ax', csvText('t,wx,wy,wz,ax,ay,az', imuIn(asIs, 1, 1))],
  ['t, gx and ax', csvText('t,gx,gy,gz,ax,ay,az', imuIn(asIs, 1, 1))],
  ['dps and g without more', csvText('timestamp_ms,gx_dps,gy_dps,gz_dps,ax_g,ay_g,az_g', imuIn((t) => t * 1000, RAD_PER_DEG, STANDARD_GRAVITY_M_S2))],
  ['g told by the values alone', csvText('time,gyrX (deg/s),gyrY (deg/s),gyrZ (deg/s),accX,accY,accZ', imuIn(asIs, RAD_PER_DEG, STANDARD_GRAVITY_M_S2))],
  ['camel case', csvText('timeMs,gyroX,gyroY,gyroZ,accelX,accelY,accelZ', imuIn((t) => t * 1000, 1, 1))],
  ['long names', csvText('timestamp,angular_velocity_x,angular_velocity_y,angular_velocity_z,linear_acceleration_x,linear_acceleration_y,linear_acceleration_z', imuIn(asIs, 1, 1))],
  ['the device in the names', csvText('imu_time_s,imu_gyro_x_rad_s,imu_gyro_y_rad_s,imu_gyro_z_rad_s,imu_acc_x_mps2,imu_acc_y_mps2,imu_acc_z_mps2', imuIn(asIs, 1, 1))],
  ['microseconds', csvText('time_us,wx_rad_s,wy_rad_s,wz_rad_s,ax_m_s2,ay_m_s2,az_m_s2', imuIn((t) => Math.round(t * 1e6), 1, 1))],
  ['nanoseconds', csvText('time (ns),wx,wy,wz,ax,ay,az', imuIn((t) => Math.round(t * 1e9), 1, 1))],
  ['a counter without a unit', csvText('SampleTime,Gyr_X,Gyr_Y,Gyr_Z,Acc_X,Acc_Y,Acc_Z', imuIn((t) => Math.round(t * 1e6), 1, 1))],
  ['semicolons', csvText(IMU_HEADER, IMU).replaceAll(',', ';')],
  ['semicolons and decimal commas', csvText(IMU_HEADER, IMU).replaceAll(',', ';').replaceAll('.', ',')],
  ['tabs', csvText(IMU_HEADER, IMU).replaceAll(',', '\t')],
  ['CRLF, byte-order mark', `\uFEFF${PLAIN_IMU.replaceAll('\n', '\r\n')}`],
  ['old line ends', PLAIN_IMU.replaceAll('\n', '\r')],
  ['UTF-16', Buffer.from(`\uFEFF${PLAIN_IMU}`, 'utf16le')],
  ['comments before and between', `# unit 7\n% slip 2\n\n${PLAIN_IMU.replace('\n0.5,', '\n# half a second\n\n0.5,')}`],
  ['the header in a comment', `# ${PLAIN_IMU}`],
  ['a row of units', csvText('time,gyro_x,gyro_y,gyro_z,accel_x,accel_y,accel_z', [['s', 'deg/s', 'deg/s', 'deg/s', 'g', 'g', 'g'], ...imuIn(asIs, RAD_PER_DEG, STANDARD_GRAVITY_M_S2)])],
  ['a delimiter at the end', PLAIN_IMU.replaceAll('\n', ',\n')],
  ['quotes around everything', PLAIN_IMU.replace(/[^,\n]+/g, '"$&"')],
  ['other columns with text and line breaks', csvText(`${IMU_HEADER},message`, IMU.map((row) => [...row, '"ok, all\nwell"']))],
  ['another order', csvText('accel_z_m_s2,time_s,gyro_z_rad_s,accel_x_m_s2,gyro_x_rad_s,accel_y_m_s2,gyro_y_rad_s', IMU.map((r) => [r[6]!, r[0]!, r[3]!, r[4]!, r[1]!, r[5]!, r[2]!]))],
  ['gzip', gzipSync(PLAIN_IMU)],
  ['no end of line at the end', PLAIN_IMU.trimEnd()],
  ['exact duplicates', csvText(IMU_HEADER, IMU.flatMap((row, k) => (k % 50 === 7 ? [row, row] : [row])))],
]; // prettier-ignore

test.each(IMU_WAYS)('IMU: %s', async (_, imu) => {
  expectSameImu(await decoded(imu, PLAIN_GNSS));
});

const [vn, ve, vd] = [4, 5, 6];
const speed = Math.hypot(0.5, 0.7);
const course = Math.atan2(0.7, 0.5) / RAD_PER_DEG;
const GNSS_WAYS: [string, string | Uint8Array][] = [
  ['plain names', csvText('t,latitude,longitude,height,vel_n,vel_e,vel_d', GNSS)],
  ['east, north, up', csvText('time_s,lat,lon,height_m,ve_m_s,vn_m_s,vu_m_s', GNSS.map((r) => [...r.slice(0, 4), r[ve]!, r[vn]!, -r[vd]!]))],
  ['km/h', csvText('Time (s),Lat (deg),Lng (deg),Altitude (m),V North (km/h),V East (km/h),V Down (km/h)', GNSS.map((r) => [...r.slice(0, 4), ...r.slice(4).map((v) => v * 3.6)]))],
  ['millimetres', csvText('time_s,lat_deg,lon_deg,height_mm,velN_mm_s,velE_mm_s,velD_mm_s', GNSS.map((r) => [...r.slice(0, 3), r[3]! * 1000, ...r.slice(4).map((v) => v * 1000)]))],
  ['radians', csvText('time_s,lat_rad,lon_rad,height_m,vn_m_s,ve_m_s,vd_m_s', GNSS.map((r) => [r[0]!, r[1]! * RAD_PER_DEG, r[2]! * RAD_PER_DEG, ...r.slice(3)]))],
  ['longitudes from 0 to 360', csvText(GNSS_HEADER, GNSS.map((r) => [r[0]!, r[1]!, r[2]! + 360, ...r.slice(3)])).replaceAll('345.37000000000000', '345.37')],
  ['rows out of order', csvText(GNSS_HEADER, [...GNSS.slice(0, 3), GNSS[4]!, GNSS[3]!, ...GNSS.slice(5)])],
  ['rows without a fix', csvText(`${GNSS_HEADER},fix`, [[-1, 0, 0, 0, 0, 0, 0, 0], ...GNSS.slice(0, 4).map((r) => [...r, 4]), [0.7, 47, -14, 0, 9, 9, 9, 0], ...GNSS.slice(4).map((r) => [...r, 1])])],
  ['position and velocity on rows of their own', csvText(GNSS_HEADER, GNSS.flatMap((r) => [[...r.slice(0, 4), '', '', ''], [r[0]!, '', '', '', ...r.slice(4)]]))],
  ['gzip', gzipSync(PLAIN_GNSS)],
]; // prettier-ignore

test.each(GNSS_WAYS)('GNSS: %s', async (way, gnss) => {
  const columns = await decoded(PLAIN_IMU, gnss);
  if (way !== 'longitudes from 0 to 360') return expectSameGnss(columns);
  expectClose(columns.gnss.lonRad, plain.gnss.lonRad, 1e-13);
});

test('GNSS: speed and course give the horizontal velocity', async () => {
  const rows = GNSS.map((r) => [...r.slice(0, 4), speed / KNOT_M_S, course]);
  const { gnss } = await decoded(PLAIN_IMU, csvText('time_s,lat,lon,height_m,sog_kn,cog_deg', rows));
  expectClose(gnss.velocityNed[0], plain.gnss.velocityNed[0], 1e-12);
  expectClose(gnss.velocityNed[1], plain.gnss.velocityNed[1], 1e-12);
  expect([...gnss.velocityNed[2]]).toEqual(GNSS.map(() => NaN));
});

test('GNSS: σ of each axis, or one horizontal and one vertical', async () => {
  const axes = csvText(
    `${GNSS_HEADER},sigma_n_m,sigma_e_m,sigma_d_m,sigma_vn_m_s,sigma_ve_m_s,sigma_vd_m_s`,
    GNSS.map((r) => [...r, 1, 2, 3, 0.1, 0.2, 0.3]),
  );
  const pair = csvText(
    `${GNSS_HEADER},hAcc (mm),vAcc (mm),sAcc (mm/s)`,
    GNSS.map((r) => [...r, 1500, 2500, 0]),
  );

  const one = (await decoded(PLAIN_IMU, axes)).gnss;
  const two = (await decoded(PLAIN_IMU, pair)).gnss;

  expect(one.positionSigma.map((axis) => axis[3])).toEqual([1, 2, 3]);
  expect(one.velocitySigma.map((axis) => axis[3])).toEqual([0.1, 0.2, 0.3]);
  expect(two.positionSigma.map((axis) => axis[3])).toEqual([1.5, 1.5, 2.5]);
  expect(two.velocitySigma.map((axis) => axis[3])).toEqual([NaN, NaN, NaN]);
});

test('GNSS: heights above sea level are raised by the geoid', async () => {
  const { gnss } = await decoded(PLAIN_IMU, PLAIN_GNSS.replace('height_m', 'altitude_msl_m'));
  // EGM96 undulation at 47.21° N, 14.63° W: about 55 m.
  const raised = gnss.heightM.map((height, i) => height - plain.gnss.heightM[i]!);
  expect(Math.min(...raised)).toBeGreaterThan(50);
  expect(Math.max(...raised)).toBeLessThan(60);
});

const iso = (t: number) => new Date((UNIX_S + t) * 1000).toISOString();
const withTime = (rows: number[][], time: (t: number) => number | string) =>
  rows.map((row) => [time(row[0]!), ...row.slice(1)]);
const ABSOLUTE: [string, string, (t: number) => number | string][] = [
  ['UNIX seconds', 'time_s', (t) => (UNIX_S + t).toFixed(3)],
  ['UNIX milliseconds', 'timestamp_ms', (t) => Math.round((UNIX_S + t) * 1000)],
  ['UNIX nanoseconds, beyond what a number can hold', 'time_ns', (t) => `${UNIX_S + Math.floor(t)}${String(Math.round((t % 1) * 1e9)).padStart(9, '0')}`],
  ['ISO 8601', 'time_utc', iso],
  ['ISO 8601 with a zone', 'datetime', (t) => iso(t + 7200).replace('Z', '+02:00')],
]; // prettier-ignore

test.each(ABSOLUTE)(
  'absolute times: %s count from a whole second and keep their digits',
  async (_, name, time) => {
    const imu = csvText(
      IMU_HEADER.replace('time_s', name),
      withTime(IMU, (t) => time(t + 0.25)),
    );
    const gnss = csvText(
      GNSS_HEADER.replace('time_s', name),
      withTime(GNSS, (t) => time(t + 0.25)),
    );

    const result = ready(await decodeLogs(at.store, { imu, gnss }));

    expect(result.timeOrigin).toMatchObject({
      sourceS: UNIX_S,
      utc: '2026-03-01T10:00:00.000Z',
      gpsWeek: 2408,
    });
    // Sunday, 18 leap seconds ahead of UTC.
    expect(result.timeOrigin.gpsTowS).toBe(36_018);
    const { columns } = await loadRecording(at.store, 'rec');
    expectSameImu(columns, 0.25);
    expectSameGnss(columns, 0.25);
  },
);

test('absolute times: GPS week and seconds beside UTC land on one axis', async () => {
  const header = IMU_HEADER.replace('time_s', 'gps_week,tow_s');
  const imu = csvText(
    header,
    IMU.map((row) => [2408, (36_018 + row[0]!).toFixed(3), ...row.slice(1)]),
  );
  const gnss = csvText(GNSS_HEADER.replace('time_s', 'time_utc'), withTime(GNSS, iso));

  const result = ready(await decodeLogs(at.store, { imu, gnss }));

  expect(result.timeOrigin).toEqual({
    sourceS: 2408 * 604_800 + 36_018,
    utc: '2026-03-01T10:00:00.000Z',
    gpsWeek: 2408,
    gpsTowS: 36_018,
  });
  const { columns } = await loadRecording(at.store, 'rec');
  expectSameImu(columns);
  expectSameGnss(columns);
});

test('seconds and nanoseconds in two columns, IMU and GNSS merged in one file', async () => {
  const header = 'stamp_sec_gps,stamp_nanosec_gps,stamp_sec_imu,stamp_nanosec_imu,latitude,longitude,height_m,wx,wy,wz,ax,ay,az';
  const split = (t: number) => [UNIX_S + Math.floor(t), Math.round((t % 1) * 1e9)];
  const rows = [
    ...IMU.map((r) => ({ t: r[0]!, row: ['', '', ...split(r[0]!), '', '', '', ...r.slice(1)] })),
    ...GNSS.map((r) => ({ t: r[0]!, row: [...split(r[0]!), '', '', ...r.slice(1, 4), '', '', '', '', '', ''] })),
  ].sort((a, b) => a.t - b.t);
  const merged = csvText(header, rows.map(({ row }) => row));

  const result = ready(await decodeLogs(at.store, { imu: merged, gnss: merged }));

  const { columns } = await loadRecording(at.store, 'rec');
  expectSameImu(columns);
  expectClose(columns.gnss.timeS, plain.gnss.timeS, 1e-9);
  expectClose(columns.gnss.latRad, plain.gnss.latRad, 1e-15);
  expect(result.health.findings.map((finding) => finding.code)).not.toContain('incomplete-rows');
}); // prettier-ignore

const AXES: [string, AxisMap, (v: number[]) => number[]][] = [
  ['forward, left, up', { forward: '+x', right: '-y', down: '-z' }, ([x, y, z]) => [x!, -y!, -z!]],
  ['right, forward, up', { forward: '+y', right: '+x', down: '-z' }, ([x, y, z]) => [y!, x!, -z!]],
  ['down, forward, right', { forward: '+y', right: '+z', down: '+x' }, ([x, y, z]) => [z!, x!, y!]],
];

test.each(AXES)('a sensor mounted %s is turned into body axes', async (_, axes, mount) => {
  const rows = IMU.map((row) => [row[0]!, ...mount(row.slice(1, 4)), ...mount(row.slice(4, 7))]);
  expectSameImu(await decoded(csvText(IMU_HEADER, rows), PLAIN_GNSS, { axes }));
});

const MAP: NonNullable<ChannelMap['imu']> = {
  time: { columns: ['c1'], base: 's', offsetS: 0, stamp: 'end' },
  gyro: { columns: ['c2', 'c3', 'c4'], unit: 'rad/s' },
  accel: { columns: ['c5', 'c6', 'c7'], unit: 'm/s^2', sign: 'specific-force' },
  sampling: 'mean-rate',
};
const CODED = 'c1,c2,c3,c4,c5,c6,c7';
const changed = (part: Partial<typeof MAP>): ChannelMap => ({ imu: { ...MAP, ...part } });

test('a channel map says what headers do not; what it leaves out is guessed', async () => {
  expectSameImu(await decoded(csvText(CODED, IMU), PLAIN_GNSS, { channelMap: { imu: MAP } }));
});

test('a channel map names columns of a file without header', async () => {
  const numbered = (n: number) => `column ${n}`;
  const channelMap = changed({
    time: { ...MAP.time, columns: [numbered(1)] },
    gyro: { columns: [numbered(2), numbered(3), numbered(4)], unit: 'rad/s' },
    accel: { columns: [numbered(5), numbered(6), numbered(7)], unit: 'm/s^2', sign: 'specific-force' },
  });
  expectSameImu(await decoded(PLAIN_IMU.slice(PLAIN_IMU.indexOf('\n') + 1), PLAIN_GNSS, { channelMap }));
});

test('an accelerometer that shows gravity instead of specific force is turned round', async () => {
  const rows = IMU.map((row) => [...row.slice(0, 4), ...accel(row, -1)]);
  const channelMap = changed({ accel: { ...MAP.accel, sign: 'opposite' } });
  expectSameImu(await decoded(csvText(CODED, rows), PLAIN_GNSS, { channelMap }));
});

test('a stated offset moves the stamps, and the zero of the source with them', async () => {
  const rows = IMU.map((row) => [row[0]! + 100, ...row.slice(1)]);
  const channelMap = changed({ time: { ...MAP.time, offsetS: -100 } });
  const result = ready(
    await decodeLogs(at.store, { imu: csvText(CODED, rows), gnss: PLAIN_GNSS }, { channelMap }),
  );
  expect(result.timeOrigin.sourceS).toBe(100);
  expectSameImu((await loadRecording(at.store, 'rec')).columns);
});

test.each([['start', 0.01], ['middle', 0.005]] as const)('stamps at the %s of the interval move to its end', async (stamp, shift) => {
  const channelMap = changed({ time: { ...MAP.time, stamp } });
  expectSameImu(await decoded(csvText(CODED, IMU), PLAIN_GNSS, { channelMap }), shift);
}); // prettier-ignore

test('increments stay increments, in rad and m/s', async () => {
  const rows = IMU.map((row) => [row[0]!, ...gyro(row, RAD_PER_DEG / 0.01), ...accel(row, 100)]);
  const header = 'time_s,dtheta_x_deg,dtheta_y_deg,dtheta_z_deg,dv_x_m_s,dv_y_m_s,dv_z_m_s';
  const { imu } = await decoded(csvText(header, rows), PLAIN_GNSS);
  expect(imu.sampling).toBe('increment');
  expectClose(
    imu.gyro[2],
    plain.imu.gyro[2].map((value) => value / 100),
    1e-15,
  );
  expectClose(
    imu.accel[2],
    plain.imu.accel[2].map((value) => value / 100),
    1e-15,
  );
});
