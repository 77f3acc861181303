/** Deletes a workspace with all its data: rows in one transaction, which names the files; the files follow. */
import { storeKeys } from '@/workers';
import type { Actor, Context } from '../context';
import { invalid } from '../errors';
import { finishDiscards } from './discard';

/** Throws 422 unless `typed` is the workspace's name. People keep their accounts. */
export async function deleteWorkspace(ctx: Context, actor: Actor, typed: string): Promise<void> {
  const { workspaceId, workspaceName } = actor;
  if (typed.trim() !== workspaceName) {
    const message = `Type the name of the workspace, “${workspaceName}”, to delete it with all its data.`;
    throw invalid(message, { errors: [{ path: 'name', message }] });
  }
  const members = await ctx.db.Membership.findAll({ where: { workspaceId }, attributes: ['userId'] });
  await stopWork(ctx, workspaceId);
  await ctx.db.transaction(async (transaction) => {
    await ctx.db.sequelize.query('SET CONSTRAINTS ALL DEFERRED', { transaction });
    const of = { where: { workspaceId }, attributes: ['id'], transaction };
    const recordings = await ctx.db.Recording.findAll(of);
    const runs = await ctx.db.Run.findAll(of);
    const prefixes = [
      ...recordings.map(({ id }) => storeKeys.recording(id)),
      ...runs.map(({ id }) => storeKeys.run(id)),
    ];
    await ctx.db.Discard.bulkCreate(prefixes.map((prefix) => ({ prefix })), { transaction }); // prettier-ignore
    await ctx.db.Workspace.destroy({ where: { id: workspaceId }, transaction });
    await ctx.db.SinkLetter.destroy({ where: { workspaceId }, transaction });
  });
  ctx.log.info({ workspace: workspaceName, by: actor.email }, 'a workspace was deleted with its data');
  for (const { userId } of members) ctx.live.leaveWorkspace(userId, workspaceId);
  await finishDiscards(ctx);
}

/** What is under way elsewhere finds its rows gone and tidies up after itself. */
async function stopWork(ctx: Context, workspaceId: string): Promise<void> {
  const active = ctx.activeRuns.all().filter((run) => run.workspaceId === workspaceId);
  for (const run of active) run.cancel();
  const recordings = await ctx.db.Recording.findAll({ where: { workspaceId }, attributes: ['id'] });
  for (const { id } of recordings) {
    ctx.relay.tell({ type: 'stop-decoding', recordingId: id, before: null });
    await ctx.activeJobs.cancel(id);
  }
  await Promise.all(active.map((run) => run.ended));
}
