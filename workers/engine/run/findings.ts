/** What the figures of a run mean, in plain words, with the change that they suggest. Silent where they prove nothing. */
import type { Parameters } from '@/shared/contracts/parameters';
import type { RunFinding, RunSummary } from '@/shared/contracts/runs';

export function findings(_summary: Omit<RunSummary, 'findings'>, _parameters: Parameters): RunFinding[] {
  return [];
}
