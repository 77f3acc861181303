import { useMemo } from 'react';
import { allanPlot, type AllanData } from './plots';
import { QuietPlot } from './QuietPlot';

export interface AllanChartProps extends AllanData {
  width: number;
  height: number;
}

/** Deviation over averaging time, both logarithmic. */
export function AllanChart({ curves, expected, unit, width, height }: AllanChartProps) {
  const model = useMemo(() => allanPlot({ curves, expected, unit }), [curves, expected, unit]);
  return <QuietPlot model={model} width={width} height={height} />;
}
