/** The GNSS-only track: what the team has without an IMU. Computed once when a recording is decoded, thinned when asked for. */
import type { BaselineTrack, BaselineTrackJob } from '../protocol';
import { readTable, writeTable, type Columns } from '../recordings/arrow-file';
import { TRACK_COLUMNS } from '../recordings/files';
import { notDecoded } from '../recordings/load';
import { storeKeys, type Store } from '../store/types';
import type { JobHelpers } from './helpers';
import { strideFor, strideRows } from './thinning';

export async function baselineTrack(job: BaselineTrackJob, helpers: JobHelpers): Promise<BaselineTrack> {
  const key = storeKeys.gnssOnly(job.recordingId);
  if (!(await helpers.store.has(key))) throw notDecoded();
  const { columns, rows } = await readTable(helpers.store, key);
  const kept = strideRows(0, rows, strideFor(rows, job.points), true);
  const pick = (name: (typeof TRACK_COLUMNS)[number]) => kept.map((row) => columns[name]![row]!);
  return { timeS: pick('time_s'), latDeg: pick('lat_deg'), lonDeg: pick('lon_deg') };
}

/** `gnss`: columns as GNSS_COLUMNS. */
export async function writeBaselineTrack(store: Store, recordingId: string, gnss: Columns): Promise<void> {
  await writeTable(store, storeKeys.gnssOnly(recordingId), trackOf(gnss));
}

/** Fixes with a position. */
function trackOf(gnss: Columns): Columns {
  const rows = Array.from(gnss.time_s!.keys()).filter(
    (i) => !Number.isNaN(gnss.lat_deg![i]! + gnss.lon_deg![i]!),
  );
  return Object.fromEntries(
    TRACK_COLUMNS.map((name) => [name, Float64Array.from(rows, (i) => gnss[name]![i]!)]),
  );
}
