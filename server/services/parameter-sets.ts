/** Parameter sets and their versions. */
import { Op, type Transaction, UniqueConstraintError, type WhereOptions } from 'sequelize';
import type { PageQuery } from '@/shared/contracts/common';
import type { ParameterSetCreate, VersionCreate } from '@/shared/contracts/parameter-sets';
import type { Actor, Context } from '../context';
import { conflict, invalid, noSuch } from '../errors';
import type { ParameterSet, SetVersion } from '../models/parameter-set';
import { escapeLike, recordBy } from './audit';
import { type Found, newestFirst } from './paging';

const PEOPLE = ['createdBy', 'reviewedBy'];

/** A set with its versions, newest first. */
export interface WholeSet {
  set: ParameterSet;
  versions: SetVersion[];
}

export async function listSets(ctx: Context, actor: Actor, query: PageQuery): Promise<Found<WholeSet>> {
  const { workspaceId } = actor;
  const where: WhereOptions<ParameterSet> = query.search
    ? { workspaceId, name: { [Op.iLike]: `%${escapeLike(query.search)}%` } }
    : { workspaceId };
  const { items, nextCursor } = await newestFirst(ctx.db.ParameterSet, query, where, {
    include: ['vehicle', 'createdBy'],
  });
  const versions = await ctx.db.SetVersion.findAll({
    where: { setId: items.map((set) => set.id) },
    attributes: { exclude: ['parameters', 'outages'] },
    include: ['createdBy'],
    order: [['number', 'DESC']],
  });
  const of = (set: ParameterSet) => versions.filter((version) => version.setId === set.id);
  return { items: items.map((set) => ({ set, versions: of(set) })), nextCursor };
}

/** Throws 404 for one that is not in the workspace. */
export async function getSet(ctx: Context, actor: Actor, id: string): Promise<WholeSet> {
  const set = await findSet(ctx, actor, id);
  const versions = await ctx.db.SetVersion.findAll({
    where: { setId: id },
    include: PEOPLE,
    order: [['number', 'DESC']],
  });
  return { set, versions };
}

export async function getVersion(
  ctx: Context,
  actor: Actor,
  id: string,
  number: number,
): Promise<SetVersion> {
  await findSet(ctx, actor, id);
  const version = await ctx.db.SetVersion.findOne({ where: { setId: id, number }, include: PEOPLE });
  if (!version) throw noSuch('version of this parameter set');
  return version;
}

/** Makes the set with its first version. Throws 409 for a name that is taken. */
export async function createSet(ctx: Context, actor: Actor, input: ParameterSetCreate): Promise<WholeSet> {
  const { name, vehicleId = null, version } = input;
  await checkVehicle(ctx, actor, vehicleId);
  await checkEvidence(ctx, actor, version);
  const { workspaceId, userId: createdById } = actor;
  const set = await ctx.db
    .transaction(async (transaction) => {
      const made = await ctx.db.ParameterSet.create(
        { workspaceId, createdById, vehicleId, name },
        { transaction },
      );
      await addVersion(ctx, actor, made, { ...version, parentNumber: undefined }, 1, transaction);
      return made;
    })
    .catch(nameTaken(name));
  return getSet(ctx, actor, set.id);
}

/** Numbers follow one another, also when two people save at once: the set's row is locked meanwhile. */
export async function createVersion(
  ctx: Context,
  actor: Actor,
  id: string,
  input: VersionCreate,
): Promise<SetVersion> {
  const set = await findSet(ctx, actor, id);
  await checkEvidence(ctx, actor, input);
  const number = await ctx.db.transaction(async (transaction) => {
    await ctx.db.ParameterSet.findByPk(id, {
      lock: transaction.LOCK.UPDATE,
      transaction,
      rejectOnEmpty: true,
    });
    const newest: number | null = await ctx.db.SetVersion.max('number', {
      where: { setId: id },
      transaction,
    });
    const next = (newest ?? 0) + 1;
    if (input.parentNumber && input.parentNumber >= next) {
      const message = `There is no version ${input.parentNumber} of this set.`;
      throw invalid(message, { errors: [{ path: 'parentNumber', message }] });
    }
    await addVersion(ctx, actor, set, input, next, transaction);
    return next;
  });
  return getVersion(ctx, actor, id, number);
}

export async function renameSet(ctx: Context, actor: Actor, id: string, name: string): Promise<WholeSet> {
  const set = await findSet(ctx, actor, id);
  const before = set.name;
  await ctx.db
    .transaction(async (transaction) => {
      await set.update({ name }, { transaction });
      await recordBy(ctx, actor, { action: 'set.renamed', subject: name, detail: { before } }, transaction);
    })
    .catch(nameTaken(name));
  return getSet(ctx, actor, id);
}

async function findSet(ctx: Context, actor: Actor, id: string): Promise<ParameterSet> {
  const where = { id, workspaceId: actor.workspaceId };
  const set = await ctx.db.ParameterSet.findOne({ where, include: ['vehicle', 'createdBy'] });
  if (!set) throw noSuch('parameter set');
  return set;
}

async function addVersion(
  ctx: Context,
  actor: Actor,
  set: ParameterSet,
  input: VersionCreate,
  number: number,
  transaction: Transaction,
): Promise<void> {
  const { note, parameters, outages, runId = null, recordingId = null, parentNumber = null } = input;
  await ctx.db.SetVersion.create(
    {
      setId: set.id,
      number,
      note,
      parameters,
      outages,
      runId,
      recordingId,
      parentNumber,
      createdById: actor.userId,
      reviewedById: null,
    },
    { transaction },
  );
  const what = { action: 'set.version-created', subject: set.name, detail: { number, note, runId } };
  await recordBy(ctx, actor, what, transaction);
}

/** The run and the recording that a version names must be of the workspace. */
async function checkEvidence(
  ctx: Context,
  actor: Actor,
  { runId, recordingId }: VersionCreate,
): Promise<void> {
  const { workspaceId } = actor;
  const [run, recording] = await Promise.all([
    runId ? ctx.db.Run.count({ where: { id: runId, workspaceId } }) : 1,
    recordingId ? ctx.db.Recording.count({ where: { id: recordingId, workspaceId, deletedAt: null } }) : 1,
  ]);
  const errors = [
    ...(run ? [] : [{ path: 'runId', message: 'There is no such run in this workspace.' }]),
    ...(recording ? [] : [{ path: 'recordingId', message: 'There is no such recording in this workspace.' }]),
  ];
  if (errors.length > 0) throw invalid(errors.map((error) => error.message).join(' '), { errors });
}

async function checkVehicle(ctx: Context, actor: Actor, vehicleId: string | null): Promise<void> {
  if (!vehicleId) return;
  const { workspaceId } = actor;
  if (await ctx.db.Vehicle.count({ where: { id: vehicleId, workspaceId } })) return;
  const message = 'There is no such vehicle in this workspace.';
  throw invalid(message, { errors: [{ path: 'vehicleId', message }] });
}

const nameTaken = (name: string) => (error: unknown) => {
  if (!(error instanceof UniqueConstraintError)) throw error;
  const message = `There is a parameter set named “${name}” already. Choose another name, or save a version of that one.`;
  throw conflict(message, { errors: [{ path: 'name', message }] });
};
