/** Figures as lines of a table. */

export const line = (what: string, figure: string, goal = ''): void =>
  console.log(`  ${what.padEnd(50)} ${figure.padStart(24)}   ${goal}`);

/** The least value that `share` of `values` do not exceed. */
export function percentile(values: readonly number[], share: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.max(0, Math.ceil(share * sorted.length) - 1)] ?? NaN;
}

export const spread = (values: readonly number[]): string =>
  [0.5, 0.95, 1].map((share) => percentile(values, share).toFixed(1)).join(' / ');

/** Shorter ones are not told by the browser. */
export const longestTask = (longTasks: readonly number[]) =>
  longTasks.length === 0 ? 'below 50 ms' : `${Math.max(...longTasks).toFixed(0)} ms`;
