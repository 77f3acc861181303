import { memo } from 'react';
import { VictoryAxis, VictoryBar, VictoryChart, VictoryLine } from 'victory-native';
import { useTheme } from '@/components/ui/ThemeProvider';
import { quietAxis, QUIET_PADDING } from './quiet-style';

export interface HistogramChartProps {
  bins: { from: number; to: number; density: number }[];
  /** What the density should be. */
  expected: { x: number; density: number }[];
  xLabel: string;
  width: number;
  height: number;
}

/** A distribution as bars, and the curve that it should follow. */
export const HistogramChart = memo(function HistogramChart({
  bins,
  expected,
  xLabel,
  width,
  height,
}: HistogramChartProps) {
  const { palette } = useTheme();
  const [low, high] = [bins[0]?.from ?? 0, bins[bins.length - 1]?.to ?? 1];
  const top = Math.max(...bins.map((bin) => bin.density), ...expected.map((point) => point.density), 1e-3);
  const barWidth = Math.max(
    1,
    (width - QUIET_PADDING.left - QUIET_PADDING.right) / Math.max(1, bins.length) - 1,
  );
  return (
    <VictoryChart
      width={width}
      height={height}
      padding={QUIET_PADDING}
      domain={{ x: [low, high], y: [0, top * 1.08] }}
    >
      <VictoryAxis
        crossAxis={false}
        label={xLabel}
        style={quietAxis(palette, false)}
        tickValues={[-4, -3, -2, -1, 0, 1, 2, 3, 4]}
      />
      <VictoryAxis
        dependentAxis
        crossAxis={false}
        offsetX={QUIET_PADDING.left}
        label="density"
        style={quietAxis(palette, true)}
        tickCount={4}
      />
      <VictoryBar
        data={bins.map((bin) => ({ x: (bin.from + bin.to) / 2, y: bin.density }))}
        barWidth={barWidth}
        style={{ data: { fill: palette.profile, fillOpacity: 0.45 } }}
      />
      <VictoryLine
        data={expected.map((point) => ({ x: point.x, y: point.density }))}
        style={{ data: { stroke: palette.pine, strokeWidth: 1.75 } }}
      />
    </VictoryChart>
  );
});
