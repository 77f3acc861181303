/** Named, versioned parameter sets. A version is draft, in review, returned, released or superseded. */
import { z } from 'zod';
import { idSchema, isoTimeSchema, nameSchema } from './common';
import { parametersSchema } from './parameters';
import { outagesSchema } from './runs';

export const versionStateSchema = z.enum(['draft', 'in-review', 'returned', 'released', 'superseded']);
export type VersionState = z.infer<typeof versionStateSchema>;

export const noteSchema = z.string().trim().min(1, 'Say in a line what changed and why.').max(2000);

export const versionCreateSchema = z.object({
  note: noteSchema,
  parameters: parametersSchema,
  runId: idSchema.optional().describe('The run that shows what this version does; its files are then kept.'),
  recordingId: idSchema.optional(),
  outages: outagesSchema.default([]),
  parentNumber: z.number().int().positive().optional(),
});
export type VersionCreate = z.infer<typeof versionCreateSchema>;
export type VersionCreateInput = z.input<typeof versionCreateSchema>;

export const parameterSetCreateSchema = z.object({
  name: nameSchema,
  vehicleId: idSchema.optional(),
  version: versionCreateSchema.describe('The first version.'),
});
export type ParameterSetCreate = z.infer<typeof parameterSetCreateSchema>;
export type ParameterSetCreateInput = z.input<typeof parameterSetCreateSchema>;

export const versionSchema = z.object({
  id: idSchema,
  number: z.number().int().positive(),
  state: versionStateSchema,
  note: z.string(),
  parameters: parametersSchema,
  outages: outagesSchema,
  runId: idSchema.nullable(),
  recordingId: idSchema.nullable(),
  parentNumber: z.number().int().nullable(),
  createdAt: isoTimeSchema,
  createdBy: z.string(),
  createdById: idSchema,
  reviewComment: z.string().nullable(),
  reviewedBy: z.string().nullable(),
  reviewedAt: isoTimeSchema.nullable(),
});
export type ParameterSetVersion = z.infer<typeof versionSchema>;

export const parameterSetSchema = z.object({
  id: idSchema,
  name: z.string(),
  vehicleId: idSchema.nullable(),
  vehicleName: z.string().nullable(),
  createdAt: isoTimeSchema,
  createdBy: z.string(),
  latest: z.object({
    number: z.number().int(),
    state: versionStateSchema,
    note: z.string(),
    createdAt: isoTimeSchema,
    createdBy: z.string(),
  }),
  versionCount: z.number().int(),
});
export type ParameterSet = z.infer<typeof parameterSetSchema>;
export const parameterSetDetailSchema = parameterSetSchema.extend({ versions: z.array(versionSchema) });
export type ParameterSetDetail = z.infer<typeof parameterSetDetailSchema>;

export const reviewSchema = z.object({ comment: z.string().trim().max(4000).default('') });
