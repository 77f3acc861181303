/** An open bench as the server sees it: a socket, and a run for every slider release. */
import { randomUUID } from 'node:crypto';
import { io, type Socket } from 'socket.io-client';
import {
  LIVE_NAMESPACE,
  type ClientToServerEvents,
  type ServerToClientEvents,
} from '@/shared/contracts/live';
import { decodeFrame } from '@/shared/contracts/frames';
import type { RunCreateInput } from '@/shared/contracts/runs';
import type { Person } from '@/tests/support/person';

export interface Timing {
  /** From the release to the answer of POST /runs, ms. */
  acceptedMs: number;
  /** To the first frame at the client, decoded, ms. */
  firstFrameMs: number;
  /** To the summary, ms. */
  completeMs: number;
}

export class LiveBench {
  private readonly benchId = randomUUID();

  private constructor(
    private readonly person: Person,
    private readonly socket: Socket<ServerToClientEvents, ClientToServerEvents>,
  ) {}

  static async open(server: string, person: Person): Promise<LiveBench> {
    const socket: Socket<ServerToClientEvents, ClientToServerEvents> = io(`${server}${LIVE_NAMESPACE}`, {
      transports: ['websocket'],
      extraHeaders: { Cookie: person.cookie, Origin: server },
      forceNew: true,
    });
    await new Promise<void>((resolve, reject) => {
      socket.once('connect', resolve);
      socket.once('connect_error', reject);
    });
    return new LiveBench(person, socket);
  }

  /** One slider release, to the summary. */
  async release(request: RunCreateInput): Promise<Timing> {
    const releasedAt = performance.now();
    const since = () => performance.now() - releasedAt;
    const { id } = (await this.person.json('POST', '/runs', { ...request, benchId: this.benchId })) as {
      id: string;
    };
    const acceptedMs = since();
    return new Promise((resolve, reject) => {
      let firstFrameMs = NaN;
      const onFrame: ServerToClientEvents['run:frame'] = (frame) => {
        if (Number.isNaN(firstFrameMs) && decodeFrame(frame).head.runId === id) firstFrameMs = since();
      };
      const onFailed: ServerToClientEvents['run:failed'] = (message) => {
        if (message.runId === id) finish(() => reject(new Error(message.reason)));
      };
      const onSummary: ServerToClientEvents['run:summary'] = (message) => {
        if (message.runId !== id) return;
        finish(() => resolve({ acceptedMs, firstFrameMs, completeMs: since() }));
      };
      const finish = (settle: () => void) => {
        this.socket.off('run:frame', onFrame).off('run:summary', onSummary).off('run:failed', onFailed);
        this.socket.emit('run:unfollow', { runId: id });
        settle();
      };
      this.socket.on('run:frame', onFrame).on('run:summary', onSummary).on('run:failed', onFailed);
      this.socket.emit('run:follow', { runId: id }, (answer) => {
        if (!answer.ok) finish(() => reject(new Error(answer.reason)));
      });
    });
  }

  close(): void {
    this.socket.close();
  }
}
