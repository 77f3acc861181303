/** The mapping form's own shape: every choice has a value ('' for no column), so that nothing typed is lost while it is incomplete. */
import { z } from 'zod';
import {
  accelUnitSchema,
  angleUnitSchema,
  barometerUnitSchema,
  fileRoleSchema,
  gyroUnitSchema,
  imuMapSchema,
  odometerUnitSchema,
  positionMapSchema,
  positionUnitSchema,
  sigmaMapSchema,
  speedUnitSchema,
  timeMapSchema,
} from '@/shared/contracts/recordings';
import { axisMapSchema } from '@/shared/contracts/vehicles';

const chosen = z.string().min(1, 'Choose a column.');
const perhaps = z.string();
const chosen3 = z.tuple([chosen, chosen, chosen]);
const perhaps3 = z.tuple([perhaps, perhaps, perhaps]);
const number = z.number({ error: 'Write a number, for instance 0.5.' });

/** Time bases that take a second column. */
export const TWO_COLUMN_BASES: readonly string[] = ['s+ns', 'gps-week+s', 'date+time'];

const maybe = number.optional();
const aboveZero = z
  .number({ error: 'Write a number above 0.' })
  .positive('Write a number above 0.')
  .optional();
const timeFields = z.object({
  column: perhaps,
  second: perhaps,
  base: timeMapSchema.shape.base,
  offsetS: number,
  stamp: timeMapSchema.shape.stamp.unwrap(),
  scale: z.enum(['', 'utc', 'gps']),
  zoneMin: z
    .number({ error: 'Write minutes between −1440 and 1440.' })
    .min(-1440, 'Not more than a day.')
    .max(1440, 'Not more than a day.')
    .optional(),
  dateOrder: z.enum(['', 'ymd', 'dmy', 'mdy']),
  date: z.union([z.literal(''), z.iso.date()], { error: 'Write the day as 2026-11-03.' }),
  rateHz: aboveZero,
  wrap: aboveZero,
});
export type TimeDraft = z.infer<typeof timeFields>;

/** What a clock cannot do without. */
function timeFaults(time: TimeDraft): { path: keyof TimeDraft; message: string }[] {
  const faults: { path: keyof TimeDraft; message: string }[] = [];
  if (time.column === '') faults.push({ path: 'column', message: 'Choose a column.' });
  if (TWO_COLUMN_BASES.includes(time.base) && time.second === '')
    faults.push({ path: 'second', message: 'This time base takes a second column.' });
  if (time.base === 'counter' && time.rateHz === undefined)
    faults.push({ path: 'rateHz', message: 'Say how often it counts in a second.' });
  return faults;
}

const timeDraftSchema = timeFields.superRefine((time, ctx) => {
  for (const { path, message } of timeFaults(time)) ctx.addIssue({ code: 'custom', path: [path], message });
});

/** A clock of a sensor's own, which counts only where `timeFrom` says so. */
function checkOwnTime(
  part: { timeFrom: 'shared' | 'own'; time: TimeDraft },
  ctx: z.RefinementCtx,
  name: string,
) {
  if (part.timeFrom === 'own')
    for (const { path, message } of timeFaults(part.time))
      ctx.addIssue({ code: 'custom', path: [name, path], message });
}

const timeFrom = z.enum(['shared', 'own']);
const sense = z.enum(['kept', 'turned']);
const sensorExtras = z.object({
  file: z.enum(['', 'imu', 'imu2']),
  signs: z.tuple([sense, sense, sense]),
  scale: z
    .number({ error: 'Write a number, for instance 0.5.' })
    .refine((value) => value !== 0, { message: 'The scale must not be 0.' })
    .optional(),
});
export type SensorExtras = z.infer<typeof sensorExtras>;

export const imuDraftSchema = z
  .object({
    time: timeDraftSchema,
    gyro: chosen3,
    gyroUnit: gyroUnitSchema,
    gyroMore: sensorExtras,
    accel: chosen3,
    accelUnit: accelUnitSchema,
    accelMore: sensorExtras,
    accelSign: imuMapSchema.shape.accel.shape.sign.unwrap(),
    accelTimeFrom: timeFrom,
    accelTime: timeFields,
    sampling: imuMapSchema.shape.sampling.unwrap(),
    axesFrom: z.enum(['vehicle', 'own']),
    axes: axisMapSchema,
    mounted: z.enum(['along', 'turned']),
    mounting: z.object({ rollDeg: number, pitchDeg: number, yawDeg: number }),
  })
  .superRefine((imu, ctx) =>
    checkOwnTime({ timeFrom: imu.accelTimeFrom, time: imu.accelTime }, ctx, 'accelTime'),
  );
