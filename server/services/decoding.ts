/** Decoding: the queue's job that turns a recording's raw files into channels, or says why it cannot. */
import { Op, type Transaction } from 'sequelize';
import type { ChannelMap, IntakeProblem, RecordingStatus } from '@/shared/contracts/recordings';
import { IDENTITY_AXES } from '@/shared/contracts/vehicles';
import { type DecodeResult, JobFailed, storeKeys, WorkerCrashed } from '@/workers';
import type { Context } from '../context';
import { persist } from '../database-state';
import type { Recording } from '../models/recording';
import type { JobPayload } from '../queue/queue';
import { discardFiles } from './discard';

/** Rows and sockets hear of progress no more often than this, ms. */
const PROGRESS_EVERY_MS = 500;
/** Share of the work that simulating a scenario takes before its files are decoded. */
const SCENARIO_SHARE = 0.5;

/** Queues the decoding of a recording that has just been confirmed or mapped anew. Higher priorities go first. */
export const sendDecode = (
  ctx: Context,
  { id: recordingId, generation }: Recording,
  transaction: Transaction,
  priority = 0,
): Promise<void> => ctx.queue.send('decode', { recordingId, generation }, { transaction, priority });

/** Puts a recording back to the start with `givenMap`, and queues it; what is under way for it is void. */
export async function redecode(
  ctx: Context,
  id: string,
  givenMap: ChannelMap | null,
  transaction: Transaction,
): Promise<void> {
  const lock = transaction.LOCK.UPDATE;
  const recording = await ctx.db.Recording.findByPk(id, { lock, transaction, rejectOnEmpty: true });
  const generation = recording.generation + 1;
  await recording.update({ ...UNDECODED, givenMap, generation, instanceId: null }, { transaction });
  await sendDecode(ctx, recording, transaction);
  transaction.afterCommit(() => {
    void ctx.activeJobs.cancel(id);
    announce(ctx, recording);
  });
}

/** Decodes again what took its axes from the vehicle. */
export async function redecodeOf(ctx: Context, vehicleId: string, transaction: Transaction): Promise<void> {
  const where = { vehicleId, confirmedAt: { [Op.ne]: null }, deletedAt: null };
  for (const recording of await ctx.db.Recording.findAll({ where, transaction })) {
    if (!recording.givenMap?.imu?.axes) await redecode(ctx, recording.id, recording.givenMap, transaction);
  }
}

/** Tells the workspace how a recording stands. */
export function announce(ctx: Context, { id, workspaceId, status, progress }: Recording): void {
  ctx.live.recordingChanged({ workspaceId, recordingId: id, status, progress });
}

/**
 * The job itself. Idempotent: what another attempt has finished, or a newer mapping has made void, is left alone.
 * Throws to be tried again.
 */
export async function decode(
  ctx: Context,
  { recordingId, generation }: JobPayload<'decode'>,
  lastAttempt: boolean,
): Promise<void> {
  const recording = await claim(ctx, recordingId, generation);
  if (!recording) return;
  announce(ctx, recording);
  try {
    if (recording.scenario && (recording.files ?? []).length === 0) await simulate(ctx, recording);
    await conclude(ctx, recording, outcomeColumns(await runDecode(ctx, recording)));
  } catch (error) {
    const problem = problemOf(error, lastAttempt);
    if (!problem) throw error;
    await conclude(ctx, recording, { status: 'rejected', progress: 1, problems: [problem] });
  }
}

const UNDECODED = {
  status: 'uploaded',
  progress: 0,
  problems: [] as IntakeProblem[],
  previews: [] as Recording['previews'],
  channelMap: null,
  startS: null,
  endS: null,
  hasReference: false,
  timeOrigin: null,
  health: null,
  strip: null,
  sha256: null,
} as const;

/** Marks the recording as being decoded here; null when there is nothing to do any more. */
async function claim(ctx: Context, id: string, generation: number): Promise<Recording | null> {
  const open: RecordingStatus[] = ['uploaded', 'decoding'];
  const [count] = await ctx.db.Recording.update(
    { status: 'decoding', progress: 0, instanceId: ctx.instance.id },
    { where: { id, generation, status: open, deletedAt: null } },
  );
  return count === 0 ? null : ctx.db.Recording.findByPk(id, { include: ['files', 'vehicle'] });
}

