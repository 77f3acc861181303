/** The one connection to the live namespace, for all who use it. */
import { io, type Socket } from 'socket.io-client';
import {
  LIVE_NAMESPACE,
  type ClientToServerEvents,
  type ServerToClientEvents,
} from '@/shared/contracts/live';

export type LiveSocket = Socket<ServerToClientEvents, ClientToServerEvents>;

let shared: LiveSocket | null = null;
let users = 0;

/** Connects with the first user; `release` of the last one disconnects. */
export function takeLiveSocket(): { socket: LiveSocket; release: () => void } {
  shared ??= io(LIVE_NAMESPACE, { transports: ['websocket', 'polling'], withCredentials: true });
  users++;
  let released = false;
  return {
    socket: shared,
    release: () => {
      if (released) return;
      released = true;
      users--;
      if (users > 0) return;
      shared?.disconnect();
      shared = null;
    },
  };
}
