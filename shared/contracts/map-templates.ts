/** Templates of a channel map: kept with a vehicle, whose loggers write the same columns drive after drive. */
import { z } from 'zod';
import { idSchema, isoTimeSchema, nameSchema } from './common';
import { channelMapSchema } from './recordings';

/** POST /vehicles/:id/map-templates. */
export const mapTemplateInputSchema = z.strictObject({
  name: nameSchema,
  channelMap: channelMapSchema.refine((map) => Object.values(map).some((part) => part !== undefined), {
    message: 'The map says nothing of any file.',
  }),
});
export type MapTemplateInput = z.infer<typeof mapTemplateInputSchema>;

export const mapTemplateSchema = z.object({
  id: idSchema,
  vehicleId: idSchema,
  name: z.string(),
  channelMap: channelMapSchema,
  createdAt: isoTimeSchema,
  createdBy: z.string(),
});
export type MapTemplate = z.infer<typeof mapTemplateSchema>;
