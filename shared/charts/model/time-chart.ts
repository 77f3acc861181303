/** A chart over time, worked out to path strings and tick positions. Pure: the shell only hands the strings to the page. */
import { decimate, polylineBuffer, type Polyline } from './decimate';
import { hatchPath, px } from './hatch';
import type { ChartContent, ChartTone, Layer, MarksLayer, TimeWindow } from './layers';
import { areaPath, bandPath, diamondsPath, dotsPath, linePath, rulePath } from './paths';
import { niceExtent } from './nice';
import { linearScale, type Extent, type Scale } from './scale';
import { lowerBound, type TimeSeries } from './series';
import { timeTicks, valueTicks } from './ticks';

export interface PlotBox {
  left: number;
  top: number;
  right: number;
  bottom: number;
}

/** Strings to set on the page; a line layer has one, bands and areas a ground and an edge. */
export interface LayerPaths {
  stroke: string;
  fill: string;
  /** More points than pixels: dashes and full ink would only make mud of it. */
  dense?: boolean;
}
export interface PlacedTick {
  at: number;
  label: string;
}
export interface PlacedAnnotation {
  x: number;
  y: number;
  anchor: 'start' | 'end';
  text: string;
  number: boolean;
  tone: ChartTone;
}
export interface ChartDrawing {
  x: Scale;
  y: Scale;
  layers: Record<string, LayerPaths>;
  /** Coasting ground: tint (closed), hatching and edges. */
  ground: { tint: string; hatch: string; edges: string };
  valueTicks: PlacedTick[];
  timeTicks: PlacedTick[];
  annotations: PlacedAnnotation[];
  /** Values of lines and marks in view that lie beyond the scale, and the largest by size. */
  beyond: { count: number; largest: number };
}

/** Works out `content` for the stretch `view` of time inside `box`. `keep` holds line buffers from frame to frame. */
export function drawChart(
  content: ChartContent,
  view: Extent,
  box: PlotBox,
  keep: ChartBuffers,
): ChartDrawing {
  const [fromS, toS] = view;
  const x = linearScale(view, [box.left, box.right]);
  const rows = Math.max(2, Math.min(6, Math.round((box.bottom - box.top) / 44)));
  const domain = niceExtent(usable(content.domain(fromS, toS)), rows);
  const y = linearScale(domain, [box.bottom, box.top]);
  const windows = content.windows();
  const breaksS = windows.flatMap((window) => [window.startS, window.endS]).sort((a, b) => a - b);
  const beyond = { count: 0, largest: 0 };
  const layers: Record<string, LayerPaths> = {};
  for (const layer of content.layers)
    layers[layer.id] = drawLayer(layer, { view, box, x, y, breaksS, keep, beyond });
  const most = Math.max(2, Math.floor((box.right - box.left) / 84));
  return {
    x,
    y,
    layers,
    ground: coastingGround(windows, x, box),
    valueTicks: valueTicks(domain[0], domain[1], rows).map(({ value, label }) => ({
      at: px(y(value)),
      label,
    })),
    timeTicks: timeTicks(fromS, toS, most).map(({ value, label }) => ({ at: px(x(value)), label })),
    annotations: placeAnnotations(content, view, x, y, box),
    beyond,
  };
}

export interface ChartBuffers {
  upper: Polyline;
  lower: Polyline;
}
export const chartBuffers = (): ChartBuffers => ({ upper: polylineBuffer(), lower: polylineBuffer() });

/** Coasting ground of `windows`, cut to the plot. */
export function coastingGround(windows: readonly TimeWindow[], x: Scale, box: PlotBox) {
  let [tint, hatch, edges] = ['', '', ''];
  for (const window of windows) {
    const [start, end] = [x(window.startS), x(window.endS)];
    const [left, right] = [Math.max(box.left, start), Math.min(box.right, end)];
    if (right <= left) continue;
    tint += `M${px(left)} ${box.top}H${px(right)}V${box.bottom}H${px(left)}Z`;
    hatch += hatchPath(left, box.top, right - left, box.bottom - box.top, 9);
    for (const edge of [start, end])
      if (edge >= box.left && edge <= box.right) edges += `M${px(edge)} ${box.top}V${box.bottom}`;
  }
  return { tint, hatch, edges };
}

interface LayerContext {
  view: Extent;
  box: PlotBox;
  x: Scale;
  y: Scale;
  breaksS: readonly number[];
  keep: ChartBuffers;
  beyond: { count: number; largest: number };
}

const NOTHING: LayerPaths = { stroke: '', fill: '' };

