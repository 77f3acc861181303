/** What a job gets from outside. Jobs know neither processes nor sockets, so they run in tests as they are. */
import { JobCancelled, type JobEvent } from '../protocol';
import { type RecordingCache } from '../recordings/cache';
import type { Store } from '../store/types';

export interface JobHelpers {
  store: Store;
  recordings: RecordingCache;
  /** 0…1; repeated or tiny steps are swallowed. */
  progress(share: number): void;
  frame(frame: Uint8Array): void;
  /** Lets waiting messages in, so that cancel is heard; throws JobCancelled once the job is cancelled. Call it every few ms. */
  breathe(): Promise<void>;
}

const PROGRESS_STEP = 0.01;

export function createHelpers(
  store: Store,
  recordings: RecordingCache,
  signal: AbortSignal,
  report: (event: JobEvent) => void,
): JobHelpers {
  let reported = -1;
  return {
    store,
    recordings,
    progress(share) {
      const progress = Math.min(1, Math.max(0, share));
      if (progress - reported < PROGRESS_STEP && !(progress === 1 && reported < 1)) return;
      reported = progress;
      report({ type: 'progress', progress });
    },
    frame: (frame) => report({ type: 'frame', frame }),
    async breathe() {
      await new Promise<void>((resolve) => setImmediate(resolve));
      if (signal.aborted) throw new JobCancelled(false);
    },
  };
}
