import type { SeriesChannel } from '@/shared/contracts/recordings';
import { recordingSeries } from '@/workers/jobs/recording-series';
import {
  csvText,
  decodeLogs,
  GNSS_HEADER,
  gnssRows,
  IMU_HEADER,
  imuRows,
  testHelpers,
  testStore,
  type TestStore,
} from '../support';

jest.setTimeout(60_000);

let at: TestStore;
const SPIKE = 41.5;

/** 100 s at 100 Hz with one sample that stands out. */
beforeAll(async () => {
  at = testStore();
  const imu = imuRows(10_000);
  imu[6789]![4] = SPIKE;
  await decodeLogs(at.store, { imu: csvText(IMU_HEADER, imu), gnss: csvText(GNSS_HEADER, gnssRows(500)) });
});
afterAll(() => at.remove());

const series = async (channels: SeriesChannel[], points: number, fromS: number | null = null, toS: number | null = null) =>
  (await recordingSeries({ kind: 'recording-series', recordingId: 'rec', channels, fromS, toS, points }, testHelpers(at.store)))
    .channels; // prettier-ignore

test('a spike of one sample is kept however few points are asked for', async () => {
  const [channel] = await series(['accel_x'], 40);
  expect(channel).toMatchObject({ name: 'accel_x', unit: 'm/s²' });
  expect(channel!.timeS.length).toBeLessThanOrEqual(42);
  expect(channel!.values).toContain(SPIKE);
  expect(channel!.timeS[channel!.values.indexOf(SPIKE)]).toBe(67.89);
  expect(channel!.timeS).toEqual([...channel!.timeS].sort((a, b) => a - b));
});

test('a short stretch comes sample by sample, in display units', async () => {
  const [channel] = await series(['gyro_z'], 200, 1, 1.5);
  expect(channel!.timeS).toHaveLength(51);
  expect(channel!.unit).toBe('°/s');
  expect(channel!.values[0]).toBeCloseTo(((0.1 + 0.003 * Math.sin(100 / 3)) * 180) / Math.PI, 9);
});

test('positions are metres north and east of the first fix', async () => {
  const [north, east] = await series(['gnss_north', 'gnss_east'], 10_000);
  expect(north!.values[0]).toBe(0);
  // 1e-6° of latitude are 0.1112 m here, 2e-6° of longitude 0.1517 m.
  expect(north!.values[100]).toBeCloseTo(11.12, 1);
  expect(east!.values[100]).toBeCloseTo(15.17, 1);
});

test('what is missing is null', async () => {
  const gnss = csvText('time_s,lat_deg,lon_deg', gnssRows(20).map((row) => row.slice(0, 3))); // prettier-ignore
  await decodeLogs(at.store, { imu: csvText(IMU_HEADER, imuRows()), gnss }, { recordingId: 'bare' });
  const job = { kind: 'recording-series' as const, recordingId: 'bare', fromS: null, toS: null, points: 100 };
  const { channels } = await recordingSeries(
    { ...job, channels: ['gnss_vn', 'gnss_height'] },
    testHelpers(at.store),
  );
  expect(new Set(channels.flatMap((channel) => channel.values))).toEqual(new Set([null]));
});
