/** Sensor grades: the usual orders of magnitude of the trade, rounded; SI units. */
import type { ImuErrors, ImuGrade } from '@/shared/contracts/scenarios';
import { RAD_PER_DEG, STANDARD_GRAVITY_M_S2 } from '@/shared/units';

/** Errors of one IMU: what a scenario names, and the finer ones. */
export interface ImuModel extends ImuErrors {
  /** How the bias wanders in a run: the usual Gauss–Markov process, or the random walk that it resembles at short times. */
  wander: 'gauss-markov' | 'random-walk';
  /** 1σ of each axis' scale factor error, 1. */
  gyroScaleSigma: number;
  accelScaleSigma: number;
  /** Steps of the output, rad/s and m/s²; 0: none. */
  gyroStepRadPerS: number;
  accelStepMPerS2: number;
  /** Output stops here, rad/s and m/s². */
  gyroRangeRadPerS: number;
  accelRangeMPerS2: number;
}

const DEG_PER_HOUR = RAD_PER_DEG / 3600;
const DEG_PER_ROOT_HOUR = RAD_PER_DEG / 60;
const MILLI_G = STANDARD_GRAVITY_M_S2 * 1e-3;
const MICRO_G_PER_ROOT_HZ = STANDARD_GRAVITY_M_S2 * 1e-6;

const exact = {
  wander: 'gauss-markov' as const,
  gyroScaleSigma: 0,
  accelScaleSigma: 0,
  gyroStepRadPerS: 0,
  accelStepMPerS2: 0,
  gyroRangeRadPerS: Infinity,
  accelRangeMPerS2: Infinity,
};

export const IMU_GRADES: Readonly<Record<ImuGrade, ImuModel>> = {
  perfect: {
    ...exact,
    gyroWhiteNoiseRadPerSqrtS: 0,
    gyroTurnOnBiasSigmaRadPerS: 0,
    gyroBiasInstabilityRadPerS: 0,
    gyroBiasCorrelationTimeS: 300,
    accelWhiteNoiseMPerSPerSqrtS: 0,
    accelTurnOnBiasSigmaMPerS2: 0,
    accelBiasInstabilityMPerS2: 0,
    accelBiasCorrelationTimeS: 300,
  },
  consumer: {
    ...exact,
    gyroWhiteNoiseRadPerSqrtS: 0.8 * DEG_PER_ROOT_HOUR,
    gyroTurnOnBiasSigmaRadPerS: 0.4 * RAD_PER_DEG,
    gyroBiasInstabilityRadPerS: 40 * DEG_PER_HOUR,
    gyroBiasCorrelationTimeS: 200,
    accelWhiteNoiseMPerSPerSqrtS: 250 * MICRO_G_PER_ROOT_HZ,
    accelTurnOnBiasSigmaMPerS2: 20 * MILLI_G,
    accelBiasInstabilityMPerS2: 0.3 * MILLI_G,
    accelBiasCorrelationTimeS: 200,
    gyroStepRadPerS: (2 * 500 * RAD_PER_DEG) / 65536,
    accelStepMPerS2: (2 * 16 * STANDARD_GRAVITY_M_S2) / 65536,
    gyroRangeRadPerS: 500 * RAD_PER_DEG,
    accelRangeMPerS2: 16 * STANDARD_GRAVITY_M_S2,
  },
  industrial: {
    ...exact,
    gyroWhiteNoiseRadPerSqrtS: 8.7e-5,
    gyroTurnOnBiasSigmaRadPerS: 3.5e-3,
    gyroBiasInstabilityRadPerS: 4.8e-5,
    gyroBiasCorrelationTimeS: 300,
    accelWhiteNoiseMPerSPerSqrtS: 1e-3,
    accelTurnOnBiasSigmaMPerS2: 0.05,
    accelBiasInstabilityMPerS2: 5e-4,
    accelBiasCorrelationTimeS: 300,
    gyroStepRadPerS: (2 * 450 * RAD_PER_DEG) / 2 ** 20,
    accelStepMPerS2: (2 * 10 * STANDARD_GRAVITY_M_S2) / 2 ** 20,
    gyroRangeRadPerS: 450 * RAD_PER_DEG,
    accelRangeMPerS2: 10 * STANDARD_GRAVITY_M_S2,
  },
  tactical: {
    ...exact,
    gyroWhiteNoiseRadPerSqrtS: 0.05 * DEG_PER_ROOT_HOUR,
    gyroTurnOnBiasSigmaRadPerS: 5 * DEG_PER_HOUR,
    gyroBiasInstabilityRadPerS: 0.5 * DEG_PER_HOUR,
    gyroBiasCorrelationTimeS: 600,
    accelWhiteNoiseMPerSPerSqrtS: 50 * MICRO_G_PER_ROOT_HZ,
    accelTurnOnBiasSigmaMPerS2: 1 * MILLI_G,
    accelBiasInstabilityMPerS2: 0.05 * MILLI_G,
    accelBiasCorrelationTimeS: 600,
    gyroRangeRadPerS: 1000 * RAD_PER_DEG,
    accelRangeMPerS2: 30 * STANDARD_GRAVITY_M_S2,
  },
  navigation: {
    ...exact,
    gyroWhiteNoiseRadPerSqrtS: 0.002 * DEG_PER_ROOT_HOUR,
    gyroTurnOnBiasSigmaRadPerS: 0.008 * DEG_PER_HOUR,
    gyroBiasInstabilityRadPerS: 0.003 * DEG_PER_HOUR,
    gyroBiasCorrelationTimeS: 3600,
    accelWhiteNoiseMPerSPerSqrtS: 10 * MICRO_G_PER_ROOT_HZ,
    accelTurnOnBiasSigmaMPerS2: 0.05 * MILLI_G,
    accelBiasInstabilityMPerS2: 0.01 * MILLI_G,
    accelBiasCorrelationTimeS: 3600,
    gyroRangeRadPerS: 400 * RAD_PER_DEG,
    accelRangeMPerS2: 25 * STANDARD_GRAVITY_M_S2,
  },
};
