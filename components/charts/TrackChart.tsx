import { useLayoutEffect, useRef, useState } from 'react';
import { StyleSheet, View } from 'react-native';
import Svg, { Path, Text as SvgText } from 'react-native-svg';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { web } from '@/components/ui/web-props';
import { fonts, space, typeScale, type Palette } from '@/constants/theme';
import { chartKey } from './chart-gestures';
import type { ChartGroup } from './chart-group';
import { ShapeSet } from './drawing/shape-set';
import {
  planeExtent,
  scaleBar,
  sigmaEllipse,
  trackDots,
  trackFrame,
  trackPath,
  type PlanePoints,
  type TrackFrame,
} from './model/track';
import { bindPlanGestures, PlanView } from './plan-view';

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
  fixes: () => PlanePoints;
  gnssOnly: () => PlanePoints;
  /** Truth or the aided solution where the vehicle coasted; `outage` numbers the pieces. */
  reference: () => PlanePoints & { outage: (index: number) => number };
  /** The solution nearest to a time, with its covariance. */
  pointAt: (timeS: number) => TrackPoint | null;
  sentence: () => string;
}

export interface TrackChartProps {
  content: TrackContent;
  group: ChartGroup;
  height: number;
}

/** σ of the ellipses: 95 % of a plane normal error lies inside 2.45 σ. */
const ELLIPSE_SIGMAS = 2.4477;
const ELLIPSE_SPACING_PX = 42;

/** The track in plan: equal scale, north up; aided and coasting, fixes, GNSS alone, 95 % ellipses, the shared cursor. */
export function TrackChart({ content, group, height }: TrackChartProps) {
  const { palette } = useTheme();
  const [width, setWidth] = useState(0);
  const [bar, setBar] = useState({ widthPx: 0, label: '' });
  const [shapes] = useState(() => new ShapeSet());
  const [view] = useState(() => new PlanView());
  const surface = useRef<View>(null);
  // On a narrow screen the legend takes several lines, and the plot what they leave.
  const [headPx, setHeadPx] = useState(HEAD_PX);
  const plotHeight = Math.max(60, height - headPx);

  useLayoutEffect(() => {
    if (width === 0) return;
    const draw = () => {
      const frame = drawTrack(content, group, view, { width, height: plotHeight }, shapes);
      if (!frame) return;
      const { widthPx, label } = scaleBar(frame, Math.min(140, width / 3));
      setBar((old) =>
        old.label === label && Math.abs(old.widthPx - widthPx) < 0.5 ? old : { widthPx, label },
      );
    };
    const remove = group.add(draw);
    const unsubscribe = group.cursor.subscribe(() => group.invalidate(draw));
    const element = surface.current as unknown as HTMLElement | null;
    const unbind = element?.addEventListener
      ? bindPlanGestures(element, {
          view,
          size: () => ({ width, height: plotHeight }),
          changed: () => group.invalidate(draw),
          point: (x, y) => {
            const frame = frameOf(content, group, view, { width, height: plotHeight });
            const timeS = frame && nearestTime(content, frame, x, y);
            if (timeS !== null) group.cursor.set(timeS);
          },
          leave: () => group.cursor.set(null),
        })
      : undefined;
    return () => {
      remove();
      unsubscribe();
      unbind?.();
    };
  }, [content, group, view, width, plotHeight, shapes]);

  return (
    <View style={{ height }} onLayout={(event) => setWidth(Math.floor(event.nativeEvent.layout.width))}>
      <View style={styles.head} onLayout={(event) => setHeadPx(Math.ceil(event.nativeEvent.layout.height))}>
        <View style={styles.title}>
          <Text variant="label" strong level={3}>
            Track
          </Text>
          <Text variant="small" tone="soft">
            north up · m
          </Text>
        </View>
        <View style={styles.legend}>
          {LEGEND.map(({ label, ...ink }) => (
            <View key={label} style={styles.entry}>
              <Svg width={20} height={10} aria-hidden>
                <Path {...inkOf(ink, palette)} d={ink.kind === 'dots' ? 'M3 6h0M10 4h0M16 6h0' : 'M0 5H20'} />
              </Svg>
              <Text variant="small" tone="soft">
                {label}
              </Text>
            </View>
          ))}
        </View>
      </View>
      <View
        ref={surface}
        role="group"
        aria-label={`Track in plan view. ${content.sentence()} Arrow keys move the cursor along the track.`}
        {...web({
          tabIndex: 0,
          onKeyDown: (event) => {
            if (chartKey(group, event.key, event.shiftKey)) event.preventDefault();
          },
        })}
        style={[styles.surface, { height: plotHeight, backgroundColor: palette.sheet }]}
      >
        {width > 0 ? (
          <Svg width={width} height={plotHeight} aria-hidden>
            {SHAPES.map((ink) => (
              <Path key={ink.id} ref={shapes.ref(ink.id)} d="" {...inkOf(ink, palette)} />
            ))}
            <Path
              ref={shapes.ref('cursor')}
              d=""
              stroke={palette.petrol}
              strokeWidth={2}
              fill={palette.sheet}
            />
            <ScaleAndNorth bar={bar} width={width} height={plotHeight} />
          </Svg>
        ) : null}
      </View>
    </View>
  );
}

