/** Writes the verdicts of the cells that hang on one run. */
import type { Transaction } from 'sequelize';
import type { RunSummary } from '@/shared/contracts/runs';
import { judge } from '@/shared/requirements/judge';
import type { JobContext } from '../context';
import type { Definition, VerificationRun } from '../models/verification';

/** Where the run has ended: judges each of its cells that has no verdict. The run's row must be locked by `transaction`. */
export async function judgeCells(
  ctx: JobContext,
  run: VerificationRun,
  transaction: Transaction,
): Promise<void> {
  if (run.state !== 'done' && run.state !== 'failed') return;
  const where = { verificationRunId: run.id, verdict: null };
  const cells = await ctx.db.VerificationCell.findAll({ where, transaction });
  if (cells.length === 0) return;
  const summary = run.state === 'done' ? await summaryOf(ctx, run, transaction) : null;
  for (const cell of cells) {
    await cell.update(
      { ...verdictOf(cell.definition, run, summary), judgedAt: ctx.clock() },
      { transaction },
    );
  }
}

function verdictOf(
  { metric, comparison, limit }: Definition,
  run: VerificationRun,
  summary: RunSummary | null,
) {
  const { biasSigma } = run;
  if (!summary || !biasSigma) {
    return { verdict: 'failed' as const, value: null, bounds: null, reason: run.failure ?? null };
  }
  const { verdict, value, bounds, reason } = judge(metric, comparison, limit, { summary, biasSigma });
  return { verdict, value, bounds: bounds ? ([...bounds] as [number, number]) : null, reason };
}

async function summaryOf(ctx: JobContext, { runId }: VerificationRun, transaction: Transaction) {
  const row = runId && (await ctx.db.Run.findByPk(runId, { attributes: ['summary'], transaction }));
  return row ? (row.summary ?? null) : null;
}
