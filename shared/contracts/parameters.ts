/**
 * The filter's parameters: the one object that the bench slides, a run stores, a version keeps and an integrator fetches.
 * Every field has a default, so that `{}` is a complete, sensible set for an industrial MEMS sensor.
 * Units are in the names, SI and radians.
 */
import { z } from 'zod';
import { vector3Schema } from './common';

const positive = (low: number, high: number) => z.number().min(low).max(high);

export const biasModelSchema = z.enum(['random-walk', 'gauss-markov', 'turn-on-plus-wander']);
export type BiasModel = z.infer<typeof biasModelSchema>;

export const gyroParametersSchema = z.object({
  whiteNoiseRadPerSqrtS: positive(1e-9, 1).default(8.7e-5).describe('Angle random walk N_g, rad/√s.'),
  biasModel: biasModelSchema.default('turn-on-plus-wander'),
  biasInstabilityRadPerS: positive(1e-10, 1).default(4.8e-5).describe('In-run bias wander σ, rad/s (1σ).'),
  biasCorrelationTimeS: positive(1, 1e6).default(300).describe('Correlation time τ of the wander, s.'),
  turnOnBiasSigmaRadPerS: positive(1e-10, 1).default(3.5e-3).describe('Turn-on bias 1σ, rad/s.'),
  biasRandomWalkRadPerSPerSqrtS: positive(1e-12, 1)
    .default(1e-6)
    .describe('Rate random walk K_g, rad/s/√s; used by the random-walk bias model.'),
});

export const accelParametersSchema = z.object({
  whiteNoiseMPerSPerSqrtS: positive(1e-8, 10).default(1e-3).describe('Velocity random walk N_a, m/s/√s.'),
  biasModel: biasModelSchema.default('turn-on-plus-wander'),
  biasInstabilityMPerS2: positive(1e-9, 10).default(5e-4).describe('In-run bias wander σ, m/s² (1σ).'),
  biasCorrelationTimeS: positive(1, 1e6).default(300).describe('Correlation time τ of the wander, s.'),
  turnOnBiasSigmaMPerS2: positive(1e-9, 10).default(0.05).describe('Turn-on bias 1σ, m/s².'),
  biasRandomWalkMPerS2PerSqrtS: positive(1e-10, 10)
    .default(2e-5)
    .describe('Acceleration random walk K_a, m/s²/√s; used by the random-walk bias model.'),
});

export const gnssParametersSchema = z.object({
  usePosition: z.boolean().default(true),
  useVelocity: z.boolean().default(true),
  sigmaSource: z
    .enum(['receiver', 'fixed'])
    .default('receiver')
    .describe("receiver: the log's own accuracies, the fixed ones where it gives none."),
  positionScale: positive(0.01, 100).default(1).describe('Factor on the position σ.'),
  velocityScale: positive(0.01, 100).default(1).describe('Factor on the velocity σ.'),
  positionInflation: positive(1, 10_000)
    .default(1)
    .describe(
      'Factor on R (σ²) of the position, for errors that stay alike from fix to fix: (1 + ρ)/(1 − ρ) with their correlation ρ.',
    ),
  velocityInflation: positive(1, 10_000).default(1).describe('The same for the velocity.'),
  positionSigmaHorizontalM: positive(1e-4, 1e4).default(1.5).describe('Each of north and east, 1σ, m.'),
  positionSigmaVerticalM: positive(1e-4, 1e4).default(2.5),
  velocitySigmaHorizontalMPerS: positive(1e-4, 1e3).default(0.1),
  velocitySigmaVerticalMPerS: positive(1e-4, 1e3).default(0.15),
  positionFloorM: positive(0, 1e3).default(0.01).describe('No position σ is taken below this, m.'),
  velocityFloorMPerS: positive(0, 1e2).default(0.005).describe('No velocity σ is taken below this, m/s.'),
  latencyS: z.number().min(-5).max(5).default(0).describe('Measurement time = epoch − latency, s.'),
});

export const gateParametersSchema = z.object({
  enabled: z.boolean().default(true),
  probability: z
    .number()
    .min(0.5)
    .max(0.9999999)
    .default(0.999)
    .describe('χ² probability that a good measurement group passes.'),
  recoveryAfterS: positive(0.1, 3600)
    .default(10)
    .describe('After this long with nothing accepted the filter re-initialises what the group measures, s.'),
});

