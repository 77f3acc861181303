/** Channels of a decoded recording for plots: of every bucket of time the lowest and the highest value are kept. */
import { SERIES_CHANNELS, type Series, type SeriesChannel } from '@/shared/contracts/recordings';
import { radToDeg } from '@/shared/units';
import { nedOffset } from '../engine/geodesy';
import type { RecordingColumns } from '../engine/types';
import type { RecordingSeriesJob } from '../protocol';
import type { JobHelpers } from './helpers';
import { firstAfter, firstAtLeast } from './time-rows';

interface Channel {
  time: Float64Array;
  /** In the unit that SERIES_CHANNELS names. */
  value(row: number): number;
}

export async function recordingSeries(job: RecordingSeriesJob, helpers: JobHelpers): Promise<Series> {
  const { columns } = await helpers.recordings.load(job.recordingId);
  return seriesOf(columns, job, helpers);
}

/** The channels that `job` names, thinned. */
export async function seriesOf(
  columns: RecordingColumns,
  job: Pick<RecordingSeriesJob, 'channels' | 'fromS' | 'toS' | 'points'>,
  helpers: Pick<JobHelpers, 'breathe'>,
): Promise<Series> {
  const channels: Series['channels'] = [];
  for (const name of job.channels) {
    channels.push({ name, unit: SERIES_CHANNELS[name], ...decimated(channelOf(columns, name), job) });
    await helpers.breathe();
  }
  return { channels };
}

function channelOf({ imu, gnss }: RecordingColumns, name: SeriesChannel): Channel {
  const axis = 'xyz'.indexOf(name.at(-1)!);
  if (name.startsWith('gyro')) return scaled(imu.timeS, imu.gyro[axis]!, radToDeg, perSecond(imu));
  if (name.startsWith('accel')) return scaled(imu.timeS, imu.accel[axis]!, (si) => si, perSecond(imu));
  if (name === 'gnss_height') return { time: gnss.timeS, value: (row) => gnss.heightM[row]! };
  if (name === 'gnss_north' || name === 'gnss_east') return localChannel(gnss, name === 'gnss_north' ? 0 : 1);
  const component = { gnss_vn: 0, gnss_ve: 1, gnss_vd: 2 }[name as 'gnss_vn' | 'gnss_ve' | 'gnss_vd'];
  return { time: gnss.timeS, value: (row) => gnss.velocityNed[component]![row]! };
}

const scaled = (
  time: Float64Array,
  values: Float64Array,
  convert: (si: number) => number,
  rate: (row: number) => number,
): Channel => ({ time, value: (row) => convert(values[row]! * rate(row)) });

/** Factor that turns an increment into a mean rate; 1 for rates. */
function perSecond({ timeS, sampling }: RecordingColumns['imu']): (row: number) => number {
  if (sampling !== 'increment') return () => 1;
  return (row) => {
    const at = Math.max(1, row);
    return 1 / (timeS[at]! - timeS[at - 1]!);
  };
}

/** North or east of the first fix, m. */
function localChannel(gnss: RecordingColumns['gnss'], axis: 0 | 1): Channel {
  const first = gnss.latRad.findIndex((lat, i) => !Number.isNaN(lat + gnss.lonRad[i]!));
  const [lat0, lon0] = [gnss.latRad[first]!, gnss.lonRad[first]!];
  const height0 = gnss.heightM[first]! || 0;
  const offset = new Float64Array(3);
  return {
    time: gnss.timeS,
    value: (row) =>
      nedOffset(lat0, lon0, height0, gnss.latRad[row]!, gnss.lonRad[row]!, height0, offset)[axis]!,
  };
}

/** About `points` samples, each with its own time: lowest and highest of every bucket, in the order they came. */
function decimated(
  channel: Channel,
  { fromS, toS, points }: Pick<RecordingSeriesJob, 'fromS' | 'toS' | 'points'>,
): { timeS: number[]; values: (number | null)[] } {
  const { time } = channel;
  const from = fromS === null ? 0 : firstAtLeast(time, fromS);
  const to = toS === null ? time.length : firstAfter(time, toS);
  const bucket = Math.max(1, Math.ceil((2 * (to - from)) / points));
  const rows: number[] = [];
  for (let start = from; start < to; start += bucket)
    rows.push(
      ...(bucket <= 2
        ? allRows(start, Math.min(to, start + bucket))
        : extremes(channel, start, Math.min(to, start + bucket))),
    );
  const shown = (row: number) => {
    const value = channel.value(row);
    return Number.isNaN(value) ? null : value;
  };
  return { timeS: rows.map((row) => time[row]!), values: rows.map(shown) };
}

const allRows = (from: number, to: number) => Array.from({ length: to - from }, (_, i) => from + i);

function extremes(channel: Channel, from: number, to: number): number[] {
  let [low, high] = [from, from];
  let [lowest, highest] = [channel.value(from), channel.value(from)];
  for (let row = from + 1; row < to; row += 1) {
    const value = channel.value(row);
    if (value < lowest || Number.isNaN(lowest)) [low, lowest] = [row, value];
    if (value > highest || Number.isNaN(highest)) [high, highest] = [row, value];
  }
  return low === high ? [low] : [Math.min(low, high), Math.max(low, high)];
}
