/** The mapping form's own shape: every choice has a value ('' for no column), so that nothing typed is lost while it is incomplete. */
import { z } from 'zod';
import {
  accelUnitSchema,
  angleUnitSchema,
  gyroUnitSchema,
  imuMapSchema,
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

const timeDraftSchema = z
  .object({
    column: chosen,
    second: perhaps,
    base: timeMapSchema.shape.base,
    offsetS: number,
    stamp: timeMapSchema.shape.stamp.unwrap(),
  })
  .superRefine((time, ctx) => {
    if (TWO_COLUMN_BASES.includes(time.base) && time.second === '')
      ctx.addIssue({ code: 'custom', path: ['second'], message: 'This time base takes a second column.' });
  });

export const imuDraftSchema = z.object({
  time: timeDraftSchema,
  gyro: chosen3,
  gyroUnit: gyroUnitSchema,
  accel: chosen3,
  accelUnit: accelUnitSchema,
  accelSign: imuMapSchema.shape.accel.shape.sign.unwrap(),
  sampling: imuMapSchema.shape.sampling.unwrap(),
  axesFrom: z.enum(['vehicle', 'own']),
  axes: axisMapSchema,
});
export type ImuDraft = z.infer<typeof imuDraftSchema>;

const positionDraftSchema = z.object({
  lat: chosen,
  lon: chosen,
  height: perhaps,
  unit: positionUnitSchema,
  heightUnit: positionMapSchema.shape.heightUnit.unwrap(),
  heightDatum: positionMapSchema.shape.heightDatum.unwrap(),
});

const velocityDraftSchema = z
  .object({
    frame: z.enum(['none', 'ned', 'enu', 'neu', 'ecef', 'speed-course']),
    columns: perhaps3,
    speed: perhaps,
    course: perhaps,
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

/** Only the files that a recording has are in the form. */
export const mapDraftSchema = z.object({
  imu: imuDraftSchema.optional(),
  gnss: gnssDraftSchema.optional(),
  reference: referenceDraftSchema.optional(),
});
export type MapDraft = z.infer<typeof mapDraftSchema>;
export type TimeDraft = z.infer<typeof timeDraftSchema>;
export type PositionDraft = z.infer<typeof positionDraftSchema>;
export type VelocityDraft = z.infer<typeof velocityDraftSchema>;
export type SigmaDraft = z.infer<typeof sigmaDraftSchema>;
