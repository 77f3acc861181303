import { useCallback, useEffect, useLayoutEffect, useMemo, useRef, useState } from 'react';
import { StyleSheet, View } from 'react-native';
import Svg, { Path } from 'react-native-svg';
import type { Palette } from '@/constants/theme';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { web } from '@/components/ui/web-props';
import { bindChartGestures, chartKey } from './chart-gestures';
import type { ChartGroup } from './chart-group';
import { ChartLegend } from './ChartLegend';
import { ChartTable } from './ChartTable';
import { ChartAnnotations, ChartAxes, type AxesDrawing } from './drawing/ChartAxes';
import { inkOf } from '@/shared/charts/model/layer-style';
import { CurveCanvas } from './drawing/curve-canvas';
import { ShapeSet } from './drawing/shape-set';
import { timeFigure } from '@/shared/charts/figure/time-figure';
import { timeTables } from '@/shared/charts/figure/time-tables';
import { asideOf } from '@/shared/charts/model/aside';
import { emptyWords } from '@/shared/charts/model/empty';
import type { ChartContent } from '@/shared/charts/model/layers';
import { chartBuffers, drawChart, type PlotBox } from '@/shared/charts/model/time-chart';
import { SaveControl } from './SaveControl';

export interface TimeChartProps {
  content: ChartContent;
  group: ChartGroup;
  /** Of the whole chart: title, plot, time axis. */
  height: number;
  /** Clock labels below; the last chart of a stack shows them for all. */
  timeAxis?: boolean;
}

const GUTTER_PX = 46;
const HEAD_PX = 26;
const NARROW_PX = 520;

/** One chart of a stack that shares time and cursor. React draws frame and axes; curves are set straight on the page. */
export function TimeChart({ content, group, height, timeAxis = true }: TimeChartProps) {
  const { palette } = useTheme();
  const [width, setWidth] = useState(0);
  const [headPx, setHeadPx] = useState(HEAD_PX);
  const [axes, setAxes] = useState(NO_AXES);
  const plotHeight = Math.max(40, height - headPx);
  const box = useMemo<PlotBox>(
    () => ({
      left: GUTTER_PX,
      top: 8,
      right: Math.max(GUTTER_PX + 10, width - 10),
      bottom: plotHeight - (timeAxis ? 24 : 8),
    }),
    [width, plotHeight, timeAxis],
  );
  const [shapes] = useState(() => new ShapeSet());
  const [canvas] = useState(() => new CurveCanvas());
  const { surface, onKeyDown } = useChartSurface(group, box);
  useDrawing({ content, group, box, width, height: plotHeight, palette, canvas, shapes, setAxes });

  return (
    <View style={{ height }} onLayout={(event) => setWidth(event.nativeEvent.layout.width)}>
      <View
        style={[styles.head, { paddingLeft: GUTTER_PX }]}
        onLayout={(event) => setHeadPx(event.nativeEvent.layout.height)}
      >
        <ChartLegend
          content={content}
          group={group}
          aside={axes.aside}
          narrow={width < NARROW_PX}
          action={
            <SaveControl
              name={content.title}
              figure={() => timeFigure(content, group.viewport.current)}
              tables={() => timeTables(content, group.viewport.current, group.viewport.whole)}
            />
          }
        />
      </View>
      <View
        ref={surface}
        role="group"
        aria-label={`${content.title}. ${content.sentence()} ${KEYS_HINT}`}
        {...web({ tabIndex: 0, onKeyDown, 'aria-roledescription': 'chart over time' })}
        style={[styles.surface, { height: plotHeight }]}
      >
        {width > 0 ? (
          <Svg width={width} height={plotHeight} aria-hidden>
            <Path ref={shapes.ref('tint')} d="" fill={palette.vermilion} fillOpacity={0.08} />
            <ChartAxes axes={axes} box={box} timeAxis={timeAxis} />
            <Path
              ref={shapes.ref('hatch')}
              d=""
              stroke={palette.vermilion}
              strokeOpacity={0.38}
              strokeWidth={1}
            />
            <Path
              ref={shapes.ref('edges')}
              d=""
              stroke={palette.vermilion}
              strokeOpacity={0.5}
              strokeWidth={1}
            />
          </Svg>
        ) : null}
        {width > 0 ? (
          <canvas ref={canvas.ref()} aria-hidden style={{ ...OVER, width, height: plotHeight }} />
        ) : null}
        {width > 0 ? (
          <Svg width={width} height={plotHeight} aria-hidden style={styles.over}>
            <ChartAnnotations annotations={axes.annotations} />
            <Path ref={shapes.ref('brush')} d="" fill={palette.petrol} fillOpacity={0.16} />
            <Path ref={shapes.ref('cursor')} d="" stroke={palette.petrol} strokeWidth={1.5} />
          </Svg>
        ) : null}
        {axes.empty ? (
          <View style={styles.empty}>
            <Text variant="label" tone="soft" align="center">
              {axes.empty}
            </Text>
          </View>
        ) : null}
      </View>
      <ChartTable content={content} group={group} />
    </View>
  );
}

