/** How long the series of runs are kept. Rows and summaries stay; a run that a version names or rests on keeps its series. */
import { QueryTypes } from 'sequelize';
import { storeKeys } from '@/workers';
import type { Context, JobContext } from '../context';

const KEPT_PER_BENCH = 20;
/** Over all benches of a workspace: a bench is made by every opening of the page. */
const KEPT_PER_WORKSPACE = 400;

/** Removes the series of a bench's older runs. */
export async function pruneBench(ctx: Context, workspaceId: string, benchId: string): Promise<void> {
  const old = await ctx.db.sequelize.query<{ id: string }>(OLD_RUNS, {
    bind: [workspaceId, benchId, KEPT_PER_BENCH, KEPT_PER_WORKSPACE],
    type: QueryTypes.SELECT,
  });
  for (const { id } of old) {
    // The row first: a run that claims series which are gone would be worse than files that nobody claims.
    await ctx.db.Run.update({ hasSeries: false }, { where: { id } });
    await ctx.store.removePrefix(storeKeys.run(id));
  }
}

/**
 * Removes the series of runs that no cell of the version's verification stands on any more. Those that a release was
 * judged by stay, whatever is verified later.
 */
export async function pruneVerification(ctx: JobContext, versionId: string): Promise<void> {
  const ids = await ctx.db.transaction(async (transaction) => {
    const lock = transaction.LOCK.UPDATE; // nobody begins a verification of it meanwhile
    const version = await ctx.db.SetVersion.findByPk(versionId, { lock, transaction });
    if (!version || version.evidence) return [];
    const bind = [versionId];
    const left = await ctx.db.sequelize.query<{ id: string; run_id: string | null }>(LEFT_RUNS, {
      bind,
      transaction,
      type: QueryTypes.SELECT,
    });
    const runIds = left.flatMap(({ run_id: id }) => (id === null ? [] : [id]));
    await ctx.db.Run.update({ hasSeries: false }, { where: { id: runIds }, transaction });
    await ctx.db.VerificationRun.destroy({ where: { id: left.map(({ id }) => id) }, transaction });
    return runIds;
  });
  for (const id of ids) await ctx.store.removePrefix(storeKeys.run(id));
}

const LEFT_RUNS = `
  SELECT id, run_id FROM verification_runs
  WHERE version_id = $1 AND state IN ('done', 'failed')
    AND NOT EXISTS (SELECT FROM verification_cells WHERE verification_run_id = verification_runs.id)
    AND NOT EXISTS (SELECT FROM set_versions WHERE run_id = verification_runs.run_id)
`;

const OLD_RUNS = `
  SELECT id FROM (
    SELECT id, bench_id,
      row_number() OVER (PARTITION BY bench_id ORDER BY created_at DESC, id DESC) AS of_bench,
      row_number() OVER (ORDER BY created_at DESC, id DESC) AS of_workspace
    FROM runs
    WHERE workspace_id = $1 AND bench_id IS NOT NULL AND has_series
  ) ranked
  WHERE ((bench_id = $2 AND of_bench > $3) OR of_workspace > $4)
    AND NOT EXISTS (SELECT FROM set_versions WHERE run_id = ranked.id)
`;
