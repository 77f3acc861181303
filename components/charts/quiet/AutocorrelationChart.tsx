import { memo } from 'react';
import Svg from 'react-native-svg';
import { Shapes } from '../drawing/Shapes';
import { belowAxis, correlationShapes, type CorrelationData } from './correlation-shapes';

export interface AutocorrelationChartProps extends CorrelationData {
  width: number;
  height: number;
}

/** Correlation of the innovations with themselves, a stem a lag and axis, over the band in which white ones stay. */
export const AutocorrelationChart = memo(function AutocorrelationChart(props: AutocorrelationChartProps) {
  const { width, height, ...data } = props;
  const box = { left: 46, right: width - 10, top: 10, bottom: height - 40 };
  return (
    <Svg width={width} height={height}>
      <Shapes shapes={[...correlationShapes(data, box), belowAxis('lag, fixes', box, height - 6)]} />
    </Svg>
  );
});
