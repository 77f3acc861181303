import { useMemo } from 'react';
import { histogramPlot, type HistogramData } from '@/shared/charts/plots';
import { FetchedPlot } from './FetchedPlot';

export interface HistogramChartProps extends HistogramData {
  width: number;
  height: number;
}

/** A distribution as bars, and the curve that it should follow. */
export function HistogramChart({ bins, expected, xLabel, width, height }: HistogramChartProps) {
  const model = useMemo(() => histogramPlot({ bins, expected, xLabel }), [bins, expected, xLabel]);
  return <FetchedPlot model={model} width={width} height={height} />;
}
