/** A chart's figures in words: what the cursor reads and what the table for the screen reader says. Pure. */
import { formatNumber } from '@/shared/format';
import type { ChartContent, Layer } from '@/shared/charts/model/layers';
import { absoluteQuantile, nearestIndex, valueExtent } from '@/shared/charts/model/series';

/** Rows of the text alternative; figures carry their unit. */
export function tableRows(
  content: ChartContent,
  view: readonly [number, number],
  cursor: number | null,
): { name: string; figures: string[] }[] {
  const written = (value: number | null | undefined) =>
    value === null || value === undefined
      ? 'none'
      : `${formatNumber(value, 3)}${content.unit ? ` ${content.unit}` : ''}`;
  return content.layers
    .filter((layer) => layer.label !== undefined)
    .map((layer) => {
      const name = layer.label!;
      if (layer.kind === 'rules') {
        const values = layer.values();
        return { name, figures: [written(values[0]), written(values[values.length - 1]), 'none', 'none'] };
      }
      const series = layer.series();
      const extent = series && valueExtent(series, view[0], view[1]);
      const most = series && absoluteQuantile(series, view[0], view[1], 0.95);
      const at = cursor === null ? null : readLayer(layer, cursor);
      return { name, figures: [written(extent?.[0]), written(extent?.[1]), written(most), written(at)] };
    });
}

/** The layer's value at `timeS`; null where it has none within a few of its own intervals. */
export function readLayer(layer: Layer, timeS: number): number | null {
  if (layer.kind === 'rules') return layer.values()[0] ?? null;
  const series = layer.series();
  if (!series) return null;
  const index = nearestIndex(series, timeS);
  if (index < 0) return null;
  const value = series.at(index);
  const spacing =
    series.length > 1 ? (series.time[series.length - 1]! - series.time[0]!) / (series.length - 1) : 1;
  const near = Math.abs(series.time[index]! - timeS) <= Math.max(1, 3 * spacing);
  return near && Number.isFinite(value) ? value : null;
}
