/** The autocorrelation chart as shapes: the page and the saved picture draw the same. Pure. */
import { AXIS_TITLE_PX, type Box, type Shape } from '@/shared/charts/figure/shapes';
import { number } from '@/shared/charts/figure/time-figure';
import { linearScale } from '@/shared/charts/model/scale';
import { correlationStems } from './correlation-stems';

export interface CorrelationData {
  axes: readonly { label: string; tone: 'north' | 'east' | 'down'; values: readonly number[] }[];
  /** Half-width of the 95 % band. */
  band: number;
  lags: number;
}

export function correlationShapes(data: CorrelationData, box: Box): Shape[] {
  const { band, lags } = data;
  const { stems, low, high, ticks } = correlationStems(data, box);
  const y = linearScale([low, high], [box.bottom, box.top]);
  const rule = (value: number, ink: Partial<Shape>): Shape =>
    ({ kind: 'path', d: `M${box.left} ${y(value)}H${box.right}`, ...ink }) as Shape;
  return [
    {
      kind: 'rect',
      x: box.left,
      y: y(band),
      width: Math.max(0, box.right - box.left),
      height: y(-band) - y(band),
      fill: 'pine',
      fillOpacity: 0.1,
    },
    ...ticks.flatMap((tick) => [
      rule(tick, { stroke: 'rule' }),
      number(box.left - 6, y(tick) + 4, String(tick).replace('-', '−'), 'end'),
    ]),
    rule(band, { stroke: 'pine', strokeWidth: 1.25 }),
    rule(-band, { stroke: 'pine', strokeWidth: 1.25 }),
    rule(0, { stroke: 'inkSoft' }),
    ...stems.map((stem): Shape => ({
      kind: 'path',
      d: stem.path,
      stroke: stem.tone,
      strokeWidth: stem.widthPx,
    })),
    ...lagLabels(lags, box),
  ];
}

/** The title under the lags, for the page; a saved picture has its own. */
export const belowAxis = (text: string, box: Box, y: number): Shape => ({
  kind: 'text',
  x: (box.left + box.right) / 2,
  y,
  text,
  anchor: 'middle',
  tone: 'inkSoft',
  face: 'label',
  size: AXIS_TITLE_PX,
});

function lagLabels(lags: number, box: Box): Shape[] {
  const room = (box.right - box.left) / Math.max(1, lags);
  const marked = Array.from({ length: lags }, (_, i) => i + 1).filter((lag) => lag === 1 || lag % 5 === 0);
  return marked.map((lag) => number(box.left + room * (lag - 0.5), box.bottom + 16, String(lag), 'middle'));
}
