/** Runs that this process computes just now: what a follower needs who comes a moment late. */
import type { RunState } from '@/shared/contracts/runs';
import type { Run } from '../models/run';

/** Frames kept for late followers of one run; older ones are in its series afterwards. */
const KEPT_BYTES = 8_000_000;
/** A follower may still be on its way when a short run is over, ms. */
const LINGER_MS = 10_000;

export interface ActiveRun {
  runId: string;
  workspaceId: string;
  recordingId: string;
  state: RunState;
  progress: number;
  frames: Uint8Array[];
  keptBytes: number;
  cancel: () => void;
  /** Resolves when the row says how it ended. */
  ended: Promise<void>;
}

export class ActiveRuns {
  private readonly runs = new Map<string, ActiveRun>();
  private readonly timers = new Set<NodeJS.Timeout>();

  /** Who adds it sets `cancel` and `ended` at once. */
  add({ id: runId, workspaceId, recordingId }: Run): ActiveRun {
    const active: ActiveRun = {
      runId,
      workspaceId,
      recordingId,
      state: 'queued',
      progress: 0,
      frames: [],
      keptBytes: 0,
      cancel: () => undefined,
      ended: Promise.resolve(),
    };
    this.runs.set(runId, active);
    return active;
  }

  get = (runId: string): ActiveRun | undefined => this.runs.get(runId);

  of = (recordingId: string): ActiveRun[] =>
    [...this.runs.values()].filter((run) => run.recordingId === recordingId);

  all = (): ActiveRun[] => [...this.runs.values()];

  /** Keeps a frame for late followers, as long as there is room. */
  keepFrame(run: ActiveRun, frame: Uint8Array): void {
    if (run.keptBytes + frame.byteLength > KEPT_BYTES) return;
    run.frames.push(frame);
    run.keptBytes += frame.byteLength;
  }

  /** The run began anew in another process. */
  restartFrames(run: ActiveRun): void {
    run.frames = [];
    run.keptBytes = 0;
  }

  /** Forgets a finished run, not at once: somebody may be about to follow it. */
  finish(run: ActiveRun): void {
    const timer = setTimeout(() => {
      this.timers.delete(timer);
      this.runs.delete(run.runId);
    }, LINGER_MS);
    this.timers.add(timer.unref());
  }

  clear(): void {
    for (const timer of this.timers) clearTimeout(timer);
    this.runs.clear();
  }
}
