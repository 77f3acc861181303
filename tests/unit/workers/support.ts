/** What tests of the workers share: a throwaway store, helpers for jobs run in this process, small logs as text. */
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import type { ChannelMap, FileRole } from '@/shared/contracts/recordings';
import { IDENTITY_AXES, type AxisMap } from '@/shared/contracts/vehicles';
import { decode } from '@/workers/jobs/decode';
import { createHelpers, type JobHelpers } from '@/workers/jobs/helpers';
import type { DecodeResult, JobEvent } from '@/workers/protocol';
import { RecordingCache } from '@/workers/recordings/cache';
import { FolderStore } from '@/workers/store/folder';
import { storeKeys, type Store } from '@/workers/store/types';

export interface TestStore {
  root: string;
  store: FolderStore;
  remove(): void;
}

export function testStore(): TestStore {
  const root = mkdtempSync(path.join(tmpdir(), 'driftwright-store-'));
  return { root, store: new FolderStore(root), remove: () => rmSync(root, { recursive: true, force: true }) };
}

export interface TestHelpers extends JobHelpers {
  events: JobEvent[];
  abort: AbortController;
}

export function testHelpers(store: Store): TestHelpers {
  const events: JobEvent[] = [];
  const abort = new AbortController();
  const cache = new RecordingCache(store, 1e9);
  return { ...createHelpers(store, cache, abort.signal, (event) => events.push(event)), events, abort };
}

export type Logs = Partial<Record<FileRole, string | Uint8Array>>;

/** Puts the files up as raw uploads and decodes them. */
export async function decodeLogs(
  store: Store,
  logs: Logs,
  options: {
    channelMap?: ChannelMap;
    axes?: AxisMap;
    recordingId?: string;
    helpers?: JobHelpers;
    /** What the uploader's machine calls the files. */
    names?: Partial<Record<FileRole, string>>;
  } = {},
): Promise<DecodeResult> {
  const recordingId = options.recordingId ?? 'rec';
  const files = [];
  for (const [role, content] of Object.entries(logs) as [FileRole, string | Uint8Array][]) {
    const key = storeKeys.raw(recordingId, role);
    await store.put(key, typeof content === 'string' ? Buffer.from(content) : content);
    files.push({ role, name: options.names?.[role] ?? `${role}.csv`, key });
  }
  const job = {
    kind: 'decode' as const,
    recordingId,
    files,
    channelMap: options.channelMap ?? null,
    vehicleAxes: options.axes ?? IDENTITY_AXES,
  };
  return decode(job, options.helpers ?? testHelpers(store));
}

/** The result, which the test expects to be a decoded recording. */
export function ready(result: DecodeResult): Extract<DecodeResult, { outcome: 'ready' }> {
  if (result.outcome !== 'ready')
    throw new Error(`Not decoded: ${result.outcome} ${result.problems.map((p) => p.message).join(' ')}`);
  return result;
}

/** Gyro x y z (rad/s) and accelerometer x y z (m/s²) of a vehicle that turns slowly, at row k of 100 Hz. */
export const imuValues = (k: number): number[] => [
  0.001 * Math.sin(k / 7),
  0.002 * Math.cos(k / 5),
  0.1 + 0.003 * Math.sin(k / 3),
  0.2 * Math.sin(k / 11),
  0.1 * Math.cos(k / 13),
  -9.81 + 0.01 * Math.sin(k / 2),
];

export const IMU_HEADER =
  'time_s,gyro_x_rad_s,gyro_y_rad_s,gyro_z_rad_s,accel_x_m_s2,accel_y_m_s2,accel_z_m_s2';
export const GNSS_HEADER = 'time_s,lat_deg,lon_deg,height_m,vn_m_s,ve_m_s,vd_m_s';

/** 100 Hz IMU rows, 0 … (rows − 1)/100 s. */
export const imuRows = (rows = 300): number[][] =>
  Array.from({ length: rows }, (_, k) => [k / 100, ...imuValues(k)]);
/** 5 Hz fixes of a slow drive north of Kelmar Haven, 0 … (rows − 1)/5 s. */
export const gnssRows = (rows = 15): number[][] =>
  Array.from({ length: rows }, (_, k) => [k / 5, 47.21 + k * 1e-6, -14.63 + k * 2e-6, 40, 0.5, 0.7, 0.01]);

export const csvText = (header: string, rows: readonly (readonly (number | string)[])[]): string =>
  `${header}\n${rows.map((row) => row.join(',')).join('\n')}\n`;

export const cleanLogs = () => ({
  imu: csvText(IMU_HEADER, imuRows()),
  gnss: csvText(GNSS_HEADER, gnssRows()),
});
