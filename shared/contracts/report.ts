/** The evidence for one version, as the page and the PDF show it. Every figure in it is one that the API gives elsewhere. */
import { z } from 'zod';
import { idSchema, isoTimeSchema } from './common';
import { versionStateSchema } from './parameter-sets';
import { groupStatisticsSchema } from './runs';
import { evidenceSchema } from './verification';

const shown = z.union([z.number(), z.string()]).nullable();

/** A parameter in its display unit, and what it was in the version before. */
export const reportParameterSchema = z.object({
  path: z.string(),
  group: z.string(),
  label: z.string(),
  unit: z.string(),
  value: shown,
  before: shown,
  changed: z.boolean(),
  percent: z.number().nullable(),
});
export type ReportParameter = z.infer<typeof reportParameterSchema>;

/** Horizontal drift of all windows of a run at one time after the loss of GNSS. */
export const reportDriftSchema = z.object({
  afterS: z.number(),
  windows: z.number().int(),
  medianM: z.number(),
  p95M: z.number(),
  maximumM: z.number(),
  predictedM: z.number().describe('RMS over the windows of √(P_NN + P_EE), m.'),
  ratio: z.number().describe('RMS of the drift ÷ predicted; 1 when the covariance tells the truth.'),
});
export type ReportDrift = z.infer<typeof reportDriftSchema>;

/** A run behind the verification (or the one that the version was saved with): consistency and drift. */
export const reportRunSchema = z.object({
  runId: idSchema,
  recordingId: idSchema,
  recordingName: z.string(),
  schedule: z.string().describe('In words: its outages.'),
  engineVersion: z.string(),
  resultSha256: z.string().nullable(),
  groups: z.array(groupStatisticsSchema),
  rejectedPercent: z.number().nullable(),
  drift: z.array(reportDriftSchema),
  /** Error of each window over the time without GNSS, m. */
  windows: z.array(z.array(z.object({ afterS: z.number(), errorM: z.number(), predictedM: z.number() }))),
});
export type ReportRun = z.infer<typeof reportRunSchema>;

export const reportSchema = z.object({
  madeAt: isoTimeSchema,
  notice: z.string().describe('Whether it may be used, in words.'),
  set: z.object({ id: idSchema, name: z.string() }),
  version: z.object({
    number: z.number().int(),
    state: versionStateSchema,
    note: z.string(),
    checksum: z.string().describe('SHA-256 over the parameters as canonical JSON (RFC 8785).'),
  }),
  vehicle: z
    .object({
      name: z.string(),
      leverArmM: z.array(z.number()).describe('GNSS antenna seen from the IMU: forward, right, down, m.'),
      sensor: z.string().nullable(),
    })
    .nullable(),
  summary: z.array(z.string()).describe('Sentences.'),
  people: z.array(z.object({ did: z.string(), name: z.string(), at: isoTimeSchema })),
  reviewComment: z.string().nullable(),
  recordings: z.array(
    z.object({
      id: idSchema,
      name: z.string(),
      durationS: z.number().nullable(),
      verdict: z.string().describe('Of the health report.'),
      sha256: z.string().nullable().describe('Over the decoded channels.'),
      files: z.array(z.object({ role: z.string(), name: z.string(), sha256: z.string() })),
    }),
  ),
  against: z.number().int().nullable().describe('The version that the parameters are compared with.'),
  parameters: z.array(reportParameterSchema),
  runs: z.array(reportRunSchema),
  matrix: evidenceSchema
    .pick({ requirements: true, recordings: true, cells: true })
    .extend({ asReleased: z.boolean(), withoutRequirements: z.string().nullable() }),
  engineVersion: z.string(),
  method: z.array(z.string()),
  references: z.array(z.string()),
  cautions: z.array(z.string()),
});
export type Report = z.infer<typeof reportSchema>;
