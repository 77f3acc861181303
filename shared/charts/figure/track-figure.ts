/** The plan view as a figure, with scale bar and north. Pure. */
import { typeScale } from '@/shared/tokens';
import { scaleBar } from '../model/track';
import {
  TRACK_LAYERS,
  trackFrameOf,
  trackLegend,
  trackPaths,
  type TrackContent,
  type TrackLayer,
} from '../model/track-drawing';
import { formatAxisTime } from '../model/ticks';
import type { ChartFigure } from './sheet';
import type { Box, Inked, Shape } from './shapes';

/** The track, fitted to the `stretch` of time (null: all of it). */
export function trackFigure(content: TrackContent, stretch: readonly [number, number] | null): ChartFigure {
  return {
    title: 'Track',
    aside: stretch ? `${formatAxisTime(stretch[0], 0.1)} to ${formatAxisTime(stretch[1], 0.1)}` : '',
    legend: trackLegend(content).map((layer) => ({
      label: layer.label,
      sample: [{ kind: 'path', d: trackSample(layer), ...inkOfTrack(layer) }],
    })),
    xTitle: 'east, m (equal scale, north up)',
    yTitle: 'north, m',
    sentence: content.sentence(),
    aspect: 0.62,
    plot: (box) => trackShapes(content, stretch, box),
  };
}

function trackShapes(
  content: TrackContent,
  stretch: readonly [number, number] | null,
  box: Box,
): readonly Shape[] {
  const size = { width: box.right - box.left, height: box.bottom - box.top };
  const at = [box.left, box.top] as const;
  const rim: Shape = {
    kind: 'path',
    d: `M${box.left} ${box.top}H${box.right}V${box.bottom}H${box.left}Z`,
    stroke: 'rule',
    strokeWidth: 1,
  };
  const frame = trackFrameOf(content, { ...size, stretch });
  if (!frame) return [rim];
  const paths = trackPaths(content, frame, null);
  const bar = scaleBar(frame, Math.min(180, size.width / 3));
  return [
    rim,
    ...TRACK_LAYERS.map((layer): Shape => ({
      kind: 'path',
      d: paths[layer.id],
      at,
      clipped: true,
      ...inkOfTrack(layer),
    })),
    ...scaleAndNorth(bar, size).map((shape): Shape =>
      shape.kind === 'path' ? { ...shape, at } : { ...shape, x: shape.x + at[0], y: shape.y + at[1] },
    ),
  ];
}

/** Stroke of a layer's sample in the legend, 20 × 10 px. */
export const trackSample = ({ dots }: TrackLayer) => (dots ? 'M3 6h0M10 4h0M16 6h0' : 'M0 5H20');

const inkOfTrack = ({ stroke, strokeWidth, strokeOpacity, dash, round }: TrackLayer): Inked => ({
  stroke,
  strokeWidth,
  strokeOpacity,
  dash,
  round,
});

/** Scale bar at the lower left, north at the upper right, of a plot of the given size. */
export function scaleAndNorth(
  bar: { widthPx: number; label: string },
  { width, height }: { width: number; height: number },
): Shape[] {
  const [left, y] = [16, height - 14];
  const ink = { stroke: 'ink', strokeWidth: 1.25 } as const;
  return [
    { kind: 'path', d: `M${left} ${y - 5}v5h${bar.widthPx.toFixed(1)}v-5`, ...ink },
    {
      kind: 'text',
      x: left + 4,
      y: y - 6,
      text: bar.label,
      tone: 'ink',
      face: 'number',
      size: typeScale.small,
    },
    { kind: 'path', d: `M${width - 22} 34V12M${width - 27} 19l5 -8l5 8`, ...ink },
    {
      kind: 'text',
      x: width - 22,
      y: 48,
      text: 'N',
      tone: 'ink',
      face: 'strong',
      size: typeScale.small,
      anchor: 'middle',
    },
  ];
}
