/** A decoded recording of a vehicle at rest, written straight into a store: quick to make at any length. */
import { defaultParameters } from '@/shared/contracts/parameters';
import type { RunJob } from '@/workers/protocol';
import { writeTable } from '@/workers/recordings/arrow-file';
import { GNSS_COLUMNS, IMU_COLUMNS, writeDecodedNote } from '@/workers/recordings/files';
import { storeKeys, type Store } from '@/workers/store/types';

export async function writeStaticRecording(
  store: Store,
  recordingId: string,
  seconds: number,
): Promise<void> {
  const imuValues = [NaN, 0, 0, 5e-5, 0.02, -0.03, -9.8085];
  const imu = IMU_COLUMNS.map((name, column) => [
    name,
    Float64Array.from({ length: seconds * 100 }, (_, k) =>
      column === 0 ? k / 100 : imuValues[column]! + 1e-3 * Math.sin(k * (0.3 + column)),
    ),
  ]);
  const gnssValues = [NaN, 47.21, -14.63, 40, 0, 0, 0, 1.5, 1.5, 2.5, 0.1, 0.1, 0.15];
  const gnss = GNSS_COLUMNS.map((name, column) => [
    name,
    Float64Array.from({ length: seconds }, (_, k) => (column === 0 ? k : gnssValues[column]!)),
  ]);
  await writeTable(store, storeKeys.imu(recordingId), Object.fromEntries(imu));
  await writeTable(store, storeKeys.gnss(recordingId), Object.fromEntries(gnss));
  await writeDecodedNote(store, recordingId, { sha256: `hash of ${recordingId}`, hasReference: false });
}

export function runOf(recordingId: string, runId: string, changes: Partial<RunJob> = {}): RunJob {
  const parameters = defaultParameters();
  parameters.initial.headingDeg = 35;
  return {
    kind: 'run',
    runId,
    recordingId,
    parameters,
    leverArmM: [0, 0, 0],
    outages: [],
    outputRateHz: 10,
    smooth: false,
    errorBudget: false,
    framePoints: 500,
    ...changes,
  };
}
