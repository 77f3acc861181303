import { memo } from 'react';
import { VictoryAxis, VictoryChart, VictoryErrorBar, VictoryLine } from 'victory-native';
import { useTheme } from '@/components/ui/ThemeProvider';
import { axisDash } from '@/constants/theme';
import { formatNumber } from '@/shared/format';
import { quietAxis, QUIET_PADDING } from './quiet-style';

export interface AllanChartProps {
  curves: {
    axis: 'x' | 'y' | 'z';
    points: { tauS: number; deviation: number; low: number; high: number; model: number }[];
  }[];
  /** Of the datasheet. */
  expected: { tauS: number; deviation: number }[] | null;
  unit: string;
  width: number;
  height: number;
}

const TONES = { x: 'north', y: 'east', z: 'down' } as const;

/** Deviation over averaging time, both logarithmic, a decade a grid line. */
export const AllanChart = memo(function AllanChart({
  curves,
  expected,
  unit,
  width,
  height,
}: AllanChartProps) {
  const { palette } = useTheme();
  const all = curves.flatMap(({ points }) => points);
  const x = decades(all.map(({ tauS }) => tauS));
  const y = decades([
    ...all.flatMap(({ low, high }) => [low, high]),
    ...(expected ?? []).map(({ deviation }) => deviation),
  ]);
  return (
    <VictoryChart
      width={width}
      height={height}
      padding={QUIET_PADDING}
      scale={{ x: 'log', y: 'log' }}
      domain={{ x: [x[0]!, x.at(-1)!], y: [y[0]!, y.at(-1)!] }}
    >
      <VictoryAxis
        crossAxis={false}
        offsetY={QUIET_PADDING.bottom}
        label="averaging time τ, s"
        tickValues={x}
        tickFormat={short}
        style={{ ...quietAxis(palette, false), grid: quietAxis(palette, true).grid }}
      />
      <VictoryAxis
        dependentAxis
        crossAxis={false}
        offsetX={QUIET_PADDING.left}
        label={`Allan deviation, ${unit}`}
        tickValues={y}
        tickFormat={short}
        style={quietAxis(palette, true)}
      />
      {expected ? (
        <VictoryLine
          data={expected.map(({ tauS, deviation }) => ({ x: tauS, y: deviation }))}
          style={{ data: { stroke: palette.ghost, strokeWidth: 3 } }}
        />
      ) : null}
      {curves.map(({ axis, points }) => (
        <VictoryErrorBar
          key={`bar-${axis}`}
          data={points.map(({ tauS, deviation, low, high }) => ({
            x: tauS,
            y: deviation,
            errorY: [high - deviation, deviation - low],
          }))}
          borderWidth={3}
          style={{ data: { stroke: palette[TONES[axis]], strokeWidth: 1, strokeOpacity: 0.55 } }}
        />
      ))}
      {curves.map(({ axis, points }) => (
        <VictoryLine
          key={`fit-${axis}`}
          data={points.filter(({ model }) => model > 0).map(({ tauS, model }) => ({ x: tauS, y: model }))}
          style={{ data: { stroke: palette[TONES[axis]], strokeWidth: 0.75 } }}
        />
      ))}
      {curves.map(({ axis, points }) => (
        <VictoryLine
          key={`line-${axis}`}
          data={points.map(({ tauS, deviation }) => ({ x: tauS, y: deviation }))}
          style={{
            data: { stroke: palette[TONES[axis]], strokeWidth: 1.75, strokeDasharray: axisDash[TONES[axis]] },
          }}
        />
      ))}
    </VictoryChart>
  );
});

/** Powers of ten that hold the positive ones of `values`, at least two. */
function decades(values: readonly number[]): number[] {
  const positive = values.filter((value) => value > 0);
  const low = Math.floor(Math.log10(Math.min(...positive)));
  const high = Math.max(low + 1, Math.ceil(Math.log10(Math.max(...positive))));
  return Array.from({ length: high - low + 1 }, (_, i) => 10 ** (low + i));
}

const short = (value: number) => formatNumber(value, 1);
