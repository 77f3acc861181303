/** A client of the live namespace. */
import { io, type Socket } from 'socket.io-client';
import { decodeFrame, type Frame } from '@/shared/contracts/frames';
import {
  type BenchCompany,
  type BenchRun,
  type ClientToServerEvents,
  type FollowAnswer,
  LIVE_NAMESPACE,
  type RecordingChanged,
  type RunFailed,
  type RunProgress,
  type ServerToClientEvents,
} from '@/shared/contracts/live';
import type { RunSummary } from '@/shared/contracts/runs';
import type { Caller } from './api';

/** What came over the socket, in order. */
export interface LiveClient {
  socket: Socket<ServerToClientEvents, ClientToServerEvents>;
  frames: Frame[];
  progress: RunProgress[];
  summaries: { runId: string; summary: RunSummary; hasSeries: boolean }[];
  failures: RunFailed[];
  recordings: RecordingChanged[];
  company: BenchCompany[];
  benchRuns: BenchRun[];
  follow(runId: string): Promise<FollowAnswer>;
  openBench(recordingId: string, benchId: string): Promise<FollowAnswer>;
  close(): void;
}

/** Connects with the caller's cookie. Rejects with the server's words when it is not let in. */
export async function connectLive(
  caller: Caller,
  headers: Record<string, string> = {},
  transport: 'websocket' | 'polling' = 'websocket',
): Promise<LiveClient> {
  const socket: LiveClient['socket'] = io(caller.url + LIVE_NAMESPACE, {
    transports: [transport],
    reconnection: false,
    forceNew: true,
    extraHeaders: { ...(caller.cookie ? { Cookie: caller.cookie } : {}), ...headers },
  });
  const client: LiveClient = {
    socket,
    frames: [],
    progress: [],
    summaries: [],
    failures: [],
    recordings: [],
    company: [],
    benchRuns: [],
    openBench: (recordingId, benchId) =>
      new Promise<FollowAnswer>((resolve) => socket.emit('bench:open', { recordingId, benchId }, resolve)),
    follow: (runId) => new Promise<FollowAnswer>((resolve) => socket.emit('run:follow', { runId }, resolve)),
    close: () => void socket.disconnect(),
  };
  socket.on('run:frame', (frame) => client.frames.push(decodeFrame(frame)));
  socket.on('run:progress', (message) => client.progress.push(message));
  socket.on('run:summary', (message) => client.summaries.push(message));
  socket.on('run:failed', (message) => client.failures.push(message));
  socket.on('recording:changed', (message) => client.recordings.push(message));
  socket.on('bench:company', (message) => client.company.push(message));
  socket.on('bench:run', (message) => client.benchRuns.push(message));
  await new Promise<void>((resolve, reject) => {
    socket.once('connect', resolve);
    socket.once('connect_error', reject);
  });
  return client;
}
