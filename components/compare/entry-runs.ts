/** The runs behind a comparison: one controller an entry, each asked for the same windows, so that they can be held side by side. */
import { LiveController } from '@/hooks/live/live-controller';
import { openSocketTransport } from '@/hooks/live/socket-transport';
import { ghostKey } from '@/components/bench/ghost-store';
import { makeId } from '@/components/bench/make-id';
import type { Outage } from '@/shared/contracts/runs';
import type { Entry } from './use-entries';

interface Held {
  live: LiveController;
  close: () => void;
  benchId: string;
  /** What was asked for last. */
  asked: string;
}

export interface Asked {
  recordingId: string;
  windows: readonly Outage[];
  /** False while a window is still being dragged. */
  settled: boolean;
  /** False: only finished runs are shown. */
  mayRun: boolean;
}

export class EntryRuns {
  private readonly held = new Map<string, Held>();
  private readonly listeners = new Set<() => void>();
  private readonly dataListeners = new Set<() => void>();
  private changes = 0;

  constructor(private readonly make = () => new LiveController(openSocketTransport)) {}

  /** Starts what is not going yet, and ends what is compared no more. */
  sync(entries: readonly Entry[], asked: Asked): void {
    const keys = new Set(entries.map(({ key }) => key));
    for (const [key, { close }] of this.held)
      if (!keys.has(key)) {
        close();
        this.held.delete(key);
      }
    for (const entry of entries) if (entry.parameters) this.ask(entry, asked);
  }

  get(key: string): LiveController | null {
    return this.held.get(key)?.live ?? null;
  }

  /** Hears of every change of a run's state; the snapshot counts them. */
  subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  };
  getSnapshot = (): number => this.changes;

  /** Hears of arriving curves. */
  subscribeData = (listener: () => void): (() => void) => {
    this.dataListeners.add(listener);
    return () => this.dataListeners.delete(listener);
  };

  close(): void {
    for (const { close } of this.held.values()) close();
    this.held.clear();
  }

  private ask(entry: Entry, { recordingId, windows, settled, mayRun }: Asked): void {
    const parameters = entry.parameters!;
    const held = this.held.get(entry.key) ?? this.open(entry.key);
    const key = ghostKey(parameters, windows);
    const { run } = entry;
    const finished =
      run && (!mayRun || ghostKey(run.parameters, run.outages, run.smooth) === key) ? run : null;
    const wanted = finished ? `shown ${finished.id}` : `${key} ${settled}`;
    if (wanted === held.asked) return;
    held.asked = wanted;
    if (finished) void held.live.show(finished);
    else if (mayRun)
      held.live.change({ recordingId, parameters, outages: [...windows], benchId: held.benchId }, settled);
  }

  private open(key: string): Held {
    const live = this.make();
    const close = live.open();
    const stop = [
      live.subscribe(() => this.told()),
      live.subscribeData(() => this.dataListeners.forEach((tell) => tell())),
    ];
    const held = {
      live,
      benchId: makeId(),
      asked: '',
      close: () => {
        stop.forEach((end) => end());
        close();
      },
    };
    this.held.set(key, held);
    return held;
  }

  private told(): void {
    this.changes += 1;
    for (const listener of this.listeners) listener();
  }
}
