/** Templates of a channel map: added to a vehicle, listed, removed. They are copies: a recording keeps the map it was given. */
import { UniqueConstraintError } from 'sequelize';
import type { PageQuery } from '@/shared/contracts/common';
import type { MapTemplateInput } from '@/shared/contracts/map-templates';
import type { Actor, Context } from '../context';
import { conflict, noSuch } from '../errors';
import type { MapTemplate } from '../models/map-template';
import { recordBy } from './audit';
import { type Found, newestFirst } from './paging';
import { findVehicle } from './vehicles';

const include = [{ association: 'createdBy' }];

/** Newest first. Throws 404 for a vehicle that is not in the workspace. */
export async function listTemplates(
  ctx: Context,
  actor: Actor,
  vehicleId: string,
  query: PageQuery,
): Promise<Found<MapTemplate>> {
  await findVehicle(ctx, actor.workspaceId, vehicleId);
  return newestFirst(ctx.db.MapTemplate, query, { vehicleId }, { include });
}

/** Throws 409 for a name that another template of the vehicle has. */
export async function createTemplate(
  ctx: Context,
  actor: Actor,
  vehicleId: string,
  input: MapTemplateInput,
): Promise<MapTemplate> {
  const { workspaceId, userId: createdById } = actor;
  const vehicle = await findVehicle(ctx, workspaceId, vehicleId);
  const made = await ctx.db
    .transaction(async (transaction) => {
      const row = { ...input, workspaceId, vehicleId, createdById };
      const template = await ctx.db.MapTemplate.create(row, { transaction });
      const detail = { vehicle: vehicle.name, map: input.channelMap };
      const what = { action: 'map-template.created', subject: template.name, detail };
      await recordBy(ctx, actor, what, transaction);
      return template;
    })
    .catch(nameTaken(input.name, vehicle.name));
  return made.reload({ include });
}

/** Recordings that were mapped by it keep their map. */
export async function deleteTemplate(
  ctx: Context,
  actor: Actor,
  vehicleId: string,
  id: string,
): Promise<void> {
  const vehicle = await findVehicle(ctx, actor.workspaceId, vehicleId);
  const template = await ctx.db.MapTemplate.findOne({ where: { id, vehicleId } });
  if (!template) throw noSuch('mapping template of this vehicle');
  await ctx.db.transaction(async (transaction) => {
    await template.destroy({ transaction });
    const detail = { vehicle: vehicle.name, map: template.channelMap };
    const what = { action: 'map-template.deleted', subject: template.name, detail };
    await recordBy(ctx, actor, what, transaction);
  });
}

const nameTaken = (name: string, vehicle: string) => (error: unknown) => {
  if (!(error instanceof UniqueConstraintError)) throw error;
  const message = `${vehicle} has a template named “${name}” already. Choose another name, or delete that one first.`;
  throw conflict(message, { errors: [{ path: 'name', message }] });
};
