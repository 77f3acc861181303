/** The live transport over fetch and socket.io; one connection for the whole app. */
import { io, type Socket } from 'socket.io-client';
import { decodeFrame } from '@/shared/contracts/frames';
import {
  LIVE_NAMESPACE,
  type ClientToServerEvents,
  type ServerToClientEvents,
} from '@/shared/contracts/live';
import type { Run } from '@/shared/contracts/runs';
import { api, apiBytes } from '../api';
import type { LiveTransport } from './live-controller';

type LiveSocket = Socket<ServerToClientEvents, ClientToServerEvents>;

let shared: LiveSocket | null = null;
let users = 0;

/** Opens the connection with the first user of it and closes it after the last. */
export function openSocketTransport(): LiveTransport {
  shared ??= io(LIVE_NAMESPACE, { transports: ['websocket', 'polling'], withCredentials: true });
  const socket = shared;
  users++;
  return {
    create: (request) => api<Run>('/runs', { method: 'POST', body: request }),
    cancel: async (runId) => void (await api(`/runs/${runId}/cancel`, { method: 'POST' })),
    fetchRun: (runId) => api<Run>(`/runs/${runId}`),
    fetchSeries: async (runId) =>
      decodeFrame(await apiBytes(`/runs/${runId}/series`, { query: { points: 3000 } })),
    follow: (runId) => socket.emit('run:follow', { runId }, () => undefined),
    unfollow: (runId) => socket.emit('run:unfollow', { runId }),
    listen: (handlers) => listen(socket, handlers),
    close: () => {
      users--;
      if (users > 0) return;
      shared?.disconnect();
      shared = null;
    },
  };
}

function listen(socket: LiveSocket, handlers: Parameters<LiveTransport['listen']>[0]): () => void {
  let connectedBefore = socket.connected;
  const onLost = () => {
    connectedBefore = true;
    handlers.lost();
  };
  const onDisconnect = (reason: string) => {
    onLost();
    // After a farewell by the server the client does not try again by itself.
    if (reason === 'io server disconnect') socket.connect();
  };
  const onFrame = (data: ArrayBuffer) => handlers.frame(decodeFrame(data));
  const onSummary: ServerToClientEvents['run:summary'] = ({ runId, summary }) =>
    handlers.summary(runId, summary);
  const onConnect = () => {
    if (connectedBefore) handlers.reconnected();
    connectedBefore = true;
  };
  socket.on('run:frame', onFrame);
  socket.on('run:progress', handlers.progress);
  socket.on('run:summary', onSummary);
  socket.on('run:failed', handlers.failed);
  socket.on('connect', onConnect);
  socket.on('disconnect', onDisconnect);
  socket.on('connect_error', onLost);
  return () => {
    socket.off('run:frame', onFrame);
    socket.off('run:progress', handlers.progress);
    socket.off('run:summary', onSummary);
    socket.off('run:failed', handlers.failed);
    socket.off('connect', onConnect);
    socket.off('disconnect', onDisconnect);
    socket.off('connect_error', onLost);
  };
}
