/** Layers that several of the bench's charts are made of. */
import { axisDash } from '@/constants/theme';
import type { FrameColumn, FrameTable } from '@/shared/contracts/frames';
import type { BandLayer, ChartTone, Layer, LineLayer } from '@/shared/charts/model/layers';
import { absoluteQuantile, valueExtent, type TimeSeries } from '@/shared/charts/model/series';
import type { RunData } from '@/hooks/live/run-data';
import { seriesOf, type Curves, type CurvesSource } from './curves';

export interface AxisSpec {
  /** Part of ids. */
  key: string;
  label: string;
  tone: Extract<ChartTone, 'north' | 'east' | 'down'>;
}
/** North, east, down: solid, dashed, dotted. */
export const NED: readonly AxisSpec[] = [
  { key: 'n', label: 'N', tone: 'north' },
  { key: 'e', label: 'E', tone: 'east' },
  { key: 'd', label: 'D', tone: 'down' },
];
export const XYZ: readonly AxisSpec[] = [
  { key: 'x', label: 'x', tone: 'north' },
  { key: 'y', label: 'y', tone: 'east' },
  { key: 'z', label: 'z', tone: 'down' },
];
export const ANGLES: readonly AxisSpec[] = [
  { key: 'roll', label: 'roll', tone: 'north' },
  { key: 'pitch', label: 'pitch', tone: 'east' },
  { key: 'yaw', label: 'yaw', tone: 'down' },
];

type SeriesOfRun = (data: RunData | null) => TimeSeries | null;

export interface CurveSpec {
  id: string;
  label: string;
  tone: ChartTone;
  dash?: string;
  width?: number;
  breaks?: boolean;
  series: SeriesOfRun;
  /** Name in a saved table; left out: the id. */
  column?: string;
  /** False: the baseline draws no ghost of it. */
  ghost?: boolean;
  /** The ghost's name in the legend, where one curve alone is shown. */
  ghostLabel?: string;
}

/** One curve in its three states: the baseline's ghost, the remainder of the run before, the run itself. */
export function curveLayers(source: CurvesSource, spec: CurveSpec): { under: Layer[]; over: LineLayer } {
  const { id, tone, dash, width, breaks, series, column = id } = spec;
  const pick = (which: keyof Curves) => () => series(source.curves()[which]);
  const ghost: LineLayer = {
    kind: 'line',
    id: `${id}.ghost`,
    column: `${column} baseline`,
    tone: 'ghost',
    dash,
    breaks,
    width: 1.25,
    label: spec.ghostLabel,
    series: pick('ghost'),
  };
  const remainder: Layer = {
    kind: 'line',
    id: `${id}.before`,
    tone,
    dash,
    breaks,
    width,
    opacity: 0.3,
    fromS: () => source.curves().current?.toS ?? -Infinity,
    series: pick('previous'),
  };
  return {
    under: spec.ghost === false ? [remainder] : [ghost, remainder],
    over: { kind: 'line', id, column, tone, dash, width, breaks, label: spec.label, series: pick('current') },
  };
}

/** Curves, ghosts and remainders below all main lines. */
export function stacked(source: CurvesSource, specs: readonly CurveSpec[]): Layer[] {
  const layers = specs.map((spec) => curveLayers(source, spec));
  return [...layers.flatMap((layer) => layer.under), ...layers.map((layer) => layer.over)];
}

/** One curve an axis from the columns of a table. */
export function axisCurves<T extends FrameTable>(
  id: string,
  table: T,
  axes: readonly AxisSpec[],
  column: (axis: AxisSpec) => FrameColumn<T>,
  factor = 1,
): CurveSpec[] {
  return axes.map((axis) => ({
    id: `${id}.${axis.key}`,
    column: `${id} ${axis.key}`,
    label: axis.label,
    tone: axis.tone,
    dash: axisDash[axis.tone],
    series: (data) => seriesOf(data, table, column(axis), factor),
  }));
}

/** A ±k σ band of the current run. */
export function sigmaBand(
  source: CurvesSource,
  id: string,
  tone: AxisSpec['tone'],
  series: SeriesOfRun,
  options: Pick<BandLayer, 'label' | 'breaks' | 'column'> & { centre?: SeriesOfRun } = {},
): BandLayer {
  const { centre, ...rest } = options;
  return {
    kind: 'band',
    id,
    tone,
    dash: axisDash[tone],
    ...rest,
    series: () => series(source.curves().current),
    centre: centre ? () => centre(source.curves().current) : undefined,
  };
}

/** Said beside the unit while a baseline is drawn behind several curves. */
export const ghostRemark = (source: CurvesSource, more = ''): string =>
  [more, source.curves().ghost ? 'grey: baseline' : ''].filter(Boolean).join(' · ');

/** [0, largest] over the series that are there, a little headroom above. */
export function fromZero(series: (TimeSeries | null)[], fromS: number, toS: number): [number, number] {
  let high = 0;
  for (const one of series) if (one) high = Math.max(high, valueExtent(one, fromS, toS)?.[1] ?? 0);
  return [0, high > 0 ? high * 1.06 : 1];
}

/** Least and largest over the series that are there, with a margin. */
export function around(series: (TimeSeries | null)[], fromS: number, toS: number): [number, number] {
  let [low, high] = [Infinity, -Infinity];
  for (const one of series) {
    const extent = one && valueExtent(one, fromS, toS);
    if (!extent) continue;
    low = Math.min(low, extent[0]);
    high = Math.max(high, extent[1]);
  }
  if (!(high >= low)) return [-1, 1];
  const margin = (high - low) * 0.08 || Math.abs(high) * 0.1 || 1;
  return [low - margin, high + margin];
}

/** The `share` quantile over several series, the largest of them. */
export function largestQuantile(
  series: (TimeSeries | null)[],
  fromS: number,
  toS: number,
  share: number,
): number | null {
  const found = series
    .map((one) => one && absoluteQuantile(one, fromS, toS, share))
    .filter((value): value is number => value !== null);
  return found.length > 0 ? Math.max(...found) : null;
}
