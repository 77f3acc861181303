import type { MapTemplate } from '@/shared/contracts/map-templates';
import type { MapTemplate as MapTemplateRow } from '../models/map-template';

export const presentTemplate = (row: MapTemplateRow): MapTemplate => ({
  id: row.id,
  vehicleId: row.vehicleId,
  name: row.name,
  channelMap: row.channelMap,
  createdAt: row.createdAt.toISOString(),
  createdBy: row.createdBy?.name ?? '',
});
