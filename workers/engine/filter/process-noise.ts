/** Process noise of the error states: white noise of gyros and accelerometers, and the biases' own. */
import type { Parameters } from '@/shared/contracts/parameters';
import { biasDecayRate, biasNoiseDensity, halfBiasNoise } from './bias-models';
import { biasParameters } from './bias-parameters';
import { optionalDensities } from './optional-states';
import { ACCEL_BIAS, ATTITUDE, GYRO_BIAS, layoutOf, POSITION, STATES, VELOCITY } from './states';

export class ProcessNoise {
  /** N_g² (rad²/s) and N_a² (m²/s³). */
  readonly gyroWhite: number;
  readonly accelWhite: number;
  /** White noise on top for the time being: gaps, clipped samples. */
  gyroExtra = 0;
  accelExtra = 0;
  /** 1/τ of decaying biases, 1/s; 0: the estimate stays. */
  readonly gyroDecay: number;
  readonly accelDecay: number;
  /** What `fill` made: to be added to the diagonal of P before and after Φ. */
  readonly half: Float64Array;
  /** Densities of the random walks of the states behind the fifteen, unit²/s. */
  private readonly optionalDensity: Float64Array;
  private readonly gyroBiasDensity: number;
  private readonly accelBiasDensity: number;

  constructor(parameters: Parameters) {
    this.optionalDensity = optionalDensities(parameters, layoutOf(parameters));
    this.half = new Float64Array(STATES + this.optionalDensity.length);
    this.gyroWhite = parameters.gyro.whiteNoiseRadPerSqrtS ** 2;
    this.accelWhite = parameters.accel.whiteNoiseMPerSPerSqrtS ** 2;
    const bias = biasParameters(parameters);
    this.gyroBiasDensity = biasNoiseDensity(bias.gyro);
    this.accelBiasDensity = biasNoiseDensity(bias.accel);
    this.gyroDecay = biasDecayRate(bias.gyro);
    this.accelDecay = biasDecayRate(bias.accel);
  }

  /** Half of a step's noise, `dt` s long, into `half`. */
  fill(dt: number): void {
    const { half } = this;
    const velocity = 0.5 * (this.accelWhite + this.accelExtra) * dt;
    const attitude = 0.5 * (this.gyroWhite + this.gyroExtra) * dt;
    const gyroBias = halfBiasNoise(this.gyroBiasDensity, this.gyroDecay, dt);
    const accelBias = halfBiasNoise(this.accelBiasDensity, this.accelDecay, dt);
    for (let i = 0; i < 3; i += 1) {
      half[POSITION + i] = 0;
      half[VELOCITY + i] = velocity;
      half[ATTITUDE + i] = attitude;
      half[GYRO_BIAS + i] = gyroBias;
      half[ACCEL_BIAS + i] = accelBias;
    }
    const { optionalDensity } = this;
    for (let i = 0; i < optionalDensity.length; i += 1) half[STATES + i] = 0.5 * optionalDensity[i]! * dt;
  }
}
