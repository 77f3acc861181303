/** What a search box of a list looks for. */
import { Op, type WhereOptions } from 'sequelize';
import type { Context } from '../context';
import { escapeLike } from './audit';

/** Rows whose name, or whose vehicle's name, has `search` in it; everything where it is empty. */
export async function nameOrVehicle(
  ctx: Context,
  workspaceId: string,
  search: string | undefined,
): Promise<WhereOptions> {
  if (!search) return {};
  const name = { [Op.iLike]: `%${escapeLike(search)}%` };
  const vehicles = await ctx.db.Vehicle.findAll({ where: { workspaceId, name }, attributes: ['id'] });
  const vehicleId = { [Op.in]: vehicles.map(({ id }) => id) };
  return { [Op.or]: [{ name }, { vehicleId }] };
}