async function simulate(ctx: Context, recording: Recording): Promise<void> {
  const { id: recordingId, scenario } = recording;
  if (!scenario) return;
  const report = progressReport(ctx, recording, 0, SCENARIO_SHARE);
  const job = ctx.pool.submit({ kind: 'scenario', recordingId, scenario }, { onEvent: report });
  const { files } = await ctx.activeJobs.track(recordingId, job);
  const rows = files.map(({ role, name, key, bytes, sha256 }) => ({ recordingId, role, name, storeKey: key, bytes, sha256 })); // prettier-ignore
  await ctx.db.RecordingFile.bulkCreate(rows, { updateOnDuplicate: ['name', 'storeKey', 'bytes', 'sha256'] });
  recording.files = await ctx.db.RecordingFile.findAll({ where: { recordingId } });
}

/** What a decoding job is told of a recording, whatever map it is to try. */
export const decodeJobOf = (recording: Recording, channelMap: ChannelMap | null) => ({
  recordingId: recording.id,
  files: (recording.files ?? []).map(({ role, name, storeKey }) => ({ role, name, key: storeKey })),
  channelMap,
  vehicleAxes: recording.vehicle?.axes ?? IDENTITY_AXES,
});

function runDecode(ctx: Context, recording: Recording): Promise<DecodeResult> {
  const from = recording.scenario ? SCENARIO_SHARE : 0;
  const job = ctx.pool.submit(
    { kind: 'decode', ...decodeJobOf(recording, recording.givenMap) },
    { onEvent: progressReport(ctx, recording, from, 1 - from) },
  );
  return ctx.activeJobs.track(recording.id, job);
}

function progressReport(ctx: Context, recording: Recording, from: number, share: number) {
  let last = 0;
  return (event: { type: string; progress?: number }) => {
    const now = Date.now();
    if (event.progress === undefined || now - last < PROGRESS_EVERY_MS) return;
    last = now;
    recording.progress = Math.min(1, from + share * event.progress);
    const { id, generation, progress } = recording;
    announce(ctx, recording);
    ctx.db.Recording.update({ progress }, { where: { id, generation, status: 'decoding' } }).catch(
      () => undefined,
    );
  };
}

/** Writes how it ended, once, unless a newer mapping or a deletion came first. */
async function conclude(ctx: Context, recording: Recording, columns: Partial<Recording>): Promise<void> {
  const { id, generation } = recording;
  const where = { id, generation, status: 'decoding' as const, deletedAt: null };
  const write = () => ctx.db.Recording.update({ ...columns, instanceId: null }, { where });
  const [count] = await persist(write, ctx);
  if (count === 0) {
    if (!(await ctx.db.Recording.findByPk(id))) await discardFiles(ctx, storeKeys.recording(id));
    return;
  }
  Object.assign(recording, { status: columns.status, progress: 1 });
  announce(ctx, recording);
}

function outcomeColumns(result: DecodeResult): Partial<Recording> {
  const { channelMap, previews } = result;
  const ended = { status: result.outcome, progress: 1, channelMap, previews };
  if (result.outcome !== 'ready') return { ...ended, problems: result.problems };
  const { startS, endS, hasReference, timeOrigin, health, strip, sha256 } = result;
  return { ...ended, problems: [], startS, endS, hasReference, timeOrigin, health, strip, sha256 };
}

/** What to tell people when trying again does not help; null: try again. */
function problemOf(error: unknown, lastAttempt: boolean): IntakeProblem | null {
  const nowhere = { file: null, line: null, column: null };
  if (error instanceof JobFailed && (error.code !== 'worker-start' || lastAttempt)) {
    const remedy = 'Mend the file and upload it again, or correct the channel map.';
    return { ...nowhere, code: error.code, message: error.message, remedy };
  }
  if (error instanceof WorkerCrashed && lastAttempt) {
    const message = 'The computing process stopped each time it worked on these files.';
    return {
      ...nowhere,
      code: 'worker-crashed',
      message,
      remedy: 'Upload a shorter piece, or tell the operator.',
    };
  }
  return null;
}
