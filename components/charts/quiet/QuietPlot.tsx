import { memo, type ReactElement } from 'react';
import {
  VictoryArea,
  VictoryAxis,
  VictoryBar,
  VictoryChart,
  VictoryErrorBar,
  VictoryLabel,
  VictoryLine,
} from 'victory-native';
import { useTheme } from '@/components/ui/ThemeProvider';
import type { Palette } from '@/constants/theme';
import type { PlotAxis, PlotMark, PlotModel } from '@/shared/charts/model/plot';
import { quietAxis, QUIET_PADDING } from './quiet-style';

export interface QuietPlotProps {
  model: PlotModel;
  width: number;
  height: number;
}

/** Draws a plot with Victory: for what changes at most about once a second. */
export const QuietPlot = memo(function QuietPlot({ model, width, height }: QuietPlotProps) {
  const { palette } = useTheme();
  const { x, y, marks } = model;
  return (
    <VictoryChart
      width={width}
      height={height}
      padding={QUIET_PADDING}
      scale={{ x: x.log ? 'log' : 'linear', y: y.log ? 'log' : 'linear' }}
      domain={{ x: [x.domain[0], x.domain[1]], y: [y.domain[0], y.domain[1]] }}
    >
      {axis(x, false, palette)}
      {axis(y, true, palette)}
      {marks.map((mark) => drawn(mark, palette, width, model))}
    </VictoryChart>
  );
});

/** Axes stand at the plot's edge, wherever zero is. */
function axis({ title, ticks, log, written }: PlotAxis, dependent: boolean, palette: Palette): ReactElement {
  const style = quietAxis(palette, dependent);
  return (
    <VictoryAxis
      key={dependent ? 'y' : 'x'}
      dependentAxis={dependent}
      crossAxis={false}
      offsetX={dependent ? QUIET_PADDING.left : undefined}
      offsetY={dependent ? undefined : QUIET_PADDING.bottom}
      label={title}
      tickValues={[...ticks]}
      tickFormat={written}
      style={log ? { ...style, grid: quietAxis(palette, true).grid } : style}
    />
  );
}

function drawn(mark: PlotMark, palette: Palette, width: number, { x }: PlotModel): ReactElement {
  const stroke = palette[mark.tone];
  switch (mark.kind) {
    case 'line':
      return (
        <VictoryLine
          key={mark.id}
          data={[...mark.points]}
          style={{ data: { stroke, strokeWidth: mark.width, strokeDasharray: mark.dash } }}
        />
      );
    case 'area':
      return (
        <VictoryArea
          key={mark.id}
          data={[...mark.points]}
          style={{ data: { fill: stroke, fillOpacity: 0.12, stroke, strokeOpacity: 0.5 } }}
        />
      );
    case 'bars': {
      const room = width - QUIET_PADDING.left - QUIET_PADDING.right;
      const first = mark.bars[0];
      const share = first ? (first.to - first.from) / (x.domain[1] - x.domain[0] || 1) : 0;
      return (
        <VictoryBar
          key={mark.id}
          data={mark.bars.map(({ from, to, value }) => ({ x: (from + to) / 2, y: value }))}
          barWidth={Math.max(1, room * share - 1)}
          style={{ data: { fill: stroke, fillOpacity: 0.45 } }}
        />
      );
    }
    case 'whiskers':
      return (
        <VictoryErrorBar
          key={mark.id}
          data={mark.points.map(({ x: at, y, low, high }) => ({ x: at, y, errorY: [high - y, y - low] }))}
          borderWidth={3}
          style={{ data: { stroke, strokeWidth: 1, strokeOpacity: 0.55 } }}
        />
      );
    case 'words':
      return (
        <VictoryLabel
          key={mark.id}
          datum={mark.at}
          text={mark.text}
          textAnchor="end"
          dx={-4}
          dy={-8}
          style={{ ...quietAxis(palette, true).axisLabel, fill: stroke }}
        />
      );
  }
}
