import { memo } from 'react';
import { VictoryArea, VictoryAxis, VictoryChart, VictoryLabel, VictoryLine } from 'victory-native';
import { useTheme } from '@/components/ui/ThemeProvider';
import { quietAxis, QUIET_PADDING } from './quiet-style';

export interface DriftGrowthChartProps {
  windows: { afterS: number; errorM: number }[][];
  predicted: { afterS: number; sigmaM: number; p95M: number }[];
  longestS: number;
  width: number;
  height: number;
}

/** Horizontal error of every window over the time since GNSS was lost, above what the filter predicted. */
export const DriftGrowthChart = memo(function DriftGrowthChart(props: DriftGrowthChartProps) {
  const { windows, predicted, longestS, width, height } = props;
  const { palette } = useTheme();
  const top = Math.max(
    ...predicted.map((point) => point.p95M),
    ...windows.flatMap((window) => window.map((point) => point.errorM)),
    1e-3,
  );
  const last = predicted[predicted.length - 1];
  return (
    <VictoryChart
      width={width}
      height={height}
      padding={QUIET_PADDING}
      domain={{ x: [0, longestS || 1], y: [0, top * 1.08] }}
    >
      <VictoryAxis crossAxis={false} label="s without GNSS" style={quietAxis(palette, false)} />
      <VictoryAxis dependentAxis crossAxis={false} label="m" style={quietAxis(palette, true)} tickCount={4} />
      <VictoryArea
        data={predicted}
        x="afterS"
        y="p95M"
        style={{
          data: { fill: palette.vermilion, fillOpacity: 0.12, stroke: palette.vermilion, strokeOpacity: 0.5 },
        }}
      />
      <VictoryLine
        data={predicted}
        x="afterS"
        y="sigmaM"
        style={{ data: { stroke: palette.vermilion, strokeWidth: 1.25, strokeDasharray: '5 3' } }}
      />
      {windows.map((window, i) => (
        <VictoryLine
          key={i}
          data={window}
          x="afterS"
          y="errorM"
          style={{ data: { stroke: palette.ink, strokeWidth: 1.75 } }}
        />
      ))}
      {last ? (
        <VictoryLabel
          datum={{ x: last.afterS, y: last.p95M }}
          text="95 % predicted"
          textAnchor="end"
          dx={-4}
          dy={-8}
          style={{ ...quietAxis(palette, true).axisLabel, fill: palette.vermilion }}
        />
      ) : null}
    </VictoryChart>
  );
});
