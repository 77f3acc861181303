/** The socket.io namespace /live: a room a run for frames, a room a workspace for what changes in it. */
import type { Server as HttpServer } from 'node:http';
import { Server } from 'socket.io';
import {
  type BenchRun,
  type ClientToServerEvents,
  LIVE_NAMESPACE,
  type RecordingChanged,
  type RunFailed,
  type RunProgress,
  type ServerToClientEvents,
} from '@/shared/contracts/live';
import type { RunSummary } from '@/shared/contracts/runs';
import type { Context } from '../context';
import { isOwnOrigin } from '../middleware/cross-site';
import type { Sessions } from '../middleware/session';
import { greet, type LiveSocket, type NoEvents, type SocketData } from './connection';
import { tellRun, welcomeBenches } from './benches';
import { sendFrame } from './frames';
import { rooms } from './rooms';

/** Clients only send ids. */
const LARGEST_MESSAGE_BYTES = 16_384;

export interface Live {
  frame(runId: string, frame: Uint8Array): void;
  progress(message: RunProgress): void;
  summary(message: { runId: string; summary: RunSummary; hasSeries: boolean }): void;
  failed(message: RunFailed): void;
  recordingChanged(message: RecordingChanged): void;
  /** A bench of the workspace starts a run. */
  benchRun(workspaceId: string, message: BenchRun): void;
  /** A session has ended: its sockets end too. */
  endSession(sid: string): void;
  endUser(userId: string): void;
  leaveWorkspace(userId: string, workspaceId: string): void;
  attach(http: HttpServer, ctx: Context, sessions: Sessions): void;
  close(): Promise<void>;
}

export function createLive(): Live {
  const io = new Server<ClientToServerEvents, ServerToClientEvents, NoEvents, SocketData>({
    serveClient: false,
    perMessageDeflate: false,
    maxHttpBufferSize: LARGEST_MESSAGE_BYTES,
  });
  const live = io.of(LIVE_NAMESPACE);
  let attached = false;
  const toRun = (runId: string) => live.to(rooms.run(runId));

  return {
    frame: (runId, frame) => sendFrame(live, runId, frame),
    progress: (message) => void toRun(message.runId).emit('run:progress', message),
    summary: (message) => void toRun(message.runId).emit('run:summary', message),
    failed: (message) => void toRun(message.runId).emit('run:failed', message),
    recordingChanged: (message) =>
      void live.to(rooms.workspace(message.workspaceId)).emit('recording:changed', message),
    benchRun: (workspaceId, message) => tellRun(live, workspaceId, message),
    endSession: (sid) => live.in(rooms.session(sid)).disconnectSockets(true),
    endUser: (userId) => live.in(rooms.user(userId)).disconnectSockets(true),
    // The client connects again and finds itself in the workspaces that are left.
    leaveWorkspace: (userId) => live.in(rooms.user(userId)).disconnectSockets(true),
    attach(http, ctx, sessions) {
      attached = true;
      io.attach(http, {
        allowRequest: (req, answer) => {
          const { origin } = req.headers;
          answer(null, !origin || isOwnOrigin(origin, req, ctx.config));
        },
      });
      io.engine.use(sessions.middleware);
      live.use((socket: LiveSocket, next) => {
        greet(ctx, sessions, socket).then(() => {
          welcomeBenches(ctx, live, socket);
          next();
        }, next);
      });
    },
    async close() {
      if (!attached) return;
      live.disconnectSockets(true);
      void io.close(); // not waited for: it waits for the HTTP server, which closes in its own time
    },
  };
}
