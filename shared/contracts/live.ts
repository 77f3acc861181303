/** The socket.io namespace of live runs. */
import type { RecordingStatus } from './recordings';
import type { RunState, RunSummary } from './runs';

export const LIVE_NAMESPACE = '/live';

export interface RunProgress {
  runId: string;
  state: RunState;
  /** 0…1 */
  progress: number;
}
export interface RunFailed {
  runId: string;
  state: 'failed' | 'cancelled' | 'superseded';
  reason: string;
}
/** Sent to everybody of the workspace whose recording it is. */
export interface RecordingChanged {
  workspaceId: string;
  recordingId: string;
  /** Null: it was deleted. */
  status: RecordingStatus | null;
  /** Of decoding, 0…1 */
  progress: number;
}
/** An open bench over a recording: each has a name of its own by which its runs are known. */
export interface BenchVisitor {
  userId: string;
  name: string;
  benchId: string;
  /** Its newest run when this was sent; null: none yet. */
  runId: string | null;
}
/** Sent to every bench that is open over the recording when one opens or closes. */
export interface BenchCompany {
  recordingId: string;
  visitors: BenchVisitor[];
}
/** Sent to them when one of them starts a run. */
export interface BenchRun {
  recordingId: string;
  benchId: string;
  runId: string;
}
export type FollowAnswer = { ok: true } | { ok: false; reason: string };

export interface ClientToServerEvents {
  'run:follow': (message: { runId: string }, answer: (result: FollowAnswer) => void) => void;
  'run:unfollow': (message: { runId: string }) => void;
  /** Opens a bench over a recording; a socket has one, and a second takes its place. */
  'bench:open': (
    message: { recordingId: string; benchId: string },
    answer: (result: FollowAnswer) => void,
  ) => void;
  'bench:close': () => void;
}
export interface ServerToClientEvents {
  /** An encoded frame (contracts/frames.ts). Volatile: a slow client misses frames, never the summary. */
  'run:frame': (frame: ArrayBuffer) => void;
  'run:progress': (message: RunProgress) => void;
  'run:summary': (message: { runId: string; summary: RunSummary; hasSeries: boolean }) => void;
  'run:failed': (message: RunFailed) => void;
  'recording:changed': (message: RecordingChanged) => void;
  'bench:company': (message: BenchCompany) => void;
  'bench:run': (message: BenchRun) => void;
}
