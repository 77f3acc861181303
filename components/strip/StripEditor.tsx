import { useEffect, useMemo, useRef, useState } from 'react';
import { StyleSheet, View } from 'react-native';
import Svg, { Path } from 'react-native-svg';
import type { ChartGroup } from '@/components/charts/chart-group';
import { ShapeSet } from '@/components/charts/drawing/shape-set';
import { Button } from '@/components/ui/Button';
import { useTheme } from '@/components/ui/ThemeProvider';
import { web } from '@/components/ui/web-props';
import { hairline, radius, space } from '@/constants/theme';
import type { Strip as StripData } from '@/shared/contracts/recordings';
import type { Outage } from '@/shared/contracts/runs';
import { WindowGround, StripGround, StripLabels, LABELS_PX } from './Strip';
import { stripGeometry, stripLayout, stripSentence, type StripGeometry } from './strip-model';
import { useStripSurface } from './use-strip-surface';
import { WindowBar } from './WindowBar';
import { WindowHandles } from './WindowHandles';
import { OUTAGE_WINDOW } from './window-kinds';
import { drawOutage, placeWindow, sortWindows, type WindowPart } from './window-model';
import { windowKey } from './window-keys';
import { WindowSheet } from './WindowSheet';

export interface StripEditorProps {
  strip: StripData;
  height: number;
  windows: readonly Outage[];
  /** `settled` is false while a finger or the mouse still moves. Left out: the windows cannot be changed. */
  onChange?: (windows: Outage[], settled: boolean) => void;
  group: ChartGroup;
}

const USUAL_LENGTH_S = 60;

/** The strip at the head of the bench: outage windows are drawn, moved, resized, typed and removed on it. */
export function StripEditor({ strip, height, windows, onChange, group }: StripEditorProps) {
  const { palette } = useTheme();
  const [width, setWidth] = useState(0);
  const [selected, setSelected] = useState<number | null>(null);
  const [sheet, setSheet] = useState<{ index: number; initial: Outage } | null>(null);
  const limits = useMemo(() => ({ startS: strip.startS, endS: strip.endS }), [strip.startS, strip.endS]);
  const geometry = useMemo(
    () => stripGeometry(strip, stripLayout(width, height, 10, LABELS_PX)),
    [strip, width, height],
  );
  const surface = useStripSurface<Outage>(
    {
      x: () => geometry.x,
      limits: () => limits,
      windows: () => windows,
      editable: () => onChange !== undefined,
      draw: (before, fromS, toS, snapS) => drawOutage(before, limits, fromS, toS, snapS),
      change: (next, settled) => onChange?.(next, settled),
      select: setSelected,
      cursor: (timeS) => group.cursor.set(timeS),
    },
    geometry.layout.width > 0,
  );
  const card = useDeselectOutside(setSelected);
  const current = selected !== null && selected < windows.length ? selected : null;

  const change = (next: readonly Outage[]) => onChange?.(sortWindows(next), true);
  const remove = (index: number) => {
    change(windows.filter((_, i) => i !== index));
    setSelected(null);
    setSheet(null);
  };
  const add = () => {
    const middle = group.cursor.current ?? (group.viewport.current[0] + group.viewport.current[1]) / 2;
    const room = (strip.endS - strip.startS) / 3;
    const length = Math.max(1, Math.min(USUAL_LENGTH_S, Math.floor(room)));
    const window = placeWindow(windows, limits, middle, length);
    if (window) setSheet({ index: -1, initial: window });
  };
  const onKey = (index: number, part: WindowPart, key: string, shift: boolean): boolean => {
    if (key === 'Enter') {
      setSheet({ index, initial: windows[index]! });
      return true;
    }
    const next = windowKey(windows, limits, index, part, key, shift);
    if (!next) return false;
    onChange?.(next, true);
    if (next.length < windows.length) setSelected(null);
    return true;
  };

  return (
    <View ref={card} style={[styles.card, { backgroundColor: palette.sheet, borderColor: palette.rule }]}>
      <View style={styles.fill} onLayout={(event) => setWidth(Math.floor(event.nativeEvent.layout.width))}>
        {width > 0 ? (
          <>
            <View
              ref={surface}
              role="group"
              aria-label={`${stripSentence(strip, windows.length)}${
                onChange ? ' Arrow keys move the cursor, Enter adds an outage window.' : ''
              }`}
              {...web({
                tabIndex: 0,
                onKeyDown: (event) => {
                  if (event.key === 'Enter' && onChange) add();
                  else if (!moveCursor(group, event.key, event.shiftKey)) return;
                  event.preventDefault();
                },
              })}
              style={[styles.surface, { height }]}
            >
              <Svg width={width} height={height} aria-hidden>
                <StripGround geometry={geometry} />
                {windows.map((window, i) => (
                  <WindowGround key={i} geometry={geometry} window={window} />
                ))}
                <StripLabels geometry={geometry} windows={windows} selected={current} height={height} />
                <SharedMarks geometry={geometry} group={group} />
              </Svg>
            </View>
            {onChange ? (
              <WindowHandles
                geometry={geometry}
                kind={OUTAGE_WINDOW}
                windows={windows}
                limits={limits}
                selected={current}
                onFocus={setSelected}
                onKey={onKey}
              />
            ) : null}
            {onChange && current !== null ? (
              <WindowBar
                window={windows[current]!}
                x={(geometry.x(windows[current]!.startS) + geometry.x(windows[current]!.endS)) / 2}
                width={width}
                top={height}
                onZoom={() => group.viewport.show(around(windows[current]!))}
                onEdit={() => setSheet({ index: current, initial: windows[current]! })}
                onRemove={() => remove(current)}
                onClose={() => setSelected(null)}
              />
            ) : null}
          </>
        ) : null}
      </View>
      {onChange ? (
        <Button label="Add an outage window" icon="outage" iconOnly kind="plain" onPress={add} />
      ) : null}
      {sheet ? (
        <WindowSheet
          {...sheet}
          windows={windows}
          limits={limits}
          onApply={(window) => {
            change(
              sheet.index < 0
                ? [...windows, window]
                : windows.map((old, i) => (i === sheet.index ? window : old)),
            );
            setSheet(null);
          }}
          onRemove={() => remove(sheet.index)}
          onClose={() => setSheet(null)}
        />
      ) : null}
    </View>
  );
}

