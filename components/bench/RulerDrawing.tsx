import { memo } from 'react';
import Svg, { Path, Rect } from 'react-native-svg';
import { logMarks } from '@/shared/charts/model/ticks';
import { px } from '@/shared/charts/model/hatch';
import { useTheme } from '@/components/ui/ThemeProvider';
import { toDisplay, type DisplayUnit } from '@/shared/units';
import type { LogRange } from '@/shared/parameters/parameter-specs';
import { fractionOf } from './slider-model';

/** Margin at both ends, so that the thumb stays inside. */
export const RULER_INSET_PX = 10;

export interface RulerDrawingProps {
  width: number;
  range: LogRange;
  unit: DisplayUnit;
  value: number;
  baseline: number;
  reference: number;
  locked: boolean;
  height: number;
}

/** Where a value stands on the rule, px. */
export const rulerX = (value: number, range: LogRange, width: number): number =>
  RULER_INSET_PX + fractionOf(value, range) * (width - 2 * RULER_INSET_PX);

/** The rule with its 1-2-5 marks, the baseline's bar, the reference's triangle and the thumb. */
export const RulerDrawing = memo(function RulerDrawing(props: RulerDrawingProps) {
  const { width, range, unit, value, baseline, reference, locked, height } = props;
  const lineY = height / 2 - 1;
  const { palette } = useTheme();
  const x = (si: number) => px(rulerX(si, range, width));
  const at = x(value);
  const home = x(baseline);
  const sheet = x(reference);
  return (
    <Svg width={width} height={height} aria-hidden>
      <Path d={marksPath(range, unit, width, lineY)} stroke={palette.inkSoft} strokeWidth={1} />
      <Path
        d={`M${RULER_INSET_PX} ${lineY}H${width - RULER_INSET_PX}`}
        stroke={palette.ink}
        strokeWidth={1.25}
      />
      <Path d={`M${home} ${lineY - 13}V${lineY + 9}`} stroke={palette.ghost} strokeWidth={3} />
      <Path
        d={`M${sheet} ${lineY + 4}l5 8h-10Z`}
        fill={palette.sheet}
        stroke={palette.inkSoft}
        strokeWidth={1.25}
        strokeLinejoin="round"
      />
      <Rect
        x={at - 5}
        y={lineY - 12}
        width={10}
        height={24}
        rx={3}
        fill={locked ? palette.inkSoft : palette.petrol}
      />
      <Path d={`M${at} ${lineY - 7}V${lineY + 7}`} stroke={palette.onPetrol} strokeWidth={1.5} />
    </Svg>
  );
});

/** 1-2-5 marks in display units: decades stand taller. */
export function marksPath(range: LogRange, unit: DisplayUnit, width: number, lineY: number): string {
  return logMarks(toDisplay(range.low, unit), toDisplay(range.high, unit))
    .map(({ value, major }) => `M${px(rulerX(value * unit.toSi, range, width))} ${lineY}v${major ? -9 : -5}`)
    .join('');
}
