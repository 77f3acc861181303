/** Requirements: a limit on a metric, judged on named recordings under an outage schedule. */
import { z } from 'zod';
import { idSchema, isoTimeSchema, nameSchema } from './common';
import { outagesSchema, withholdSchema } from './runs';

/** Seconds of coasting at which a run reports its drift, besides the end of the window. */
export const DRIFT_TIMES_S = [10, 30, 60, 120] as const;

export const driftMetricSchema = z.object({
  kind: z.literal('drift'),
  quantity: z.enum(['horizontal', 'vertical', 'velocity', 'heading']).describe('m, m, m/s, °'),
  afterS: z
    .number()
    .min(1)
    .max(3600)
    .describe('Seconds into the window: 10, 30, 60, 120, or the length of every window.'),
  statistic: z.enum(['median', 'p95', 'maximum']).describe('Over all windows of the recording.'),
});
export const nisMeanMetricSchema = z.object({
  kind: z.literal('nis-mean'),
  group: z.enum(['position', 'velocity']),
});
export const nisInsideMetricSchema = z.object({
  kind: z.literal('nis-inside-share'),
  group: z.enum(['position', 'velocity']),
});
export const rejectedMetricSchema = z.object({
  kind: z.literal('rejected-share'),
  group: z.enum(['position', 'velocity']),
});
export const attitudeMetricSchema = z.object({
  kind: z.literal('attitude-sigma'),
  axis: z.enum(['roll', 'pitch', 'yaw', 'largest']),
  when: z.enum(['end', 'mean']).describe('At the end of the run, or its mean over the run.'),
});
export const convergenceMetricSchema = z.object({
  kind: z.literal('bias-convergence'),
  sensor: z.enum(['gyro', 'accel']),
  sigma: z
    .number()
    .positive()
    .describe(
      '1σ below which the bias of every axis must stay: rad/s for the gyro, m/s² for the accelerometer.',
    ),
});
export const rmseMetricSchema = z.object({
  kind: z.literal('rmse'),
  quantity: z.enum(['horizontal', 'vertical', 'position', 'velocity', 'roll', 'pitch', 'yaw']),
});

export const metricSchema = z
  .discriminatedUnion('kind', [
    driftMetricSchema,
    nisMeanMetricSchema,
    nisInsideMetricSchema,
    rejectedMetricSchema,
    attitudeMetricSchema,
    convergenceMetricSchema,
    rmseMetricSchema,
  ])
  .describe(
    'nis-mean: mean NIS, inside its two-sided 95 % bounds. nis-inside-share: share of single NIS inside theirs. ' +
      'bias-convergence: time from alignment until the 1σ stays below, s. rmse: against the reference trajectory.',
  );
export type Metric = z.infer<typeof metricSchema>;

/** `inside-bounds` has no limit: the bounds come with the metric. */
export const comparisonSchema = z.enum(['at-most', 'at-least', 'inside-bounds']);
export type Comparison = z.infer<typeof comparisonSchema>;

/** Windows without GNSS (or without what is withheld) that a run is made with. */
export const scheduleSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('none') }),
  z
    .object({
      kind: z.literal('every'),
      everyS: z.number().min(1).max(86_400).describe('From the start of one window to the next, s.'),
      forS: z.number().min(1).max(3600).describe('Length of a window, s.'),
      firstAfterS: z.number().min(0).max(86_400).default(60).describe('First window after the alignment, s.'),
      withhold: withholdSchema.default('gnss'),
    })
    .refine(({ everyS, forS }) => everyS >= forS, {
      message: 'The next window must not begin before the one before has ended.',
      path: ['everyS'],
    }),
  z.object({
    kind: z.literal('windows'),
    windows: outagesSchema.min(1).describe('On the axis of the recordings.'),
  }),
]);
export type Schedule = z.infer<typeof scheduleSchema>;

const fields = {
  name: nameSchema,
  metric: metricSchema,
  comparison: comparisonSchema,
  limit: z
    .number()
    .nullable()
    .describe('In the unit of the metric: m, m/s, °, s, or a share from 0 to 1; null for inside-bounds.'),
  vehicleId: idSchema.nullable().describe('Null: for every vehicle of the workspace.'),
  recordingIds: z
    .array(idSchema)
    .min(1, 'Choose at least one recording.')
    .max(50, 'At most 50 recordings.')
    .refine((ids) => new Set(ids).size === ids.length, { message: 'A recording is named twice.' }),
  schedule: scheduleSchema,
};

export const requirementInputSchema = z.object({
  ...fields,
  limit: fields.limit.default(null),
  vehicleId: fields.vehicleId.default(null),
  schedule: fields.schedule.prefault({ kind: 'none' }),
});
export type RequirementInput = z.infer<typeof requirementInputSchema>;
export type RequirementInputInput = z.input<typeof requirementInputSchema>;

/** For PATCH: what is left out stays; the whole must hold together afterwards. */
export const requirementPatchSchema = z.object(fields).partial();
export type RequirementPatch = z.infer<typeof requirementPatchSchema>;

export const requirementSchema = z.object({
  id: idSchema,
  ...fields,
  unit: z.string().describe('Of the limit and of values; empty for a pure number.'),
  sentence: z.string().describe('What is required, in words.'),
  vehicleName: z.string().nullable(),
  recordings: z.array(z.object({ id: idSchema, name: z.string() })),
  createdAt: isoTimeSchema,
  createdBy: z.string(),
  changedAt: isoTimeSchema,
});
export type Requirement = z.infer<typeof requirementSchema>;

export const requirementListQuerySchema = z.object({
  limit: z.coerce.number().int().min(1).max(200).default(100),
  cursor: z.string().max(200).optional(),
  vehicleId: idSchema
    .optional()
    .describe('Those that apply to the vehicle: its own, and those of the workspace.'),
});
export type RequirementListQuery = z.infer<typeof requirementListQuerySchema>;
