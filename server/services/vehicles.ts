/** Vehicles: what a recording and a run take their axes and lever arm from. */
import { Op, UniqueConstraintError, type WhereOptions } from 'sequelize';
import type { AxisMap, VehicleInput, VehicleListQuery, VehiclePatch } from '@/shared/contracts/vehicles';
import type { Actor, Context } from '../context';
import { conflict, inUse, noSuch } from '../errors';
import type { Vehicle } from '../models/vehicle';
import { escapeLike, recordBy } from './audit';
import { redecodeOf } from './decoding';
import { type Found, newestFirst, sortOf } from './paging';

export interface CountedVehicle {
  vehicle: Vehicle;
  recordingCount: number;
}

export async function listVehicles(
  ctx: Context,
  actor: Actor,
  query: VehicleListQuery,
): Promise<Found<CountedVehicle>> {
  const { workspaceId } = actor;
  const { search, kind } = query;
  const where: WhereOptions<Vehicle> = {
    workspaceId,
    ...(search ? { name: { [Op.iLike]: `%${escapeLike(search)}%` } } : {}),
    ...(kind ? { kind } : {}),
  };
  const sort = sortOf(query.sort);
  const { items, nextCursor } = await newestFirst(ctx.db.Vehicle, query, where, { sort });
  const counts = await countRecordings(ctx, items.map((vehicle) => vehicle.id)); // prettier-ignore
  return {
    items: items.map((vehicle) => ({ vehicle, recordingCount: counts.get(vehicle.id) ?? 0 })),
    nextCursor,
  };
}

export async function getVehicle(ctx: Context, actor: Actor, id: string): Promise<CountedVehicle> {
  const vehicle = await findVehicle(ctx, actor.workspaceId, id);
  const counts = await countRecordings(ctx, [id]);
  return { vehicle, recordingCount: counts.get(id) ?? 0 };
}

export async function createVehicle(
  ctx: Context,
  actor: Actor,
  input: VehicleInput,
): Promise<CountedVehicle> {
  const vehicle = await ctx.db
    .transaction(async (transaction) => {
      const made = await ctx.db.Vehicle.create({ ...input, workspaceId: actor.workspaceId }, { transaction });
      const what = {
        action: 'vehicle.created',
        subject: made.name,
        subjectId: made.id,
        detail: { ...input },
      };
      await recordBy(ctx, actor, what, transaction);
      return made;
    })
    .catch(nameTaken(input.name));
  return { vehicle, recordingCount: 0 };
}

/** New axes decode the vehicle's recordings again, but those whose own map names the axes. */
export async function changeVehicle(
  ctx: Context,
  actor: Actor,
  id: string,
  patch: VehiclePatch,
): Promise<CountedVehicle> {
  const vehicle = await findVehicle(ctx, actor.workspaceId, id);
  const before = { ...vehicle.get() };
  const newAxes = patch.axes && !sameAxes(patch.axes, vehicle.axes);
  await ctx.db
    .transaction(async (transaction) => {
      await vehicle.update(patch, { transaction });
      if (newAxes) await redecodeOf(ctx, vehicle.id, transaction);
      const detail = { before: pick(before, patch), after: patch };
      const what = { action: 'vehicle.changed', subject: vehicle.name, subjectId: id, detail };
      await recordBy(ctx, actor, what, transaction);
    })
    .catch(nameTaken(patch.name ?? ''));
  return getVehicle(ctx, actor, id);
}

/** Throws 409 while recordings, parameter sets or requirements name it. */
export async function deleteVehicle(ctx: Context, actor: Actor, id: string): Promise<void> {
  const vehicle = await findVehicle(ctx, actor.workspaceId, id);
  await ctx.db.transaction(async (transaction) => {
    await vehicle.reload({ lock: transaction.LOCK.UPDATE, transaction });
    const recordings = await ctx.db.Recording.count({ where: { vehicleId: id }, transaction });
    const sets = await ctx.db.ParameterSet.count({ where: { vehicleId: id }, transaction });
    const requirements = await ctx.db.Requirement.count({ where: { vehicleId: id }, transaction });
    if (recordings + sets + requirements > 0) {
      throw inUse(whatUsesIt(vehicle.name, recordings, sets, requirements));
    }
    await vehicle.destroy({ transaction });
    const what = { action: 'vehicle.deleted', subject: vehicle.name, subjectId: id };
    await recordBy(ctx, actor, what, transaction);
  });
}

/** Throws 404 for one that is not in the workspace. */
export async function findVehicle(ctx: Context, workspaceId: string, id: string): Promise<Vehicle> {
  const vehicle = await ctx.db.Vehicle.findOne({ where: { id, workspaceId } });
  if (!vehicle) throw noSuch('vehicle');
  return vehicle;
}

export const sameAxes = (a: AxisMap, b: AxisMap): boolean =>
  a.forward === b.forward && a.right === b.right && a.down === b.down;

async function countRecordings(ctx: Context, ids: string[]): Promise<Map<string, number>> {
  const rows = await ctx.db.Recording.count({
    where: { vehicleId: ids, confirmedAt: { [Op.ne]: null }, deletedAt: null },
    group: ['vehicleId'],
  });
  return new Map(rows.map((row) => [String(row.vehicleId), row.count]));
}

function whatUsesIt(name: string, recordings: number, sets: number, requirements: number): string {
  const parts = [
    plural(recordings, 'recording'),
    plural(sets, 'parameter set'),
    plural(requirements, 'requirement'),
  ].filter(Boolean);
  return `“${name}” cannot be deleted: ${parts.join(' and ')} use it. Give them another vehicle, or delete them first.`;
}

const plural = (count: number, noun: string) =>
  count === 0 ? '' : `${count} ${noun}${count === 1 ? '' : 's'}`;

const nameTaken = (name: string) => (error: unknown) => {
  if (!(error instanceof UniqueConstraintError)) throw error;
  const message = `There is a vehicle named “${name}” already. Choose another name.`;
  throw conflict(message, { errors: [{ path: 'name', message }] });
};

const pick = (from: object, keys: object) =>
  Object.fromEntries(Object.entries(from).filter(([key]) => key in keys));
