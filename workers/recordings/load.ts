/** Loads a decoded recording as the engine wants it: radians, columns that are views on the file where Arrow allows. */
import { RAD_PER_DEG } from '@/shared/units';
import type {
  GnssColumns,
  ImuColumns,
  ImuSampling,
  RecordingColumns,
  ReferenceColumns,
} from '../engine/types';
import { JobFailed } from '../protocol';
import { storeKeys, type Store } from '../store/types';
import { aidColumns, type AidKind } from './aids';
import { readTable, type ArrowTable, type Columns } from './arrow-file';
import { readDecodedNote, SAMPLING_KEY } from './files';

export interface LoadedRecording {
  columns: RecordingColumns;
  /** Over the decoded channel files. */
  sha256: string;
  bytes: number;
}

/** Throws JobFailed where the recording is not decoded. */
export async function loadRecording(store: Store, recordingId: string): Promise<LoadedRecording> {
  const note = await readDecodedNote(store, recordingId);
  if (!note) throw notDecoded();
  const [imu, gnss, reference] = await Promise.all([
    readTable(store, storeKeys.imu(recordingId)),
    readTable(store, storeKeys.gnss(recordingId)),
    note.hasReference ? readTable(store, storeKeys.reference(recordingId)) : null,
  ]);
  const aids = await readAids(store, recordingId, note.aids ?? []);
  const sampling = (imu.metadata.get(SAMPLING_KEY) ?? 'mean-rate') as ImuSampling;
  const columns: RecordingColumns = {
    imu: imuColumns(imu.columns, sampling),
    gnss: gnssColumns(gnss.columns),
    reference: reference ? referenceColumns(reference.columns) : null,
    aids: aidColumns(Object.fromEntries(aids.map(({ kind, table }) => [kind, table.columns]))),
  };
  const tables = [imu, gnss, reference, ...aids.map(({ table }) => table)].flatMap((table) => table ?? []);
  const values = tables.reduce((sum, table) => sum + table.rows * Object.keys(table.columns).length, 0);
  return { columns, sha256: note.sha256, bytes: values * 8 };
}

const readAids = (store: Store, recordingId: string, kinds: readonly AidKind[]) =>
  Promise.all(
    kinds.map(async (kind): Promise<{ kind: AidKind; table: ArrowTable }> => ({
      kind,
      table: await readTable(store, storeKeys.aid(recordingId, kind)),
    })),
  );

export const notDecoded = () =>
  new JobFailed('not-decoded', 'The recording has not been decoded. Look at its problems on its page.');

const imuColumns = (c: Columns, sampling: ImuSampling): ImuColumns => ({
  timeS: c.time_s!,
  gyro: [c.gyro_x_rad_s!, c.gyro_y_rad_s!, c.gyro_z_rad_s!],
  accel: [c.accel_x_m_s2!, c.accel_y_m_s2!, c.accel_z_m_s2!],
  sampling,
});

/** Columns of gnss.arrow as the engine wants them. */
export const gnssColumns = (c: Columns): GnssColumns => ({
  timeS: c.time_s!,
  latRad: radians(c.lat_deg!),
  lonRad: radians(c.lon_deg!),
  heightM: c.height_m!,
  velocityNed: [c.vn_m_s!, c.ve_m_s!, c.vd_m_s!],
  positionSigma: [c.sigma_n_m!, c.sigma_e_m!, c.sigma_d_m!],
  velocitySigma: [c.sigma_vn_m_s!, c.sigma_ve_m_s!, c.sigma_vd_m_s!],
});

const referenceColumns = (c: Columns): ReferenceColumns => ({
  timeS: c.time_s!,
  latRad: radians(c.lat_deg!),
  lonRad: radians(c.lon_deg!),
  heightM: c.height_m!,
  velocityNed: [c.vn_m_s!, c.ve_m_s!, c.vd_m_s!],
  attitude: [radians(c.roll_deg!), radians(c.pitch_deg!), radians(c.yaw_deg!)],
});

const radians = (degrees: Float64Array) => degrees.map((value) => value * RAD_PER_DEG);