function ScaleAndNorth({
  bar,
  width,
  height,
}: {
  bar: { widthPx: number; label: string };
  width: number;
  height: number;
}) {
  const { palette } = useTheme();
  const [left, y] = [16, height - 14];
  return (
    <>
      <Path
        d={`M${left} ${y - 5}v5h${bar.widthPx.toFixed(1)}v-5`}
        stroke={palette.ink}
        strokeWidth={1.25}
        fill="none"
      />
      <SvgText x={left + 4} y={y - 6} fontSize={typeScale.small} fontFamily={fonts.number} fill={palette.ink}>
        {bar.label}
      </SvgText>
      <Path
        d={`M${width - 22} 34V12M${width - 27} 19l5 -8l5 8`}
        stroke={palette.ink}
        strokeWidth={1.25}
        fill="none"
      />
      <SvgText
        x={width - 22}
        y={48}
        textAnchor="middle"
        fontSize={typeScale.small}
        fontFamily={fonts.labelStrong}
        fill={palette.ink}
      >
        N
      </SvgText>
    </>
  );
}

interface Size {
  width: number;
  height: number;
}

/** The frame: all of the track, or the stretch of time that the charts show. */
function frameOf(content: TrackContent, group: ChartGroup, view: PlanView, size: Size): TrackFrame | null {
  const solution = content.solution();
  const [from, to] = group.viewport.current;
  const inView: PlanePoints = group.viewport.zoomed
    ? {
        ...solution,
        north: (i) => (solution.timeAt(i) >= from && solution.timeAt(i) <= to ? solution.north(i) : NaN),
      }
    : solution;
  const extent = planeExtent(
    group.viewport.zoomed ? [inView] : [inView, content.fixes(), content.reference()],
  );
  return extent && view.apply(trackFrame(extent, { ...size, margin: 34 }), size.width, size.height);
}

