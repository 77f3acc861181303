/**
 * Who has a recording in hand. Its row names the process that decodes it; a newer mapping leaves that name standing until
 * the process has let go, so that two never write a recording's files at once.
 */
import type { RecordingStatus } from '@/shared/contracts/recordings';
import { JobCancelled, storeKeys } from '@/workers';
import type { JobContext } from '../context';
import { pause, persist } from '../database-state';
import type { Recording } from '../models/recording';
import { discardFiles } from './discard';

const OPEN: RecordingStatus[] = ['uploaded', 'decoding'];
/** How often it is looked whether another process has let go, ms. */
const LOOK_EVERY_MS = 250;

/** Marks the recording as being decoded here; null when there is nothing to do any more, or another process is at it. */
export async function claim(ctx: JobContext, id: string, generation: number): Promise<Recording | null> {
  const where = { id, generation, deletedAt: null };
  for (;;) {
    const row = await ctx.db.Recording.findOne({
      where: { ...where, status: OPEN },
      attributes: ['id', 'status', 'instanceId'],
    });
    if (!row) return null;
    const { status, instanceId } = row;
    if (instanceId && (await isAtWork(ctx, instanceId, id))) {
      if (status === 'decoding') return null;
      await pause(LOOK_EVERY_MS, ctx.stopping);
      if (ctx.stopping.aborted) throw new JobCancelled(false);
      continue;
    }
    const mine = { status: 'decoding', progress: 0, instanceId: ctx.instance.id } as const;
    const [count] = await ctx.db.Recording.update(mine, { where: { ...where, status, instanceId } });
    if (count === 1) return ctx.db.Recording.findByPk(id, { include: ['files', 'vehicle'] });
  }
}

async function isAtWork(ctx: JobContext, instanceId: string, recordingId: string): Promise<boolean> {
  if (instanceId === ctx.instance.id) return ctx.activeJobs.has(recordingId);
  return (await ctx.instance.deadAmong([instanceId])).length === 0;
}

/**
 * Writes how it ended, once; answers false where a newer mapping, a stop or a deletion came first, or where this process
 * was out of reach for so long that another took the recording up.
 */
export async function conclude(
  ctx: JobContext,
  recording: Recording,
  columns: Partial<Recording>,
): Promise<boolean> {
  const { id, generation } = recording;
  const where = { id, generation, status: 'decoding' as const, deletedAt: null, instanceId: ctx.instance.id };
  const write = () => ctx.db.Recording.update({ ...columns, instanceId: null }, { where });
  const [count] = await persist(write, ctx);
  if (count === 0) await releaseVoid(ctx, id);
  return count > 0;
}

/** Gives the recording back undecoded; answers whether it is still to be decoded for the same mapping. */
export async function letGo(ctx: JobContext, { id, generation }: Recording): Promise<boolean> {
  const where = { id, generation, status: 'decoding' as const, deletedAt: null, instanceId: ctx.instance.id };
  const back = { status: 'uploaded', progress: 0, instanceId: null } as const;
  const [count] = await persist(() => ctx.db.Recording.update(back, { where }), ctx);
  if (count === 0) await releaseVoid(ctx, id);
  return count > 0;
}

/** Lets those in whom a newer mapping has waiting; where the recording is gone, its files go too. */
async function releaseVoid(ctx: JobContext, id: string): Promise<void> {
  const waiting: RecordingStatus[] = ['uploaded', 'needs-mapping', 'rejected'];
  const where = { id, instanceId: ctx.instance.id, status: waiting };
  await persist(() => ctx.db.Recording.update({ instanceId: null }, { where }), ctx);
  if (!(await ctx.db.Recording.findByPk(id))) await discardFiles(ctx, storeKeys.recording(id));
}
