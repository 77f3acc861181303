/** Where a recording is at rest, and the longest part of a stretch without a gap. */
import { defaultParameters } from '@/shared/contracts/parameters';
import { findStaticStretch } from '../engine/alignment/static-stretch';
import { prepareFixes } from '../engine/filter/fixes';
import { medianSpacing } from '../engine/strapdown/imu-intervals';
import type { RecordingColumns } from '../engine/types';
import type { JobHelpers } from './helpers';

/** Rows of the IMU, both included. */
export interface Rows {
  from: number;
  to: number;
}

/** Shorter ones show nothing but white noise, s. */
const LEAST_S = 5;
/** Where a search found nothing the next begins this much later, s. */
const STEP_S = 1;
const MOST_STRETCHES = 50;

/** The longest first. */
export async function stretchesAtRest(columns: RecordingColumns, helpers: JobHelpers): Promise<Rows[]> {
  const { timeS } = columns.imu;
  const fixes = prepareFixes(columns.gnss, defaultParameters().gnss);
  const step = Math.max(1, Math.round(STEP_S / medianSpacing(timeS)));
  const found: Rows[] = [];
  for (let row = 0; row < timeS.length;) {
    const stretch = findStaticStretch(columns.imu, fixes, row);
    if (stretch && stretch.durationS >= LEAST_S) found.push({ from: stretch.from, to: stretch.to });
    row = stretch ? stretch.to + step : row + step;
    await helpers.breathe();
  }
  const length = ({ from, to }: Rows) => timeS[to]! - timeS[from]!;
  return found.sort((a, b) => length(b) - length(a)).slice(0, MOST_STRETCHES);
}

/** The longest part of `rows` in which no interval is longer than one and a half times the median. */
export function steadyPart(timeS: Float64Array, { from, to }: Rows): Rows {
  const limit = 1.5 * medianSpacing(timeS);
  let best: Rows = { from, to: from };
  let start = from;
  for (let row = from + 1; row <= to + 1; row += 1) {
    if (row <= to && timeS[row]! - timeS[row - 1]! <= limit) continue;
    if (row - 1 - start > best.to - best.from) best = { from: start, to: row - 1 };
    start = row;
  }
  return best;
}
