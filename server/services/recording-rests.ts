/** What rests on a recording, so that it must stay. */
import { Op, type Transaction } from 'sequelize';
import type { Context } from '../context';
import { inUse } from '../errors';
import type { Recording } from '../models/recording';

/** Throws 409 for one that a requirement is judged on, or that a version rests on which has left the draft state. */
export async function refuseWhileRested(
  ctx: Context,
  recording: Recording,
  transaction: Transaction,
): Promise<void> {
  const { id } = recording;
  const runs = await ctx.db.Run.findAll({ where: { recordingId: id }, attributes: ['id'], transaction });
  const judged = await ctx.db.RequirementRecording.findOne({ where: { recordingId: id }, transaction });
  if (judged) {
    const requirement = await ctx.db.Requirement.findByPk(judged.requirementId, { transaction });
    throw inUse(
      `“${recording.name}” cannot be deleted: the requirement “${requirement?.name}” is judged on it. Take it out of the requirement first.`,
    );
  }
  const version = await ctx.db.SetVersion.findOne({
    where: {
      state: { [Op.ne]: 'draft' },
      [Op.or]: [{ recordingId: id }, { runId: runs.map((run) => run.id) }],
    },
    transaction,
  });
  const verified = version ?? (await versionVerifiedOn(ctx, id, transaction));
  if (!verified) return;
  const set = await ctx.db.ParameterSet.findByPk(verified.setId, { transaction });
  throw inUse(
    `“${recording.name}” cannot be deleted: version ${verified.number} of “${set?.name}” (${verified.state}) rests on it, and its evidence must stay.`,
  );
}

/** One that is or was on its way to a vehicle, and was verified on the recording. */
async function versionVerifiedOn(ctx: Context, recordingId: string, transaction: Transaction) {
  const runs = await ctx.db.VerificationRun.findAll({
    where: { recordingId },
    attributes: ['versionId'],
    transaction,
  });
  const state = ['in-review' as const, 'released' as const, 'superseded' as const];
  return ctx.db.SetVersion.findOne({
    where: { id: runs.map(({ versionId }) => versionId), state },
    transaction,
  });
}