function drawLayer(layer: Layer, context: LayerContext): LayerPaths {
  const { box, x, y } = context;
  if (layer.kind === 'rules') {
    const inside = layer.values().filter((value) => Number.isFinite(value) && within(y, value));
    return { stroke: inside.map((value) => rulePath(box.left, box.right, y(value))).join(''), fill: '' };
  }
  const whole = layer.series();
  if (!whole || whole.length === 0) return NOTHING;
  const series = layer.fromS ? startingAt(whole, layer.fromS()) : whole;
  if (isMarks(layer)) return drawMarks(layer.kind, series, context);

  const { keep } = context;
  const points = (buffer: Polyline, source: TimeSeries) => {
    const [fromS, toS] = context.view;
    const breaksS = layer.breaks ? context.breaksS : [];
    return decimate({ series: source, fromS, toS, x, y, breaksS }, buffer);
  };
  if (layer.kind === 'band') {
    const centre = layer.centre?.() ?? null;
    const upper = points(keep.upper, shifted(series, centre, 1));
    const lower = points(keep.lower, shifted(series, centre, -1));
    return { stroke: linePath(upper) + linePath(lower), fill: bandPath(upper, lower) };
  }
  const line = points(keep.upper, series);
  if (layer.kind === 'area') return { stroke: linePath(line), fill: areaPath(line, y(0)) };
  if (layer.label !== undefined && layer.tone !== 'ghost') countBeyond(series, context);
  return { stroke: linePath(line), fill: '', dense: isDense(line) };
}

/** More than about a point a pixel over the stretch that the line covers. */
function isDense({ x, length }: Polyline): boolean {
  return length > 50 && length > 1.2 * (x[length - 1]! - x[0]!);
}

/** centre ± half, point by point; both share one time axis. */
function shifted(half: TimeSeries, centre: TimeSeries | null, sign: 1 | -1): TimeSeries {
  const { time, length, at } = half;
  return { time, length, at: centre ? (i) => centre.at(i) + sign * at(i) : (i) => sign * at(i) };
}

function drawMarks(kind: 'dots' | 'diamonds', series: TimeSeries, context: LayerContext): LayerPaths {
  const { box, view, x, y, keep } = context;
  const edge = kind === 'dots' ? 3 : 7;
  // A mark beyond the scale stands at the plot's edge: it is not lost.
  const held = (value: number) => Math.min(box.bottom - edge, Math.max(box.top + edge, y(value)));
  const line = decimate({ series, fromS: view[0], toS: view[1], x, y: held }, keep.upper);
  let count = 0;
  for (let i = 0; i < line.length; i++) {
    const [at, height] = [line.x[i]!, line.y[i]!];
    if (Number.isNaN(height) || at < box.left || at > box.right) continue;
    line.x[count] = at;
    line.y[count] = height;
    count++;
  }
  countBeyond(series, context);
  return kind === 'dots'
    ? { stroke: dotsPath(line.x, line.y, count), fill: '' }
    : { stroke: diamondsPath(line.x, line.y, count, 4.5), fill: '' };
}

function countBeyond(series: TimeSeries, { view, y, beyond }: LayerContext): void {
  const [low, high] = y.domain;
  for (let i = lowerBound(series.time, series.length, view[0]); i < series.length; i++) {
    if (series.time[i]! > view[1]) return;
    const value = series.at(i);
    if (value >= low && value <= high) continue;
    if (!Number.isFinite(value)) continue;
    beyond.count++;
    if (Math.abs(value) > Math.abs(beyond.largest)) beyond.largest = value;
  }
}

function startingAt(series: TimeSeries, fromS: number): TimeSeries {
  const skip = lowerBound(series.time, series.length, fromS);
  if (skip === 0) return series;
  const { time, length, at } = series;
  const later = ArrayBuffer.isView(time)
    ? (time as Float64Array).subarray(skip)
    : Array.from(time).slice(skip);
  return { length: length - skip, time: later, at: (i) => at(i + skip) };
}

function placeAnnotations(content: ChartContent, view: Extent, x: Scale, y: Scale, box: PlotBox) {
  const placed: PlacedAnnotation[] = [];
  for (const { timeS, value, text, number = false, tone } of content.annotations?.() ?? []) {
    if (timeS < view[0] || timeS > view[1] || !Number.isFinite(value)) continue;
    const at = x(timeS);
    const width = text.length * (number ? 7.6 : 5.5) + 8;
    const anchor = at + width > box.right ? 'end' : 'start';
    let height = Math.min(box.bottom - 4, Math.max(box.top + 12, y(value) + 4));
    const clash = () =>
      placed.find((other) => Math.abs(other.y - height) < 15 && Math.abs(other.x - at) < width + 40);
    for (let tries = 0; tries < 4 && clash(); tries++) height = clash()!.y + 15;
    // Where many windows crowd the chart, a figure without room of its own stays in the table.
    if (height > box.bottom - 2 || clash()) continue;
    placed.push({ x: px(anchor === 'end' ? at - 6 : at + 6), y: px(height), anchor, text, number, tone });
  }
  return placed;
}

const isMarks = (layer: Layer): layer is MarksLayer => layer.kind === 'dots' || layer.kind === 'diamonds';
const within = (y: Scale, value: number) => value >= y.domain[0] && value <= y.domain[1];

/** A domain that can be drawn: finite and not empty. */
function usable([low, high]: Extent): Extent {
  if (!Number.isFinite(low) || !Number.isFinite(high)) return [0, 1];
  if (high > low) return [low, high];
  const half = Math.abs(high) * 0.1 || 1;
  return [low - half, high + half];
}
