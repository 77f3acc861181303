/** Verifying a version: the runs that are missing are queued; what still holds is left as it is. */
import type { Transaction } from 'sequelize';
import type { Actor, Context } from '../context';
import { conflict } from '../errors';
import type { ParameterSet, SetVersion } from '../models/parameter-set';
import type { VerificationRun } from '../models/verification';
import { recordBy } from './audit';
import { judgeCells } from './verification-judging';
import { loadMatrix, type Matrix, type MatrixCell } from './verification-matrix';
import { watchVerification } from './verification-watch';
import { findSet, getVersion, lockVersion } from './versions';

export interface Verification {
  version: SetVersion;
  matrix: Matrix;
}

export async function getVerification(
  ctx: Context,
  actor: Actor,
  setId: string,
  number: number,
): Promise<Verification> {
  const set = await findSet(ctx, actor, setId);
  const version = await getVersion(ctx, actor, setId, number);
  return { version, matrix: await loadMatrix(ctx, set, version) };
}

/** Throws 409 when no requirement applies. Runs that failed are tried again. Where runs are going, `actor` hears of the end. */
export async function startVerification(
  ctx: Context,
  actor: Actor,
  setId: string,
  number: number,
  baseUrl: string,
): Promise<Verification> {
  await ctx.db.transaction(async (transaction) => {
    const { set, version } = await lockVersion(ctx, actor, setId, number, transaction);
    const { cells } = await loadMatrix(ctx, set, version, transaction);
    if (cells.length === 0) throw conflict(noRequirement(set));
    let queued = 0;
    let going = false;
    for (const group of byRun(cells)) {
      const prepared = await prepare(ctx, actor, version, group, transaction);
      if (prepared.queued) queued += 1;
      going ||= prepared.going;
    }
    if (going) await watchVerification(ctx, actor, version.id, baseUrl, transaction); // after the locks of the runs
    const detail = { number, cells: cells.length, runs: queued };
    const what = { action: 'version.verification-started', subject: set.name, subjectId: version.id, detail };
    await recordBy(ctx, actor, what, transaction);
  });
  return getVerification(ctx, actor, setId, number);
}

const noRequirement = ({ name }: ParameterSet) =>
  `No requirement applies to “${name}” and its vehicle. Add one first, with the recordings that it is judged on.`;

/** Cells that the same run answers: same recording, same schedule. */
function byRun(cells: MatrixCell[]): MatrixCell[][] {
  const groups = new Map<string, MatrixCell[]>();
  for (const cell of cells) {
    const key = `${cell.recording.id} ${cell.inputHash}`;
    groups.set(key, [...(groups.get(key) ?? []), cell]);
  }
  return [...groups.values()];
}

/** Sees to the run of a group of cells and to the cells themselves; answers whether that run was queued, and whether it is yet to end. */
async function prepare(
  ctx: Context,
  actor: Actor,
  version: SetVersion,
  cells: MatrixCell[],
  transaction: Transaction,
): Promise<{ queued: boolean; going: boolean }> {
  const { run, queued } = await runFor(ctx, actor, version, cells[0]!, transaction);
  for (const { requirement, recording, definition, requirementHash, judged, outOfDate } of cells) {
    const holds = judged?.verdict && outOfDate.length === 0 && judged.verificationRunId === run.id;
    if (holds && !queued) continue;
    await ctx.db.VerificationCell.upsert(
      {
        versionId: version.id,
        requirementId: requirement.id,
        recordingId: recording.id,
        verificationRunId: run.id,
        requirementHash,
        definition,
        verdict: null,
        value: null,
        bounds: null,
        reason: null,
        judgedAt: null,
      },
      { transaction },
    );
  }
  await judgeCells(ctx, run, transaction);
  return { queued, going: run.state === 'waiting' || run.state === 'running' };
}

/** The run made from just these inputs, locked; made and queued where there is none, and where it failed. */
async function runFor(
  ctx: Context,
  actor: Actor,
  { id: versionId, parameters }: SetVersion,
  { recording, inputs, inputHash }: MatrixCell,
  transaction: Transaction,
): Promise<{ run: VerificationRun; queued: boolean }> {
  const where = { versionId, recordingId: recording.id, inputHash };
  const lock = transaction.LOCK.UPDATE;
  const known = await ctx.db.VerificationRun.findOne({ where, lock, transaction });
  const isDecoded = inputs.recordingSha256 !== null;
  const again = known && isDecoded && (known.state === 'failed' || (known.state === 'done' && !known.runId));
  if (known && !again) return { run: known, queued: false };
  const failure = `“${recording.name}” is not decoded: open the recording to see why, then verify again.`;
  const columns = isDecoded
    ? ({ state: 'waiting', progress: 0, failure: null, finishedAt: null } as const)
    : ({ state: 'failed', progress: 1, failure, finishedAt: ctx.clock() } as const);
  const run = known
    ? await known.update(columns, { transaction })
    : await ctx.db.VerificationRun.create(
        { ...where, ...columns, createdById: actor.userId, inputs, parameters },
        { transaction },
      );
  if (isDecoded) await ctx.queue.send('verify', { verificationRunId: run.id }, { transaction });
  return { run, queued: isDecoded };
}
