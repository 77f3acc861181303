/** Named, versioned parameter sets. A version is draft, in review, returned, released or superseded. */
import { z } from 'zod';
import { idSchema, isoTimeSchema, listSortSchema, nameSchema, pageQuerySchema } from './common';
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

/** For PATCH of a draft: what is left out stays. */
export const versionPatchSchema = z.object({
  note: noteSchema.optional(),
  parameters: parametersSchema.optional().describe('Takes the place of all of them.'),
  outages: outagesSchema.optional(),
  runId: idSchema.nullable().optional(),
  recordingId: idSchema.nullable().optional(),
});
export type VersionPatch = z.infer<typeof versionPatchSchema>;

/** A new draft that begins as a copy of a version. */
export const versionReviseSchema = z.object({
  note: noteSchema.optional().describe('Left out: says which version it comes from.'),
});
export type VersionRevise = z.infer<typeof versionReviseSchema>;

export const parameterSetPatchSchema = z.object({
  name: nameSchema.optional(),
  vehicleId: idSchema
    .nullable()
    .optional()
    .describe('Fixed once a version is in review or has been released.'),
});
export type ParameterSetPatch = z.infer<typeof parameterSetPatchSchema>;

/** GET /parameter-sets. `state`: sets that have a version in it; `search` looks in the name and in the vehicle's. */
export const parameterSetListQuerySchema = pageQuerySchema.extend({
  sort: listSortSchema.default('-createdAt'),
  vehicleId: idSchema.optional(),
  state: versionStateSchema.optional(),
});
export type ParameterSetListQuery = z.infer<typeof parameterSetListQuerySchema>;

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
  submittedAt: isoTimeSchema.nullable(),
  submittedBy: z.string().nullable(),
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
  releasedNumber: z.number().int().nullable().describe('The version that is released just now.'),
  inReviewNumbers: z.array(z.number().int()).describe('Versions that wait for a review, newest first.'),
});
export type ParameterSet = z.infer<typeof parameterSetSchema>;
export const parameterSetDetailSchema = parameterSetSchema.extend({ versions: z.array(versionSchema) });
export type ParameterSetDetail = z.infer<typeof parameterSetDetailSchema>;

const reviewText = z.string().trim().max(4000);
export const reviewSchema = z.object({ comment: reviewText.default('') });
export type Review = z.infer<typeof reviewSchema>;
/** POST …/return: who wrote it must learn why. */
export const returnSchema = z.object({ comment: reviewText.min(1, 'Say what is to be mended.') });
export type ReviewReturn = z.infer<typeof returnSchema>;
/** POST …/release. */
export const releaseSchema = reviewSchema.extend({
  withoutRequirements: reviewText
    .min(10, 'Say in a sentence why it may be released without requirements.')
    .optional()
    .describe('Why it is released though no requirement applies to its vehicle; refused where one does.'),
});
export type ReviewRelease = z.infer<typeof releaseSchema>;
export type ReviewReleaseInput = z.input<typeof releaseSchema>;
