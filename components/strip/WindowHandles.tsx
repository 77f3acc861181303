import { StyleSheet, View } from 'react-native';
import { useTheme } from '@/components/ui/ThemeProvider';
import { web } from '@/components/ui/web-props';
import { formatClock } from '@/shared/format';
import { lengthLabel } from './labels';
import type { StripGeometry } from './strip-model';
import { windowTimes, type WindowKind } from './window-kinds';
import type { WindowLimits, WindowPart } from './window-model';

export interface WindowHandlesProps<W extends WindowLimits> {
  geometry: StripGeometry;
  kind: WindowKind<W>;
  windows: readonly W[];
  limits: WindowLimits;
  selected: number | null;
  onFocus: (index: number) => void;
  /** Answers whether the key did something. */
  onKey: (index: number, part: WindowPart, key: string, shift: boolean) => boolean;
}

/** The least size of what can be focused, px (WCAG 2.2, 2.5.8); the pointer's own hit areas are larger. */
const LEAST_PX = 24;
/** How far an edge's box reaches into its window, px. */
const INSIDE_PX = 4;

/** What the keyboard and the screen reader hold of each window: the window and its two edges. The pointer goes through. */
export function WindowHandles<W extends WindowLimits>(props: WindowHandlesProps<W>) {
  return props.windows.map((window, index) => (
    <Handles key={index} {...props} window={window} index={index} />
  ));
}

function Handles<W extends WindowLimits>({
  geometry,
  kind,
  limits,
  selected,
  onFocus,
  onKey,
  window,
  index,
}: WindowHandlesProps<W> & { window: W; index: number }) {
  const { palette } = useTheme();
  const [left, right] = [geometry.x(window.startS), geometry.x(window.endS)];
  const { tickBottom } = geometry.layout;
  const grip = { height: 22, top: tickBottom / 2 - 11 };
  const listen = (part: WindowPart) =>
    web({
      tabIndex: 0,
      onKeyDown: (event) => {
        if (onKey(index, part, event.key, event.shiftKey)) event.preventDefault();
      },
    });
  const name = kind.name(index);
  const ink = palette[kind.tone];
  const edge = (part: 'start' | 'end', at: number, valueS: number) => (
    <View
      role="slider"
      aria-label={`${name}, ${part}`}
      aria-valuemin={limits.startS}
      aria-valuemax={limits.endS}
      aria-valuenow={valueS}
      aria-valuetext={`${formatClock(valueS)}, ${lengthLabel(window.endS - window.startS)} long`}
      onFocus={() => onFocus(index)}
      {...listen(part)}
      style={[
        styles.edge,
        { top: grip.top - 1, left: part === 'start' ? at + INSIDE_PX - LEAST_PX : at - INSIDE_PX },
      ]}
    >
      <View
        style={[
          styles.grip,
          grip,
          {
            top: 1,
            left: part === 'start' ? LEAST_PX - 2 * INSIDE_PX : 0,
            borderColor: ink,
            backgroundColor: selected === index ? ink : palette.sheet,
          },
        ]}
      />
    </View>
  );
  // A window too narrow to be held between its edges is moved by them, or by its times (Enter).
  const holdable = right - left >= LEAST_PX + 2 * INSIDE_PX;
  const body = (
    <View
      role="button"
      aria-label={`${name}: ${windowTimes(window)}. ${kind.more(window)}`}
      onFocus={() => onFocus(index)}
      {...listen('body')}
      style={[styles.body, { left, width: right - left, height: tickBottom }]}
    />
  );
  return (
    <>
      {holdable ? body : null}
      {edge('start', left, window.startS)}
      {edge('end', right, window.endS)}
    </>
  );
}

const styles = StyleSheet.create({
  body: { position: 'absolute', top: 0, pointerEvents: 'none' },
  edge: { position: 'absolute', width: LEAST_PX, height: LEAST_PX, pointerEvents: 'none' },
  grip: { position: 'absolute', width: 8, borderRadius: 3, borderWidth: 1.5 },
});
