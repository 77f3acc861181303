/** What is said of a version and what happened to it: comments, differences, history. */
import { z } from 'zod';
import { idSchema, isoTimeSchema } from './common';
import { parameterAt } from '../parameters/parameter-list';

export const commentCreateSchema = z.object({
  text: z.string().trim().min(1, 'Write something.').max(4000),
  path: z
    .string()
    .max(120)
    .refine((path) => parameterAt(path) !== undefined, {
      message: 'There is no such parameter; a path is dotted, like gyro.whiteNoiseRadPerSqrtS.',
    })
    .optional()
    .describe('Of the parameter that it is about; left out: about the version.'),
});
export type CommentCreate = z.infer<typeof commentCreateSchema>;

export const versionCommentSchema = z.object({
  id: idSchema,
  text: z.string(),
  path: z.string().nullable(),
  label: z.string().nullable().describe('The parameter’s name.'),
  createdAt: isoTimeSchema,
  createdBy: z.string(),
  createdById: idSchema,
});
export type VersionComment = z.infer<typeof versionCommentSchema>;

const shown = z.union([z.number(), z.string()]).nullable();

export const parameterDifferenceSchema = z.object({
  path: z.string(),
  group: z.string(),
  label: z.string(),
  unit: z.string().describe('Of before and after; empty for what has none.'),
  before: shown.describe('In the unit, or in words; null: not set.'),
  after: shown,
  percent: z.number().nullable().describe('Change in percent of the value before, where both are numbers.'),
});

/** GET …/versions/:n/differences?against=m */
export const differencesQuerySchema = z.object({ against: z.coerce.number().int().positive() });
export const differencesSchema = z.object({
  against: z.number().int(),
  number: z.number().int(),
  parameters: z.array(parameterDifferenceSchema),
});
export type VersionDifferences = z.infer<typeof differencesSchema>;
