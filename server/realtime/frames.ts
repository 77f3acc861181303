/**
 * Frames go out at the pace of each client. Packets that the transport has not taken yet are counted between two
 * `drain` events of the connection; a client that is behind misses frames, so that no queue grows for it. (socket.io's
 * own `volatile` would drop a frame already when another message is just being written.)
 */
import type { Namespace } from 'socket.io';
import type { ClientToServerEvents, ServerToClientEvents } from '@/shared/contracts/live';
import type { LiveSocket, NoEvents, SocketData } from './connection';
import { rooms } from './rooms';

/** Frames that may wait for one client: a moment's stutter drops none. */
const MOST_WAITING = 6;

type LiveNamespace = Namespace<ClientToServerEvents, ServerToClientEvents, NoEvents, SocketData>;

/** Begins to count what waits for `socket`. */
export function watchDrain(socket: LiveSocket): void {
  socket.data.framesWaiting = 0;
  socket.conn.on('drain', () => {
    socket.data.framesWaiting = 0;
  });
}

/** Sends a frame to everybody in the run's room who keeps up. */
export function sendFrame(live: LiveNamespace, runId: string, frame: Uint8Array): void {
  const wire = frameForWire(frame);
  for (const id of live.adapter.rooms.get(rooms.run(runId)) ?? []) {
    const socket = live.sockets.get(id);
    if (!socket || socket.data.framesWaiting >= MOST_WAITING) continue;
    socket.data.framesWaiting += 1;
    socket.emit('run:frame', wire);
  }
}

/** The driver sends Node's Buffer as binary; a browser receives it as the ArrayBuffer that the contract names. */
export function frameForWire(frame: Uint8Array): ArrayBuffer {
  return Buffer.from(frame.buffer, frame.byteOffset, frame.byteLength) as unknown as ArrayBuffer;
}
