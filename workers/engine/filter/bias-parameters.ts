/** The bias models' parameters out of a run's parameters. */
import type { Parameters } from '@/shared/contracts/parameters';
import type { BiasModelParameters } from './bias-models';

export function biasParameters(parameters: Parameters): {
  gyro: BiasModelParameters;
  accel: BiasModelParameters;
} {
  const { gyro, accel } = parameters;
  return {
    gyro: {
      model: gyro.biasModel,
      instability: gyro.biasInstabilityRadPerS,
      correlationTimeS: gyro.biasCorrelationTimeS,
      turnOnSigma: gyro.turnOnBiasSigmaRadPerS,
      randomWalk: gyro.biasRandomWalkRadPerSPerSqrtS,
    },
    accel: {
      model: accel.biasModel,
      instability: accel.biasInstabilityMPerS2,
      correlationTimeS: accel.biasCorrelationTimeS,
      turnOnSigma: accel.turnOnBiasSigmaMPerS2,
      randomWalk: accel.biasRandomWalkMPerS2PerSqrtS,
    },
  };
}
