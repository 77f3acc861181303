import { useSyncExternalStore } from 'react';
import type { ChartGroup } from './chart-group';
import type { ChartContent } from '@/shared/charts/model/layers';
import { formatAxisTime } from '@/shared/charts/model/ticks';
import { tableRows } from './table-rows';
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
