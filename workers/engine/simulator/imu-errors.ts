/** What real inertial sensors make of a perfect recording. */
import type { RandomSource } from '../random';
import type { ImuColumns } from '../types';
import { GaussMarkov, MatchedRandomWalk } from './gauss-markov';
import type { ImuModel } from './grades';

/** Local names: a global looked up in each call costs more than the call. */
const { max, min, round, sqrt } = Math;

/** A recording with sensor errors, and the biases that were added (turn-on + in-run), at each sample; rad/s and m/s². */
export interface SensedImu {
  imu: ImuColumns;
  gyroBias: readonly [Float64Array, Float64Array, Float64Array];
  accelBias: readonly [Float64Array, Float64Array, Float64Array];
  /** Scale factor errors of the axes, 1. */
  gyroScale: readonly [number, number, number];
  accelScale: readonly [number, number, number];
}

interface AxisErrors {
  whiteNoise: number;
  turnOnSigma: number;
  wanderSigma: number;
  wanderTauS: number;
  wander: ImuModel['wander'];
  scaleSigma: number;
  step: number;
  range: number;
}

/**
 * Adds to each axis: turn-on constant, in-run wander, scale factor error, white noise (density N: σ = N/√Δt
 * of a rate sample, N√Δt of an increment), then the output's range and step. The input is left as it is.
 */
export function senseImu(perfect: ImuColumns, model: ImuModel, random: RandomSource): SensedImu {
  const gyroErrors: AxisErrors = {
    whiteNoise: model.gyroWhiteNoiseRadPerSqrtS,
    turnOnSigma: model.gyroTurnOnBiasSigmaRadPerS,
    wanderSigma: model.gyroBiasInstabilityRadPerS,
    wanderTauS: model.gyroBiasCorrelationTimeS,
    wander: model.wander,
    scaleSigma: model.gyroScaleSigma,
    step: model.gyroStepRadPerS,
    range: model.gyroRangeRadPerS,
  };
  const accelErrors: AxisErrors = {
    whiteNoise: model.accelWhiteNoiseMPerSPerSqrtS,
    turnOnSigma: model.accelTurnOnBiasSigmaMPerS2,
    wanderSigma: model.accelBiasInstabilityMPerS2,
    wanderTauS: model.accelBiasCorrelationTimeS,
    wander: model.wander,
    scaleSigma: model.accelScaleSigma,
    step: model.accelStepMPerS2,
    range: model.accelRangeMPerS2,
  };
  const sense = (group: 'gyro' | 'accel', axis: 0 | 1 | 2) =>
    senseAxis(
      perfect,
      perfect[group][axis],
      group === 'gyro' ? gyroErrors : accelErrors,
      random.split(`${group}-${axis}`),
    );
  const g = [sense('gyro', 0), sense('gyro', 1), sense('gyro', 2)] as const;
  const a = [sense('accel', 0), sense('accel', 1), sense('accel', 2)] as const;
  return {
    imu: {
      timeS: perfect.timeS,
      sampling: perfect.sampling,
      gyro: [g[0].values, g[1].values, g[2].values],
      accel: [a[0].values, a[1].values, a[2].values],
    },
    gyroBias: [g[0].bias, g[1].bias, g[2].bias],
    accelBias: [a[0].bias, a[1].bias, a[2].bias],
    gyroScale: [g[0].scale - 1, g[1].scale - 1, g[2].scale - 1],
    accelScale: [a[0].scale - 1, a[1].scale - 1, a[2].scale - 1],
  };
}

function senseAxis(perfect: ImuColumns, truth: Float64Array, errors: AxisErrors, random: RandomSource) {
  const { timeS } = perfect;
  const n = timeS.length;
  const increments = perfect.sampling === 'increment';
  const values = new Float64Array(n);
  const bias = new Float64Array(n);
  const turnOn = errors.turnOnSigma * random.normal();
  const scale = 1 + errors.scaleSigma * random.normal();
  const Wander = errors.wander === 'random-walk' ? MatchedRandomWalk : GaussMarkov;
  const wander = new Wander(errors.wanderSigma, errors.wanderTauS, random.split('wander'));
  for (let k = 0; k < n; k += 1) {
    const dt = k === 0 ? timeS[min(1, n - 1)]! - timeS[0]! || 1 : timeS[k]! - timeS[k - 1]!;
    if (k > 0) wander.step(dt);
    bias[k] = turnOn + wander.value;
    const rate = (increments ? truth[k]! / dt : truth[k]!) * scale;
    let sensed = rate + bias[k]! + (errors.whiteNoise / sqrt(dt)) * random.normal();
    sensed = min(max(sensed, -errors.range), errors.range);
    if (errors.step > 0) sensed = round(sensed / errors.step) * errors.step;
    values[k] = increments ? sensed * dt : sensed;
  }
  return { values, bias, scale };
}
