/** The verification matrix of a version: requirements × recordings, each cell with its value, its verdict and its run. */
import { z } from 'zod';
import { idSchema, isoTimeSchema } from './common';
import { comparisonSchema, metricSchema, scheduleSchema } from './requirements';

export const verdictSchema = z
  .enum(['pass', 'fail', 'not-applicable', 'failed'])
  .describe('not-applicable: the recording cannot show it. failed: the run could not be made. Both say why.');
export type Verdict = z.infer<typeof verdictSchema>;

export const waiverSchema = z.object({
  id: idSchema,
  text: z.string(),
  createdAt: isoTimeSchema,
  createdBy: z.string(),
});
export type Waiver = z.infer<typeof waiverSchema>;

/** POST …/waivers: by an approver, for one cell as it stands, while the version is in review. */
export const waiverCreateSchema = z.object({
  requirementId: idSchema,
  recordingId: idSchema,
  text: z.string().trim().min(10, 'Say in a sentence why it may be waived.').max(4000),
});
export type WaiverCreate = z.infer<typeof waiverCreateSchema>;

export const verificationCellSchema = z.object({
  requirementId: idSchema,
  recordingId: idSchema,
  state: z.enum(['not-verified', 'waiting', 'running', 'done']),
  progress: z.number().min(0).max(1).describe('Of its run.'),
  verdict: verdictSchema.nullable().describe('Null until it is done.'),
  value: z.number().nullable().describe('In the requirement’s unit; null where there is none.'),
  bounds: z
    .tuple([z.number(), z.number()])
    .nullable()
    .describe('For inside-bounds: between what it had to lie.'),
  reason: z.string().nullable(),
  outOfDate: z
    .array(z.string())
    .describe('Why the verdict is out of date, each a clause; empty: it is current.'),
  runId: idSchema.nullable().describe('To be opened on the bench.'),
  judgedAt: isoTimeSchema.nullable(),
  waiver: waiverSchema.nullable(),
  settled: z.boolean().describe('A current pass, or waived: it does not stand in the way of a release.'),
});
export type VerificationCell = z.infer<typeof verificationCellSchema>;

const matrix = {
  requirements: z.array(
    z.object({
      id: idSchema,
      name: z.string(),
      sentence: z.string(),
      metric: metricSchema,
      comparison: comparisonSchema,
      limit: z.number().nullable(),
      unit: z.string(),
      schedule: scheduleSchema,
    }),
  ),
  recordings: z.array(z.object({ id: idSchema, name: z.string(), sha256: z.string().nullable() })),
  cells: z
    .array(verificationCellSchema)
    .describe('Requirement by requirement; a pair that is not asked for has none.'),
  engineVersion: z.string(),
};

/** The matrix as it stood when the version was released. */
export const evidenceSchema = z.object({
  ...matrix,
  withoutRequirements: z.string().nullable().describe('Why it was released though there was no requirement.'),
  vehicle: z.object({ id: idSchema, name: z.string(), leverArmM: z.array(z.number()) }),
});
export type Evidence = z.infer<typeof evidenceSchema>;

/** GET and POST …/versions/:n/verification, …/verify. */
export const verificationSchema = z.object({
  ...matrix,
  state: z
    .enum(['none', 'going', 'done'])
    .describe('none: nothing was verified yet. going: runs are waiting or computed.'),
  progress: z.number().min(0).max(1).describe('Over the runs behind the cells.'),
  counts: z.object({
    cells: z.number().int(),
    pass: z.number().int(),
    fail: z.number().int(),
    notApplicable: z.number().int(),
    failed: z.number().int(),
    going: z.number().int(),
    notVerified: z.number().int(),
    outOfDate: z.number().int().describe('Of those with a verdict.'),
    waived: z.number().int(),
    unsettled: z.number().int().describe('What stands in the way of a release.'),
  }),
  evidence: evidenceSchema.nullable().describe('Of a released or superseded version.'),
});
export type Verification = z.infer<typeof verificationSchema>;
