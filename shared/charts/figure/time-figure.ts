/** A chart over time as a figure: the same drawing as on the screen, for the same stretch of time. Pure. */
import { typeScale } from '@/shared/tokens';
import { layerInk } from '../model/layer-style';
import { asideOf } from '../model/aside';
import type { ChartContent, Layer } from '../model/layers';
import { legendOrder, samplePath } from '../model/legend';
import type { Extent } from '../model/scale';
import { chartBuffers, drawChart, type LayerPaths, type PlotBox } from '../model/time-chart';
import { formatAxisTime } from '../model/ticks';
import type { ChartFigure, LegendEntry } from './sheet';
import type { Box, PathShape, Shape } from './shapes';

const ASPECT = 0.42;
/** To word the remark before the sheet knows its size. */
const PROBE: PlotBox = { left: 0, top: 0, right: 800, bottom: 336 };

/** `content` in the stretch `view`. */
export function timeFigure(content: ChartContent, view: Extent): ChartFigure {
  const { beyond } = drawChart(content, view, PROBE, chartBuffers());
  const span = `${formatAxisTime(view[0], 0.1)} to ${formatAxisTime(view[1], 0.1)}`;
  return {
    title: content.title,
    aside: [asideOf(content, beyond), span].filter(Boolean).join(' · '),
    legend: legendOrder(content.layers).map(legendEntry),
    xTitle: 'time, min:s',
    yTitle: content.unit ? `${content.title}, ${content.unit}` : content.title,
    sentence: content.sentence(),
    aspect: ASPECT,
    plot: (box) => timeShapes(content, view, box),
  };
}

/** Grid, tick labels, grounds, curves and words of the plot. */
export function timeShapes(content: ChartContent, view: Extent, box: Box): Shape[] {
  const drawing = drawChart(content, view, box, chartBuffers());
  const { tint, hatch, edges } = drawing.ground;
  return [
    { kind: 'path', d: tint, fill: 'vermilion', fillOpacity: 0.08 },
    ...drawing.valueTicks.flatMap(({ at, label }): Shape[] => [
      { kind: 'path', d: `M${box.left} ${at}H${box.right}`, stroke: 'rule', strokeWidth: 1 },
      number(box.left - 8, at + 4, label, 'end'),
    ]),
    ...drawing.timeTicks.map(({ at, label }) => number(at, box.bottom + 17, label, 'middle')),
    { kind: 'path', d: hatch, stroke: 'vermilion', strokeOpacity: 0.38, strokeWidth: 1 },
    { kind: 'path', d: edges, stroke: 'vermilion', strokeOpacity: 0.5, strokeWidth: 1 },
    ...content.layers.flatMap((layer) => layerShapes(layer, drawing.layers[layer.id])),
    ...drawing.annotations.map((note): Shape => ({
      ...number(note.x, note.y, note.text, note.anchor),
      face: note.number ? 'number' : 'label',
      size: note.number ? typeScale.small : 13,
      tone: note.tone,
      halo: true,
    })),
  ];
}

/** Digits of a tick. */
export const number = (x: number, y: number, text: string, anchor: 'start' | 'middle' | 'end') =>
  ({ kind: 'text', x, y, text, anchor, tone: 'inkSoft', face: 'number', size: typeScale.small }) as const;

function layerShapes(layer: Layer, paths: LayerPaths | undefined): Shape[] {
  if (!paths) return [];
  const ink = layerInk(layer);
  const { fill, fillOpacity, ...stroke } = ink;
  const dense = layer.kind === 'line' && paths.dense;
  const thinned = dense ? { dash: undefined, strokeOpacity: (stroke.strokeOpacity ?? 1) * 0.75 } : null;
  return [
    { kind: 'path', d: paths.fill, fill, fillOpacity, clipped: true },
    { kind: 'path', d: paths.stroke, ...stroke, ...thinned, clipped: true },
  ];
}

function legendEntry(layer: Layer): LegendEntry {
  const ground = layer.kind === 'band' || layer.kind === 'area';
  const ink = layerInk(layer);
  const sample: PathShape = ground
    ? { kind: 'path', d: 'M0.5 1H15.5V9H0.5Z', ...ink, strokeOpacity: 0.6, fillOpacity: 0.2 }
    : { kind: 'path', d: samplePath(layer.kind), ...ink, fill: undefined };
  return { label: layer.label ?? '', sample: [sample] };
}
