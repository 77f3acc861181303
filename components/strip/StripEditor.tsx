import { useMemo, useState } from 'react';
import { StyleSheet, View } from 'react-native';
import Svg from 'react-native-svg';
import type { ChartGroup } from '@/components/charts/chart-group';
import { useTheme } from '@/components/ui/ThemeProvider';
import { web } from '@/components/ui/web-props';
import { hairline, radius, space } from '@/constants/theme';
import type { Strip as StripData } from '@/shared/contracts/recordings';
import type { Outage } from '@/shared/contracts/runs';
import { WindowGround, StripGround, StripLabels, LABELS_PX } from './Strip';
import { SharedMarks } from './SharedMarks';
import { useDeselectOutside } from './use-deselect-outside';
import { StripButtons } from './StripButtons';
import { snapTime } from './snapping';
import { stripGeometry, stripLayout, stripSentence } from './strip-model';
import { useStripSurface } from './use-strip-surface';
import { WindowBar } from './WindowBar';
import { WindowHandles } from './WindowHandles';
import { OUTAGE_WINDOW } from './window-kinds';
import { drawOutage, placeWindow, SNAP_S, sortWindows, type WindowPart } from './window-model';
import { windowKey } from './window-keys';
import { WindowSheet } from './WindowSheet';

export interface StripEditorProps {
  strip: StripData;
  height: number;
  windows: readonly Outage[];
  /** `settled` is false while a finger or the mouse still moves. Left out: the windows cannot be changed. */
  onChange?: (windows: Outage[], settled: boolean) => void;
  group: ChartGroup;
  /** What a run here has to withhold. */
  withholdable?: readonly Outage['withhold'][];
  /** Times of the fixes, where all are known: windows then begin and end at one. */
  epochsS?: ArrayLike<number>;
}

const GNSS_PARTS = ['gnss', 'position', 'velocity'] as const;
const NO_EPOCHS: readonly number[] = [];
const USUAL_LENGTH_S = 60;

/** The strip at the head of the bench: outage windows are drawn, moved, resized, typed and removed on it. */
export function StripEditor(props: StripEditorProps) {
  const { strip, height, windows, onChange, group, withholdable = GNSS_PARTS, epochsS = NO_EPOCHS } = props;
  const { palette } = useTheme();
  const [width, setWidth] = useState(0);
  const [selected, setSelected] = useState<number | null>(null);
  const [sheet, setSheet] = useState<{ index: number; initial: Outage } | null>(null);
  const [snaps, setSnaps] = useState(true);
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
      draw: (before, fromS, toS, by) => drawOutage(before, limits, fromS, toS, by),
      change: (next, settled) => onChange?.(next, settled),
      select: setSelected,
      cursor: (timeS) => group.cursor.set(timeS),
      snap: (timeS, others, reachS) => snapTime({ timeS, stepS: SNAP_S, others, reachS, epochsS }),
      snaps: () => snaps,
      clockTop: () => geometry.layout.tickBottom,
      brush: (stretch, done) => {
        group.brush.set(done ? null : stretch);
        if (done) group.viewport.show(stretch);
      },
      clockTap: () => group.viewport.reset(),
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
              } A drag along its clock zooms the charts.`}
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
        <StripButtons
          onAdd={add}
          windows={windows}
          limits={limits}
          withholdable={withholdable}
          onSchedule={change}
        />
      ) : null}
      {sheet ? (
        <WindowSheet
          {...sheet}
          windows={windows}
          limits={limits}
          withholdable={withholdable}
          snaps={snaps}
          onSnaps={setSnaps}
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
