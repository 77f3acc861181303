/** A simulated recording with exact truth: what the generator is asked for. Everything not said has a default. */
import { z } from 'zod';
import { idSchema, nameSchema, vector3Schema } from './common';

export const motionSchema = z.enum(['road', 'crawler', 'fixed-wing', 'multirotor', 'static']);
export type Motion = z.infer<typeof motionSchema>;
export const imuGradeSchema = z.enum(['perfect', 'consumer', 'industrial', 'tactical', 'navigation']);
export type ImuGrade = z.infer<typeof imuGradeSchema>;

/** Sensor errors, SI; what is given replaces the grade's figure. */
export const imuErrorsSchema = z.object({
  gyroWhiteNoiseRadPerSqrtS: z.number().min(0),
  gyroTurnOnBiasSigmaRadPerS: z.number().min(0),
  gyroBiasInstabilityRadPerS: z.number().min(0),
  gyroBiasCorrelationTimeS: z.number().positive(),
  accelWhiteNoiseMPerSPerSqrtS: z.number().min(0),
  accelTurnOnBiasSigmaMPerS2: z.number().min(0),
  accelBiasInstabilityMPerS2: z.number().min(0),
  accelBiasCorrelationTimeS: z.number().positive(),
});
export type ImuErrors = z.infer<typeof imuErrorsSchema>;

export const gnssErrorsSchema = z.object({
  positionSigmaHorizontalM: z.number().min(0).default(1.5),
  positionSigmaVerticalM: z.number().min(0).default(2.5),
  velocitySigmaHorizontalMPerS: z.number().min(0).default(0.1),
  velocitySigmaVerticalMPerS: z.number().min(0).default(0.15),
  /** Correlation time of the position error, s; 0: white. */
  correlationTimeS: z.number().min(0).default(0),
  outlierShare: z.number().min(0).max(0.5).default(0),
  outlierSigmas: z.number().min(0).default(50),
  outagesS: z.array(z.tuple([z.number(), z.number()])).default([]),
});
export type GnssErrors = z.infer<typeof gnssErrorsSchema>;

export const scenarioSchema = z.object({
  motion: motionSchema.default('road'),
  durationS: z.number().min(10).max(36_000).default(600),
  seed: z
    .number()
    .int()
    .min(0)
    .max(2 ** 31 - 1)
    .default(1),
  imuRateHz: z.number().min(10).max(1000).default(100),
  gnssRateHz: z.number().min(0.2).max(50).default(5),
  staticStartS: z.number().min(0).max(3600).default(30).describe('Stands still first, s.'),
  origin: z
    .object({
      latDeg: z.number().min(-89).max(89),
      lonDeg: z.number().min(-180).max(180),
      heightM: z.number(),
    })
    .default({ latDeg: 47.21, lonDeg: -14.63, heightM: 40 }),
  initialHeadingDeg: z.number().default(35),
  leverArmM: vector3Schema.default([0, 0, 0]),
  imuGrade: imuGradeSchema.default('industrial'),
  imuErrors: imuErrorsSchema.partial().default({}),
  gnss: gnssErrorsSchema.prefault({}),
});
export type Scenario = z.infer<typeof scenarioSchema>;
export type ScenarioInput = z.input<typeof scenarioSchema>;

/** POST /scenarios: makes a recording out of a scenario. */
export const scenarioRequestSchema = z.object({
  name: nameSchema,
  vehicleId: idSchema.optional(),
  scenario: scenarioSchema.prefault({}),
});
export type ScenarioRequest = z.infer<typeof scenarioRequestSchema>;
