/** A platform: how its IMU is mounted and where the GNSS antenna sits. */
import { z } from 'zod';
import {
  idSchema,
  isoTimeSchema,
  listSortSchema,
  nameSchema,
  pageQuerySchema,
  vector3Schema,
} from './common';

/** A signed sensor axis. */
export const signedAxisSchema = z.enum(['+x', '-x', '+y', '-y', '+z', '-z']);
export type SignedAxis = z.infer<typeof signedAxisSchema>;

/** Which signed sensor axis points forward, right and down on the vehicle: a proper (right-handed) permutation. */
export const axisMapSchema = z
  .object({ forward: signedAxisSchema, right: signedAxisSchema, down: signedAxisSchema })
  .refine((axes) => axisDeterminant(axes) === 1, {
    message: 'The three axes must be different and right-handed (forward × right = down).',
  });
export interface AxisMap {
  forward: SignedAxis;
  right: SignedAxis;
  down: SignedAxis;
}
export const IDENTITY_AXES: AxisMap = { forward: '+x', right: '+y', down: '+z' };

/** Row of the 3×3 signed permutation (body ← sensor) that `axis` stands for. */
export function axisRow(axis: SignedAxis): [number, number, number] {
  const sign = axis[0] === '-' ? -1 : 1;
  const index = 'xyz'.indexOf(axis[1]!);
  const row: [number, number, number] = [0, 0, 0];
  row[index] = sign;
  return row;
}

/** +1 for a right-handed map, −1 for a mirrored one, 0 when two axes coincide. */
export function axisDeterminant(axes: AxisMap): number {
  const [a, b, c] = [axisRow(axes.forward), axisRow(axes.right), axisRow(axes.down)];
  return (
    a[0] * (b[1] * c[2] - b[2] * c[1]) -
    a[1] * (b[0] * c[2] - b[2] * c[0]) +
    a[2] * (b[0] * c[1] - b[1] * c[0])
  );
}

const figure = z.number().positive().nullable().default(null);

/** Noise figures of an IMU, named as the filter's parameters; null where the source does not say. */
export const sensorFiguresSchema = z.object({
  gyro: z
    .object({
      whiteNoiseRadPerSqrtS: figure,
      biasInstabilityRadPerS: figure,
      biasCorrelationTimeS: figure,
      turnOnBiasSigmaRadPerS: figure,
      biasRandomWalkRadPerSPerSqrtS: figure,
    })
    .prefault({}),
  accel: z
    .object({
      whiteNoiseMPerSPerSqrtS: figure,
      biasInstabilityMPerS2: figure,
      biasCorrelationTimeS: figure,
      turnOnBiasSigmaMPerS2: figure,
      biasRandomWalkMPerS2PerSqrtS: figure,
    })
    .prefault({}),
});
export type SensorFigures = z.infer<typeof sensorFiguresSchema>;

/** An IMU: what its datasheet says, and what was measured. */
export const sensorModelSchema = z.object({
  name: z.string().max(120).default(''),
  datasheet: sensorFiguresSchema.nullable().default(null),
  measured: sensorFiguresSchema
    .extend({
      recordingId: idSchema,
      recordingName: z.string(),
      fromS: z.number(),
      toS: z.number(),
      measuredAt: isoTimeSchema,
    })
    .nullable()
    .default(null),
});
export type SensorModel = z.infer<typeof sensorModelSchema>;

export const vehicleInputSchema = z.object({
  name: nameSchema,
  kind: z.enum(['road', 'marine', 'fixedWing', 'multirotor', 'other']).default('other'),
  leverArmM: vector3Schema
    .default([0, 0, 0])
    .describe('GNSS antenna seen from the IMU, metres: forward, right, down.'),
  axes: axisMapSchema
    .default(IDENTITY_AXES)
    .describe('Sensor axes as mounted: which points forward, right, down.'),
  sensor: sensorModelSchema.nullable().optional(),
  notes: z.string().max(2000).default(''),
});
export type VehicleInput = z.infer<typeof vehicleInputSchema>;
/** For PATCH: no defaults, so that what is left out stays as it is. */
export const vehiclePatchSchema = z.object({
  name: nameSchema.optional(),
  kind: z.enum(['road', 'marine', 'fixedWing', 'multirotor', 'other']).optional(),
  leverArmM: vector3Schema.optional(),
  axes: axisMapSchema.optional(),
  sensor: sensorModelSchema.nullable().optional(),
  notes: z.string().max(2000).optional(),
});
export type VehiclePatch = z.infer<typeof vehiclePatchSchema>;

export const vehicleSchema = z.object({
  id: idSchema,
  name: z.string(),
  kind: z.enum(['road', 'marine', 'fixedWing', 'multirotor', 'other']),
  leverArmM: vector3Schema,
  axes: axisMapSchema,
  sensor: sensorModelSchema.nullable(),
  notes: z.string(),
  createdAt: isoTimeSchema,
  recordingCount: z.number().int(),
});
export type Vehicle = z.infer<typeof vehicleSchema>;

/** GET /vehicles. */
export const vehicleListQuerySchema = pageQuerySchema.extend({
  sort: listSortSchema.default('name'),
  kind: vehicleSchema.shape.kind.optional(),
});
export type VehicleListQuery = z.infer<typeof vehicleListQuerySchema>;
