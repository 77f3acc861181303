/** Recordings: arrival, list, change, deletion. Nothing of an upload is visible before all of it is safe. */
import { randomUUID } from 'node:crypto';
import { type Includeable, Op, type Transaction, type WhereOptions } from 'sequelize';
import type {
  ChannelMap,
  FileRole,
  MapPreview,
  RecordingListQuery,
  RecordingMeta,
  RecordingPatch,
  RecordingStatus,
} from '@/shared/contracts/recordings';
import type { ScenarioRequest } from '@/shared/contracts/scenarios';
import { IDENTITY_AXES } from '@/shared/contracts/vehicles';
import { JobCancelled, storeKeys } from '@/workers';
import type { Actor, Context } from '../context';
import { conflict, invalid, noSuch } from '../errors';
import type { Recording } from '../models/recording';
import { recordBy } from './audit';
import { announce, decodeJobOf, redecode, sendDecode } from './decoding';
import { discardFiles } from './discard';
import { type Found, newestFirst, sortOf } from './paging';
import { nameOrVehicle } from './search';
import { refuseWhileRested } from './recording-rests';
import { sameAxes } from './vehicles';

/** A file of an upload, received whole into a temporary place. */
export interface ReceivedFile {
  role: FileRole;
  name: string;
  path: string;
  bytes: number;
  sha256: string;
}

/** Files by a query of their own: joined, they would repeat the bulky columns. */
const WITH_NAMES: Includeable[] = [
  { association: 'vehicle' },
  { association: 'createdBy' },
  { association: 'files', separate: true },
];
/** Not needed to compute with a recording. */
const BULKY = ['strip', 'health', 'previews', 'problems', 'channelMap'];
const VISIBLE = { confirmedAt: { [Op.ne]: null }, deletedAt: null };

export async function listRecordings(
  ctx: Context,
  actor: Actor,
  query: RecordingListQuery,
): Promise<Found<Recording>> {
  const { search, status, vehicleId, since, sort } = query;
  const where: WhereOptions<Recording> = {
    workspaceId: actor.workspaceId,
    ...VISIBLE,
    ...(await nameOrVehicle(ctx, actor.workspaceId, search)),
    ...(status ? { status } : {}),
    ...(since ? { createdAt: { [Op.gte]: new Date(since) } } : {}),
    ...(vehicleId ? { vehicleId } : {}),
  };
  return newestFirst(ctx.db.Recording, query, where, {
    include: WITH_NAMES,
    attributes: { exclude: ['previews'] },
    sort: sortOf(sort),
  });
}

/** Throws 404 for one that is not in the workspace. */
export async function getRecording(ctx: Context, actor: Actor, id: string): Promise<Recording> {
  const where = { id, workspaceId: actor.workspaceId, ...VISIBLE };
  const recording = await ctx.db.Recording.findOne({ where, include: WITH_NAMES });
  if (!recording) throw noSuch('recording');
  return recording;
}

/** Without its bulky columns. Throws 409, with what to do, unless it is decoded. */
export async function getReadyRecording(ctx: Context, actor: Actor, id: string): Promise<Recording> {
  const recording = await ctx.db.Recording.findOne({
    where: { id, workspaceId: actor.workspaceId, ...VISIBLE },
    attributes: { exclude: BULKY },
    include: ['vehicle', 'files'],
  });
  if (!recording) throw noSuch('recording');
  const status: RecordingStatus = recording.status;
  if (status === 'ready') return recording;
  throw conflict(`“${recording.name}” ${NOT_READY[status]}`);
}

const NOT_READY = {
  uploaded: 'is still waiting to be decoded. Try again in a moment.',
  decoding: 'is still being decoded. Try again in a moment.',
  'needs-mapping': 'needs its columns mapped first: open the recording and say what they are.',
  rejected: 'could not be decoded: open the recording to see why.',
};

/**
 * Takes an upload in. A row that nobody sees comes first, then the files, then the confirmation together with the
 * decoding job: a kill at any moment leaves what the next start can clear away, and nothing confirmed without its files.
 */
export async function addRecording(
  ctx: Context,
  actor: Actor,
  meta: RecordingMeta,
  files: ReceivedFile[],
): Promise<Recording> {
  const { name, vehicleId = null, channelMap = null } = meta;
  await checkVehicle(ctx, actor, vehicleId);
  const id = randomUUID();
  const row = { id, name, vehicleId, givenMap: channelMap, notes: '' };
  await ctx.db.Recording.create({ ...row, ...ownedBy(actor), instanceId: ctx.instance.id });
  try {
    for (const { role, path } of files) await ctx.store.adopt(storeKeys.raw(id, role), path);
    await confirm(ctx, actor, id, 'recording.uploaded', async (transaction) => {
      const rows = files.map(({ role, name: fileName, bytes, sha256 }) => ({
        recordingId: id,
        role,
        name: fileName,
        storeKey: storeKeys.raw(id, role),
        bytes,
        sha256,
      }));
      await ctx.db.RecordingFile.bulkCreate(rows, { transaction });
    });
  } catch (error) {
    await forget(ctx, id).catch((again: unknown) =>
      ctx.log.warn({ err: again, id }, 'left for the next start'),
    );
    throw error;
  }
  return getRecording(ctx, actor, id);
}

/** A recording that the generator makes; its files come out of the first part of its job. */
export async function addScenario(ctx: Context, actor: Actor, request: ScenarioRequest): Promise<Recording> {
  const { name, vehicleId = null, scenario } = request;
  await checkVehicle(ctx, actor, vehicleId);
  const id = randomUUID();
  await ctx.db.Recording.create({
    id,
    name,
    vehicleId,
    scenario,
    ...ownedBy(actor),
    instanceId: ctx.instance.id,
  });
  await confirm(ctx, actor, id, 'recording.simulated');
  return getRecording(ctx, actor, id);
}

