/** Gyro bias read off a static stretch: the mean rate less the Earth's, weighed against the turn-on prior. */
import type { Parameters } from '@/shared/contracts/parameters';
import { initialBiasVariance, biasNoiseDensity } from '../filter/bias-models';
import { biasParameters } from '../filter/bias-parameters';
import { EARTH_RATE } from '../geodesy';
import type { StaticStretch } from './static-stretch';

/** Bias (rad/s) and variance (rad²/s²) per body axis at the stretch's start, for an attitude n←b. */
export function restGyroBias(
  rest: StaticStretch,
  parameters: Parameters,
  dcm: Float64Array,
  latRad: number,
  yawVariance: number,
): { bias: [number, number, number]; variance: [number, number, number] } {
  const prior = initialBiasVariance(biasParameters(parameters).gyro);
  const known = restBiasVariance(rest, parameters);
  const weight = 1 - known / prior;
  // Earth rate taken off in a wrong direction: the first order is correlated with the heading error and is seen to
  // where the covariance is put together; here what is beyond it, 1 − cos Δψ ≈ Δψ²/2.
  const beyond = (EARTH_RATE * Math.cos(latRad) * Math.min(2, yawVariance)) / 2;
  const variance = known + beyond * beyond;
  const earthN = EARTH_RATE * Math.cos(latRad);
  const earthD = -EARTH_RATE * Math.sin(latRad);
  const bias = [0, 1, 2].map((i) => weight * (rest.gyro[i]! - dcm[i]! * earthN - dcm[6 + i]! * earthD));
  return { bias: bias as [number, number, number], variance: [variance, variance, variance] };
}

/** Variance of the bias at the stretch's start once its mean is known, rad²/s². */
export function restBiasVariance(rest: StaticStretch, parameters: Parameters): number {
  const prior = initialBiasVariance(biasParameters(parameters).gyro);
  const noise = restNoiseVariance(rest, parameters);
  return (prior * noise) / (prior + noise);
}

/** White noise of the mean, and how far the bias wandered between the start and the mean (a third of its walk), rad²/s². */
export function restNoiseVariance(rest: StaticStretch, parameters: Parameters): number {
  const duration = rest.meanDurationS;
  const walk = biasNoiseDensity(biasParameters(parameters).gyro);
  return parameters.gyro.whiteNoiseRadPerSqrtS ** 2 / duration + (walk * duration) / 3;
}
