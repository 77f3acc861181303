import { useMemo } from 'react';
import { driftGrowthPlot, type DriftGrowthData } from '@/shared/charts/plots';
import { FetchedPlot } from './FetchedPlot';

export interface DriftGrowthChartProps extends DriftGrowthData {
  width: number;
  height: number;
}

/** Horizontal error of every window over the time since GNSS was lost, above what the filter predicted. */
export function DriftGrowthChart(props: DriftGrowthChartProps) {
  const { windows, predicted, longestS, width, height } = props;
  const model = useMemo(
    () => driftGrowthPlot({ windows, predicted, longestS }),
    [windows, predicted, longestS],
  );
  return <FetchedPlot model={model} width={width} height={height} />;
}