/**
 * The state at the start. What is given is used as it stands; what is left out is found from the data
 * (position and velocity from GNSS, roll and pitch from gravity, heading from GNSS course).
 * σ: north, east, down; attitude about north, east, down for roll, pitch, yaw respectively small angles.
 */
export const initialParametersSchema = z.object({
  timeS: z
    .number()
    .optional()
    .describe('Start here on the recording’s axis, s; left out: at the first usable moment.'),
  position: z.object({ latDeg: z.number(), lonDeg: z.number(), heightM: z.number() }).optional(),
  velocityNedMPerS: vector3Schema.optional(),
  attitude: z.object({ rollDeg: z.number(), pitchDeg: z.number(), yawDeg: z.number() }).optional(),
  headingDeg: z.number().optional().describe('Heading alone, when roll and pitch are to be levelled.'),
  positionSigmaNedM: vector3Schema.optional(),
  velocitySigmaNedMPerS: vector3Schema.optional(),
  attitudeSigmaDeg: vector3Schema.optional().describe('roll, pitch, yaw, 1σ.'),
  gyroBiasRadPerS: vector3Schema.optional(),
  accelBiasMPerS2: vector3Schema.optional(),
  courseSpeedMPerS: positive(0.1, 100)
    .default(2)
    .describe('GNSS course is taken as heading above this speed, m/s.'),
});

export const mechanisationParametersSchema = z.object({
  scheme: z
    .enum(['coning-sculling', 'trapezoidal', 'rectangular'])
    .default('coning-sculling')
    .describe('The last two are for study.'),
  covarianceIntervalS: z.number().min(0).max(1).default(0.05).describe('0: at every sample, s.'),
});

/** Samples at the end of a sensor's range hide what went beyond it. */
export const clippingParametersSchema = z.object({
  enabled: z.boolean().default(true).describe('Widen the uncertainty over clipped samples.'),
  gyroRangeRadPerS: positive(0.01, 1000)
    .optional()
    .describe('Range of the gyros, rad/s; left out: flat tops at the extremes are looked for.'),
  accelRangeMPerS2: positive(0.1, 1e5)
    .optional()
    .describe('Range of the accelerometers, m/s²; left out: flat tops at the extremes are looked for.'),
  overflowShare: positive(0.01, 10)
    .default(1)
    .describe('1σ of what a clipped sample may have missed, as a share of the range.'),
});

const aidSensor = {
  enabled: z.boolean().default(false),
  sigmaSource: z
    .enum(['log', 'fixed'])
    .default('log')
    .describe("log: the log's own 1σ, the fixed one where it gives none."),
  sigmaScale: positive(0.01, 100).default(1).describe('Factor on 1σ.'),
  latencyS: z.number().min(-5).max(5).default(0).describe('Measurement time = time stamp − latency, s.'),
};

