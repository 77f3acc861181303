import { useLayoutEffect, useRef, useState } from 'react';
import { StyleSheet, View } from 'react-native';
import Svg, { Path } from 'react-native-svg';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { web } from '@/components/ui/web-props';
import { space } from '@/constants/theme';
import { chartKey } from './chart-gestures';
import type { ChartGroup } from './chart-group';
import { Shapes, svgInk } from './drawing/Shapes';
import { ShapeSet } from './drawing/shape-set';
import { scaleAndNorth, trackFigure, trackSample } from '@/shared/charts/figure/track-figure';
import { trackTables } from '@/shared/charts/figure/track-tables';
import {
  nearestTime,
  TRACK_LAYERS,
  trackFrameOf,
  trackLegend,
  trackPaths,
  type TrackContent,
} from '@/shared/charts/model/track-drawing';
import { scaleBar } from '@/shared/charts/model/track';
import { bindPlanGestures, PlanView } from './plan-view';
import { SaveControl } from './SaveControl';

export interface TrackChartProps {
  content: TrackContent;
  group: ChartGroup;
  height: number;
}

/** The track in plan: equal scale, north up; aided and coasting, fixes, GNSS alone, 95 % ellipses, the shared cursor. */
export function TrackChart({ content, group, height }: TrackChartProps) {
  const { palette } = useTheme();
  const [width, setWidth] = useState(0);
  const [bar, setBar] = useState({ widthPx: 0, label: '' });
  const [empty, setEmpty] = useState(false);
  const [shapes] = useState(() => new ShapeSet());
  const [view] = useState(() => new PlanView());
  const surface = useRef<View>(null);
  // On a narrow screen the legend takes several lines, and the plot what they leave.
  const [headPx, setHeadPx] = useState(HEAD_PX);
  const plotHeight = Math.max(60, height - headPx);

  useLayoutEffect(() => {
    if (width === 0) return;
    const frameNow = () =>
      trackFrameOf(content, {
        width,
        height: plotHeight,
        stretch: group.viewport.zoomed ? group.viewport.current : null,
        seen: (fitted) => view.apply(fitted, width, plotHeight),
      });
    const draw = () => {
      const frame = frameNow();
      setEmpty(!frame);
      const paths = frame && trackPaths(content, frame, group.cursor.current);
      for (const id of [...TRACK_LAYERS.map((layer) => layer.id), 'cursor'] as const)
        shapes.set(id, paths?.[id] ?? '');
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
            const frame = frameNow();
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
          <Text variant="small" tone="soft" style={styles.unit}>
            north up · m
          </Text>
          <SaveControl
            name="Track"
            figure={() => trackFigure(content, group.viewport.zoomed ? group.viewport.current : null)}
            tables={() => trackTables(content, group.viewport.current, group.viewport.zoomed)}
          />
        </View>
        <View style={styles.legend}>
          {trackLegend(content).map((layer) => (
            <View key={layer.id} style={styles.entry}>
              <Svg width={20} height={10} aria-hidden>
                <Path {...svgInk(layer, palette)} d={trackSample(layer)} />
              </Svg>
              <Text variant="small" tone="soft">
                {layer.label}
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
            {TRACK_LAYERS.map((layer) => (
              <Path key={layer.id} ref={shapes.ref(layer.id)} d="" {...svgInk(layer, palette)} />
            ))}
            <Path
              ref={shapes.ref('cursor')}
              d=""
              stroke={palette.petrol}
              strokeWidth={2}
              fill={palette.sheet}
            />
            {empty ? null : <Shapes shapes={scaleAndNorth(bar, { width, height: plotHeight })} />}
          </Svg>
        ) : null}
        {empty ? (
          <Text variant="label" tone="soft" align="center" style={styles.empty}>
            No position in this stretch of time yet.
          </Text>
        ) : null}
      </View>
    </View>
  );
}

/** Before the head is measured. */
const HEAD_PX = 48;

const styles = StyleSheet.create({
  head: {
    paddingHorizontal: space.m,
    paddingTop: space.s,
    paddingBottom: space.xs,
    gap: 2,
    zIndex: 1,
  },
  title: { flexDirection: 'row', alignItems: 'center', gap: space.m },
  unit: { marginLeft: 'auto' },
  legend: { flexDirection: 'row', flexWrap: 'wrap', columnGap: space.m },
  entry: { flexDirection: 'row', alignItems: 'center', gap: space.xs },
  surface: { userSelect: 'none', overflow: 'hidden' },
  empty: { position: 'absolute', top: '40%', left: 0, right: 0 },
});
