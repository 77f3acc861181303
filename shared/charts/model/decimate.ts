/**
 * Min–max decimation: one stroke a pixel column. Of all points in a column the first, the least, the largest and the last
 * are kept, in their order, so that the drawn line covers the same pixels as the whole one would and a one-sample
 * spike in millions stays in sight. Where many points share a column the first and the last fall within the stroke from
 * least to largest, give or take a pixel, and are left out.
 */
import { visibleRange, type TimeSeries } from './series';

export interface Polyline {
  /** Pixels; NaN in `y` breaks the line before the next point. */
  x: Float64Array;
  y: Float64Array;
  length: number;
}

/** Room for the points of one line; reused from frame to frame. */
export const polylineBuffer = (capacity = 4096): Polyline => ({
  x: new Float64Array(capacity),
  y: new Float64Array(capacity),
  length: 0,
});

export interface DecimateInput {
  series: TimeSeries;
  fromS: number;
  toS: number;
  /** Time → pixel, value → pixel. */
  x: (t: number) => number;
  y: (value: number) => number;
  /** Sorted times that the line must not cross (edges of outage windows). */
  breaksS?: readonly number[];
}

/** Fills `out` with the points to stroke and answers it. */
export function decimate(input: DecimateInput, out: Polyline): Polyline {
  const { series, x, y, breaksS = [] } = input;
  const [first, end] = visibleRange(series, input.fromS, input.toS);
  out.length = 0;
  let nextBreak = 0;
  let column: Column | null = null;
  let previous = -1;
  for (let i = first; i < end; i++) {
    const t = series.time[i]!;
    const value = series.at(i);
    let crossed = false;
    while (nextBreak < breaksS.length && breaksS[nextBreak]! <= t) {
      crossed ||= previous >= 0 && breaksS[nextBreak]! > series.time[previous]!;
      nextBreak++;
    }
    const missing = !Number.isFinite(value);
    if (crossed || missing) {
      flush(column, out);
      column = null;
      push(out, x(t), NaN);
    }
    if (!missing) {
      const at = x(t);
      const pixel = Math.floor(at);
      if (column && column.pixel !== pixel) {
        flush(column, out);
        column = null;
      }
      column = extend(column, pixel, at, y(value));
    }
    previous = i;
  }
  flush(column, out);
  return out;
}

/** From this many points a column is crowded. */
const CROWD = 4;

interface Column {
  pixel: number;
  count: number;
  firstX: number;
  firstY: number;
  lastX: number;
  lastY: number;
  lowX: number;
  lowY: number;
  highX: number;
  highY: number;
}

function extend(column: Column | null, pixel: number, x: number, y: number): Column {
  if (!column)
    return {
      pixel,
      count: 1,
      firstX: x,
      firstY: y,
      lastX: x,
      lastY: y,
      lowX: x,
      lowY: y,
      highX: x,
      highY: y,
    };
  column.count++;
  if (y < column.lowY) [column.lowX, column.lowY] = [x, y];
  if (y > column.highY) [column.highX, column.highY] = [x, y];
  [column.lastX, column.lastY] = [x, y];
  return column;
}

function flush(column: Column | null, out: Polyline): void {
  if (!column) return;
  const crowded = column.count >= CROWD;
  if (!crowded) push(out, column.firstX, column.firstY);
  const lowFirst = column.lowX <= column.highX;
  pushNew(out, lowFirst ? column.lowX : column.highX, lowFirst ? column.lowY : column.highY);
  pushNew(out, lowFirst ? column.highX : column.lowX, lowFirst ? column.highY : column.lowY);
  if (!crowded) pushNew(out, column.lastX, column.lastY);
}

/** Leaves out a point that repeats the one before. */
function pushNew(out: Polyline, x: number, y: number): void {
  if (out.x[out.length - 1] !== x || out.y[out.length - 1] !== y) push(out, x, y);
}

function push(out: Polyline, x: number, y: number): void {
  if (out.length === out.x.length) {
    const grow = (old: Float64Array) => {
      const wider = new Float64Array(old.length * 2);
      wider.set(old);
      return wider;
    };
    out.x = grow(out.x);
    out.y = grow(out.y);
  }
  out.x[out.length] = x;
  out.y[out.length] = y;
  out.length++;
}
