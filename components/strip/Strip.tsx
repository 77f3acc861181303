import { useMemo } from 'react';
import { View } from 'react-native';
import Svg, { G, Path, Rect, Text as SvgText } from 'react-native-svg';
import type { Strip as StripData } from '@/shared/contracts/recordings';
import { hatchPath } from '@/shared/charts/model/hatch';
import { useTheme } from '@/components/ui/ThemeProvider';
import { fonts, typeScale } from '@/constants/theme';
import { placeLabels } from './labels';
import { stripGeometry, stripLayout, stripSentence, type StripGeometry } from './strip-model';
import type { WindowTone } from './window-kinds';

export interface StripProps {
  strip: StripData;
  width: number;
  height: number;
  /** Hatched vermilion. */
  outages?: readonly { startS: number; endS: number }[];
  /** No clock and no lengths below: for lists and pickers. */
  compact?: boolean;
  /** Time of the shared cursor, s. */
  cursor?: number | null;
}

/** A recording drawn so that a person knows it again: speed in ink, GNSS as ticks, clipped and missing stretches, outages. */
export function Strip({ strip, width, height, outages = [], compact, cursor }: StripProps) {
  const { palette } = useTheme();
  const geometry = useMemo(
    () => stripGeometry(strip, stripLayout(width, height, compact ? 0 : 8, compact ? 0 : LABELS_PX)),
    [strip, width, height, compact],
  );
  if (!(width > 0)) return <View style={{ height }} />;
  return (
    <View role="img" aria-label={stripSentence(strip, outages.length)} style={{ width, height }}>
      <Svg width={width} height={height} aria-hidden>
        <StripGround geometry={geometry} />
        {outages.map((window, i) => (
          <WindowGround key={i} geometry={geometry} window={window} />
        ))}
        {compact ? null : <StripLabels geometry={geometry} windows={outages} height={height} />}
        {cursor === null || cursor === undefined ? null : (
          <Path
            d={`M${geometry.x(cursor)} 0V${geometry.layout.tickBottom}`}
            stroke={palette.petrol}
            strokeWidth={1.5}
          />
        )}
      </Svg>
    </View>
  );
}

/** What the recording itself is: profile, ground, fixes, clipped and missing stretches. */
export function StripGround({ geometry }: { geometry: StripGeometry }) {
  const { palette } = useTheme();
  const { layout } = geometry;
  return (
    <G>
      {geometry.gaps.map((gap, i) => (
        <Rect
          key={i}
          x={gap.x}
          y={layout.profileTop}
          width={gap.width}
          height={layout.tickBottom - layout.profileTop}
          fill={palette.well}
        />
      ))}
      <Path d={geometry.profile} fill={palette.profile} />
      <Path d={geometry.ground} stroke={palette.inkSoft} strokeWidth={1} />
      {geometry.clipped.map((span, i) => (
        <Rect key={i} x={span.x} y={layout.baseY - 9} width={span.width} height={9} fill={palette.ochre} />
      ))}
      <Path d={geometry.fixes} stroke={palette.profile} strokeWidth={1} />
      <Path d={geometry.sparse} stroke={palette.ochre} strokeWidth={1.5} />
    </G>
  );
}

/** One window: tint, edges, and hatching where the filter coasts. */
export function WindowGround({
  geometry,
  window,
  tone = 'vermilion',
}: {
  geometry: StripGeometry;
  window: { startS: number; endS: number };
  tone?: WindowTone;
}) {
  const { palette } = useTheme();
  const [left, right] = [geometry.x(window.startS), geometry.x(window.endS)];
  const bottom = geometry.layout.tickBottom;
  const width = Math.max(1, right - left);
  const ink = palette[tone];
  return (
    <G>
      <Rect x={left} y={0} width={width} height={bottom} fill={ink} fillOpacity={0.1} />
      {tone === 'vermilion' ? (
        <Path
          d={hatchPath(left, 0, right - left, bottom, 7)}
          stroke={ink}
          strokeOpacity={0.45}
          strokeWidth={1}
        />
      ) : null}
      <Path d={`M${left} 0V${bottom}M${right} 0V${bottom}`} stroke={ink} strokeWidth={1.25} />
    </G>
  );
}

/** The clock and the windows' lengths under the strip. */
export function StripLabels({
  geometry,
  windows,
  selected,
  height,
  tone = 'vermilion',
}: {
  geometry: StripGeometry;
  windows: readonly { startS: number; endS: number }[];
  selected?: number | null;
  height: number;
  tone?: WindowTone;
}) {
  const { palette } = useTheme();
  const labels = placeLabels({ x: geometry.x, windows, selected, characterPx: LABEL_CHARACTER_PX });
  return (
    <G>
      {labels.map((label) => (
        <SvgText
          key={`${label.kind}${label.window ?? label.text}`}
          x={label.x}
          y={height - 4}
          textAnchor="middle"
          fontSize={typeScale.small}
          fontFamily={label.kind === 'window' ? fonts.labelStrong : fonts.label}
          fill={label.kind === 'window' ? palette[tone] : palette.inkSoft}
        >
          {label.text}
        </SvgText>
      ))}
    </G>
  );
}

/** Height of the labels' line, px. */
export const LABELS_PX = 20;
const LABEL_CHARACTER_PX = 6.2;
