/** The plan view worked out to path strings; TrackChart.tsx and the saved picture draw what is said here. Pure. */
import type { Inked, Tone } from '../figure/shapes';
import {
  planeExtent,
  sigmaEllipse,
  trackDots,
  trackFrame,
  trackPath,
  type PlanePoints,
  type TrackFrame,
} from './track';

export interface TrackPoint {
  timeS: number;
  northM: number;
  eastM: number;
  sigmaN: number;
  sigmaE: number;
  covNE: number;
}

/** What the plan view draws; read anew at each redraw. */
export interface TrackContent {
  /** The filter's track in order of time. */
  solution: () => PlanePoints & { timeAt: (index: number) => number };
  isCoasting: (timeS: number) => boolean;
  ghost: () => PlanePoints;
  /** The fixed-interval smoother's track; empty where the run has none. */
  smoothed: () => PlanePoints;
  fixes: () => PlanePoints;
  gnssOnly: () => PlanePoints;
  /** Truth or the aided solution where the vehicle coasted; `outage` numbers the pieces. */
  reference: () => PlanePoints & { outage: (index: number) => number };
  /** The solution nearest to a time, with its covariance. */
  pointAt: (timeS: number) => TrackPoint | null;
  sentence: () => string;
}

export interface TrackView {
  width: number;
  height: number;
  /** The stretch of time to fit; null: all of the track. */
  stretch: readonly [number, number] | null;
  /** The frame that the person has zoomed to, given the fitted one. */
  seen?: (fitted: TrackFrame) => TrackFrame;
}

/** The frame: all of the track, or the stretch of time that the charts show; null while there is nothing to fit. */
export function trackFrameOf(content: TrackContent, view: TrackView): TrackFrame | null {
  const solution = content.solution();
  const { stretch, width, height, seen = (fitted) => fitted } = view;
  const within = (timeS: number) => stretch !== null && timeS >= stretch[0] && timeS <= stretch[1];
  const inView: PlanePoints = stretch
    ? { ...solution, north: (i) => (within(solution.timeAt(i)) ? solution.north(i) : NaN) }
    : solution;
  const extent = planeExtent(stretch ? [inView] : [inView, content.fixes(), content.reference()]);
  return extent && seen(trackFrame(extent, { width, height, margin: MARGIN_PX }));
}

/** Paths by the ids of `TRACK_LAYERS`, and of the cursor. */
export function trackPaths(
  content: TrackContent,
  frame: TrackFrame,
  cursorS: number | null,
): Record<TrackLayerId | 'cursor', string> {
  const solution = content.solution();
  const coasting = (i: number) => content.isCoasting(solution.timeAt(i));
  const only = (keep: (i: number) => boolean): PlanePoints => ({
    ...solution,
    north: (i) => (keep(i) ? solution.north(i) : NaN),
  });
  const reference = content.reference();
  return {
    fixes: trackDots(content.fixes(), frame),
    gnssOnly: trackPath(content.gnssOnly(), frame),
    ghost: trackPath(content.ghost(), frame),
    smoothed: trackPath(content.smoothed(), frame),
    aided: trackPath(
      only((i) => !coasting(i)),
      frame,
    ),
    // One point beyond each side, so that the coasting piece joins the aided one.
    coasting: trackPath(
      only((i) => coasting(i) || coasting(i - 1) || coasting(i + 1)),
      frame,
    ),
    reference: trackPath(reference, frame, {
      cut: (i) => i > 0 && reference.outage(i) !== reference.outage(i - 1),
    }),
    ellipses: ellipses(content, solution, frame),
    cursor: cursorPath(content, cursorS, frame),
  };
}

/** Time of the track point nearest to a pixel; null when none is near. */
export function nearestTime(content: TrackContent, frame: TrackFrame, x: number, y: number): number | null {
  const solution = content.solution();
  let best = { distance: 40, timeS: null as number | null };
  for (let i = 0; i < solution.length; i++) {
    const distance = Math.hypot(frame.x(solution.east(i)) - x, frame.y(solution.north(i)) - y);
    if (distance < best.distance) best = { distance, timeS: solution.timeAt(i) };
  }
  return best.timeS;
}

