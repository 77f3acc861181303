/** The GNSS-only track: what the team has without an IMU. Computed once when a recording is decoded, thinned when asked for. */
import { radToDeg } from '@/shared/units';
import { gnssOnlyTrack } from '../engine/gnss-only';
import type { BaselineTrack, BaselineTrackJob } from '../protocol';
import { readTable, writeTable, type Columns } from '../recordings/arrow-file';
import { type TRACK_COLUMNS } from '../recordings/files';
import { gnssColumns, notDecoded } from '../recordings/load';
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

/** The filter works on general matrices, a few thousand fixes a second: of longer logs every n-th fix is taken. */
const MAX_FIXES = 8000;

/** Filters the fixes of a recording that is just being decoded and keeps the track at the fixes' times. */
export async function writeBaselineTrack(store: Store, recordingId: string, gnss: Columns): Promise<void> {
  const stride = strideFor(gnss.time_s!.length, MAX_FIXES);
  const thinned = Object.entries(gnss).map(([name, values]) => [
    name,
    values.filter((_, i) => i % stride === 0),
  ]);
  const track = gnssOnlyTrack(gnssColumns(Object.fromEntries(thinned) as Columns));
  const columns: Record<(typeof TRACK_COLUMNS)[number], Float64Array> = {
    time_s: track.timeS,
    lat_deg: track.latRad.map(radToDeg),
    lon_deg: track.lonRad.map(radToDeg),
    height_m: track.heightM,
  };
  await writeTable(store, storeKeys.gnssOnly(recordingId), columns);
}
