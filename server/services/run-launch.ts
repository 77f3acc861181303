/**
 * Sees a run through: to the pool, its frames to the room, its outcome to the row. A row moves
 * queued → running → done | failed | cancelled | superseded; each step asks for the one before it, so that a run ends once.
 */
import {
  JobCancelled,
  JobFailed,
  type JobEvent,
  type RunJobResult,
  type RunSpec,
  storeKeys,
} from '@/workers';
import type { RunState } from '@/shared/contracts/runs';
import type { Context } from '../context';
import { persist } from '../database-state';
import type { Recording } from '../models/recording';
import type { Run } from '../models/run';
import type { ActiveRun } from './active-runs';
import { discardFiles } from './discard';
import { frameSequence } from './frame-sequence';
import { pruneBench } from './retention';

/** Points a series in a frame: about a screen's width. */
const FRAME_POINTS = 1500;

type Outcome =
  { state: 'done'; result: RunJobResult } | { state: 'failed' | 'cancelled' | 'superseded'; reason: string };

/** Starts computing; answers at once. */
export function launch(ctx: Context, run: Run, recording: Recording): void {
  const { benchId, workspaceId, recordingId } = run;
  const active = ctx.activeRuns.add(run);
  const job = ctx.pool.submit(
    { kind: 'run', ...specOf(run), framePoints: FRAME_POINTS },
    {
      ...(benchId ? { latestKey: `${workspaceId}:${benchId}` } : {}),
      affinity: recordingId,
      retryOnCrash: true,
      onEvent: (event) => relay(ctx, active, event),
    },
  );
  active.cancel = () => job.cancel();
  active.ended = see(ctx, run, recording, active, job.result);
  if (benchId) ctx.live.benchRun(workspaceId, { recordingId, benchId, runId: run.id });
}

/** What a worker must know of a run. */
export const specOf = (run: Run): RunSpec => ({
  runId: run.id,
  recordingId: run.recordingId,
  parameters: run.parameters,
  leverArmM: [...run.leverArmM],
  outages: run.outages,
  outputRateHz: run.outputRateHz,
  smooth: run.smooth,
  errorBudget: run.errorBudget,
});

async function see(
  ctx: Context,
  run: Run,
  recording: Recording,
  active: ActiveRun,
  result: Promise<RunJobResult>,
): Promise<void> {
  const outcome = await result.then(succeeded, fallen(ctx, run));
  if (!outcome) return ctx.activeRuns.finish(active);
  active.state = outcome.state;
  try {
    const written = await persist(() => write(ctx, run, recording, outcome), ctx);
    if (written) tell(ctx, run.id, outcome);
    if (!written || outcome.state !== 'done') await discardFiles(ctx, storeKeys.run(run.id));
    else if (run.benchId) await pruneBench(ctx, run.workspaceId, run.benchId);
  } catch (error) {
    ctx.log.error({ err: error, runId: run.id }, 'the end of a run could not be written');
  } finally {
    ctx.activeRuns.finish(active);
  }
}

const succeeded = (result: RunJobResult): Outcome => ({ state: 'done', result });

/** Null: the server stops, and the row stays as it is; the next one computes the run anew. */
const fallen =
  (ctx: Context, run: Run) =>
  (error: unknown): Outcome | null => {
    if (error instanceof JobCancelled && !error.superseded && ctx.stopping.aborted) {
      return run.benchId ? { state: 'failed', reason: RESTARTED } : null;
    }
    if (error instanceof JobCancelled) {
      return { state: error.superseded ? 'superseded' : 'cancelled', reason: error.message };
    }
    if (error instanceof JobFailed) return { state: 'failed', reason: error.message };
    ctx.log.warn({ err: error }, 'a run failed');
    return {
      state: 'failed',
      reason:
        'The computing process stopped unexpectedly, twice. Run it again; if it happens again, tell the operator.',
    };
  };

export const RESTARTED = 'The server was restarted while this run was computing; run it again.';

/**
 * True when the row now says that the run ended so; false when it is gone, or had ended otherwise. May be repeated:
 * a write whose answer was lost with the connection is found done.
 */
async function write(ctx: Context, run: Run, recording: Recording, outcome: Outcome): Promise<boolean> {
  const going: RunState[] = ['queued', 'running'];
  const finishedAt = ctx.clock();
  const columns =
    outcome.state === 'done'
      ? { progress: 1, hasSeries: true, summary: outcome.result.summary, provenance: provenance(recording, outcome.result) } // prettier-ignore
      : { failure: outcome.reason };
  const [count] = await ctx.db.Run.update(
    { ...columns, state: outcome.state, finishedAt, instanceId: null },
    { where: { id: run.id, state: going } },
  );
  if (count > 0) return true;
  const row = await ctx.db.Run.findByPk(run.id, { attributes: ['state'] });
  return row?.state === outcome.state;
}

const provenance = (recording: Recording, { provenance: made, resultSha256 }: RunJobResult) => ({
  ...made,
  resultSha256,
  files: (recording.files ?? []).map(({ role, name, sha256 }) => ({ role, name, sha256 })),
});

function tell(ctx: Context, runId: string, outcome: Outcome): void {
  if (outcome.state === 'done') ctx.live.summary({ runId, summary: outcome.result.summary, hasSeries: true });
  else ctx.live.failed({ runId, state: outcome.state, reason: outcome.reason });
}

function relay(ctx: Context, active: ActiveRun, event: JobEvent): void {
  const { runId } = active;
  if (active.state === 'queued') begin(ctx, active);
  if (event.type === 'frame') {
    if (frameSequence(event.frame) === 0) ctx.activeRuns.restartFrames(active);
    ctx.activeRuns.keepFrame(active, event.frame);
    ctx.live.frame(runId, event.frame);
    return;
  }
  active.progress = event.progress;
  ctx.live.progress({ runId, state: active.state, progress: event.progress });
}

/** Not waited for: the row's next step asks for `queued` or `running` alike. */
function begin(ctx: Context, active: ActiveRun): void {
  active.state = 'running';
  ctx.db.Run.update({ state: 'running' }, { where: { id: active.runId, state: 'queued' } }).catch(
    (error: unknown) =>
      ctx.log.warn({ err: error, runId: active.runId }, 'the start of a run was not written'),
  );
}