export interface TrackLayer extends Inked {
  id: TrackLayerId;
  label: string;
  stroke: Tone;
  dots?: boolean;
}
export type TrackLayerId =
  'fixes' | 'gnssOnly' | 'ghost' | 'ellipses' | 'reference' | 'smoothed' | 'aided' | 'coasting';

/** From the lowest to the topmost. */
export const TRACK_LAYERS: readonly TrackLayer[] = [
  { id: 'fixes', label: 'GNSS fixes', dots: true, stroke: 'inkSoft', strokeWidth: 2.4, strokeOpacity: 0.55, round: true },
  { id: 'gnssOnly', label: 'GNSS alone', stroke: 'east', strokeWidth: 1.25, dash: '2 3' },
  { id: 'ghost', label: 'baseline', stroke: 'ghost', strokeWidth: 2, round: true },
  { id: 'ellipses', label: '95 % ellipse', stroke: 'petrol', strokeWidth: 1, strokeOpacity: 0.55, round: true },
  { id: 'reference', label: 'reference', stroke: 'pine', strokeWidth: 1.5, dash: '6 3' },
  { id: 'smoothed', label: 'smoothed', stroke: 'down', strokeWidth: 1.5, dash: '8 2 2 2' },
  { id: 'aided', label: 'aided', stroke: 'ink', strokeWidth: 1.75, round: true },
  { id: 'coasting', label: 'coasting', stroke: 'vermilion', strokeWidth: 2.25, round: true },
]; // prettier-ignore

const LEGEND_ORDER: readonly TrackLayerId[] = [
  'aided', 'coasting', 'smoothed', 'reference', 'fixes', 'gnssOnly', 'ellipses', 'ghost',
]; // prettier-ignore

/** What the legend names: the solution first, only what `content` has. */
export function trackLegend(content: TrackContent): TrackLayer[] {
  const has = (id: TrackLayerId) =>
    (id !== 'smoothed' || content.smoothed().length > 0) && (id !== 'ghost' || content.ghost().length > 0);
  return LEGEND_ORDER.filter(has).map((id) => TRACK_LAYERS.find((layer) => layer.id === id)!);
}

/** Ellipses spaced evenly along the drawn track, so that they neither crowd nor miss the outages. */
function ellipses(
  content: TrackContent,
  solution: ReturnType<TrackContent['solution']>,
  frame: TrackFrame,
): string {
  let path = '';
  let last: { x: number; y: number } | null = null;
  for (let i = 0; i < solution.length; i++) {
    const [x, y] = [frame.x(solution.east(i)), frame.y(solution.north(i))];
    if (last && Math.hypot(x - last.x, y - last.y) < ELLIPSE_SPACING_PX) continue;
    last = { x, y };
    const point = content.pointAt(solution.timeAt(i));
    if (point) path += sigmaEllipse(point, frame, ELLIPSE_SIGMAS);
  }
  return path;
}

function cursorPath(content: TrackContent, cursorS: number | null, frame: TrackFrame): string {
  const point = cursorS === null ? null : content.pointAt(cursorS);
  if (!point) return '';
  const [x, y] = [frame.x(point.eastM).toFixed(1), frame.y(point.northM).toFixed(1)];
  return `M${x} ${y}m-5 0a5 5 0 1 0 10 0a5 5 0 1 0 -10 0Z${sigmaEllipse(point, frame, ELLIPSE_SIGMAS)}`;
}

/** σ of the ellipses: 95 % of a plane normal error lies inside 2.45 σ. */
const ELLIPSE_SIGMAS = 2.4477;
const ELLIPSE_SPACING_PX = 42;
const MARGIN_PX = 34;
