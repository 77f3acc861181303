/** Tells who started a verification when it has ended and cells of it fail: once, not cell by cell. */
import type { Transaction } from 'sequelize';
import type { Actor, JobContext } from '../context';
import type { FailingCell } from '../mail/version-letters';
import type { MatrixCell } from './verification-matrix';
import { loadMatrix } from './verification-matrix';
import { tellVerificationFailed } from './version-letters';

/** `actor` will hear of its end. The runs that are going must be locked by `transaction`, so that none ends unseen. */
export async function watchVerification(
  ctx: JobContext,
  { userId }: Actor,
  versionId: string,
  baseUrl: string,
  transaction: Transaction,
): Promise<void> {
  await ctx.db.VerificationWatch.upsert({ versionId, userId, baseUrl }, { transaction });
}

/**
 * To be called in the transaction that judges a run's cells, with the run's row locked. The last of them writes the
 * letters: the watches are locked before anything is counted, so that of two that end at once one sees the other's cells.
 */
export async function tellWhenEnded(
  ctx: JobContext,
  versionId: string,
  transaction: Transaction,
): Promise<void> {
  const where = { versionId };
  const lock = transaction.LOCK.UPDATE;
  const watches = await ctx.db.VerificationWatch.findAll({
    where,
    order: [['userId', 'ASC']],
    lock,
    transaction,
  });
  if (watches.length === 0) return;
  if ((await ctx.db.VerificationCell.count({ where: { versionId, verdict: null }, transaction })) > 0) return;
  await ctx.db.VerificationWatch.destroy({ where, transaction });
  const version = await ctx.db.SetVersion.findByPk(versionId, { transaction, rejectOnEmpty: true });
  const set = await ctx.db.ParameterSet.findByPk(version.setId, { transaction, rejectOnEmpty: true });
  const matrix = await loadMatrix(ctx, set, version, transaction);
  const cells = matrix.cells.filter(fails).map(named);
  if (cells.length === 0) return;
  for (const { userId, baseUrl } of watches) {
    const told = { userId, set, version, baseUrl };
    await tellVerificationFailed(ctx, told, { cells, total: matrix.cells.length }, transaction);
  }
}

const fails = ({ judged, settled }: MatrixCell) =>
  !settled && (judged?.verdict === 'fail' || judged?.verdict === 'failed');

const named = ({ requirement, recording, judged }: MatrixCell): FailingCell => ({
  requirement: requirement.name,
  recording: recording.name,
  runFailed: judged?.verdict === 'failed',
  reason: judged?.reason ?? null,
});
