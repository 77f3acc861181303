/** The live transport over fetch and socket.io; one connection for the whole app. */
import { decodeFrame } from '@/shared/contracts/frames';
import type { ServerToClientEvents } from '@/shared/contracts/live';
import type { Run } from '@/shared/contracts/runs';
import { api, apiBytes } from '../api';
import type { LiveTransport } from './live-controller';
import { takeLiveSocket, type LiveSocket } from './live-socket';

export function openSocketTransport(): LiveTransport {
  const { socket, release } = takeLiveSocket();
  return {
    create: (request) => api<Run>('/runs', { method: 'POST', body: request }),
    cancel: async (runId) => void (await api(`/runs/${runId}/cancel`, { method: 'POST' })),
    fetchRun: (runId) => api<Run>(`/runs/${runId}`),
    fetchSeries: async (runId) =>
      decodeFrame(await apiBytes(`/runs/${runId}/series`, { query: { points: 3000 } })),
    follow: (runId) => socket.emit('run:follow', { runId }, () => undefined),
    unfollow: (runId) => socket.emit('run:unfollow', { runId }),
    listen: (handlers) => listen(socket, handlers),
    close: release,
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
