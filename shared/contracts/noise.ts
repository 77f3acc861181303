/** Sensor noise: the Allan analysis of a stretch at rest. */
import { z } from 'zod';
import { sensorFiguresSchema } from './vehicles';

/** POST /recordings/:id/noise. Both left out: the longest stretch at rest. */
export const noiseRequestSchema = z
  .object({ fromS: z.number().optional(), toS: z.number().optional() })
  .refine(({ fromS, toS }) => (fromS === undefined) === (toS === undefined), {
    message: 'Give both ends of the stretch, or neither.',
    path: ['toS'],
  })
  .refine(({ fromS, toS }) => fromS === undefined || toS === undefined || toS > fromS, {
    message: 'The stretch must end after it starts.',
    path: ['toS'],
  });
export type NoiseRequest = z.infer<typeof noiseRequestSchema>;

/**
 * Terms of IEEE Std 952: quantisation Q (u·s), white N (u·√s), bias instability B (u), rate random walk K (u/√s),
 * ramp R (u/s), with u the sensor's unit: rad/s for gyros, m/s² for accelerometers.
 */
export const NOISE_TERMS = ['quantisation', 'white', 'biasInstability', 'rateRandomWalk', 'ramp'] as const;
export type NoiseTerm = (typeof NOISE_TERMS)[number];

export const noiseTermSchema = z.object({
  value: z.number().nullable().describe('Null: the stretch cannot tell this term.'),
  sigma: z.number().nullable().describe('1σ of the value, same unit.'),
});

export const noisePointSchema = z.object({
  tauS: z.number(),
  deviation: z.number().describe('Overlapping Allan deviation, u.'),
  low: z.number().describe('68 % interval of the true deviation, u.'),
  high: z.number(),
  model: z.number().describe('Of the terms that were found, u.'),
});

export const noiseAxisSchema = z.object({
  channel: z.enum(['gyro_x', 'gyro_y', 'gyro_z', 'accel_x', 'accel_y', 'accel_z']),
  unit: z.enum(['rad/s', 'm/s²']).describe('u'),
  points: z.array(noisePointSchema),
  terms: z.object({
    quantisation: noiseTermSchema,
    white: noiseTermSchema,
    biasInstability: noiseTermSchema,
    rateRandomWalk: noiseTermSchema,
    ramp: noiseTermSchema,
  }),
});
export type NoiseAxis = z.infer<typeof noiseAxisSchema>;

const stretchSchema = z.tuple([z.number(), z.number()]);

export const noiseAnalysisSchema = z.object({
  fromS: z.number().describe('The stretch that was analysed, on the recording’s axis.'),
  toS: z.number(),
  samples: z.number().int(),
  intervalS: z.number().describe('Mean sampling interval τ₀, s.'),
  stretchesS: z.array(stretchSchema).describe('All stretches at rest that were found, the longest first, s.'),
  notes: z.array(z.string()).describe('What to know of the result, in plain words.'),
  axes: z.array(noiseAxisSchema),
  figures: sensorFiguresSchema.describe('As the filter takes them: of the noisiest axis.'),
});
export type NoiseAnalysis = z.infer<typeof noiseAnalysisSchema>;
