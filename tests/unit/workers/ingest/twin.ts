/** The clean twin of a small drive, and what it means that another way of writing it landed on the same columns. */
import type { ChannelMap, FileRole } from '@/shared/contracts/recordings';
import type { AxisMap } from '@/shared/contracts/vehicles';
import type { RecordingColumns } from '@/workers/engine/types';
import { loadRecording } from '@/workers/recordings/load';
import { csvText, decodeLogs, GNSS_HEADER, gnssRows, IMU_HEADER, imuRows, ready, type Logs, type TestStore } from '../support'; // prettier-ignore

export const IMU = imuRows();
export const GNSS = gnssRows();
export const PLAIN_IMU = csvText(IMU_HEADER, IMU);
export const PLAIN_GNSS = csvText(GNSS_HEADER, GNSS);
/** 2026-03-01T10:00:00Z, a Sunday: GPS week 2408, second 36018. */
export const UNIX_S = 1_772_359_200;
export const GPS = { week: 2408, towS: 36_018, leapS: 18, epochS: 315_964_800 };

export interface DecodeOptions {
  channelMap?: ChannelMap;
  axes?: AxisMap;
  names?: Partial<Record<FileRole, string>>;
}

/** Decodes by the real job and loads what it stored. */
export async function decodedLogs(at: TestStore, logs: Logs, options: DecodeOptions = {}): Promise<RecordingColumns> {
  ready(await decodeLogs(at.store, logs, options));
  return (await loadRecording(at.store, 'rec')).columns;
} // prettier-ignore

export function expectClose(actual: Float64Array, expected: ArrayLike<number>, tolerance: number): void {
  expect(actual).toHaveLength(expected.length);
  const worst = actual.reduce((most, value, i) => Math.max(most, Math.abs(value - expected[i]!)), 0);
  expect(worst).toBeLessThanOrEqual(tolerance);
}

export interface Tolerances {
  timeS?: number;
  /** rad/s and m/s². */
  imu?: number;
  rad?: number;
  heightM?: number;
  velocity?: number;
}

/** `shiftS`: how much later the stamps lie on the axis. */
export function expectSameImu(actual: RecordingColumns, shiftS = 0, { timeS = 1e-9, imu = 1e-13 }: Tolerances = {}): void {
  expectClose(actual.imu.timeS, IMU.map((row) => row[0]! + shiftS), timeS);
  for (let i = 0; i < 3; i += 1) {
    expectClose(actual.imu.gyro[i]!, IMU.map((row) => row[1 + i]!), imu);
    expectClose(actual.imu.accel[i]!, IMU.map((row) => row[4 + i]!), imu);
  }
} // prettier-ignore

export function expectSamePositions(
  actual: RecordingColumns,
  shiftS = 0,
  { timeS = 1e-9, rad = 1e-15, heightM = 1e-9 }: Tolerances = {},
): void {
  expectClose(actual.gnss.timeS, GNSS.map((row) => row[0]! + shiftS), timeS);
  expectClose(actual.gnss.latRad, GNSS.map((row) => row[1]! * (Math.PI / 180)), rad);
  expectClose(actual.gnss.lonRad, GNSS.map((row) => row[2]! * (Math.PI / 180)), rad);
  expectClose(actual.gnss.heightM, GNSS.map((row) => row[3]!), heightM);
} // prettier-ignore

export function expectSameGnss(actual: RecordingColumns, shiftS = 0, tolerances: Tolerances = {}): void {
  expectSamePositions(actual, shiftS, tolerances);
  for (let i = 0; i < 3; i += 1)
    expectClose(actual.gnss.velocityNed[i]!, GNSS.map((row) => row[4 + i]!), tolerances.velocity ?? 1e-12);
} // prettier-ignore

/** Rows with another way to tell time. */
export const withTime = (rows: readonly number[][], time: (t: number) => (number | string)[]) =>
  rows.map((row) => [...time(row[0]!), ...row.slice(1)]);

export const IMU_VALUES = IMU_HEADER.slice('time_s,'.length);
export const GNSS_VALUES = GNSS_HEADER.slice('time_s,'.length);
