import { G, Rect } from 'react-native-svg';
import { useTheme } from '@/components/ui/ThemeProvider';
import type { Stretch } from './stretches';
import { spanPx, type StripGeometry } from './strip-model';

const BAR_PX = 3;

/** A stretch that was found: a tint of pine under a bar, so that it shows beside the one that is chosen. */
export function FoundGround({ geometry, stretch }: { geometry: StripGeometry; stretch: Stretch }) {
  const { palette } = useTheme();
  const { x, width } = spanPx(stretch, geometry.x, BAR_PX);
  const height = geometry.layout.tickBottom;
  return (
    <G>
      <Rect x={x} y={0} width={width} height={height} fill={palette.pine} fillOpacity={0.14} />
      <Rect x={x} y={0} width={width} height={BAR_PX} fill={palette.pine} />
    </G>
  );
}
