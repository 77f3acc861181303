/** Clears up after servers that died: what they had half done is finished, taken up again or told as failed. */
import { Op } from 'sequelize';
import type { RunState } from '@/shared/contracts/runs';
import { storeKeys } from '@/workers';
import type { Context, JobContext } from '../context';
import { isDatabaseAway, pause } from '../database-state';
import { announce, sendDecode } from './decoding';
import { discardFiles, finishDiscards } from './discard';
import { forget } from './recordings';
import { launch, RESTARTED } from './run-launch';
import { verifyAgain } from './verification-jobs';

const LOOK_EVERY_MS = 5_000;
const GOING: RunState[] = ['queued', 'running'];

/**
 * Every few seconds, for the sake of other processes, until this one stops. One counts as dead when it was found so
 * twice in a row: after a restart of the database all of them need a moment to take their locks again.
 */
export async function keepRecovering<C extends JobContext>(
  ctx: C,
  clearUp: (ctx: C, dead: string[]) => Promise<void>,
): Promise<void> {
  let suspects: string[] = [];
  while (!ctx.stopping.aborted) {
    await pause(LOOK_EVERY_MS, ctx.stopping);
    if (ctx.stopping.aborted) return;
    try {
      const dead = await findDead(ctx);
      const gone = dead.filter((id) => suspects.includes(id));
      await clearUp(ctx, gone);
      if (gone.length > 0) await ctx.sweepStore(); // its worker processes have ended by now
      suspects = dead;
    } catch (error) {
      if (!isDatabaseAway(error)) ctx.log.error({ err: error }, 'recovery');
    }
  }
}

/** At start: whoever is found dead now was so before. */
export const recover = async <C extends JobContext>(
  ctx: C,
  clearUp: (ctx: C, dead: string[]) => Promise<void>,
): Promise<void> => clearUp(ctx, await findDead(ctx));

const findDead = async (ctx: JobContext): Promise<string[]> => ctx.instance.deadAmong(await holders(ctx));

/** A server's share. */
export async function clearUpAfter(ctx: Context, dead: string[]): Promise<void> {
  await dropUnconfirmed(ctx, dead);
  await finishDeletions(ctx);
  await finishDiscards(ctx);
  await takeUpJobs(ctx, dead);
  await endRuns(ctx, dead);
}

/** The queue's jobs that were cut off: all that a process without an HTTP side does for the dead. */
export async function takeUpJobs(ctx: JobContext, dead: string[]): Promise<void> {
  await decodeAgain(ctx, dead);
  await verifyAgain(ctx, dead);
}

/** Servers that rows in hand name. */
async function holders(ctx: JobContext): Promise<string[]> {
  const where = { instanceId: { [Op.ne]: null } };
  const recordings = await ctx.db.Recording.findAll({
    where,
    attributes: ['instanceId'],
    group: ['instanceId'],
  });
  const runs = await ctx.db.Run.findAll({
    where: { ...where, state: GOING },
    attributes: ['instanceId'],
    group: ['instanceId'],
  });
  const verifications = await ctx.db.VerificationRun.findAll({
    where,
    attributes: ['instanceId'],
    group: ['instanceId'],
  });
  const ids = [...recordings, ...runs, ...verifications].map((row) => row.instanceId ?? null);
  return [...new Set(ids.filter((id) => id !== null))];
}

/** Uploads that were never confirmed: nobody was told that they are kept. */
async function dropUnconfirmed(ctx: Context, dead: string[]): Promise<void> {
  const where = { confirmedAt: null, instanceId: dead };
  for (const { id } of await ctx.db.Recording.findAll({ where, attributes: ['id'] })) {
    ctx.log.info({ recordingId: id }, 'an upload that was cut off is cleared away');
    await forget(ctx, id);
  }
}

/** A deletion that was cut off between its steps. One that is going on just now is none the worse for it. */
async function finishDeletions(ctx: Context): Promise<void> {
  const where = { deletedAt: { [Op.ne]: null } };
  for (const { id } of await ctx.db.Recording.findAll({ where, attributes: ['id'] })) await forget(ctx, id);
}

/** Takes decodings up again that were cut off. */
async function decodeAgain(ctx: JobContext, dead: string[]): Promise<void> {
  const where = { status: 'decoding' as const, instanceId: dead };
  for (const recording of await ctx.db.Recording.findAll({ where })) {
    const { id, generation, instanceId } = recording;
    const back = { status: 'uploaded', progress: 0, instanceId: null } as const;
    const isOurs = await ctx.db.transaction(async (transaction) => {
      // Whoever else looks after the dead does the same: one of them changes the row.
      const same = { where: { ...where, id, generation, instanceId }, transaction };
      const [count] = await ctx.db.Recording.update(back, same);
      if (count > 0) await sendDecode(ctx, recording, transaction);
      return count > 0;
    });
    if (!isOurs) continue;
    ctx.log.info({ recordingId: id }, 'a decoding that was cut off is taken up again');
    announce(ctx, Object.assign(recording, back));
  }
}

/** A bench's run is told as failed: its slider has moved on or is moved again. Any other is computed anew. */
async function endRuns(ctx: Context, dead: string[]): Promise<void> {
  const where = { state: GOING, instanceId: dead };
  for (const run of await ctx.db.Run.findAll({ where })) {
    await discardFiles(ctx, storeKeys.run(run.id));
    const recording = run.benchId
      ? null
      : await ctx.db.Recording.findOne({
          where: { id: run.recordingId, status: 'ready' },
          include: ['files'],
        });
    if (recording) {
      await run.update({ state: 'queued', instanceId: ctx.instance.id });
      ctx.log.info({ runId: run.id }, 'a run that was cut off is computed anew');
      launch(ctx, run, recording);
      continue;
    }
    const ended = { state: 'failed', failure: RESTARTED, finishedAt: ctx.clock(), instanceId: null } as const;
    await ctx.db.Run.update(ended, { where: { id: run.id, state: GOING } });
    ctx.live.failed({ runId: run.id, state: 'failed', reason: RESTARTED });
  }
}
