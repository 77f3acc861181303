/** The small logs of fixtures/ that no other test reads: each goes in as it is. */
import { LOGS, type LogName } from '@/fixtures/logs';
import type { FileRole } from '@/shared/contracts/recordings';
import { loadRecording } from '@/workers/recordings/load';
import { decodeLogs, ready, testStore, type TestStore } from '../support';

let at: TestStore;
beforeAll(() => {
  at = testStore();
});
afterAll(() => at.remove());

const UPLOADS: [string, Partial<Record<FileRole, LogName>>, number][] = [
  ['gyro and accelerometer apart', { imu: 'imu-gyro-alone.csv', imu2: 'imu-accel-alone.csv', gnss: 'gnss-plain.csv' }, 0],
  ['one log for both', { imu: 'merged.csv' }, 0],
  ['NMEA', { imu: 'imu-absolute.csv', gnss: 'gnss-sentences.nmea' }, 0],
  ['GPX', { imu: 'imu-absolute.csv', gnss: 'gnss-track.gpx' }, 0],
  ['a barometer', { imu: 'imu-plain.csv', gnss: 'gnss-plain.csv', aids: 'barometer.csv' }, 6],
]; // prettier-ignore

test.each(UPLOADS)('%s', async (_, names, barometerReadings) => {
  const logs = Object.fromEntries(Object.entries(names).map(([role, name]) => [role, LOGS[name]]));
  const result = ready(await decodeLogs(at.store, logs));
  expect(result.health.imu.samples).toBe(11);
  expect(result.health.gnss.epochs).toBe(6);
  const { columns } = await loadRecording(at.store, 'rec');
  expect(columns.gnss.latRad[0]! * (180 / Math.PI)).toBeCloseTo(47.21, 7);
  expect(columns.imu.accel[2][4]).toBeCloseTo(-9.79, 9);
  expect(columns.aids?.barometer?.heightM.length ?? 0).toBe(barometerReadings);
});
