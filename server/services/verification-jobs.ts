/**
 * The queue's job that makes one run for a verification. Whichever process takes it names itself in the row; when it dies,
 * another takes the row up (recovery.ts). The same row names the same run, so that no run is made or counted twice.
 */
import type { Transaction } from 'sequelize';
import { JobFailed, storeKeys, type VerificationRunResult, WorkerCrashed } from '@/workers';
import type { JobContext } from '../context';
import { persist } from '../database-state';
import type { Run } from '../models/run';
import type { VerificationRun } from '../models/verification';
import type { JobPayload } from '../queue/queue';
import { discardFiles } from './discard';
import { pruneVerification } from './retention';
import { judgeCells } from './verification-judging';
import { tellWhenEnded } from './verification-watch';

const OUTPUT_RATE_HZ = 10;
/** Rows hear of progress no more often than this, ms. */
const PROGRESS_EVERY_MS = 1_000;
const CRASHED =
  'The computing process stopped unexpectedly, several times. Verify again; if it happens again, tell the operator.';

type Outcome = { result: VerificationRunResult } | { failure: string };

const keyOf = (id: string) => `verification:${id}`;

/** Idempotent: what has ended, or is in the hands of another process that lives, is left alone. Throws to be tried again. */
export async function verify(
  ctx: JobContext,
  { verificationRunId: id }: JobPayload<'verify'>,
  lastAttempt: boolean,
): Promise<void> {
  const claimed = await claim(ctx, id);
  if (!claimed) return;
  try {
    const result = await compute(ctx, claimed);
    await conclude(ctx, claimed, checked(claimed, result));
  } catch (error) {
    if (error instanceof JobFailed) return conclude(ctx, claimed, { failure: error.message });
    if (lastAttempt && error instanceof WorkerCrashed) return conclude(ctx, claimed, { failure: CRASHED });
    await letGo(ctx, id);
    throw error;
  }
}

/** Takes up what processes that died had in hand. Whoever else looks after the dead does the same: one changes the row. */
export async function verifyAgain(ctx: JobContext, dead: string[]): Promise<void> {
  const where = { state: 'running' as const, instanceId: dead };
  for (const { id, instanceId } of await ctx.db.VerificationRun.findAll({ where })) {
    await ctx.db.transaction(async (transaction) => {
      const same = { where: { ...where, id, instanceId }, transaction };
      const [count] = await ctx.db.VerificationRun.update(BACK, same);
      if (count > 0) await ctx.queue.send('verify', { verificationRunId: id }, { transaction });
    });
  }
}

const BACK = { state: 'waiting', progress: 0, instanceId: null } as const;

interface Claimed {
  row: VerificationRun;
  run: Run;
}

async function claim(ctx: JobContext, id: string): Promise<Claimed | null> {
  const seen = await ctx.db.VerificationRun.findByPk(id, { attributes: ['state', 'instanceId'] });
  if (!seen || (seen.state !== 'waiting' && seen.state !== 'running')) return null;
  if (seen.state === 'running' && (await isInHand(ctx, id, seen.instanceId ?? null))) return null;
  return ctx.db.transaction(async (transaction) => {
    const where = { id, state: seen.state, instanceId: seen.instanceId ?? null };
    const row = await ctx.db.VerificationRun.findOne({ where, lock: transaction.LOCK.UPDATE, transaction });
    const run = row && (await runOf(ctx, row, transaction));
    if (!run) return null;
    const mine = { state: 'running', progress: 0, instanceId: ctx.instance.id, runId: run.id } as const;
    return { row: await row.update(mine, { transaction }), run };
  });
}

async function isInHand(ctx: JobContext, id: string, instanceId: string | null): Promise<boolean> {
  if (instanceId === null) return false;
  if (instanceId === ctx.instance.id) return ctx.activeJobs.has(keyOf(id));
  return (await ctx.instance.deadAmong([instanceId])).length === 0;
}

/**
 * The run's own row: made at the first attempt, used again at the next. It names no process, so that nobody but us takes
 * it up. Null where its recording is gone.
 */
async function runOf(ctx: JobContext, row: VerificationRun, transaction: Transaction): Promise<Run | null> {
  const known = row.runId ? await ctx.db.Run.findByPk(row.runId, { transaction }) : null;
  if (known) return known.update({ state: 'running', progress: 0, failure: null }, { transaction });
  const { recordingId, createdById, parameters, inputs } = row;
  const recording = await ctx.db.Recording.findByPk(recordingId, {
    attributes: ['workspaceId'],
    transaction,
  });
  if (!recording) return null;
  const { workspaceId } = recording;
  const fixed = { outages: [], outputRateHz: OUTPUT_RATE_HZ, benchId: null, instanceId: null } as const;
  const { leverArmM } = inputs;
  return ctx.db.Run.create(
    { ...fixed, outages: [], workspaceId, recordingId, createdById, parameters, leverArmM, state: 'running' },
    { transaction },
  );
}

