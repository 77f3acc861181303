/** A decoded recording as files: its channels, and what the intake found. */
import { z } from 'zod';
import { idSchema, isoTimeSchema } from './common';
import {
  channelMapSchema,
  healthReportSchema,
  recordingFileSchema,
  remedySchema,
  timeOriginSchema,
} from './recordings';

export const decodedChannelSchema = z.enum(['imu', 'gnss', 'reference']);
export type DecodedChannel = z.infer<typeof decodedChannelSchema>;

export const decodedQuerySchema = z.object({
  channel: decodedChannelSchema
    .default('imu')
    .describe(
      'imu: rates and specific force in vehicle axes; gnss: fixes; reference: the trajectory it is held against.',
    ),
});

/** The health report with what it rests on, so that it stands by itself. */
export const healthFileSchema = z.object({
  recordingId: idSchema,
  name: z.string(),
  vehicleName: z.string().nullable(),
  madeAt: isoTimeSchema,
  startS: z.number(),
  endS: z.number(),
  timeOrigin: timeOriginSchema.nullable(),
  files: z.array(recordingFileSchema).describe('As they were uploaded.'),
  decodedSha256: z.string().nullable().describe('Over the decoded channels.'),
  channelMap: channelMapSchema.nullable(),
  remedies: z.array(remedySchema),
  health: healthReportSchema,
});
export type HealthFile = z.infer<typeof healthFileSchema>;
