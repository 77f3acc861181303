/** The figures behind a chart over time: one row a time at which any of its series has a point. Pure. */
import type { ChartContent, Layer } from '../model/layers';
import type { Extent } from '../model/scale';
import { lowerBound, type TimeSeries } from '../model/series';
import { columnName, rowCount, type CsvColumn, type CsvTable } from './csv';

/** What is in view and, where that is not all, all that the chart holds. */
export function timeTables(content: ChartContent, view: Extent, whole: Extent): CsvTable[] {
  const zoomed = view[0] > whole[0] || view[1] < whole[1];
  const table = (part: string, words: string, span: Extent): CsvTable => {
    const columns = timeColumns(content, span);
    return { part, label: `${words}, CSV (${rowCount({ columns })} rows)`, columns };
  };
  return [
    ...(zoomed ? [table('in-view', 'Data in view', view)] : []),
    table(zoomed ? 'all' : '', 'All data', [-Infinity, Infinity]),
  ];
}

/** `time_s`, then a column a layer; a layer without a point at a time has an empty cell there. */
export function timeColumns(content: ChartContent, [fromS, toS]: Extent): CsvColumn[] {
  const layers = content.layers.filter((layer) => !isRemainder(layer));
  const drawn = layers.flatMap((layer) => {
    const series = layer.kind === 'rules' ? null : layer.series();
    return series ? [{ layer, series: cut(series, fromS, toS) }] : [];
  });
  const times = union(drawn.map(({ series }) => series));
  const curves = drawn.map(({ layer, series }) => ({
    name: nameOf(layer, content.unit),
    values: aligned(series, times),
  }));
  return [{ name: 'time_s', values: times }, ...curves, ...rules(layers, content.unit, times.length)];
}

/** What a newer run has not reached yet is no part of it. */
const isRemainder = (layer: Layer) => layer.fromS !== undefined;

const nameOf = (layer: Layer, unit: string) => columnName(layer.column ?? layer.id, unit);

function rules(layers: readonly Layer[], unit: string, rows: number): CsvColumn[] {
  return layers.flatMap((layer) =>
    layer.kind === 'rules'
      ? layer.values().map((value, i, all) => ({
          name: columnName(layer.column ?? layer.id, all.length > 1 ? (i === 0 ? 'low' : 'high') : '', unit),
          values: new Array<number>(rows).fill(value),
        }))
      : [],
  );
}

interface Points {
  time: number[];
  values: number[];
}

/** Points without a value are left out: their place is empty in any case. */
function cut(series: TimeSeries, fromS: number, toS: number): Points {
  const points: Points = { time: [], values: [] };
  for (let i = lowerBound(series.time, series.length, fromS); i < series.length; i++) {
    const time = series.time[i]!;
    if (time > toS) break;
    const value = series.at(i);
    if (!Number.isFinite(value)) continue;
    points.time.push(time);
    points.values.push(value);
  }
  return points;
}

const union = (all: readonly Points[]): number[] =>
  [...new Set(all.flatMap(({ time }) => time))].sort((a, b) => a - b);

function aligned({ time, values }: Points, times: readonly number[]): (number | null)[] {
  let next = 0;
  return times.map((at) => {
    if (time[next] !== at) return null;
    const value = values[next]!;
    // Of two points at one time the later one holds.
    while (time[next] === at) next++;
    return value;
  });
}
