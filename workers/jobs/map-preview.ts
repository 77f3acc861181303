/** What a channel map makes of the beginnings of the files: the real decoding, cut short, nothing kept. */
import { SERIES_CHANNELS, type MapPreview, type SeriesChannel } from '@/shared/contracts/recordings';
import type { MapPreviewJob } from '../protocol';
import { loadRecording } from '../recordings/load';
import { ScratchStore } from '../store/scratch';
import { decode } from './decode';
import type { JobHelpers } from './helpers';
import { seriesOf } from './recording-series';

/** Five minutes at 100 Hz: long enough to see a turn. */
const ROWS = 30_000;
const POINTS = 300;
const CHANNELS = (Object.keys(SERIES_CHANNELS) as SeriesChannel[]).filter((name) => !name.startsWith('gnss'));

export async function mapPreview(job: MapPreviewJob, helpers: JobHelpers): Promise<MapPreview> {
  const store = new ScratchStore(helpers.store);
  const result = await decode({ ...job, kind: 'decode' }, { ...helpers, store }, ROWS);
  if (result.outcome !== 'ready')
    return { outcome: result.outcome, problems: result.problems, health: null, series: null };
  const { columns } = await loadRecording(store, job.recordingId);
  const span = { fromS: null, toS: null, points: POINTS };
  const series = await seriesOf(columns, { channels: CHANNELS, ...span }, helpers);
  return { outcome: 'ready', problems: [], health: result.health, series };
}
