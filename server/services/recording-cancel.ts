/** Stopping a decoding: the files stay, and a mapping decodes them again. */
import type { Actor, Context } from '../context';
import { conflict } from '../errors';
import type { Recording } from '../models/recording';
import { recordBy } from './audit';
import { announce, stopDecoding } from './decoding';
import { problem } from './decoding-problems';
import { getRecording } from './recordings';

const REMEDY = 'Its files are kept: map the columns, or leave that to the headers, and it is decoded again.';

/** Throws 409 where nothing is under way. What is, here or in a process beside, becomes void and stops. */
export async function cancelDecoding(ctx: Context, actor: Actor, id: string): Promise<Recording> {
  const { name } = await getRecording(ctx, actor, id);
  await ctx.db.transaction(async (transaction) => {
    const lock = transaction.LOCK.UPDATE;
    const recording = await ctx.db.Recording.findByPk(id, { lock, transaction, rejectOnEmpty: true });
    if (recording.status !== 'uploaded' && recording.status !== 'decoding') {
      throw conflict(`“${name}” is not being decoded just now: there is nothing to stop.`);
    }
    const generation = recording.generation + 1;
    const problems = [problem('stopped', `Decoding was stopped by ${actor.name}.`, REMEDY)];
    // The name of the process that has it in hand stays until that has let go.
    await recording.update({ status: 'rejected', progress: 1, problems, generation }, { transaction });
    await recordBy(ctx, actor, { action: 'recording.stopped', subject: name }, transaction);
    transaction.afterCommit(() => {
      stopDecoding(ctx, id, generation);
      announce(ctx, recording);
    });
  });
  return getRecording(ctx, actor, id);
}
