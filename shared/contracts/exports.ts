/** A version as a file for those who build it in: what JSON and YAML hold; the C header and CSV hold the same. */
import { z } from 'zod';
import { idSchema, isoTimeSchema } from './common';
import { versionStateSchema } from './parameter-sets';
import { parametersSchema } from './parameters';

export const exportFormatSchema = z.enum(['json', 'yaml', 'c', 'csv']);
export type ExportFormat = z.infer<typeof exportFormatSchema>;
/** `?format=` */
export const exportQuerySchema = z.object({ format: exportFormatSchema.default('json') });

const person = z.string().nullable();
const time = isoTimeSchema.nullable();
const parameterValue = z.union([z.number(), z.boolean(), z.string(), z.array(z.number())]);

export const exportedValueSchema = z.object({
  path: z.string().describe('Dotted, as in `parameters`.'),
  name: z.string(),
  value: parameterValue.describe(
    'As in `parameters`: SI; angles of the start in degrees, as their names say.',
  ),
  unit: z.string().describe('Of the value; 1 for a pure number, empty for what is switched or chosen.'),
  shown: z
    .object({ value: z.union([z.number(), z.string()]), unit: z.string() })
    .describe('In the unit of the trade.'),
});
export type ExportedValue = z.infer<typeof exportedValueSchema>;

export const exportDocumentSchema = z.object({
  format: z.literal('driftwright-parameter-set'),
  formatVersion: z.literal(1),
  notice: z.string().describe('Whether it may be used, in words.'),
  released: z.boolean(),
  set: z.object({ id: idSchema, name: z.string() }),
  vehicle: z
    .object({ id: idSchema, name: z.string(), leverArmM: z.array(z.number()) })
    .nullable()
    .describe(
      'Lever arm: GNSS antenna seen from the IMU, forward, right, down, m. As released; else as it stands.',
    ),
  version: z.object({ number: z.number().int(), state: versionStateSchema, note: z.string() }),
  checksum: z.object({
    algorithm: z.literal('SHA-256'),
    over: z.literal('parameters, as canonical JSON (RFC 8785)'),
    value: z.string(),
  }),
  parameters: parametersSchema,
  values: z.array(exportedValueSchema),
  provenance: z.object({
    author: z.string(),
    createdAt: isoTimeSchema,
    submittedBy: person,
    submittedAt: time,
    reviewer: person,
    reviewedAt: time,
    reviewComment: z.string().nullable(),
    engineVersion: z.string().nullable(),
    recordings: z
      .array(z.object({ id: idSchema, name: z.string(), sha256: z.string().nullable() }))
      .describe('It was verified on, else tuned on; the hash is over the decoded channels.'),
    run: z
      .object({ id: idSchema, resultSha256: z.string().nullable() })
      .nullable()
      .describe('The run that was saved with it.'),
    verification: z
      .object({
        cells: z.number().int(),
        passed: z.number().int(),
        waived: z.number().int(),
        withoutRequirements: z.string().nullable(),
      })
      .nullable()
      .describe('As it was released.'),
  }),
  cautions: z.array(z.string()),
});
export type ExportDocument = z.infer<typeof exportDocumentSchema>;
