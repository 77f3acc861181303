/** An IMU's log by itself: no fault, good for its noise. */
import { loadRecording } from '@/workers/recordings/load';
import { csvText, decodeLogs, IMU_HEADER, imuRows, ready, testStore, type TestStore } from '../support';

let at: TestStore;
beforeEach(() => {
  at = testStore();
});
afterEach(() => at.remove());

test('it is decoded, says that there is no GNSS, and loads with empty fixes', async () => {
  const result = ready(await decodeLogs(at.store, { imu: csvText(IMU_HEADER, imuRows()) }));
  expect(result.health.gnss).toMatchObject({ epochs: 0, rateHz: 0, hasVelocity: false });
  expect(result.health.findings.map(({ code }) => code)).toContain('no-gnss');
  expect(result.health.verdict).toBe('with-care');
  expect(result.health.overlapS).toEqual([0, 0]);
  expect(result.channelMap.gnss).toBeUndefined();
  const { columns } = await loadRecording(at.store, 'rec');
  expect(columns.imu.timeS).toHaveLength(300);
  expect(columns.gnss.timeS).toHaveLength(0);
});

test('a log that names a latitude is not taken for one', async () => {
  const rows = imuRows().map((row) => [...row, 47.21]);
  const result = await decodeLogs(at.store, { imu: csvText(`${IMU_HEADER},lat_deg`, rows) });
  expect(result.outcome).toBe('needs-mapping');
});