export type ImuDraft = z.infer<typeof imuDraftSchema>;

const positionDraftSchema = z.object({
  lat: chosen,
  lon: chosen,
  height: perhaps,
  unit: positionUnitSchema,
  heightUnit: positionMapSchema.shape.heightUnit.unwrap(),
  heightDatum: positionMapSchema.shape.heightDatum.unwrap(),
  latHemisphere: perhaps,
  lonHemisphere: perhaps,
});

const velocityDraftSchema = z
  .object({
    frame: z.enum(['none', 'ned', 'enu', 'neu', 'ecef', 'speed-course']),
    columns: perhaps3,
    speed: perhaps,
    course: perhaps,
    climb: perhaps,
    unit: speedUnitSchema,
    courseUnit: angleUnitSchema,
  })
  .superRefine((velocity, ctx) => {
    if (velocity.frame === 'none') return;
    const needed: [string, (string | number)[]][] =
      velocity.frame === 'speed-course'
        ? [
            [velocity.speed, ['speed']],
            [velocity.course, ['course']],
          ]
        : velocity.columns.map((column, i) => [column, ['columns', i]]);
    for (const [column, path] of needed)
      if (column === '') ctx.addIssue({ code: 'custom', path, message: 'Choose a column.' });
  });

const sigmaDraftSchema = z
  .object({ shape: z.enum(['none', 'two', 'three']), columns: perhaps3, unit: sigmaMapSchema.shape.unit })
  .superRefine((sigma, ctx) => {
    const wanted = { none: 0, two: 2, three: 3 }[sigma.shape];
    sigma.columns.slice(0, wanted).forEach((column, i) => {
      if (column === '') ctx.addIssue({ code: 'custom', path: ['columns', i], message: 'Choose a column.' });
    });
  });

export const gnssDraftSchema = z.object({
  time: timeDraftSchema,
  position: positionDraftSchema,
  velocity: velocityDraftSchema,
  positionSigma: sigmaDraftSchema,
  velocitySigma: sigmaDraftSchema,
  quality: perhaps,
  repeats: z.enum(['', 'keep', 'drop']),
});
export type GnssDraft = z.infer<typeof gnssDraftSchema>;

export const referenceDraftSchema = z.object({
  time: timeDraftSchema,
  position: positionDraftSchema,
  velocity: velocityDraftSchema,
  attitude: z
    .object({ given: z.enum(['no', 'yes']), columns: perhaps3, unit: angleUnitSchema })
    .superRefine((attitude, ctx) => {
      if (attitude.given === 'no') return;
      attitude.columns.forEach((column, i) => {
        if (column === '')
          ctx.addIssue({ code: 'custom', path: ['columns', i], message: 'Choose a column.' });
      });
    }),
});
export type ReferenceDraft = z.infer<typeof referenceDraftSchema>;

/** What the three kinds of other sensors have in common. */
const aidFields = z.object({
  given: z.enum(['no', 'yes']),
  file: z.union([z.literal(''), fileRoleSchema]),
  column: perhaps,
  sigma: perhaps,
  timeFrom,
  time: timeFields,
});
const needsColumn = (aid: z.infer<typeof aidFields>, ctx: z.RefinementCtx) => {
  if (aid.given === 'no') return;
  if (aid.column === '') ctx.addIssue({ code: 'custom', path: ['column'], message: 'Choose a column.' });
  checkOwnTime(aid, ctx, 'time');
};
export const aidsDraftSchema = z.object({
  /** The map in force names such sensors: taking all of them away is then said, not left to a guess. */
  known: z.boolean(),
  barometer: aidFields.extend({ unit: barometerUnitSchema }).superRefine(needsColumn),
  heading: aidFields.extend({ unit: angleUnitSchema, offsetDeg: maybe }).superRefine(needsColumn),
  odometer: aidFields.extend({ unit: odometerUnitSchema, scale: aboveZero }).superRefine(needsColumn),
});
export type AidsDraft = z.infer<typeof aidsDraftSchema>;
export type AidDraft = z.infer<typeof aidFields>;

/** Only the files that a recording has are in the form. */
export const mapDraftSchema = z.object({
  imu: imuDraftSchema.optional(),
  gnss: gnssDraftSchema.optional(),
  reference: referenceDraftSchema.optional(),
  aids: aidsDraftSchema,
});
export type MapDraft = z.infer<typeof mapDraftSchema>;
export type PositionDraft = z.infer<typeof positionDraftSchema>;
export type VelocityDraft = z.infer<typeof velocityDraftSchema>;
export type SigmaDraft = z.infer<typeof sigmaDraftSchema>;