/** Another vehicle with other axes decodes the recording again. */
export async function changeRecording(
  ctx: Context,
  actor: Actor,
  id: string,
  patch: RecordingPatch,
): Promise<Recording> {
  const recording = await getRecording(ctx, actor, id);
  const vehicle =
    patch.vehicleId === undefined ? recording.vehicle : await checkVehicle(ctx, actor, patch.vehicleId);
  const axesOf = (of: typeof vehicle) => of?.axes ?? IDENTITY_AXES;
  const turned = !recording.givenMap?.imu?.axes && !sameAxes(axesOf(vehicle), axesOf(recording.vehicle));
  const { name, notes, vehicleId } = recording;
  await ctx.db.transaction(async (transaction) => {
    await recording.update(patch, { transaction });
    if (turned) await redecode(ctx, id, recording.givenMap, transaction);
    const detail = { before: { name, notes, vehicleId }, after: patch };
    await recordBy(
      ctx,
      actor,
      { action: 'recording.changed', subject: recording.name, subjectId: id, detail },
      transaction,
    );
  });
  if (!turned) announce(ctx, recording);
  return getRecording(ctx, actor, id);
}

/** Decodes the recording again by `map`. */
export async function mapRecording(
  ctx: Context,
  actor: Actor,
  id: string,
  map: ChannelMap,
): Promise<Recording> {
  const recording = await getRecording(ctx, actor, id);
  await ctx.db.transaction(async (transaction) => {
    await redecode(ctx, id, map, transaction);
    await ctx.db.Recording.update({ remedies: [] }, { where: { id }, transaction });
    await recordBy(
      ctx,
      actor,
      { action: 'recording.mapped', subject: recording.name, subjectId: id, detail: { map } },
      transaction,
    );
  });
  return getRecording(ctx, actor, id);
}

/** What `map` makes of the first rows; nothing is changed. A newer preview by the same person takes its place. */
export async function previewMap(
  ctx: Context,
  actor: Actor,
  id: string,
  map: ChannelMap,
): Promise<MapPreview> {
  const recording = await getRecording(ctx, actor, id);
  const job = { kind: 'map-preview', ...decodeJobOf(recording, map) } as const;
  const latestKey = `map-preview:${id}:${actor.userId}`;
  return ctx.pool.submit(job, { latestKey, retryOnCrash: true }).result.catch((error: unknown) => {
    if (error instanceof JobCancelled && error.superseded) throw conflict('A newer preview took its place.');
    throw error;
  });
}

/** Deletes it with its runs. Throws 409 while a requirement is judged on it, or a version that has left the draft state rests on it. */
export async function deleteRecording(ctx: Context, actor: Actor, id: string): Promise<void> {
  const recording = await getRecording(ctx, actor, id);
  await ctx.db.transaction(async (transaction) => {
    await refuseWhileRested(ctx, recording, transaction);
    await recording.update({ deletedAt: ctx.clock() }, { transaction });
    await recordBy(
      ctx,
      actor,
      { action: 'recording.deleted', subject: recording.name, subjectId: id },
      transaction,
    );
  });
  const { workspaceId } = recording;
  ctx.live.recordingChanged({ workspaceId, recordingId: id, status: null, progress: 0 });
  await forget(ctx, id);
}

/** Stops what works on a recording, then removes its files, its runs' files and its rows. May be repeated. */
export async function forget(ctx: Context, id: string): Promise<void> {
  const active = ctx.activeRuns.of(id);
  for (const run of active) run.cancel();
  ctx.relay.tell({ type: 'stop-decoding', recordingId: id, before: null });
  await Promise.all([ctx.activeJobs.cancel(id), ...active.map((run) => run.ended)]);
  const runs = await ctx.db.Run.findAll({ where: { recordingId: id }, attributes: ['id'] });
  for (const run of runs) await discardFiles(ctx, storeKeys.run(run.id));
  await discardFiles(ctx, storeKeys.recording(id));
  await ctx.db.Recording.destroy({ where: { id } });
}

const ownedBy = (actor: Actor) => ({ workspaceId: actor.workspaceId, createdById: actor.userId });

async function confirm(
  ctx: Context,
  actor: Actor,
  id: string,
  action: string,
  alongside?: (transaction: Transaction) => Promise<void>,
): Promise<void> {
  await ctx.db.transaction(async (transaction) => {
    await alongside?.(transaction);
    const recording = await ctx.db.Recording.findByPk(id, { transaction, rejectOnEmpty: true });
    await recording.update({ confirmedAt: ctx.clock(), instanceId: null }, { transaction });
    await sendDecode(ctx, recording, transaction);
    await recordBy(ctx, actor, { action, subject: recording.name, subjectId: id }, transaction);
    transaction.afterCommit(() => announce(ctx, recording));
  });
}

/** Throws 422 for a vehicle that is not in the workspace. */
async function checkVehicle(ctx: Context, actor: Actor, vehicleId: string | null) {
  if (!vehicleId) return null;
  const vehicle = await ctx.db.Vehicle.findOne({ where: { id: vehicleId, workspaceId: actor.workspaceId } });
  if (vehicle) return vehicle;
  const message = 'There is no such vehicle in this workspace.';
  throw invalid(message, { errors: [{ path: 'vehicleId', message }] });
}
