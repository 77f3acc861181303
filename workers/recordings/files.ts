/** The decoded files of a recording: which columns each holds, and the note that says that they are complete. */
import type { AidKind } from './aids';
import { storeKeys, StoreKeyMissing, type Store } from '../store/types';

export const IMU_COLUMNS = [
  'time_s', 'gyro_x_rad_s', 'gyro_y_rad_s', 'gyro_z_rad_s', 'accel_x_m_s2', 'accel_y_m_s2', 'accel_z_m_s2',
] as const; // prettier-ignore
/** NaN where the receiver gave none. */
export const GNSS_COLUMNS = [
  'time_s', 'lat_deg', 'lon_deg', 'height_m', 'vn_m_s', 've_m_s', 'vd_m_s',
  'sigma_n_m', 'sigma_e_m', 'sigma_d_m', 'sigma_vn_m_s', 'sigma_ve_m_s', 'sigma_vd_m_s',
] as const; // prettier-ignore
export const REFERENCE_COLUMNS = [
  'time_s', 'lat_deg', 'lon_deg', 'height_m', 'vn_m_s', 've_m_s', 'vd_m_s', 'roll_deg', 'pitch_deg', 'yaw_deg',
] as const; // prettier-ignore
export const TRACK_COLUMNS = ['time_s', 'lat_deg', 'lon_deg', 'height_m'] as const;

/** Name of the entry in the IMU file's metadata that holds its `ImuSampling`. */
export const SAMPLING_KEY = 'sampling';

/** Written under storeKeys.decoded when all decoded files are in place. */
export interface DecodedNote {
  /** Over the decoded channel files, in the order IMU, GNSS, reference, barometer, heading, odometer. */
  sha256: string;
  hasReference: boolean;
  /** Which of barometer, heading and odometer there are; left out: none. */
  aids?: AidKind[];
}

export async function writeDecodedNote(store: Store, recordingId: string, note: DecodedNote): Promise<void> {
  await store.put(storeKeys.decoded(recordingId), Buffer.from(JSON.stringify(note)));
}

/** Null where the recording is not decoded. */
export async function readDecodedNote(store: Store, recordingId: string): Promise<DecodedNote | null> {
  try {
    const bytes = await store.bytes(storeKeys.decoded(recordingId));
    return JSON.parse(Buffer.from(bytes).toString('utf8')) as DecodedNote;
  } catch (error) {
    if (error instanceof StoreKeyMissing) return null;
    throw error;
  }
}
