/** The curves on the bench: what is coming in, what a newer run has not reached yet, and the baseline's ghost. */
import type { FrameColumn, FrameTable } from '@/shared/contracts/frames';
import type { RunSummary } from '@/shared/contracts/runs';
import type { RunData } from '@/hooks/live/run-data';
import { columnSeries, lowerBound, type TimeSeries } from '@/shared/charts/model/series';

export interface Curves {
  current: RunData | null;
  /** The run before, drawn faint where `current` has not come yet. */
  previous: RunData | null;
  ghost: RunData | null;
}

/** What the charts read at each drawing; they are made once and never hold data themselves. */
export interface CurvesSource {
  curves: () => Curves;
  summary: () => RunSummary | null;
}

/** A column of a run as a series, times `factor`; null where the run has no such rows. */
export function seriesOf<T extends FrameTable>(
  data: RunData | null,
  table: T,
  column: FrameColumn<T>,
  factor = 1,
): TimeSeries | null {
  if (!data) return null;
  const { length } = data.table(table);
  if (length === 0) return null;
  return columnSeries(data.column(table, 'time_s'), data.column(table, column), length, factor);
}

/** A series of the rows of `data` worked out by `at`. */
export function derivedSeries(
  data: RunData | null,
  table: FrameTable,
  make: (data: RunData) => (row: number) => number,
): TimeSeries | null {
  if (!data) return null;
  const { length, columns } = data.table(table);
  if (length === 0) return null;
  return { length, time: columns.time_s!, at: make(data) };
}

/** The rows of `series` for which `keep` holds; others read NaN. */
export function filtered(series: TimeSeries | null, keep: (row: number) => boolean): TimeSeries | null {
  return series && { ...series, at: (row) => (keep(row) ? series.at(row) : NaN) };
}

/** Row of the state nearest before `timeS`, or −1. */
export function stateRowAt(data: RunData, timeS: number): number {
  const { length, columns } = data.table('state');
  const row = lowerBound(columns.time_s!, length, timeS);
  return row < length && columns.time_s![row] === timeS ? row : row - 1;
}
