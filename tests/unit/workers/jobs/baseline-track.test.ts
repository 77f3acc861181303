import { baselineTrack } from '@/workers/jobs/baseline-track';
import { JobFailed } from '@/workers/protocol';
import {
  cleanLogs,
  csvText,
  decodeLogs,
  GNSS_HEADER,
  gnssRows,
  testHelpers,
  testStore,
  type TestStore,
} from '../support';

jest.setTimeout(60_000);

let at: TestStore;
beforeEach(() => {
  at = testStore();
});
afterEach(() => at.remove());

const job = { kind: 'baseline-track' as const, recordingId: 'rec' };

test('the track follows the fixes and is thinned to what was asked for', async () => {
  const rows = gnssRows();
  await decodeLogs(at.store, { ...cleanLogs(), gnss: csvText(GNSS_HEADER, rows) });

  const whole = await baselineTrack({ ...job, points: 100 }, testHelpers(at.store));
  const thinned = await baselineTrack({ ...job, points: 5 }, testHelpers(at.store));

  expect(whole.timeS).toEqual(rows.map((row) => row[0]));
  // 1e-5° are about a metre: the filter smooths the fixes by less than that.
  whole.latDeg.forEach((lat, i) => expect(Math.abs(lat - rows[i]![1]!)).toBeLessThan(1e-5));
  whole.lonDeg.forEach((lon, i) => expect(Math.abs(lon - rows[i]![2]!)).toBeLessThan(1e-5));
  expect(thinned.timeS).toEqual([0, 0.6, 1.2, 1.8, 2.4, 2.8]);
});

test('a recording that is not decoded has none', async () => {
  await expect(baselineTrack({ ...job, points: 5 }, testHelpers(at.store))).rejects.toBeInstanceOf(JobFailed);
});
