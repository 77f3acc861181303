/** A chart as a picture by itself: title, legend, plot with titled axes, and whence it comes. Pure. */
import { typeScale } from '@/shared/tokens';
import { AXIS_TITLE_PX, type Box, type Shape } from './shapes';

export interface LegendEntry {
  label: string;
  /** Drawn in a box of 18 × 10 px. */
  sample: readonly Shape[];
}

/** What a chart brings to a picture of it. */
export interface ChartFigure {
  title: string;
  /** Beside the title: what is compared, what lies beyond the scale. */
  aside: string;
  legend: readonly LegendEntry[];
  xTitle: string;
  yTitle: string;
  /** The chart in a sentence. */
  sentence: string;
  /** Height ÷ width of the plot. */
  aspect: number;
  /** The plot with grid and tick labels; these stand in the margins around `box`. */
  plot: (box: Box) => readonly Shape[];
}

/** Whence a picture comes: its footer line. */
export interface Origin {
  recording: string;
  /** Id of the run; null where no run is shown. */
  run: string | null;
  engineVersion: string | null;
}

export interface Sheet {
  width: number;
  height: number;
  title: string;
  sentence: string;
  /** Paths that say so are cut to it. */
  clip: Box;
  shapes: Shape[];
}

const MARGIN = 24;
const GUTTER = 62;
const LINE = 20;
const SAMPLE_PX = 24;
const CHARACTER_PX = 6.4;

/** Lays `figure` out on a sheet of `width` px. */
export function figureSheet(figure: ChartFigure, origin: Origin, width = 960): Sheet {
  const [left, right] = [MARGIN + GUTTER, width - MARGIN];
  const shapes: Shape[] = [
    text(MARGIN, MARGIN + 14, figure.title, { face: 'strong', size: typeScale.heading }),
    text(right, MARGIN + 14, figure.aside, { tone: 'inkSoft', anchor: 'end' }),
  ];
  const legendTop = MARGIN + 30;
  const { placed, lines } = placeLegend(figure.legend, MARGIN, right, legendTop);
  shapes.push(...placed);
  const top = legendTop + lines * LINE + 18;
  const bottom = top + Math.round((right - left) * figure.aspect);
  const box = { left, top, right, bottom };
  const height = bottom + 24 + LINE + 34;
  shapes.push(
    ...figure.plot(box),
    text((left + right) / 2, bottom + 40, figure.xTitle, {
      tone: 'inkSoft',
      anchor: 'middle',
      size: AXIS_TITLE_PX,
    }),
    text(MARGIN + 10, (top + bottom) / 2, figure.yTitle, {
      tone: 'inkSoft',
      anchor: 'middle',
      size: AXIS_TITLE_PX,
      upright: true,
    }),
    { kind: 'path', d: `M${MARGIN} ${height - 30}H${right}`, stroke: 'rule', strokeWidth: 1 },
    text(MARGIN, height - 12, originLine(origin), { tone: 'inkSoft', size: typeScale.small }),
  );
  const { title, sentence } = figure;
  return { width, height, title, sentence, clip: box, shapes };
}

/** "Crawler 1, breakwater · run 4f0c8a52 · engine 1.2.0" */
export const originLine = ({ recording, run, engineVersion }: Origin): string =>
  [recording, run && `run ${run}`, engineVersion && `engine ${engineVersion}`].filter(Boolean).join(' · ');

function placeLegend(legend: readonly LegendEntry[], left: number, right: number, top: number) {
  const placed: Shape[] = [];
  let [x, line] = [left, 0];
  for (const { label, sample } of legend) {
    const width = SAMPLE_PX + label.length * CHARACTER_PX + 18;
    if (x + width > right && x > left) [x, line] = [left, line + 1];
    const y = top + line * LINE;
    placed.push(...sample.map((shape) => moved(shape, x, y)));
    placed.push(text(x + SAMPLE_PX, y + 9, label, { tone: 'inkSoft', size: AXIS_TITLE_PX }));
    x += width;
  }
  return { placed, lines: legend.length > 0 ? line + 1 : 0 };
}

const moved = (shape: Shape, x: number, y: number): Shape =>
  shape.kind === 'path' ? { ...shape, at: [x, y] } : { ...shape, x: shape.x + x, y: shape.y + y };

type TextOptions = Partial<Omit<Extract<Shape, { kind: 'text' }>, 'kind' | 'x' | 'y' | 'text'>>;
const text = (x: number, y: number, words: string, options: TextOptions): Shape => ({
  kind: 'text',
  x,
  y,
  text: words,
  tone: 'ink',
  face: 'label',
  size: typeScale.label,
  ...options,
});
