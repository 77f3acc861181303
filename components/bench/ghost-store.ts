/**
 * The baseline's curves and figures for the windows of the moment. They are taken from the bench's own runs when these
 * have the baseline's parameters, else from runs of their own, so that a change is always seen against equal windows.
 */
import type { Outage, RunCreateInput, RunSummary } from '@/shared/contracts/runs';
import type { Parameters } from '@/shared/contracts/parameters';
import type { RunData } from '@/hooks/live/run-data';
import type { LiveController } from '@/hooks/live/live-controller';

export interface Ghost {
  key: string;
  data: RunData;
  summary: RunSummary;
}

/** Same parameters and windows, same key. A smoothed run is compared with a smoothed one: drift is read against the smoother. */
export const ghostKey = (parameters: Parameters, outages: readonly Outage[], smooth = false): string =>
  JSON.stringify([parameters, outages.map(({ startS, endS, withhold }) => [startS, endS, withhold]), smooth]);

export class GhostStore {
  private ghost: Ghost | null = null;
  private readonly listeners = new Set<() => void>();

  get current(): Ghost | null {
    return this.ghost;
  }
  getSnapshot = (): Ghost | null => this.ghost;

  subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  };

  /** Keeps the curves of `live`'s finished run where it is the one that `key` asks for. Answers whether it was. */
  adopt(live: LiveController, key: string): boolean {
    const { summary, summaryRequest, summaryRunId, phase } = live.state;
    const data = live.data.current;
    if (phase !== 'done' || !summary || !summaryRequest || !data?.complete || data.runId !== summaryRunId)
      return false;
    if (keyOf(summaryRequest) !== key) return false;
    if (this.ghost?.key === key) return true;
    this.ghost = { key, data, summary };
    for (const listener of this.listeners) listener();
    return true;
  }

  clear(): void {
    if (!this.ghost) return;
    this.ghost = null;
    for (const listener of this.listeners) listener();
  }
}

const keyOf = (request: RunCreateInput) =>
  ghostKey(request.parameters as Parameters, (request.outages ?? []) as Outage[], request.smooth);
