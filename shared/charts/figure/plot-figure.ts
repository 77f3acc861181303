/** A quiet chart's plot as shapes. Pure. */
import { px } from '../model/hatch';
import type { PlotMark, PlotModel, PlotPoint } from '../model/plot';
import { linearScale, logScale, type Scale } from '../model/scale';
import type { ChartFigure, LegendEntry } from './sheet';
import { AXIS_TITLE_PX, type Box, type Shape } from './shapes';
import { number } from './time-figure';

/** `model` with a title and its words. */
export function plotFigure(
  model: PlotModel,
  { title, aside, sentence }: Pick<ChartFigure, 'title' | 'aside' | 'sentence'>,
): ChartFigure {
  return {
    title,
    aside,
    sentence,
    legend: model.marks.flatMap(legendEntry),
    xTitle: model.x.title,
    yTitle: model.y.title,
    aspect: 0.5,
    plot: (box) => plotShapes(model, box),
  };
}

/** Grid, tick labels and marks inside `box`. */
export function plotShapes({ x, y, marks }: PlotModel, box: Box): Shape[] {
  const toX = (x.log ? logScale : linearScale)(x.domain, [box.left, box.right]);
  const toY = (y.log ? logScale : linearScale)(y.domain, [box.bottom, box.top]);
  const grid = { stroke: 'rule', strokeWidth: 1 } as const;
  return [
    ...y.ticks.flatMap((tick): Shape[] => [
      { kind: 'path', d: `M${box.left} ${px(toY(tick))}H${box.right}`, ...grid },
      number(box.left - 8, toY(tick) + 4, y.written(tick), 'end'),
    ]),
    ...x.ticks.flatMap((tick): Shape[] => [
      { kind: 'path', d: x.log ? `M${px(toX(tick))} ${box.top}V${box.bottom}` : '', ...grid },
      number(toX(tick), box.bottom + 17, x.written(tick), 'middle'),
    ]),
    {
      kind: 'path',
      d: `M${box.left} ${box.bottom}H${box.right}`,
      stroke: 'inkSoft',
      strokeWidth: 1,
    },
    ...marks.map((mark) => markShape(mark, toX, toY, box)),
  ];
}

function markShape(mark: PlotMark, x: Scale, y: Scale, box: Box): Shape {
  const { tone } = mark;
  switch (mark.kind) {
    case 'line':
      return {
        kind: 'path',
        d: line(mark.points, x, y),
        stroke: tone,
        strokeWidth: mark.width,
        dash: mark.dash,
        clipped: true,
      };
    case 'area': {
      const [first, last] = [mark.points[0], mark.points[mark.points.length - 1]];
      const ground = px(y(0));
      const d =
        first && last
          ? `M${px(x(first.x))} ${ground}L${line(mark.points, x, y).slice(1)}L${px(x(last.x))} ${ground}Z`
          : '';
      const ink = { stroke: tone, strokeOpacity: 0.5, fill: tone, fillOpacity: 0.12 };
      return { kind: 'path', d, ...ink, clipped: true };
    }
    case 'bars':
      return {
        kind: 'path',
        d: mark.bars
          .map(
            ({ from, to, value }) =>
              `M${px(x(from) + 0.5)} ${px(y(0))}V${px(y(value))}H${px(x(to) - 0.5)}V${px(y(0))}Z`,
          )
          .join(''),
        fill: tone,
        fillOpacity: 0.45,
        clipped: true,
      };
    case 'whiskers':
      return {
        kind: 'path',
        d: mark.points.map(({ x: at, low, high }) => whisker(x(at), y(low), y(high), box.bottom)).join(''),
        stroke: tone,
        strokeWidth: 1,
        strokeOpacity: 0.55,
        clipped: true,
      };
    case 'words': {
      const at = { x: x(mark.at.x) - 4, y: y(mark.at.y) - 8, anchor: 'end' as const };
      return { kind: 'text', ...at, text: mark.text, tone, face: 'label', size: AXIS_TITLE_PX, halo: true };
    }
  }
}

const line = (points: readonly PlotPoint[], x: Scale, y: Scale) =>
  points.map((point, i) => `${i === 0 ? 'M' : 'L'}${px(x(point.x))} ${px(y(point.y))}`).join('');

/** A lower end that no logarithm reaches stands at the plot's ground. */
function whisker(x: number, low: number, high: number, bottom: number): string {
  const foot = Number.isFinite(low) ? low : bottom;
  return `M${px(x - 3)} ${px(high)}h6M${px(x)} ${px(high)}V${px(foot)}M${px(x - 3)} ${px(foot)}h6`;
}

function legendEntry(mark: PlotMark): LegendEntry[] {
  if (mark.label === undefined || mark.kind === 'words') return [];
  const { tone, label } = mark;
  const sample: Shape =
    mark.kind === 'line'
      ? { kind: 'path', d: 'M0 5H18', stroke: tone, strokeWidth: mark.width, dash: mark.dash }
      : { kind: 'path', d: 'M0.5 1H15.5V9H0.5Z', stroke: tone, fill: tone, fillOpacity: 0.3 };
  return [{ label, sample: [sample] }];
}