function drawTrack(
  content: TrackContent,
  group: ChartGroup,
  view: PlanView,
  size: Size,
  shapes: ShapeSet,
): TrackFrame | null {
  const frame = frameOf(content, group, view, size);
  if (!frame) {
    for (const { id } of SHAPES) shapes.set(id, '');
    return null;
  }
  const solution = content.solution();
  const coasting = (i: number) => content.isCoasting(solution.timeAt(i));
  const only = (keep: (i: number) => boolean): PlanePoints => ({
    ...solution,
    north: (i) => (keep(i) ? solution.north(i) : NaN),
  });
  const reference = content.reference();
  shapes.set('fixes', trackDots(content.fixes(), frame));
  shapes.set('gnssOnly', trackPath(content.gnssOnly(), frame));
  shapes.set('ghost', trackPath(content.ghost(), frame));
  shapes.set(
    'aided',
    trackPath(
      only((i) => !coasting(i)),
      frame,
    ),
  );
  // One point beyond each side, so that the coasting piece joins the aided one.
  shapes.set(
    'coasting',
    trackPath(
      only((i) => coasting(i) || coasting(i - 1) || coasting(i + 1)),
      frame,
    ),
  );
  shapes.set(
    'reference',
    trackPath(reference, frame, { cut: (i) => i > 0 && reference.outage(i) !== reference.outage(i - 1) }),
  );
  shapes.set('ellipses', ellipses(content, solution, frame));
  shapes.set('cursor', cursorPath(content, group, frame));
  return frame;
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

function cursorPath(content: TrackContent, group: ChartGroup, frame: TrackFrame): string {
  const at = group.cursor.current;
  const point = at === null ? null : content.pointAt(at);
  if (!point) return '';
  const [x, y] = [frame.x(point.eastM).toFixed(1), frame.y(point.northM).toFixed(1)];
  return `M${x} ${y}m-5 0a5 5 0 1 0 10 0a5 5 0 1 0 -10 0Z${sigmaEllipse(point, frame, ELLIPSE_SIGMAS)}`;
}

/** Time of the track point nearest to a pixel; null when none is near. */
function nearestTime(content: TrackContent, frame: TrackFrame, x: number, y: number): number | null {
  const solution = content.solution();
  let best = { distance: 40, timeS: null as number | null };
  for (let i = 0; i < solution.length; i++) {
    const distance = Math.hypot(frame.x(solution.east(i)) - x, frame.y(solution.north(i)) - y);
    if (distance < best.distance) best = { distance, timeS: solution.timeAt(i) };
  }
  return best.timeS;
}

interface TrackInk {
  kind: 'line' | 'dots';
  tone: keyof Palette;
  width: number;
  dash?: string;
  opacity?: number;
}
const SHAPES: readonly (TrackInk & { id: string })[] = [
  { id: 'fixes', kind: 'dots', tone: 'inkSoft', width: 2.4, opacity: 0.55 },
  { id: 'gnssOnly', kind: 'line', tone: 'east', width: 1.25, dash: '2 3' },
  { id: 'ghost', kind: 'line', tone: 'ghost', width: 2 },
  { id: 'ellipses', kind: 'line', tone: 'petrol', width: 1, opacity: 0.55 },
  { id: 'reference', kind: 'line', tone: 'pine', width: 1.5, dash: '6 3' },
  { id: 'aided', kind: 'line', tone: 'ink', width: 1.75 },
  { id: 'coasting', kind: 'line', tone: 'vermilion', width: 2.25 },
];
const LEGEND: readonly (TrackInk & { label: string })[] = [
  { label: 'aided', ...SHAPES[5]! },
  { label: 'coasting', ...SHAPES[6]! },
  { label: 'reference', ...SHAPES[4]! },
  { label: 'GNSS fixes', ...SHAPES[0]! },
  { label: 'GNSS alone', ...SHAPES[1]! },
  { label: '95 % ellipse', ...SHAPES[3]! },
  { label: 'baseline', ...SHAPES[2]! },
];

function inkOf({ kind, tone, width, dash, opacity = 1 }: TrackInk, palette: Palette) {
  return {
    fill: 'none',
    stroke: palette[tone],
    strokeWidth: width,
    strokeOpacity: opacity,
    strokeDasharray: dash,
    strokeLinecap: kind === 'dots' || !dash ? ('round' as const) : ('butt' as const),
    strokeLinejoin: 'round' as const,
  };
}

/** Before the head is measured. */
const HEAD_PX = 48;

const styles = StyleSheet.create({
  head: {
    paddingHorizontal: space.m,
    paddingTop: space.s,
    paddingBottom: space.xs,
    gap: 2,
  },
  title: { flexDirection: 'row', alignItems: 'baseline', justifyContent: 'space-between', gap: space.m },
  legend: { flexDirection: 'row', flexWrap: 'wrap', columnGap: space.m },
  entry: { flexDirection: 'row', alignItems: 'center', gap: space.xs },
  surface: { userSelect: 'none', overflow: 'hidden' },
});
