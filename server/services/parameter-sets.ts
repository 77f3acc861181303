/** Parameter sets: a name, a vehicle, and versions that versions.ts looks after. */
import { Op, type Transaction, UniqueConstraintError, type WhereOptions } from 'sequelize';
import type {
  ParameterSetCreate,
  ParameterSetListQuery,
  ParameterSetPatch,
  VersionState,
} from '@/shared/contracts/parameter-sets';
import type { Actor, Context } from '../context';
import { conflict, invalid, noSuch } from '../errors';
import type { ParameterSet, SetVersion } from '../models/parameter-set';
import { recordBy } from './audit';
import { type Found, newestFirst, sortOf } from './paging';
import { nameOrVehicle } from './search';
import { addVersion, checkEvidence, PEOPLE } from './versions';

/** A set with its versions, newest first. */
export interface WholeSet {
  set: ParameterSet;
  versions: SetVersion[];
}

export async function listSets(
  ctx: Context,
  actor: Actor,
  query: ParameterSetListQuery,
): Promise<Found<WholeSet>> {
  const { search, vehicleId, state, sort } = query;
  const where: WhereOptions<ParameterSet> = {
    workspaceId: actor.workspaceId,
    ...(await nameOrVehicle(ctx, actor.workspaceId, search)),
    ...(vehicleId ? { vehicleId } : {}),
    ...(state ? { id: { [Op.in]: withVersionIn(ctx, state) } } : {}),
  };
  const { items, nextCursor } = await newestFirst(ctx.db.ParameterSet, query, where, {
    include: ['vehicle', 'createdBy'],
    sort: sortOf(sort),
  });
  const versions = await ctx.db.SetVersion.findAll({
    where: { setId: items.map((set) => set.id) },
    attributes: { exclude: ['parameters', 'outages', 'evidence'] },
    include: ['createdBy'],
    order: [['number', 'DESC']],
  });
  const of = (set: ParameterSet) => versions.filter((version) => version.setId === set.id);
  return { items: items.map((set) => ({ set, versions: of(set) })), nextCursor };
}

function withVersionIn({ db: { sequelize } }: Context, state: VersionState) {
  return sequelize.literal(`(SELECT set_id FROM set_versions WHERE state = ${sequelize.escape(state)})`);
}

/** Throws 404 for one that is not in the workspace. */
export async function getSet(ctx: Context, actor: Actor, id: string): Promise<WholeSet> {
  const where = { id, workspaceId: actor.workspaceId };
  const set = await ctx.db.ParameterSet.findOne({ where, include: ['vehicle', 'createdBy'] });
  if (!set) throw noSuch('parameter set');
  const versions = await ctx.db.SetVersion.findAll({
    where: { setId: id },
    include: PEOPLE,
    order: [['number', 'DESC']],
  });
  return { set, versions };
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
      await addVersion(ctx, actor, made, { ...version, parentNumber: undefined }, transaction);
      return made;
    })
    .catch(nameTaken(name));
  return getSet(ctx, actor, set.id);
}

/** Throws 409 for a name that is taken, and for another vehicle once a version is in review or has been released. */
export async function changeSet(
  ctx: Context,
  actor: Actor,
  id: string,
  patch: ParameterSetPatch,
): Promise<WholeSet> {
  await getSet(ctx, actor, id);
  if (patch.vehicleId) await checkVehicle(ctx, actor, patch.vehicleId);
  await ctx.db
    .transaction(async (transaction) => {
      const lock = transaction.LOCK.UPDATE;
      const set = await ctx.db.ParameterSet.findByPk(id, { lock, transaction, rejectOnEmpty: true });
      const { name, vehicleId } = set;
      const moves = patch.vehicleId !== undefined && patch.vehicleId !== vehicleId;
      if (moves) await refuseOnceSubmitted(ctx, set, transaction);
      await set.update(patch, { transaction });
      const detail = { before: { name, vehicleId }, after: { name: set.name, vehicleId: set.vehicleId } };
      const what = { action: 'set.changed', subject: set.name, subjectId: id, detail };
      await recordBy(ctx, actor, what, transaction);
    })
    .catch(nameTaken(patch.name ?? ''));
  return getSet(ctx, actor, id);
}

async function refuseOnceSubmitted(ctx: Context, set: ParameterSet, transaction: Transaction) {
  const state: VersionState[] = ['in-review', 'released', 'superseded'];
  const version = await ctx.db.SetVersion.findOne({ where: { setId: set.id, state }, transaction });
  if (!version) return;
  const message = `“${set.name}” keeps its vehicle: version ${version.number} is in review or has been released for it. Make a set of its own for another vehicle.`;
  throw conflict(message, { errors: [{ path: 'vehicleId', message }] });
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
