/** Where the bars of an error budget stand. Pure; BudgetChart.tsx only draws what is said here. */
import { linearScale } from '@/shared/charts/model/scale';

export interface BudgetBar {
  /** Index of the source, from the largest. */
  source: number;
  y: number;
  height: number;
}

export interface BudgetColumnLayout {
  x: number;
  width: number;
  /** From the ground up. */
  bars: BudgetBar[];
}

export interface BudgetBox {
  left: number;
  right: number;
  top: number;
  bottom: number;
}

const WIDEST_PX = 72;

/** Stacks each column's `shares` (together 1) over the height of `box`, the first at the ground. */
export function budgetLayout(columns: readonly { shares: readonly number[] }[], box: BudgetBox) {
  const y = linearScale([0, 1], [box.bottom, box.top]);
  const room = (box.right - box.left) / Math.max(1, columns.length);
  const width = Math.min(WIDEST_PX, room * 0.62);
  return columns.map(({ shares }, i): BudgetColumnLayout => {
    let from = 0;
    const bars = shares.map((share, source) => {
      const bar = { source, y: y(from + share), height: y(from) - y(from + share) };
      from += share;
      return bar;
    });
    return { x: box.left + room * (i + 0.5) - width / 2, width, bars };
  });
}
