/** Stems of an autocorrelation chart: side by side at each lag, one path an axis. Pure. */
import { px } from '@/shared/charts/model/hatch';
import { niceTicks } from '@/shared/charts/model/nice';
import { linearScale } from '@/shared/charts/model/scale';

export interface Stems {
  low: number;
  high: number;
  /** Round values to rule. */
  ticks: number[];
  stems: { tone: 'north' | 'east' | 'down'; path: string; widthPx: number }[];
}

export interface StemBox {
  left: number;
  right: number;
  top: number;
  bottom: number;
}

/** The value axis always holds the band, and reaches a little further than the largest value. */
export function correlationStems(
  {
    axes,
    band,
    lags,
  }: {
    axes: readonly { tone: 'north' | 'east' | 'down'; values: readonly number[] }[];
    band: number;
    lags: number;
  },
  box: StemBox,
): Stems {
  const values = axes.flatMap((axis) => [...axis.values]);
  const low = Math.max(-1, Math.min(-1.6 * band, ...values.map((value) => value - 0.02)));
  const high = Math.min(1, Math.max(1.6 * band, ...values.map((value) => value + 0.02)));
  const y = linearScale([low, high], [box.bottom, box.top]);
  const room = (box.right - box.left) / Math.max(1, lags);
  const widthPx = Math.max(1, Math.min(6, (room * 0.7) / Math.max(1, axes.length)));
  const stems = axes.map(({ tone, values: own }, axis) => ({
    tone,
    widthPx,
    path: own
      .map((value, i) => {
        const x = box.left + room * (i + 0.5) + (axis - (axes.length - 1) / 2) * widthPx;
        return `M${px(x)} ${px(y(0))}V${px(y(value))}`;
      })
      .join(''),
  }));
  return { low, high, ticks: niceTicks(low, high, 4), stems };
}
