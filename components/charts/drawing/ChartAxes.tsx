import { memo } from 'react';
import { G, Path, Text as SvgText } from 'react-native-svg';
import { useTheme } from '@/components/ui/ThemeProvider';
import { fonts, typeScale } from '@/constants/theme';
import type { ChartDrawing, PlotBox } from '@/shared/charts/model/time-chart';

export type AxesDrawing = Pick<ChartDrawing, 'valueTicks' | 'timeTicks' | 'annotations'>;

/** A time label at the right end is turned inwards, so that it is not cut. */
const EDGE_PX = 8;
const LABEL_HALF_PX = 26;

/** Grid, tick labels and words in the plot. Rendered by React: it changes far less often than the curves. */
export const ChartAxes = memo(function ChartAxes({
  axes,
  box,
  timeAxis,
}: {
  axes: AxesDrawing;
  box: PlotBox;
  timeAxis: boolean;
}) {
  const { palette } = useTheme();
  const grid = axes.valueTicks.map((tick) => `M${box.left} ${tick.at}H${box.right}`).join('');
  return (
    <G>
      <Path d={grid} stroke={palette.rule} strokeWidth={1} />
      {axes.valueTicks.map((tick) => (
        <SvgText
          key={tick.label}
          x={box.left - 8}
          y={tick.at + 4}
          textAnchor="end"
          fontSize={typeScale.small}
          fontFamily={fonts.number}
          fill={palette.inkSoft}
        >
          {tick.label}
        </SvgText>
      ))}
      {timeAxis
        ? axes.timeTicks.map((tick) => (
            <SvgText
              key={tick.label}
              x={tick.at > box.right - LABEL_HALF_PX + EDGE_PX ? box.right + EDGE_PX : tick.at}
              y={box.bottom + 17}
              textAnchor={tick.at > box.right - LABEL_HALF_PX + EDGE_PX ? 'end' : 'middle'}
              fontSize={typeScale.small}
              fontFamily={fonts.number}
              fill={palette.inkSoft}
            >
              {tick.label}
            </SvgText>
          ))
        : null}
    </G>
  );
});

/** Words in the plot, drawn above the curves with a halo of the ground. */
export const ChartAnnotations = memo(function ChartAnnotations({
  annotations,
}: {
  annotations: AxesDrawing['annotations'];
}) {
  const { palette } = useTheme();
  return (
    <G>
      {annotations.map((note, i) =>
        [true, false].map((halo) => (
          <SvgText
            key={`${i}${halo}`}
            x={note.x}
            y={note.y}
            textAnchor={note.anchor}
            fontSize={note.number ? typeScale.small : 13}
            fontFamily={note.number ? fonts.number : fonts.label}
            fill={halo ? palette.sheet : palette[note.tone]}
            stroke={halo ? palette.sheet : 'none'}
            strokeWidth={halo ? 3 : 0}
          >
            {note.text}
          </SvgText>
        )),
      )}
    </G>
  );
});
