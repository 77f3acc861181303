/** Runs as people ask for them: made, listed, stopped, read. run-launch.ts sees them through. */
import type { Readable } from 'node:stream';
import type { Page } from '@/shared/contracts/common';
import type { Outage, RunCreate, RunSeriesQuery, RunState } from '@/shared/contracts/runs';
import { formatNumber } from '@/shared/format';
import { type RunExportJob, safeFileName, storeKeys } from '@/workers';
import type { Actor, Context } from '../context';
import { conflict, invalid, noSuch } from '../errors';
import type { Recording } from '../models/recording';
import type { Run } from '../models/run';
import { newestFirst } from './paging';
import { getReadyRecording } from './recordings';
import { launch, specOf } from './run-launch';

interface ListQuery {
  limit: number;
  cursor?: string | undefined;
  recordingId?: string | undefined;
  state?: RunState | undefined;
}

const BULKY = ['parameters', 'summary', 'provenance', 'outages'];

/** Inserts the row and sets the run going. Throws 409 for a recording that is not ready, 422 for what cannot be run. */
export async function createRun(ctx: Context, actor: Actor, input: RunCreate): Promise<Run> {
  const recording = await getReadyRecording(ctx, actor, input.recordingId);
  checkOutages(input.outages, recording);
  const { parameters, outages, outputRateHz, smooth, errorBudget, benchId = null } = input;
  const run = await ctx.db.Run.create({
    workspaceId: actor.workspaceId,
    recordingId: recording.id,
    createdById: actor.userId,
    benchId,
    parameters,
    leverArmM: parameters.leverArmM ?? recording.vehicle?.leverArmM ?? [0, 0, 0],
    outages,
    outputRateHz,
    smooth,
    errorBudget,
    instanceId: ctx.instance.id,
  });
  launch(ctx, run, recording);
  run.recording = recording;
  return run;
}

export async function listRuns(ctx: Context, actor: Actor, query: ListQuery): Promise<Page<Run>> {
  const { recordingId, state } = query;
  const where = {
    workspaceId: actor.workspaceId,
    ...(recordingId ? { recordingId } : {}),
    ...(state ? { state } : {}),
  };
  return newestFirst(ctx.db.Run, query, where, {
    include: ['createdBy', { association: 'recording', attributes: ['name'] }],
    attributes: { exclude: BULKY },
  });
}

/** Throws 404 for one that is not in the workspace. */
export async function getRun(ctx: Context, actor: Actor, id: string): Promise<Run> {
  const where = { id, workspaceId: actor.workspaceId };
  const include = ['createdBy', { association: 'recording', include: ['files'] }];
  const run = await ctx.db.Run.findOne({ where, include });
  if (!run) throw noSuch('run');
  const active = ctx.activeRuns.get(id);
  if (active && run.state === 'running') run.progress = active.progress;
  return run;
}

/** Stops a run that is going; one that has ended stays as it is. */
export async function cancelRun(ctx: Context, actor: Actor, id: string): Promise<Run> {
  await getRun(ctx, actor, id);
  const active = ctx.activeRuns.get(id);
  active?.cancel();
  await active?.ended;
  return getRun(ctx, actor, id);
}

/** The stored run as one encoded frame. Throws 409 where its series are not kept. */
export async function runSeries(
  ctx: Context,
  actor: Actor,
  id: string,
  query: RunSeriesQuery,
): Promise<Uint8Array> {
  const run = await getRunWithSeries(ctx, actor, id);
  const { from = null, to = null, points } = query;
  const job = { kind: 'run-series', runId: run.id, fromS: from, toS: to, points } as const;
  return ctx.pool.submit(job, { affinity: run.recordingId, retryOnCrash: true }).result;
}

export interface Download {
  stream: Readable;
  bytes: number;
  fileName: string;
}

const EXTENSIONS = {
  'solution-csv': 'solution.csv',
  'innovations-csv': 'innovations.csv',
  geojson: 'track.geojson',
  kml: 'track.kml',
  gpx: 'track.gpx',
} as const;

/** A file made of a run; made once and kept with the run. */
export async function exportRun(
  ctx: Context,
  actor: Actor,
  id: string,
  format: RunExportJob['format'],
  { rateHz = null, smoothed = false }: { rateHz?: number | null; smoothed?: boolean } = {},
): Promise<Download> {
  const run = await getRunWithSeries(ctx, actor, id);
  const ending = EXTENSIONS[format];
  const name = `${rateHz === null ? '' : `${rateHz}-hz-`}${smoothed ? 'smoothed-' : ''}${ending}`;
  const key = storeKeys.export(run.id, name);
  if (!(await ctx.store.has(key))) {
    const utcOrigin = run.recording?.timeOrigin?.utc ?? null;
    const job = { kind: 'run-export', run: specOf(run), format, rateHz, smoothed, name, utcOrigin } as const;
    await ctx.pool.submit(job, { affinity: run.recordingId, retryOnCrash: true }).result;
  }
  const title = safeFileName(run.recording?.name ?? 'run');
  return {
    stream: await ctx.store.stream(key),
    bytes: await ctx.store.size(key),
    fileName: `${title}-${run.id.slice(0, 8)}-${name}`,
  };
}

async function getRunWithSeries(ctx: Context, actor: Actor, id: string): Promise<Run> {
  const run = await getRun(ctx, actor, id);
  if (run.state === 'queued' || run.state === 'running') {
    throw conflict('The run is still going. Fetch its series when it is done.');
  }
  if (!run.hasSeries) {
    throw conflict(
      run.state === 'done'
        ? 'Only the summary of this run is kept: later runs of the same bench took its place. Run it again for its series.'
        : 'This run did not finish, so that it has no series. Run it again.',
    );
  }
  return run;
}

/** A window that misses the recording altogether would do nothing, in silence. */
function checkOutages(outages: Outage[], { startS, endS }: Recording): void {
  if (startS === null || endS === null) return;
  const at = outages.findIndex((window) => window.endS <= startS || window.startS >= endS);
  const window = outages[at];
  if (!window) return;
  const span = (from: number, to: number) => `${formatNumber(from, 6)}–${formatNumber(to, 6)} s`;
  const message = `The outage ${span(window.startS, window.endS)} lies outside the recording, ${span(startS, endS)}.`;
  throw invalid(message, { errors: [{ path: `outages.${at}`, message }] });
}
