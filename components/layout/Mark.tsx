import Svg, { Circle, Path } from 'react-native-svg';
import { useTheme } from '@/components/ui/ThemeProvider';

/** The mark: a track in ink that drifts off as a vermilion thread once the fixes stop. */
export function Mark({ size = 32 }: { size?: number }) {
  const { palette } = useTheme();
  return (
    <Svg width={size} height={size} viewBox="0 0 32 32" fill="none" aria-hidden>
      <Path d="M5 27c6.5-2 10.5-9 11.5-20" stroke={palette.ink} strokeWidth={2.5} strokeLinecap="round" />
      <Circle cx={16.5} cy={6} r={2.6} fill={palette.ink} />
      <Path
        d="M14 17c3.5 1 7 4 11.5 9.5"
        stroke={palette.vermilion}
        strokeWidth={2.2}
        strokeLinecap="round"
        strokeDasharray="0.1 4.3"
      />
    </Svg>
  );
}