/** A window with more than half of its length beside it on either side. */
export function around({ startS, endS }: { startS: number; endS: number }): [number, number] {
  const margin = 0.7 * (endS - startS);
  return [startS - margin, endS + margin];
}

/** The cursor that all charts share, and under the profile what stretch they show. Set on the page without a render. */
function SharedMarks({ geometry, group }: { geometry: StripGeometry; group: ChartGroup }) {
  const { palette } = useTheme();
  const [shapes] = useState(() => new ShapeSet());
  useEffect(() => {
    const draw = () => {
      const at = group.cursor.current;
      shapes.set(
        'cursor',
        at === null ? '' : `M${geometry.x(at).toFixed(1)} 0V${geometry.layout.tickBottom}`,
      );
      const [from, to] = group.viewport.current;
      const y = geometry.layout.baseY + 1.5;
      const view = `M${geometry.x(from).toFixed(1)} ${y}H${geometry.x(to).toFixed(1)}`;
      shapes.set('view', group.viewport.zoomed ? view : '');
    };
    draw();
    const stop = [group.cursor.subscribe(draw), group.viewport.subscribe(draw)];
    return () => stop.forEach((unsubscribe) => unsubscribe());
  }, [geometry, group, shapes]);
  return (
    <>
      <Path ref={shapes.ref('view')} d="" stroke={palette.petrol} strokeWidth={3} />
      <Path ref={shapes.ref('cursor')} d="" stroke={palette.petrol} strokeWidth={1.5} />
    </>
  );
}

/** A press anywhere else lets the selected window go, so that its bar covers nothing. */
function useDeselectOutside(setSelected: (index: number | null) => void) {
  const card = useRef<View>(null);
  useEffect(() => {
    const element = card.current as unknown as HTMLElement | null;
    if (!element?.ownerDocument) return;
    const page = element.ownerDocument;
    const onDown = (event: PointerEvent) => {
      if (!element.contains(event.target as Node)) setSelected(null);
    };
    page.addEventListener('pointerdown', onDown);
    return () => page.removeEventListener('pointerdown', onDown);
  }, [setSelected]);
  return card;
}

function moveCursor(group: ChartGroup, key: string, shift: boolean): boolean {
  const direction = key === 'ArrowLeft' ? -1 : key === 'ArrowRight' ? 1 : 0;
  if (direction === 0) return false;
  const [from, to] = group.viewport.whole;
  const step = (to - from) / (shift ? 1000 : 100);
  const at = group.cursor.current ?? (from + to) / 2;
  group.cursor.set(Math.min(to, Math.max(from, at + direction * step)));
  return true;
}

const styles = StyleSheet.create({
  card: {
    borderWidth: hairline,
    borderRadius: radius,
    flexDirection: 'row',
    alignItems: 'center',
    paddingTop: space.s,
    zIndex: 5,
  },
  fill: { flex: 1, minWidth: 0 },
  surface: { userSelect: 'none' },
});