function compute(ctx: JobContext, { row, run }: Claimed): Promise<VerificationRunResult> {
  const { recordingId, parameters, inputs } = row;
  const { leverArmM, schedule } = inputs;
  const spec = {
    runId: run.id,
    recordingId,
    parameters,
    leverArmM: [...leverArmM] as [number, number, number],
  };
  const job = ctx.pool.submit(
    { kind: 'verification-run', ...spec, outputRateHz: OUTPUT_RATE_HZ, schedule },
    { affinity: recordingId, retryOnCrash: true, onEvent: progressReport(ctx, row.id) },
  );
  return ctx.activeJobs.track(keyOf(row.id), 0, job);
}

function progressReport(ctx: JobContext, id: string) {
  let last = Date.now();
  return (event: { type: string; progress?: number }) => {
    const now = Date.now();
    if (event.progress === undefined || now - last < PROGRESS_EVERY_MS) return;
    last = now;
    const where = { id, state: 'running' as const, instanceId: ctx.instance.id };
    ctx.db.VerificationRun.update({ progress: event.progress }, { where }).catch(() => undefined); // the next one is soon enough
  };
}

/** The recording may have been decoded again between the question and the run. */
function checked({ row }: Claimed, result: VerificationRunResult): Outcome {
  if (result.provenance.recordingSha256 === row.inputs.recordingSha256) return { result };
  return { failure: 'The recording was decoded again meanwhile, with another result. Verify again.' };
}

/** Run, verification and verdicts in one transaction, once: nothing where another process has taken it up meanwhile. */
async function conclude(
  ctx: JobContext,
  { row: { id, versionId }, run }: Claimed,
  outcome: Outcome,
): Promise<void> {
  const written = await persist(() => write(ctx, id, run, outcome), ctx);
  const isWanted = written && 'result' in outcome;
  if (!isWanted && !(await isTakenUp(ctx, id))) await discardFiles(ctx, storeKeys.run(run.id));
  await pruneVerification(ctx, versionId);
}

/** In the hands of another process, or ended by it: the files are then its own. */
async function isTakenUp(ctx: JobContext, id: string): Promise<boolean> {
  const row = await ctx.db.VerificationRun.findByPk(id, { attributes: ['state', 'instanceId'] });
  return row?.state === 'done' || (row?.state === 'running' && row.instanceId !== ctx.instance.id);
}

function write(ctx: JobContext, id: string, run: Run, outcome: Outcome): Promise<boolean> {
  return ctx.db.transaction(async (transaction) => {
    const where = { id, state: 'running' as const, instanceId: ctx.instance.id };
    const row = await ctx.db.VerificationRun.findOne({ where, lock: transaction.LOCK.UPDATE, transaction });
    if (!row) return false;
    const finishedAt = ctx.clock();
    const ended = { progress: 1, finishedAt, instanceId: null };
    if ('failure' in outcome) {
      const { failure } = outcome;
      await ctx.db.Run.update(
        { state: 'failed', failure, finishedAt },
        { where: { id: run.id }, transaction },
      );
      await row.update({ ...ended, state: 'failed', failure }, { transaction });
    } else {
      await ctx.db.Run.update(await columnsOf(ctx, run, outcome.result, finishedAt), {
        where: { id: run.id },
        transaction,
      });
      await row.update({ ...ended, state: 'done', biasSigma: outcome.result.biasSigma }, { transaction });
    }
    await judgeCells(ctx, row, transaction);
    await tellWhenEnded(ctx, row.versionId, transaction);
    return true;
  });
}

async function columnsOf(
  ctx: JobContext,
  { recordingId }: Run,
  result: VerificationRunResult,
  finishedAt: Date,
) {
  const { summary, outages, provenance, resultSha256 } = result;
  const files = await ctx.db.RecordingFile.findAll({ where: { recordingId } });
  return {
    state: 'done' as const,
    progress: 1,
    hasSeries: true,
    finishedAt,
    summary,
    outages,
    provenance: {
      ...provenance,
      resultSha256,
      files: files.map(({ role, name, sha256 }) => ({ role, name, sha256 })),
    },
  };
}

async function letGo(ctx: JobContext, id: string): Promise<void> {
  const where = { id, state: 'running' as const, instanceId: ctx.instance.id };
  await persist(() => ctx.db.VerificationRun.update(BACK, { where }), ctx);
}
