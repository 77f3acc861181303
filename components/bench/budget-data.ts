/** Where the predicted drift comes from, over all windows that were split. Pure. */
import type { RunSummary } from '@/shared/contracts/runs';

export interface BudgetColumn {
  afterS: number;
  /** Windows that last so long. */
  windows: number;
  /** Predicted 1σ, root mean square over the windows, m. */
  totalM: number;
  /** Share of the variance of each source, in the order of `sources`; together 1. */
  shares: number[];
}

export interface Budget {
  /** Largest first; what never matters is gathered at the end. */
  sources: string[];
  columns: BudgetColumn[];
}

/** A source that stays below this everywhere is gathered under "others". */
const LEAST_SHARE = 0.02;
const MOST_SOURCES = 7;
export const OTHERS = 'others';
/** Windows of unequal length end at as many times: only these and the longest are shown. */
const SHOWN_S = [10, 30, 60, 120];
const SAME_S = 0.25;

/** Null where no window was split. Squares add up: shares are of variance, windows count alike by their variance. */
export function errorBudget(summary: RunSummary | null, direction: 'horizontal' | 'vertical'): Budget | null {
  const points = summary?.outages.flatMap((outage) => outage.budget ?? []) ?? [];
  if (points.length === 0) return null;
  const longest = Math.max(...points.map((point) => point.afterS));
  const times = [...SHOWN_S.filter((time) => time < longest - SAME_S), longest];
  const key = direction === 'horizontal' ? 'horizontalM' : 'verticalM';
  const sums = times
    .map((afterS) => {
      const here = points.filter((point) => Math.abs(point.afterS - afterS) < SAME_S);
      const variance = new Map<string, number>();
      for (const { shares } of here)
        for (const share of shares)
          variance.set(share.source, (variance.get(share.source) ?? 0) + share[key] ** 2);
      return { afterS, windows: here.length, variance };
    })
    .filter(({ windows }) => windows > 0);
  return gathered(sums);
}

interface Sum {
  afterS: number;
  windows: number;
  variance: Map<string, number>;
}

function gathered(sums: readonly Sum[]): Budget {
  const total = ({ variance }: Sum) => [...variance.values()].reduce((sum, one) => sum + one, 0);
  const share = (sum: Sum, source: string) => {
    const all = total(sum);
    return all > 0 ? (sum.variance.get(source) ?? 0) / all : 0;
  };
  const largest = (source: string) => Math.max(...sums.map((sum) => share(sum, source)));
  const named = [...new Set(sums.flatMap(({ variance }) => [...variance.keys()]))]
    .filter((source) => largest(source) >= LEAST_SHARE)
    .sort((a, b) => largest(b) - largest(a))
    .slice(0, MOST_SOURCES);
  const columns = sums.map((sum) => {
    const shares = named.map((source) => share(sum, source));
    const rest = Math.max(0, 1 - shares.reduce((all, one) => all + one, 0));
    return {
      afterS: sum.afterS,
      windows: sum.windows,
      totalM: Math.sqrt(total(sum) / sum.windows),
      shares: [...shares, rest],
    };
  });
  const others = columns.some(({ shares }) => shares[named.length]! > 1e-9);
  return {
    sources: others ? [...named, OTHERS] : named,
    columns: others
      ? columns
      : columns.map((column) => ({ ...column, shares: column.shares.slice(0, named.length) })),
  };
}
