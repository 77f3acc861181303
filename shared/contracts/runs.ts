/** Runs: one pass of the filter over a recording, and all that is said of it. */
import { z } from 'zod';
import { idSchema, isoTimeSchema } from './common';
import { parametersSchema } from './parameters';
import { severitySchema } from './recordings';

/** What helps besides GNSS: the vehicle's nature, then sensors of their own. */
export const aidNameSchema = z.enum([
  'zero-velocity',
  'zero-rotation',
  'non-holonomic',
  'barometer',
  'heading',
  'odometer',
  'attitude',
]);
export type AidName = z.infer<typeof aidNameSchema>;

/** What an outage window withholds: all GNSS, a part of it, or one aid. */
export const withholdSchema = z.enum(['gnss', 'position', 'velocity', ...aidNameSchema.options]);

export const outageSchema = z
  .object({
    startS: z.number(),
    endS: z.number(),
    withhold: withholdSchema.default('gnss'),
  })
  .refine((window) => window.endS > window.startS, {
    message: 'An outage must end after it starts.',
    path: ['endS'],
  })
  .describe('[startS, endS) on the recording’s axis: withheld from the filter.');
export type Outage = z.infer<typeof outageSchema>;

export const outagesSchema = z
  .array(outageSchema)
  .max(200)
  .refine(
    (windows) => {
      const sorted = [...windows].sort((a, b) => a.startS - b.startS);
      return sorted.every((window, i) => i === 0 || window.startS >= sorted[i - 1]!.endS);
    },
    { message: 'Outage windows must not overlap.' },
  );

export const runCreateSchema = z.object({
  recordingId: idSchema,
  parameters: parametersSchema.prefault({}),
  outages: outagesSchema.default([]),
  outputRateHz: z.number().min(0.1).max(1000).default(10).describe('Rate of the kept solution, Hz.'),
  smooth: z
    .boolean()
    .default(false)
    .describe('Run the fixed-interval smoother too: takes several times as long.'),
  errorBudget: z
    .boolean()
    .default(false)
    .describe('Split the predicted error in each outage by its sources: takes several times as long.'),
  benchId: z
    .uuid()
    .optional()
    .describe('An open bench: a newer run of the same bench supersedes an older one that is still going.'),
});
export type RunCreate = z.infer<typeof runCreateSchema>;
export type RunCreateInput = z.input<typeof runCreateSchema>;

export const runStateSchema = z.enum(['queued', 'running', 'done', 'failed', 'cancelled', 'superseded']);
export type RunState = z.infer<typeof runStateSchema>;

/** Statistics of one measurement channel (north position, east velocity …) or one group (all three). */
export const channelStatisticsSchema = z.object({
  channel: z.string(),
  unit: z.string(),
  used: z.number().int(),
  rejected: z.number().int(),
  mean: z.number().nullable().describe('Mean innovation, in the channel’s unit.'),
  sigmaRatio: z
    .number()
    .nullable()
    .describe('RMS of innovation ÷ its predicted σ; 1 when R and Q are right.'),
  lag1: z.number().nullable().describe('Autocorrelation of the normalised innovation at lag 1.'),
  lag1Band: z.number().nullable().describe('95 % band, ±.'),
  autocorrelation: z
    .array(z.number())
    .optional()
    .describe('Of the normalised innovation at lags 1 to 20; left out where the sample is too small.'),
  whitenessP: z
    .number()
    .optional()
    .describe('Ljung–Box over those lags: probability of so much correlation in white innovations.'),
});
export type ChannelStatistics = z.infer<typeof channelStatisticsSchema>;

export const groupStatisticsSchema = z.object({
  group: z.enum(['position', 'velocity']),
  dimension: z.number().int(),
  used: z.number().int(),
  rejected: z.number().int(),
  nisMean: z.number().nullable(),
  nisBounds: z.tuple([z.number(), z.number()]).nullable().describe('Two-sided 95 % bounds on the mean.'),
  insideShare: z.number().nullable().describe('Share of single NIS inside their own 95 % bounds.'),
});
export type GroupStatistics = z.infer<typeof groupStatisticsSchema>;

/** What one aid did: used, refused by the gate, mean NIS. */
export const aidStatisticsSchema = z.object({
  aid: aidNameSchema,
  dimension: z.number().int(),
  used: z.number().int(),
  rejected: z.number().int(),
  nisMean: z.number().nullable(),
});
export type AidStatistics = z.infer<typeof aidStatisticsSchema>;

