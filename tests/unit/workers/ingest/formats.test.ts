/** Tables as loggers, spreadsheets and power cuts leave them: each lands on its clean twin, or is refused by name. */
import { gzipSync } from 'node:zlib';
import { csvText, decodeLogs, GNSS_HEADER, IMU_HEADER, ready, testStore, type TestStore } from '../support';
import { decodedLogs, expectSameGnss, expectSameImu, GNSS, IMU, PLAIN_GNSS, PLAIN_IMU } from './twin';

jest.setTimeout(60_000);

let at: TestStore;
beforeAll(() => {
  at = testStore();
});
afterAll(() => at.remove());

const [, ...ROWS] = PLAIN_IMU.trimEnd().split('\n');
const half = ROWS.length / 2;
const padded = (row: readonly (number | string)[]) => row.map((cell) => String(cell).padStart(26)).join('');
const PREAMBLE = 'Logger 7, firmware 2.1\nDrive of the harbour crawler\nRange: 16 g\n\n';
const UNITS = 's,rad/s,rad/s,rad/s,m/s^2,m/s^2,m/s^2';

const WAYS: [string, string | Uint8Array][] = [
  ['lines of prose before the header', PREAMBLE + PLAIN_IMU],
  ['prose, and semicolons', PREAMBLE + PLAIN_IMU.replaceAll(',', ';')],
  ['a spreadsheet’s separator line', `sep=;\r\n${PLAIN_IMU.replaceAll(',', ';').replaceAll('\n', '\r\n')}`],
  ['columns aligned by blanks', `${padded(IMU_HEADER.split(','))}\n${IMU.map(padded).join('\n')}\n`],
  ['one blank between columns', PLAIN_IMU.replaceAll(',', ' ')],
  ['bars between columns', PLAIN_IMU.replaceAll(',', '|')],
  ['decimal commas in quotes between commas', csvText(IMU_HEADER, IMU.map((row) => row.map((v) => `"${String(v).replace('.', ',')}"`)))],
  ['decimal commas and tabs', PLAIN_IMU.replaceAll(',', '\t').replaceAll('.', ',')],
  ['the header again in the middle', [IMU_HEADER, ...ROWS.slice(0, half), IMU_HEADER, ...ROWS.slice(half)].join('\n')],
  ['header and units again in the middle', ['time,gyro_x,gyro_y,gyro_z,accel_x,accel_y,accel_z', UNITS, ...ROWS.slice(0, half), 'time,gyro_x,gyro_y,gyro_z,accel_x,accel_y,accel_z', UNITS, ...ROWS.slice(half)].join('\n')],
  ['empty columns, one in front without a name', csvText(`,time_s,,${IMU_HEADER.slice(7)},,`, IMU.map((row, k) => [k, row[0]!, '', ...row.slice(1), '', '']))],
  ['the same name over two columns', csvText(`${IMU_HEADER},time_s`, IMU.map((row) => [...row, 7]))],
  ['comments with slashes', `// unit 7\n${PLAIN_IMU.replace('\n0.5,', '\n// half a second\n0.5,')}`],
  ['blanks around every cell', PLAIN_IMU.replaceAll(',', ' , ')],
  ['rows shorter by empty columns at the end', csvText(`${IMU_HEADER},note,mark`, IMU)],
  ['zeros that a power cut left at the end', Buffer.concat([Buffer.from(PLAIN_IMU), Buffer.alloc(100_000)])],
  ['UTF-16 without a byte-order mark', Buffer.from(PLAIN_IMU, 'utf16le')],
  ['gzip of tabs with CRLF', gzipSync(PLAIN_IMU.replaceAll(',', '\t').replaceAll('\n', '\r\n'))],
  ['gzip in two members', Buffer.concat([gzipSync(PLAIN_IMU.slice(0, 5000)), gzipSync(PLAIN_IMU.slice(5000))])],
  ['rows of zeros before the sensor starts', csvText(IMU_HEADER, [[-0.02, 0, 0, 0, 0, 0, 0], [-0.01, 0, 0, 0, 0, 0, 0], ...IMU])],
  ['exponents', csvText(IMU_HEADER, IMU.map((row) => row.map((v) => v.toExponential())))],
  ['signs in front', PLAIN_IMU.replace(/(^|,)(\d)/gm, '$1+$2')],
]; // prettier-ignore

test.each(WAYS)('%s', async (_, imu) => {
  const columns = await decodedLogs(at, { imu, gnss: PLAIN_GNSS });
  expectSameImu(columns);
  expectSameGnss(columns);
});

test('headers in capitals with the unit of a power: [rad s^-1]', async () => {
  const header = '#timestamp [ns],w_RS_S_x [rad s^-1],w_RS_S_y [rad s^-1],w_RS_S_z [rad s^-1],a_RS_S_x [m s^-2],a_RS_S_y [m s^-2],a_RS_S_z [m s^-2]';
  const imu = csvText(header, IMU.map((row) => [Math.round(row[0]! * 1e9), ...row.slice(1)]));
  expectSameImu(await decodedLogs(at, { imu, gnss: PLAIN_GNSS }));
}); // prettier-ignore

const NAMED: [string, string, number][] = [
  [
    'axes numbered as an array, the rate’s unit cut short',
    'timestamp,gyro_rad[0],gyro_rad[1],gyro_rad[2],gyro_integral_dt,accelerometer_m_s2[0],accelerometer_m_s2[1],accelerometer_m_s2[2]',
    1e6,
  ],
  [
    'fields of a message, the header behind a percent sign',
    '%time,field.angular_velocity.x,field.angular_velocity.y,field.angular_velocity.z,field.angular_velocity_covariance0,field.linear_acceleration.x,field.linear_acceleration.y,field.linear_acceleration.z',
    1e9,
  ],
  ['words of one letter and a counter', 'TimeUS,GyrX,GyrY,GyrZ,I,AccX,AccY,AccZ', 1e6],
  ['body rates by their letters', 't_us,p (rad/s),q (rad/s),r (rad/s),n,ax,ay,az', 1e6],
];

