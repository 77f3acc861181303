/** Who has a bench open over a recording: those who do see each other, and hear of each other's runs. */
import type { Namespace } from 'socket.io';
import { z } from 'zod';
import { idSchema } from '@/shared/contracts/common';
import type {
  BenchRun,
  ClientToServerEvents,
  FollowAnswer,
  ServerToClientEvents,
} from '@/shared/contracts/live';
import type { Context } from '../context';
import type { LiveSocket, NoEvents, SocketData } from './connection';
import { rooms } from './rooms';

type LiveNamespace = Namespace<ClientToServerEvents, ServerToClientEvents, NoEvents, SocketData>;

const openSchema = z.object({ recordingId: idSchema, benchId: z.uuid() });

/** Lets the client open and close its bench; a connection that ends closes it. */
export function welcomeBenches(ctx: Context, live: LiveNamespace, socket: LiveSocket): void {
  socket.on('bench:open', (message, answer) => {
    const reply = typeof answer === 'function' ? answer : () => undefined;
    open(ctx, live, socket, message, reply).catch((error: unknown) => {
      ctx.log.warn({ err: error }, 'bench:open');
      reply({ ok: false, reason: 'Who else is on this bench could not be told just now.' });
    });
  });
  const leave = () => void close(ctx, live, socket);
  socket.on('bench:close', leave);
  socket.on('disconnect', leave);
}

async function open(
  ctx: Context,
  live: LiveNamespace,
  socket: LiveSocket,
  message: unknown,
  answer: (result: FollowAnswer) => void,
): Promise<void> {
  const asked = openSchema.safeParse(message);
  if (!asked.success) return answer({ ok: false, reason: 'Say which bench: {recordingId, benchId}.' });
  const { recordingId, benchId } = asked.data;
  const recording = await ctx.db.Recording.findByPk(recordingId, {
    attributes: ['workspaceId', 'deletedAt'],
  });
  if (!recording || recording.deletedAt || !socket.data.workspaceIds.includes(recording.workspaceId))
    return answer({ ok: false, reason: 'There is no such recording in your workspaces.' });
  await close(ctx, live, socket);
  const room = rooms.bench(recording.workspaceId, recordingId);
  const { workspaceId } = recording;
  const newest = await ctx.db.Run.findOne({
    where: { workspaceId, benchId },
    order: [['createdAt', 'DESC']],
    attributes: ['id'],
  });
  socket.data.bench = { room, recordingId, benchId, runId: newest?.id ?? null };
  await socket.join(room);
  answer({ ok: true });
  await tell(live, room, recordingId);
}

async function close(ctx: Context, live: LiveNamespace, socket: LiveSocket): Promise<void> {
  const { bench } = socket.data;
  if (!bench) return;
  socket.data.bench = undefined;
  await socket.leave(bench.room);
  await tell(live, bench.room, bench.recordingId).catch((error: unknown) =>
    ctx.log.warn({ err: error }, 'bench:company'),
  );
}

/** A bench starts a run: whoever is on the recording hears of it, now or when they come. */
export function tellRun(live: LiveNamespace, workspaceId: string, message: BenchRun): void {
  for (const { data } of live.sockets.values())
    if (data.bench?.benchId === message.benchId) data.bench.runId = message.runId;
  live.to(rooms.bench(workspaceId, message.recordingId)).emit('bench:run', message);
}

async function tell(live: LiveNamespace, room: string, recordingId: string): Promise<void> {
  const sockets = await live.in(room).fetchSockets();
  const visitors = sockets.flatMap(({ data: { userId, name, bench } }) =>
    bench?.room === room ? [{ userId, name, benchId: bench.benchId, runId: bench.runId }] : [],
  );
  live.to(room).emit('bench:company', { recordingId, visitors });
}
