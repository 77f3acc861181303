import { memo } from 'react';
import Svg from 'react-native-svg';
import { Shapes } from '../drawing/Shapes';
import { budgetShapes, type BudgetColumns } from './budget-shapes';
import { belowAxis } from './correlation-shapes';

export interface BudgetChartProps extends BudgetColumns {
  width: number;
  height: number;
}

/** Shares of the predicted variance, a column a drift point. */
export const BudgetChart = memo(function BudgetChart({ columns, width, height }: BudgetChartProps) {
  const box = { left: 46, right: width - 10, top: 26, bottom: height - 40 };
  return (
    <Svg width={width} height={height}>
      <Shapes shapes={[...budgetShapes({ columns }, box), belowAxis('s without GNSS', box, height - 6)]} />
    </Svg>
  );
});