test.each(NAMED)('headers: %s', async (_, header, ticks) => {
  const rows = IMU.map((row) => [Math.round(row[0]! * ticks), ...row.slice(1, 4), 0, ...row.slice(4)]);
  expectSameImu(await decodedLogs(at, { imu: csvText(header, rows), gnss: PLAIN_GNSS }));
});

test('seven columns without a header: gravity tells the sensors apart, and that is said', async () => {
  const imu = ROWS.join('\n');
  const result = ready(await decodeLogs(at.store, { imu, gnss: PLAIN_GNSS }));
  expect(
    result.health.findings.some(({ sentence }) => sentence.includes('columns 2 to 4 are taken for the gyro')),
  ).toBe(true);
  expectSameImu(await decodedLogs(at, { imu, gnss: PLAIN_GNSS }));
});

test('fixes as a receiver’s message holds them: 10⁻⁷ degrees, mm, mm/s, ms of the week', async () => {
  const gnss = csvText(
    'iTOW,lon,lat,height,hMSL,hAcc,vAcc,velN,velE,velD,gSpeed,sAcc',
    GNSS.map((r) => [
      r[0]! * 1000,
      Math.round(r[2]! * 1e7),
      Math.round(r[1]! * 1e7),
      r[3]! * 1000,
      0,
      1500,
      2500,
      ...r.slice(4).map((v) => Math.round(v * 1000)),
      860,
      120,
    ]),
  );
  const columns = await decodedLogs(at, { imu: PLAIN_IMU, gnss });
  expectSameGnss(columns, 0, { rad: 1e-9 });
  expect(columns.gnss.positionSigma.map((axis) => axis[2])).toEqual([1.5, 1.5, 2.5]);
  expect(columns.gnss.velocitySigma[0][2]).toBe(0.12);
});

test('two clocks without a common start: the refusal names the offset that would bring them together', async () => {
  const gnss = csvText(
    GNSS_HEADER,
    GNSS.map((r) => [r[0]! + 677.5, ...r.slice(1)]),
  );
  const result = await decodeLogs(at.store, { imu: PLAIN_IMU, gnss });
  expect(result).toMatchObject({ outcome: 'rejected', problems: [{ code: 'no-overlap', file: 'gnss' }] });
  if (result.outcome === 'rejected') expect(result.problems[0]!.remedy).toContain('-677.5 s');
});

test('a path in the name of a file leads nowhere else in the store', async () => {
  const names = { imu: '../../../../etc/imu.csv', gnss: '..\\gnss.csv' };
  const result = ready(await decodeLogs(at.store, { imu: PLAIN_IMU, gnss: PLAIN_GNSS }, { names }));
  expect(result.outcome).toBe('ready');
  expect((await at.store.list('recordings/')).every((key) => key.startsWith('recordings/rec/'))).toBe(true);
});

test('a log that breaks off in its last line loses that line and says so', async () => {
  const cut = `${PLAIN_IMU}3.00,0.1e`;
  const result = ready(await decodeLogs(at.store, { imu: cut, gnss: PLAIN_GNSS }));
  expect(result.health.imu.samples).toBe(IMU.length);
  expect(result.health.findings).toContainEqual(
    expect.objectContaining({ code: 'cut-off', severity: 'warn', figure: { value: 302, unit: 'line' } }),
  );
});

/** A stream of gzip that names columns for ever would fill the memory if it were read to its end. */
const wide = (columns: number) => {
  const part = 'c,'.repeat(500_000);
  return gzipSync(`time_s,${part.repeat(columns / 500_000)}\n0\n1\n`);
};

const REFUSED: [string, string | Uint8Array, object][] = [
  ['ten million columns', wide(10_000_000), { code: 'too-many-columns', line: 1 }],
  ['XML that is no track', '<?xml version="1.0"?><kml><Document/></kml>', { code: 'xml-unknown', line: 1 }],
  ['a web page in place of the log', '<html><body>Sign in</body></html>', { code: 'xml-unknown' }],
  ['text in the middle of the last whole line', `${PLAIN_IMU}3.00,x,0,0,0,0,-9.81\n`, { code: 'not-a-number', line: 302, column: 'gyro_x_rad_s' }],
]; // prettier-ignore

test.each(REFUSED)('refused: %s', async (_, imu, problem) => {
  const result = await decodeLogs(at.store, { imu, gnss: PLAIN_GNSS });
  expect(result).toMatchObject({ outcome: 'rejected', problems: [{ file: 'imu', ...problem }] });
  if (result.outcome !== 'rejected') return;
  expect(result.problems[0]!.remedy.length).toBeGreaterThan(20);
  expect(await at.store.list('recordings/rec/imu')).toEqual([]);
});

test('fixes with decimal commas, quotes and a units row', async () => {
  const rows = GNSS.map((row) => row.map((value) => `"${String(value).replace('.', ',')}"`));
  const header = 'Time;Latitude;Longitude;Height;V North;V East;V Down';
  const units = 's;deg;deg;m;m/s;m/s;m/s';
  const gnss = [header, units, ...rows.map((row) => row.join(';'))].join('\r\n');
  expectSameGnss(await decodedLogs(at, { imu: PLAIN_IMU, gnss }));
});
