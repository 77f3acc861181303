import { useMemo } from 'react';
import { allanPlot, type AllanData } from '@/shared/charts/plots';
import { FetchedPlot } from './FetchedPlot';

export interface AllanChartProps extends AllanData {
  width: number;
  height: number;
}

/** Deviation over averaging time, both logarithmic. */
export function AllanChart({ curves, expected, unit, width, height }: AllanChartProps) {
  const model = useMemo(() => allanPlot({ curves, expected, unit }), [curves, expected, unit]);
  return <FetchedPlot model={model} width={width} height={height} />;
}