export const driftPointSchema = z.object({
  afterS: z.number(),
  horizontalM: z.number(),
  verticalM: z.number(),
  velocityMPerS: z.number(),
  headingDeg: z.number(),
  predictedHorizontalM: z.number().describe('√(P_NN + P_EE), m.'),
  predictedVerticalM: z.number(),
});
export type DriftPoint = z.infer<typeof driftPointSchema>;

/** Where the predicted error at a drift point comes from: 1σ that each source alone would leave; squares add up. */
export const budgetPointSchema = z.object({
  afterS: z.number(),
  shares: z.array(z.object({ source: z.string(), horizontalM: z.number(), verticalM: z.number() })),
});
export type BudgetPoint = z.infer<typeof budgetPointSchema>;

export const outageResultSchema = z.object({
  startS: z.number(),
  endS: z.number(),
  withhold: withholdSchema,
  reference: z
    .enum(['truth', 'aided', 'smoothed'])
    .describe(
      'What the coasting solution is compared with: truth, or the fully aided solution, filtered or smoothed.',
    ),
  points: z
    .array(driftPointSchema)
    .describe('At 10, 30, 60, 120 s and at the end, as far as the window goes.'),
  budget: z.array(budgetPointSchema).optional().describe('At the same points, where it was asked for.'),
});
export type OutageResult = z.infer<typeof outageResultSchema>;

export const truthStatisticsSchema = z.object({
  positionRmseM: z.number(),
  horizontalRmseM: z.number(),
  verticalRmseM: z.number(),
  velocityRmseMPerS: z.number().nullable(),
  attitudeRmseDeg: z.object({ roll: z.number(), pitch: z.number(), yaw: z.number() }).nullable(),
  aneesPosition: z.number().describe('Average NEES of position (3); 3 when consistent.'),
  aneesVelocity: z.number().nullable(),
  aneesAttitude: z.number().nullable(),
  epochs: z.number().int(),
});
export type TruthStatistics = z.infer<typeof truthStatisticsSchema>;

/** A parameter change that a finding suggests: dotted path and the new value. */
export const suggestionSchema = z.object({ path: z.string(), value: z.number(), label: z.string() });
export const runFindingSchema = z.object({
  code: z.string(),
  severity: z.enum([...severitySchema.options, 'good']),
  title: z.string(),
  sentence: z.string(),
  suggestion: suggestionSchema.nullable(),
  intervalS: z.tuple([z.number(), z.number()]).nullable(),
});
export type RunFinding = z.infer<typeof runFindingSchema>;

/** σ or value of each of the 15 states: position and velocity NED, attitude roll-pitch-yaw, biases x-y-z (forward-right-down). */
export const stateVectorSchema = z.object({
  positionM: z.tuple([z.number(), z.number(), z.number()]),
  velocityMPerS: z.tuple([z.number(), z.number(), z.number()]),
  attitudeDeg: z.tuple([z.number(), z.number(), z.number()]),
  gyroBiasRadPerS: z.tuple([z.number(), z.number(), z.number()]),
  accelBiasMPerS2: z.tuple([z.number(), z.number(), z.number()]),
});
export type StateVector = z.infer<typeof stateVectorSchema>;

/** A state that the run carried behind the fifteen; `name` is its column in the kept solution. */
export const optionalStateResultSchema = z.object({
  name: z.string(),
  unit: z.enum(['ppm', 'm']),
  value: z.number().describe('Last estimate.'),
  sigma: z.number().describe('Its 1σ.'),
  firstSigma: z
    .number()
    .describe('1σ at the start: the two alike say that the recording does not show this state.'),
});
export type OptionalStateResult = z.infer<typeof optionalStateResultSchema>;

export const runSummarySchema = z.object({
  engineVersion: z.string(),
  startS: z.number(),
  endS: z.number(),
  durationS: z.number(),
  imuSamples: z.number().int(),
  computeS: z.number().describe('Processor time of the filter, s.'),
  alignment: z.object({
    timeS: z.number(),
    levelling: z.enum(['given', 'static', 'moving']),
    heading: z.enum(['given', 'course', 'unknown', 'aid', 'gyrocompass']),
    sentence: z.string(),
    attitudeDeg: z.tuple([z.number(), z.number(), z.number()]).describe('roll, pitch, yaw'),
    attitudeSigmaDeg: z.tuple([z.number(), z.number(), z.number()]),
  }),
  channels: z.array(channelStatisticsSchema),
  groups: z.array(groupStatisticsSchema),
  aids: z.array(aidStatisticsSchema).optional().describe('Left out by engines before the aids.'),
  outages: z.array(outageResultSchema),
  finalSigma: stateVectorSchema,
  meanSigma: stateVectorSchema,
  optionalStates: z
    .array(optionalStateResultSchema)
    .optional()
    .describe('Scale factors, lever arm, barometer bias; left out where none is switched on.'),
  gyroBiasRadPerS: z.tuple([z.number(), z.number(), z.number()]),
  accelBiasMPerS2: z.tuple([z.number(), z.number(), z.number()]),
  truth: truthStatisticsSchema.nullable(),
  smoothedTruth: truthStatisticsSchema
    .nullable()
    .optional()
    .describe('The smoothed solution against truth; left out where it was not asked for.'),
  findings: z.array(runFindingSchema),
  warnings: z.array(z.object({ code: z.string(), sentence: z.string(), timeS: z.number().nullable() })),
});
export type RunSummary = z.infer<typeof runSummarySchema>;

