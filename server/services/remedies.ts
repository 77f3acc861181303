/** Remedies of the health report: accepted one by one, and taken back one by one. Each decodes the recording again. */
import type { Transaction } from 'sequelize';
import type { ChannelMap } from '@/shared/contracts/recordings';
import type { Actor, Context } from '../context';
import { conflict, invalid } from '../errors';
import type { AcceptedRemedy, Recording } from '../models/recording';
import { recordBy } from './audit';
import { redecode } from './decoding';
import { getReadyRecording, getRecording } from './recordings';

/**
 * Of a finding of the health report, or of the problem that stopped the intake. Throws 409 for a recording that is under
 * way, 422 for a finding that is not there or offers nothing.
 */
export async function acceptRemedy(ctx: Context, actor: Actor, id: string, code: string): Promise<Recording> {
  const recording = await getRecording(ctx, actor, id);
  if (recording.status !== 'rejected') await getReadyRecording(ctx, actor, id);
  const told = [...(recording.health?.findings ?? []), ...recording.problems];
  const fix = told.find((one) => one.code === code && one.fix)?.fix;
  if (!fix) {
    const message = 'The health report has no such remedy any more: it may have been accepted already.';
    throw invalid(message, { errors: [{ path: 'code', message }] });
  }
  const user = await ctx.db.User.findByPk(actor.userId, { attributes: ['name'] });
  const accepted: AcceptedRemedy = {
    code,
    label: fix.label,
    at: ctx.clock().toISOString(),
    by: user?.name ?? '',
    before: recording.givenMap,
  };
  const map: ChannelMap = { ...recording.channelMap, ...fix.map };
  await change(
    ctx,
    actor,
    recording,
    [...recording.remedies, accepted],
    map,
    'recording.remedied',
    fix.label,
  );
  return getRecording(ctx, actor, id);
}

/** Takes the latest back. Throws 409 where there is none. */
export async function undoRemedy(ctx: Context, actor: Actor, id: string): Promise<Recording> {
  const recording = await getRecording(ctx, actor, id);
  const latest = recording.remedies.at(-1);
  if (!latest) throw conflict('No remedy is in force that could be taken back.');
  const left = recording.remedies.slice(0, -1);
  await change(ctx, actor, recording, left, latest.before, 'recording.remedy-undone', latest.label);
  return getRecording(ctx, actor, id);
}

async function change(
  ctx: Context,
  actor: Actor,
  recording: Recording,
  remedies: AcceptedRemedy[],
  map: ChannelMap | null,
  action: string,
  label: string,
): Promise<void> {
  await ctx.db.transaction(async (transaction: Transaction) => {
    const now = await ctx.db.Recording.findByPk(recording.id, {
      lock: transaction.LOCK.UPDATE,
      transaction,
      rejectOnEmpty: true,
    });
    if (now.generation !== recording.generation)
      throw conflict('Somebody else has just changed this recording’s mapping. Look at it again.');
    await redecode(ctx, recording.id, map, transaction);
    await ctx.db.Recording.update({ remedies }, { where: { id: recording.id }, transaction });
    await recordBy(ctx, actor, { action, subject: recording.name, detail: { label } }, transaction);
  });
}
