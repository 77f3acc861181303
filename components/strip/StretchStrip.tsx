import { useMemo, useState } from 'react';
import { StyleSheet, View } from 'react-native';
import Svg, { Path } from 'react-native-svg';
import { useTheme } from '@/components/ui/ThemeProvider';
import type { Strip as StripData } from '@/shared/contracts/recordings';
import { StripGround, StripLabels, WindowGround, LABELS_PX } from './Strip';
import { FoundGround } from './FoundGround';
import { stretchAt, type Stretch } from './stretches';
import { stripGeometry, stripLayout, stripSentence } from './strip-model';
import { useStripSurface } from './use-strip-surface';
import { WindowHandles } from './WindowHandles';
import { CHOSEN_STRETCH } from './window-kinds';
import { drawWindow, type WindowLimits } from './window-model';
import { windowKey } from './window-keys';

export interface StretchStripProps {
  strip: StripData;
  height: number;
  /** Marked on the ground; a tap chooses one. */
  found: readonly Stretch[];
  chosen: Stretch | null;
  /** `settled` is false while a finger or the mouse still moves. */
  onChoose: (stretch: Stretch, settled: boolean) => void;
}

/** A strip on which one stretch is chosen: by tapping one that was found, by drawing, by its edges, or by keys. */
export function StretchStrip({ strip, height, found, chosen, onChoose }: StretchStripProps) {
  const { palette } = useTheme();
  const [width, setWidth] = useState(0);
  const [at, setAt] = useState<number | null>(null);
  const limits = useMemo(() => ({ startS: strip.startS, endS: strip.endS }), [strip.startS, strip.endS]);
  const geometry = useMemo(
    () => stripGeometry(strip, stripLayout(width, height, 10, LABELS_PX)),
    [strip, width, height],
  );
  const windows = useMemo(() => (chosen ? [{ startS: chosen[0], endS: chosen[1] }] : []), [chosen]);
  const choose = ([window]: WindowLimits[], settled: boolean) => {
    if (window) onChoose([window.startS, window.endS], settled);
  };
  const surface = useStripSurface<WindowLimits>(
    {
      x: () => geometry.x,
      limits: () => limits,
      windows: () => windows,
      editable: () => true,
      // A stretch at rest often fills the recording: what is wanted is a part of it, not the same elsewhere.
      drawsInside: true,
      draw: (_, fromS, toS, by) => {
        const drawn = drawWindow([], limits, fromS, toS, by);
        return drawn && [drawn];
      },
      change: choose,
      select: () => undefined,
      cursor: setAt,
      tap: (timeS, reachS) => {
        const stretch = stretchAt(found, timeS, reachS);
        if (stretch) onChoose(stretch, true);
      },
    },
    width > 0,
  );
  return (
    <View onLayout={(event) => setWidth(Math.floor(event.nativeEvent.layout.width))} style={{ height }}>
      {width > 0 ? (
        <>
          <View ref={surface} style={[styles.surface, { height }]}>
            <View role="img" aria-label={sentence(strip, found.length)}>
              <Svg width={width} height={height} aria-hidden>
                {found.map((stretch) => (
                  <FoundGround key={stretch[0]} geometry={geometry} stretch={stretch} />
                ))}
                <StripGround geometry={geometry} />
                {windows.map((window) => (
                  <WindowGround key="chosen" geometry={geometry} window={window} tone={CHOSEN_STRETCH.tone} />
                ))}
                <StripLabels
                  geometry={geometry}
                  windows={windows}
                  selected={0}
                  height={height}
                  tone={CHOSEN_STRETCH.tone}
                />
                {at === null ? null : (
                  <Path
                    d={`M${geometry.x(at).toFixed(1)} 0V${geometry.layout.tickBottom}`}
                    stroke={palette.petrol}
                    strokeWidth={1}
                  />
                )}
              </Svg>
            </View>
          </View>
          <WindowHandles
            geometry={geometry}
            kind={CHOSEN_STRETCH}
            windows={windows}
            limits={limits}
            selected={0}
            onFocus={() => undefined}
            onKey={(index, part, key, shift) => {
              const next = windowKey(windows, limits, index, part, key, shift);
              if (!next || next.length === 0) return false;
              choose(next, true);
              return true;
            }}
          />
        </>
      ) : null}
    </View>
  );
}

const sentence = (strip: StripData, found: number) =>
  `${stripSentence(strip, 0)} ${found === 0 ? 'No stretch' : found === 1 ? 'One stretch' : `${found} stretches`} at rest found.`;

const styles = StyleSheet.create({ surface: { userSelect: 'none' } });
