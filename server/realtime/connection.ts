/** One connected client: let in by its session cookie, put out when the session ends, following runs it may read. */
import type { IncomingMessage } from 'node:http';
import type { Session, SessionData } from 'express-session';
import type { Socket } from 'socket.io';
import type { ClientToServerEvents, FollowAnswer, ServerToClientEvents } from '@/shared/contracts/live';
import { idSchema } from '@/shared/contracts/common';
import type { Context } from '../context';
import type { Sessions } from '../middleware/session';
import { loadPerson } from '../services/accounts';
import { frameForWire, watchDrain } from './frames';
import { rooms } from './rooms';

export type NoEvents = Record<string, never>;
export interface SocketData {
  userId: string;
  name: string;
  workspaceIds: string[];
  /** The bench that is open on this connection. */
  bench?: { room: string; recordingId: string; benchId: string; runId: string | null };
  /** Sent, and not yet taken by the transport. */
  framesWaiting: number;
}
export type LiveSocket = Socket<ClientToServerEvents, ServerToClientEvents, NoEvents, SocketData>;

/** How often a socket's session is looked up: it may have ended on another server, or run out. */
const CHECK_SESSION_MS = 30_000;
const ROOMS_AT_ONCE = 50;

/** Lets the client in. Throws where it has no live session. */
export async function greet(ctx: Context, sessions: Sessions, socket: LiveSocket): Promise<void> {
  const { session } = socket.request as IncomingMessage & { session?: Session & Partial<SessionData> };
  const userId = session?.userId;
  const person = userId ? await loadPerson(ctx, userId, socket.handshake.address) : null;
  if (!session || !person) throw new Error('Not signed in: sign in and connect again.');
  const sid = session.id;
  const workspaceIds = person.memberships.map((member) => member.workspaceId);
  socket.data = { userId: person.userId, name: person.name, workspaceIds, framesWaiting: 0 };
  watchDrain(socket);
  await socket.join([rooms.session(sid), rooms.user(person.userId), ...workspaceIds.map(rooms.workspace)]);
  keepChecking(ctx, sessions, socket, sid);
  socket.on('run:follow', (message, answer) => {
    const reply = typeof answer === 'function' ? answer : () => undefined;
    follow(ctx, socket, message, reply).catch((error: unknown) => {
      ctx.log.warn({ err: error }, 'run:follow');
      reply({ ok: false, reason: 'The run could not be followed just now. Try again.' });
    });
  });
  socket.on('run:unfollow', (message) => {
    const runId = idSchema.safeParse(message?.runId);
    if (runId.success) void socket.leave(rooms.run(runId.data));
  });
}

/**
 * Puts the client out when its session or a membership has ended. What ends them on this server does so at once
 * (Live.endSession and its kin); this finds what another server did, and sessions that have run out.
 */
function keepChecking(ctx: Context, sessions: Sessions, socket: LiveSocket, sid: string): void {
  const { userId, workspaceIds } = socket.data;
  const stands = async () => {
    if ((await sessions.ownerOf(sid)) !== userId) return false;
    const memberships = await ctx.db.Membership.findAll({ where: { userId }, attributes: ['workspaceId'] });
    return workspaceIds.every((id) => memberships.some((member) => member.workspaceId === id));
  };
  const check = setInterval(() => {
    stands().then(
      (still) => still || socket.disconnect(true),
      () => undefined, // the database is away: ask again next time
    );
  }, CHECK_SESSION_MS);
  socket.on('disconnect', () => clearInterval(check));
}

/** Joins the room of a run of one of the person's workspaces, and sends what of it has passed already. */
async function follow(
  ctx: Context,
  socket: LiveSocket,
  message: { runId: string },
  answer: (result: FollowAnswer) => void,
): Promise<void> {
  const runId = idSchema.safeParse(message?.runId);
  if (!runId.success) return answer({ ok: false, reason: 'Say which run: {runId}.' });
  const run =
    ctx.activeRuns.get(runId.data) ??
    (await ctx.db.Run.findByPk(runId.data, { attributes: ['workspaceId'] }));
  if (!run || !socket.data.workspaceIds.includes(run.workspaceId)) {
    return answer({ ok: false, reason: 'There is no such run in your workspaces.' });
  }
  if (socket.rooms.size > ROOMS_AT_ONCE) {
    return answer({ ok: false, reason: 'Too many runs are followed at once. Unfollow some first.' });
  }
  await catchUp(ctx, socket, runId.data, answer);
}

/** Joining and the frames so far happen in one go, so that none is missed and none comes twice. */
async function catchUp(
  ctx: Context,
  socket: LiveSocket,
  runId: string,
  answer: (result: FollowAnswer) => void,
): Promise<void> {
  answer({ ok: true });
  const active = ctx.activeRuns.get(runId);
  void socket.join(rooms.run(runId));
  if (active) {
    for (const frame of active.frames) socket.emit('run:frame', frameForWire(frame));
    if (active.state === 'queued' || active.state === 'running') {
      socket.emit('run:progress', { runId, state: active.state, progress: active.progress });
      return;
    }
    await active.ended;
  }
  const row = await ctx.db.Run.findByPk(runId, { attributes: ['state', 'failure', 'summary', 'hasSeries'] });
  if (!row) return;
  const { state, failure, summary, hasSeries } = row;
  if (state === 'done' && summary) socket.emit('run:summary', { runId, summary, hasSeries });
  else if (state === 'failed' || state === 'cancelled' || state === 'superseded') {
    socket.emit('run:failed', { runId, state, reason: failure ?? '' });
  }
}
