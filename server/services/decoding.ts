/** Decoding: the queue's job that turns a recording's raw files into channels, or says why it cannot. */
import { Op, type Transaction } from 'sequelize';
import type { ChannelMap, IntakeProblem } from '@/shared/contracts/recordings';
import { IDENTITY_AXES } from '@/shared/contracts/vehicles';
import { type DecodeResult, JobCancelled } from '@/workers';
import type { JobContext } from '../context';
import type { Recording } from '../models/recording';
import type { JobPayload } from '../queue/queue';
import { claim, conclude, letGo } from './decoding-hold';
import { problemOf } from './decoding-problems';

/** Rows and sockets hear of progress no more often than this, ms. */
const PROGRESS_EVERY_MS = 500;
/** Share of the work that simulating a scenario takes before its files are decoded. */
const SCENARIO_SHARE = 0.5;

/** Queues the decoding of a recording that has just been confirmed or mapped anew. Higher priorities go first. */
export const sendDecode = (
  ctx: JobContext,
  { id: recordingId, generation }: Recording,
  transaction: Transaction,
  priority = 0,
): Promise<void> => ctx.queue.send('decode', { recordingId, generation }, { transaction, priority });

/** Puts a recording back to the start with `givenMap`, and queues it; what is under way for it is void. */
export async function redecode(
  ctx: JobContext,
  id: string,
  givenMap: ChannelMap | null,
  transaction: Transaction,
): Promise<void> {
  const lock = transaction.LOCK.UPDATE;
  const recording = await ctx.db.Recording.findByPk(id, { lock, transaction, rejectOnEmpty: true });
  const generation = recording.generation + 1;
  await recording.update({ ...UNDECODED, givenMap, generation }, { transaction });
  await sendDecode(ctx, recording, transaction);
  transaction.afterCommit(() => {
    stopDecoding(ctx, id, generation);
    announce(ctx, recording);
  });
}

/** Stops, here and in the processes beside, what decodes a recording for a mapping before number `before`. */
export function stopDecoding(ctx: JobContext, recordingId: string, before: number): void {
  void ctx.activeJobs.cancel(recordingId, before);
  ctx.relay.tell({ type: 'stop-decoding', recordingId, before });
}

/** Decodes again what took its axes from the vehicle. */
export async function redecodeOf(
  ctx: JobContext,
  vehicleId: string,
  transaction: Transaction,
): Promise<void> {
  const where = { vehicleId, confirmedAt: { [Op.ne]: null }, deletedAt: null };
  for (const recording of await ctx.db.Recording.findAll({ where, transaction })) {
    if (!recording.givenMap?.imu?.axes) await redecode(ctx, recording.id, recording.givenMap, transaction);
  }
}

/** Tells the workspace how a recording stands. */
export function announce(ctx: JobContext, { id, workspaceId, status, progress }: Recording): void {
  ctx.live.recordingChanged({ workspaceId, recordingId: id, status, progress });
}

/**
 * The job itself. Idempotent: what another attempt has finished, or a newer mapping has made void, is left alone.
 * Throws to be tried again.
 */
export async function decode(
  ctx: JobContext,
  { recordingId, generation }: JobPayload<'decode'>,
  lastAttempt: boolean,
): Promise<void> {
  const recording = await claim(ctx, recordingId, generation);
  if (!recording) return;
  announce(ctx, recording);
  try {
    if (recording.scenario && (recording.files ?? []).length === 0) await simulate(ctx, recording);
    await finish(ctx, recording, outcomeColumns(await runDecode(ctx, recording)));
  } catch (error) {
    const problem = problemOf(error, lastAttempt);
    if (problem) return finish(ctx, recording, { status: 'rejected', progress: 1, problems: [problem] });
    const isWanted = await letGo(ctx, recording);
    if (isWanted || !(error instanceof JobCancelled)) throw error;
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

async function simulate(ctx: JobContext, recording: Recording): Promise<void> {
  const { id: recordingId, scenario } = recording;
  if (!scenario) return;
  const report = progressReport(ctx, recording, 0, SCENARIO_SHARE);
  const job = ctx.pool.submit({ kind: 'scenario', recordingId, scenario }, { onEvent: report });
  const { files } = await ctx.activeJobs.track(recordingId, recording.generation, job);
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

function runDecode(ctx: JobContext, recording: Recording): Promise<DecodeResult> {
  const from = recording.scenario ? SCENARIO_SHARE : 0;
  const job = ctx.pool.submit(
    { kind: 'decode', ...decodeJobOf(recording, recording.givenMap) },
    { onEvent: progressReport(ctx, recording, from, 1 - from) },
  );
  return ctx.activeJobs.track(recording.id, recording.generation, job);
}

function progressReport(ctx: JobContext, recording: Recording, from: number, share: number) {
  let last = 0;
  return (event: { type: string; progress?: number }) => {
    const now = Date.now();
    if (event.progress === undefined || now - last < PROGRESS_EVERY_MS) return;
    last = now;
    recording.progress = Math.min(1, from + share * event.progress);
    const { id, generation, progress } = recording;
    announce(ctx, recording);
    const where = { id, generation, status: 'decoding' as const, instanceId: ctx.instance.id };
    ctx.db.Recording.update({ progress }, { where }).then(
      ([count]) => (count === 0 ? ctx.activeJobs.cancel(id, generation + 1) : undefined),
      () => undefined,
    );
  };
}

async function finish(ctx: JobContext, recording: Recording, columns: Partial<Recording>): Promise<void> {
  if (!(await conclude(ctx, recording, columns))) return;
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
