import Svg, { Circle, G, Line, Path } from 'react-native-svg';
import { useTheme } from '@/components/ui/ThemeProvider';
import { axisDash } from '@/constants/theme';

/** An invented track on ruled paper: fixes along an ink line, then a stretch without them where the thread runs off. */
export function Thread() {
  const { palette } = useTheme();
  return (
    <Svg width="100%" height={300} viewBox="0 0 560 300" preserveAspectRatio="xMinYMid meet" aria-hidden>
      <G stroke={palette.rule} strokeWidth={1}>
        {[40, 80, 120, 160, 200, 240, 280].map((y) => (
          <Line key={y} x1={0} x2={560} y1={y} y2={y} />
        ))}
      </G>
      <Path d={TRACK} stroke={palette.ink} strokeWidth={2.25} fill="none" strokeLinecap="round" />
      {FIXES.map(([x, y]) => (
        <Circle key={x} cx={x} cy={y} r={3.5} fill={palette.ground} stroke={palette.ink} strokeWidth={1.5} />
      ))}
      <Path d={TRUTH} stroke={palette.ghost} strokeWidth={2} fill="none" strokeDasharray={axisDash.east} />
      <Path d={DRIFT_HALO} fill={palette.vermilion} opacity={0.12} />
      <Path d={DRIFT} stroke={palette.vermilion} strokeWidth={2.25} fill="none" strokeLinecap="round" />
    </Svg>
  );
}

const TRACK = 'M10 236 C 60 226, 80 150, 130 152 S 205 226, 262 210 S 318 150, 350 132';
const FIXES: readonly (readonly [number, number])[] = [
  [28, 228],
  [62, 199],
  [94, 164],
  [130, 152],
  [166, 168],
  [202, 198],
  [240, 212],
  [276, 203],
  [312, 171],
  [350, 132],
];
const TRUTH = 'M350 132 C 385 112, 420 128, 455 124 S 520 96, 552 92';
const DRIFT = 'M350 132 C 385 110, 415 118, 450 100 S 520 40, 548 26';
const DRIFT_HALO =
  'M350 132 C 390 104, 430 90, 470 62 S 520 16, 536 4 L 558 52 C 530 70, 500 96, 460 112 S 390 118, 350 132 z';
