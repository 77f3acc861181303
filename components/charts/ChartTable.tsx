import { useSyncExternalStore } from 'react';
import { formatNumber } from '@/shared/format';
import { readLayer } from './ChartLegend';
import type { ChartGroup } from './chart-group';
import type { ChartContent } from './model/layers';
import { absoluteQuantile, valueExtent } from './model/series';
import { formatAxisTime } from './model/ticks';
import { VisuallyHidden } from './VisuallyHidden';

/** The chart's figures as a table for the screen reader: least, largest and 95 % of each series in view, and at the cursor. */
export function ChartTable({ content, group }: { content: ChartContent; group: ChartGroup }) {
  const view = useSyncExternalStore(group.viewport.subscribe, () => group.viewport.current);
  const cursor = useSyncExternalStore(group.cursor.subscribe, () => group.cursor.current);
  const rows = tableRows(content, view, cursor);
  return (
    <VisuallyHidden>
      <table>
        <caption>
          {`${content.title}, ${content.unit || 'no unit'}, ${formatAxisTime(view[0], 1)} to ${formatAxisTime(view[1], 1)}`}
        </caption>
        <thead>
          <tr>
            <th scope="col">Series</th>
            <th scope="col">Least</th>
            <th scope="col">Largest</th>
            <th scope="col">95 % of sizes below</th>
            <th scope="col">{cursor === null ? 'At the cursor' : `At ${formatAxisTime(cursor, 0.1)}`}</th>
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <tr key={row.name}>
              <th scope="row">{row.name}</th>
              {row.figures.map((figure, i) => (
                <td key={i}>{figure}</td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </VisuallyHidden>
  );
}

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
