/** The error budget as shapes: shares of the predicted variance, a column a drift point, the total's 1σ above each. Pure. */
import { formatNumber } from '@/shared/format';
import type { Box, Shape } from '@/shared/charts/figure/shapes';
import { number } from '@/shared/charts/figure/time-figure';
import { hatchPath } from '@/shared/charts/model/hatch';
import { budgetLayout, type BudgetBar } from './budget-layout';
import { sourceInk } from './source-ink';

export interface BudgetColumns {
  columns: readonly { afterS: number; totalM: number; shares: readonly number[] }[];
}

export function budgetShapes({ columns }: BudgetColumns, box: Box): Shape[] {
  const layout = budgetLayout(columns, box);
  return [
    ...percents(box),
    ...layout.flatMap((column, i) => {
      const { afterS, totalM } = columns[i]!;
      const middle = column.x + column.width / 2;
      return [
        ...column.bars.flatMap((bar) => barShapes(bar, column.x, column.width)),
        { ...number(middle, box.top - 8, `${formatNumber(totalM)} m`, 'middle'), tone: 'ink' as const },
        number(middle, box.bottom + 16, String(Number(afterS.toFixed(1))), 'middle'),
      ];
    }),
  ];
}

/** How a source is inked, in the size of a sample or of a bar. */
export function sourceShapes(rank: number, x: number, y: number, width: number, height: number): Shape[] {
  const { tone, hatched } = sourceInk(rank);
  const ink = { fill: tone, fillOpacity: hatched ? 0.16 : 0.72, stroke: 'sheet' } as const;
  const hatch = hatched ? hatchPath(x, y, width, height, 6) : '';
  return [
    { kind: 'rect', x, y, width, height, ...ink },
    ...(hatch ? [{ kind: 'path', d: hatch, stroke: tone, strokeWidth: 1.25 } as const] : []),
  ];
}

function percents(box: Box): Shape[] {
  return [0, 50, 100].flatMap((percent): Shape[] => {
    const y = box.bottom - ((box.bottom - box.top) * percent) / 100;
    return [
      { kind: 'path', d: `M${box.left} ${y}H${box.right}`, stroke: 'rule' },
      number(box.left - 6, y + 4, percent === 100 ? '100 %' : String(percent), 'end'),
    ];
  });
}

function barShapes({ source, y, height }: BudgetBar, x: number, width: number): Shape[] {
  if (height < 0.5) return [];
  // The ground under the tint hides the rules.
  return [{ kind: 'rect', x, y, width, height, fill: 'sheet' }, ...sourceShapes(source, x, y, width, height)];
}