export const provenanceSchema = z.object({
  engineVersion: z.string(),
  recordingSha256: z.string().describe('Over the decoded channel files.'),
  files: z.array(z.object({ role: z.string(), name: z.string(), sha256: z.string() })),
  parametersSha256: z.string(),
  resultSha256: z.string().nullable().describe('Over the kept solution and innovations.'),
});
export type Provenance = z.infer<typeof provenanceSchema>;

export const runSchema = z.object({
  id: idSchema,
  recordingId: idSchema,
  recordingName: z.string(),
  state: runStateSchema,
  progress: z.number().min(0).max(1),
  failure: z.string().nullable().describe('Why it failed and what to do, in plain words.'),
  parameters: parametersSchema,
  outages: z.array(outageSchema),
  outputRateHz: z.number(),
  smooth: z.boolean(),
  errorBudget: z.boolean(),
  createdAt: isoTimeSchema,
  createdBy: z.string(),
  finishedAt: isoTimeSchema.nullable(),
  hasSeries: z.boolean(),
  summary: runSummarySchema.nullable(),
  provenance: provenanceSchema.nullable(),
});
export type Run = z.infer<typeof runSchema>;
/** A row of GET /runs: everything but the bulky parts. */
export const runListItemSchema = runSchema.omit({
  parameters: true,
  summary: true,
  provenance: true,
  outages: true,
});
export type RunListItem = z.infer<typeof runListItemSchema>;

export const runListQuerySchema = z.object({
  limit: z.coerce.number().int().min(1).max(200).default(50),
  cursor: z.string().max(200).optional(),
  recordingId: idSchema.optional(),
  state: runStateSchema.optional(),
});

export const solutionQuerySchema = z.object({
  rate: z.coerce.number().min(0.01).max(2000).optional().describe('Hz; left out: the kept rate.'),
  smoothed: z
    .enum(['true', 'false'])
    .default('false')
    .describe('The smoothed solution; where the run kept none, it is computed now.'),
});
export const runSeriesQuerySchema = z.object({
  from: z.coerce.number().optional(),
  to: z.coerce.number().optional(),
  points: z.coerce.number().int().min(50).max(10_000).default(1500),
});
export type RunSeriesQuery = z.infer<typeof runSeriesQuerySchema>;

/** Header of GET /runs/:id/solution.csv, in order. */
export const SOLUTION_COLUMNS = [
  'time_s', 'lat_deg', 'lon_deg', 'height_m', 'vn_m_s', 've_m_s', 'vd_m_s', 'roll_deg', 'pitch_deg', 'yaw_deg',
  'gyro_bias_x_rad_s', 'gyro_bias_y_rad_s', 'gyro_bias_z_rad_s',
  'accel_bias_x_m_s2', 'accel_bias_y_m_s2', 'accel_bias_z_m_s2',
  'sigma_n_m', 'sigma_e_m', 'sigma_d_m', 'sigma_vn_m_s', 'sigma_ve_m_s', 'sigma_vd_m_s',
  'sigma_roll_deg', 'sigma_pitch_deg', 'sigma_yaw_deg',
  'sigma_gyro_bias_x_rad_s', 'sigma_gyro_bias_y_rad_s', 'sigma_gyro_bias_z_rad_s',
  'sigma_accel_bias_x_m_s2', 'sigma_accel_bias_y_m_s2', 'sigma_accel_bias_z_m_s2',
] as const; // prettier-ignore
/** Header of GET /runs/:id/innovations.csv: one row a scalar channel; `nis` and `accepted` are its group's. */
export const INNOVATION_COLUMNS = ['time_s', 'channel', 'innovation', 'sigma', 'nis', 'accepted'] as const;
