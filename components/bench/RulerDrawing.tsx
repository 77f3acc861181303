import { memo } from 'react';
import Svg, { Path, Rect } from 'react-native-svg';
import { logMarks } from '@/components/charts/model/ticks';
import { px } from '@/components/charts/model/hatch';
import { useTheme } from '@/components/ui/ThemeProvider';
import { toDisplay, type DisplayUnit } from '@/shared/units';
import { fractionOf, type LogRange } from './slider-model';

export const RULER_PX = 44;
/** Margin at both ends, so that the thumb stays inside. */
export const RULER_INSET_PX = 10;
const LINE_Y = 22;

export interface RulerDrawingProps {
  width: number;
  range: LogRange;
  unit: DisplayUnit;
  value: number;
  baseline: number;
  reference: number;
  locked: boolean;
}

/** Where a value stands on the rule, px. */
export const rulerX = (value: number, range: LogRange, width: number): number =>
  RULER_INSET_PX + fractionOf(value, range) * (width - 2 * RULER_INSET_PX);

/** The rule with its 1-2-5 marks, the baseline's bar, the reference's triangle and the thumb. */
export const RulerDrawing = memo(function RulerDrawing(props: RulerDrawingProps) {
  const { width, range, unit, value, baseline, reference, locked } = props;
  const { palette } = useTheme();
  const x = (si: number) => px(rulerX(si, range, width));
  const at = x(value);
  const home = x(baseline);
  const sheet = x(reference);
  return (
    <Svg width={width} height={RULER_PX} aria-hidden>
      <Path d={marksPath(range, unit, width)} stroke={palette.inkSoft} strokeWidth={1} />
      <Path
        d={`M${RULER_INSET_PX} ${LINE_Y}H${width - RULER_INSET_PX}`}
        stroke={palette.ink}
        strokeWidth={1.25}
      />
      <Path d={`M${home} ${LINE_Y - 13}V${LINE_Y + 9}`} stroke={palette.ghost} strokeWidth={3} />
      <Path
        d={`M${sheet} ${LINE_Y + 4}l5 8h-10Z`}
        fill={palette.sheet}
        stroke={palette.inkSoft}
        strokeWidth={1.25}
        strokeLinejoin="round"
      />
      <Rect
        x={at - 5}
        y={LINE_Y - 12}
        width={10}
        height={24}
        rx={3}
        fill={locked ? palette.inkSoft : palette.petrol}
      />
      <Path d={`M${at} ${LINE_Y - 7}V${LINE_Y + 7}`} stroke={palette.onPetrol} strokeWidth={1.5} />
    </Svg>
  );
});

/** 1-2-5 marks in display units: decades stand taller. */
export function marksPath(range: LogRange, unit: DisplayUnit, width: number): string {
  return logMarks(toDisplay(range.low, unit), toDisplay(range.high, unit))
    .map(({ value, major }) => `M${px(rulerX(value * unit.toSi, range, width))} ${LINE_Y}v${major ? -9 : -5}`)
    .join('');
}