/** What a vehicle's nature measures, and sensors besides IMU and GNSS. Each is off by default: which of them hold is for the engineer to say. */
export const aidParametersSchema = z.object({
  stopDetection: z
    .object({
      windowS: positive(0.1, 10).default(0.5).describe('A stop is judged window by window, s.'),
      gyroSpreadRadPerS: positive(1e-6, 1)
        .default(0.01)
        .describe('Standing still: the gyros spread less than this within a window, rad/s.'),
      accelSpreadMPerS2: positive(1e-4, 10)
        .default(0.25)
        .describe('Standing still: the accelerometers spread less than this within a window, m/s².'),
      speedMPerS: positive(0.01, 10)
        .default(0.5)
        .describe(
          'Slower than this a quiet vehicle may be standing, m/s. A stop counts only where no GNSS velocity of the last 2 s is above it (or 3σ), the estimated speed is below it or 3σ, and that speed + 3σ is below half of what was last known, four times this where no motion was.',
        ),
    })
    .prefault({}),
  zeroVelocity: z
    .object({
      enabled: z.boolean().default(false),
      sigmaMPerS: positive(1e-4, 10).default(0.03).describe('1σ of velocity at a detected stop, m/s.'),
    })
    .prefault({}),
  zeroRotation: z
    .object({
      enabled: z.boolean().default(false),
      sigmaRadPerS: positive(1e-9, 1)
        .default(1e-4)
        .describe('1σ of rotation at a detected stop, on top of the gyro noise, rad/s.'),
    })
    .prefault({}),
  nonHolonomic: z
    .object({
      enabled: z.boolean().default(false),
      lateralSigmaMPerS: positive(1e-3, 100).default(0.2).describe('1σ of sideways velocity, m/s.'),
      verticalSigmaMPerS: positive(1e-3, 100).default(0.2).describe('1σ of velocity along body down, m/s.'),
      intervalS: positive(0.02, 60).default(1).describe('One constraint each, s: its errors last.'),
      axleArmM: positive(0, 100)
        .default(1.5)
        .describe('IMU ahead of the unsteered axle, m: swings sideways in turns.'),
    })
    .prefault({}),
  barometer: z
    .object({ ...aidSensor, sigmaM: positive(0.001, 1000).default(1).describe('1σ of the height, m.') })
    .prefault({})
    .describe('Barometric height; its offset is a state of its own (states.barometerBias).'),
  heading: z
    .object({
      ...aidSensor,
      sigmaRad: positive(1e-6, 2).default(0.035).describe('1σ of the heading, rad.'),
      offsetRad: z
        .number()
        .min(-Math.PI)
        .max(Math.PI)
        .default(0)
        .describe('Added to each reading: declination of a compass, mounting angle of two antennas, rad.'),
    })
    .prefault({})
    .describe('Compass or two antennas; also used for the first heading.'),
  odometer: z
    .object({
      ...aidSensor,
      sigmaMPerS: positive(1e-4, 100).default(0.1).describe('1σ of the forward speed, m/s.'),
    })
    .prefault({})
    .describe('Speed along the vehicle at its unsteered axle, backwards negative.'),
  attitude: z
    .object({
      ...aidSensor,
      sigmaRad: positive(1e-7, 1).default(0.005).describe('1σ about each of forward, right and down, rad.'),
    })
    .prefault({})
    .describe('Roll, pitch and yaw as a whole: a star or horizon tracker.'),
});

const scaleStateSchema = (sigmaPpm: number) =>
  z
    .object({
      enabled: z.boolean().default(false),
      initialSigmaPpm: positive(1, 200_000).default(sigmaPpm).describe('Each axis, 1σ at the start, ppm.'),
      randomWalkPpmPerSqrtS: positive(0, 10_000)
        .default(0)
        .describe('Random walk of the factor, ppm/√s; 0: it stays.'),
    })
    .prefault({});

/** States beyond the fifteen, estimated along with them. Each is off by default: only motion that shows it makes it worth its cost. */
export const optionalStatesSchema = z.object({
  gyroScale: scaleStateSchema(3000).describe(
    'Scale factors of the gyros: measured = (1 + s) × (true + bias).',
  ),
  accelScale: scaleStateSchema(2000).describe('Scale factors of the accelerometers, the same way.'),
  leverArm: z
    .object({
      enabled: z.boolean().default(false),
      initialSigmaM: positive(0.001, 100).default(0.2).describe('Each axis, 1σ at the start, m.'),
    })
    .prefault({})
    .describe('GNSS lever arm, starting at the given one.'),
  barometerBias: z
    .object({
      enabled: z.boolean().default(false),
      initialSigmaM: positive(0.01, 10_000).default(30).describe('1σ at the start, m.'),
      randomWalkMPerSqrtS: positive(0, 100)
        .default(0.05)
        .describe('Random walk as the weather changes, m/√s.'),
    })
    .prefault({})
    .describe('Offset of barometric height from height above the ellipsoid.'),
});

export const parametersSchema = z.object({
  gyro: gyroParametersSchema.prefault({}),
  accel: accelParametersSchema.prefault({}),
  gnss: gnssParametersSchema.prefault({}),
  gate: gateParametersSchema.prefault({}),
  initial: initialParametersSchema.prefault({}),
  mechanisation: mechanisationParametersSchema.prefault({}),
  clipping: clippingParametersSchema.prefault({}),
  aids: aidParametersSchema.prefault({}),
  states: optionalStatesSchema.prefault({}),
  leverArmM: vector3Schema
    .optional()
    .describe("GNSS antenna seen from the IMU, forward, right, down, m; left out: the vehicle's."),
});
/** Complete parameters, defaults filled in. */
export type Parameters = z.infer<typeof parametersSchema>;
/** What a request may send: any part. */
export type ParametersInput = z.input<typeof parametersSchema>;

export const defaultParameters = (): Parameters => parametersSchema.parse({});
