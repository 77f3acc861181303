import Svg, { Path } from 'react-native-svg';
import { useTheme } from '@/components/ui/ThemeProvider';
import { ENTRY_LOOKS } from './compare-charts';

/** The line by which an entry is known in the charts. */
export function EntryMark({ index }: { index: number }) {
  const { palette } = useTheme();
  const { tone, dash } = ENTRY_LOOKS[index % ENTRY_LOOKS.length]!;
  return (
    <Svg width={WIDTH} height={HEIGHT} aria-hidden>
      <Path
        d={`M0 ${HEIGHT / 2}H${WIDTH}`}
        stroke={palette[tone]}
        strokeWidth={2}
        strokeDasharray={dash}
        fill="none"
      />
    </Svg>
  );
}

const WIDTH = 28;
const HEIGHT = 12;