/** What React draws: it differs seldom. */
interface DrawnAxes extends AxesDrawing {
  aside: string;
  /** In place of an empty plot. */
  empty: string;
}

interface DrawingInput {
  content: ChartContent;
  group: ChartGroup;
  box: PlotBox;
  /** Of the surface, px. */
  width: number;
  height: number;
  palette: Palette;
  canvas: CurveCanvas;
  shapes: ShapeSet;
  setAxes: (axes: DrawnAxes) => void;
}

/** Draws with the group's frames: paths straight to the page, axes to React only when they differ. */
function useDrawing(input: DrawingInput): void {
  const { content, group, box, width, height, palette, canvas, shapes, setAxes } = input;
  const keep = useRef(chartBuffers());
  const lastAxes = useRef('');
  useLayoutEffect(() => {
    if (width === 0) return;
    const drawCursor = () => {
      const at = group.cursor.current;
      const [from, to] = group.viewport.current;
      const inView = at !== null && at >= from && at <= to;
      const x = inView ? box.left + ((at - from) / (to - from || 1)) * (box.right - box.left) : 0;
      shapes.set('cursor', inView ? `M${Math.round(x * 10) / 10} ${box.top}V${box.bottom}` : '');
    };
    const drawBrush = () => {
      const [from, to] = group.viewport.current;
      const place = (timeS: number) =>
        Math.min(
          box.right,
          Math.max(box.left, box.left + ((timeS - from) / (to - from || 1)) * (box.right - box.left)),
        );
      const [left, right] = group.brush.current?.map(place) ?? [];
      shapes.set(
        'brush',
        left === undefined || right === undefined
          ? ''
          : `M${left.toFixed(1)} ${box.top}H${right.toFixed(1)}V${box.bottom}H${left.toFixed(1)}Z`,
      );
    };
    const draw = () => {
      const drawing = drawChart(content, group.viewport.current, box, keep.current);
      const curves = content.layers.flatMap((layer) => {
        const paths = drawing.layers[layer.id];
        return paths ? [{ paths, ink: inkOf(layer, palette) }] : [];
      });
      canvas.paint(curves, box, width, height);
      shapes.set('tint', drawing.ground.tint);
      shapes.set('hatch', drawing.ground.hatch);
      shapes.set('edges', drawing.ground.edges);
      drawCursor();
      const axes = {
        valueTicks: drawing.valueTicks,
        timeTicks: drawing.timeTicks,
        annotations: drawing.annotations,
        aside: asideOf(content, drawing.beyond),
        empty: emptyWords(content),
      };
      const key = JSON.stringify(axes);
      if (key !== lastAxes.current) {
        lastAxes.current = key;
        setAxes(axes);
      }
    };
    const remove = group.add(draw);
    const stop = [group.cursor.subscribe(drawCursor), group.brush.subscribe(drawBrush)];
    return () => {
      remove();
      stop.forEach((unsubscribe) => unsubscribe());
    };
  }, [content, group, box, width, height, palette, canvas, shapes, setAxes]);
}

function useChartSurface(group: ChartGroup, box: PlotBox) {
  const surface = useRef<View>(null);
  const edges = useRef(box);
  useEffect(() => {
    edges.current = box;
  }, [box]);
  useEffect(() => {
    const element = surface.current as unknown as HTMLElement | null;
    if (!element?.addEventListener) return;
    return bindChartGestures(element, group, () => edges.current);
  }, [group]);
  const onKeyDown = useCallback(
    (event: { key: string; shiftKey: boolean; preventDefault: () => void }) => {
      if (chartKey(group, event.key, event.shiftKey)) event.preventDefault();
    },
    [group],
  );
  return { surface, onKeyDown };
}

const NO_AXES: DrawnAxes = { valueTicks: [], timeTicks: [], annotations: [], aside: '', empty: '' };
const KEYS_HINT = 'Arrow keys move the cursor, plus and minus zoom, 0 shows all.';

/** Over the grid, under the cursor. */
const OVER = { position: 'absolute', left: 0, top: 0, pointerEvents: 'none' } as const;

const styles = StyleSheet.create({
  over: OVER,
  head: { paddingRight: 10, zIndex: 1 },
  empty: {
    position: 'absolute',
    inset: 0,
    paddingHorizontal: GUTTER_PX,
    alignItems: 'center',
    justifyContent: 'center',
    pointerEvents: 'none',
  },
  surface: { userSelect: 'none', cursor: 'auto' },
});
