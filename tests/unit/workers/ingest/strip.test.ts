import {
  csvText,
  decodeLogs,
  GNSS_HEADER,
  IMU_HEADER,
  imuRows,
  ready,
  testStore,
  type TestStore,
} from '../support';

let at: TestStore;
beforeEach(() => {
  at = testStore();
});
afterEach(() => at.remove());

/** One fix a second, 10 m/s and more, over a minute of 100 Hz; none from 20 to 40 s. */
const fixes = Array.from({ length: 60 }, (_, k) => [k, 47.21 + k * 9e-5, -14.63, 40, 10 + k / 10, 0, 0]);

test('speed is drawn through between neighbouring fixes and left open where GNSS was away', async () => {
  const gnss = csvText(
    GNSS_HEADER,
    fixes.filter(([time]) => time! < 20 || time! > 40),
  );
  const { strip } = ready(await decodeLogs(at.store, { imu: csvText(IMU_HEADER, imuRows(6000)), gnss }));
  const bucketOf = (timeS: number) =>
    Math.floor(((timeS - strip.startS) / (strip.endS - strip.startS)) * strip.speedMPerS.length);
  const within = (from: number, to: number) => strip.speedMPerS.slice(bucketOf(from), bucketOf(to));
  expect(within(0, 18).every((speed) => speed !== null)).toBe(true);
  expect(strip.speedMPerS[bucketOf(10.55)]).toBeCloseTo(11.05, 1);
  expect(within(22, 39).every((speed) => speed === null)).toBe(true);
});
