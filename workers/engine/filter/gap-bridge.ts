/**
 * Bridging a gap in the IMU log: what rates are taken to have been, and how much the vehicle may have moved unseen.
 *
 * The last rates are held for a short while; beyond it the vehicle is taken to keep attitude and velocity, because a
 * rate held for long would turn it over. The sample that ends the gap speaks for one nominal interval.
 */
import { ANGLE, ANGLE_BEND, DURATION, INTERVAL_SIZE, VELOCITY_INCREMENT } from '../strapdown/imu-intervals';
import { GRAVITY } from '../strapdown/local-earth';
import { NAV_ACCEL_BIAS, NAV_GYRO_BIAS } from '../strapdown/navigation-state';
import type { Strapdown } from '../strapdown/strapdown';
import type { ImuColumns } from '../types';

/** Last rates are held for this long, s. */
const HOLD_S = 1;
/** Samples of this stretch on either side of the gap show how lively the vehicle is, s. */
const WINDOW_S = 10;
/** Least unknown change of rate and specific force: rad/s, m/s². */
const RATE_FLOOR = 0.01;
const ACCEL_FLOOR = 0.1;
/** Most that a gap can leave unknown, 1σ: tilt and heading (rad), velocity (m/s). */
const TILT_LIMIT = 0.2;
const HEADING_LIMIT = 1;
const VELOCITY_LIMIT = 20;

export class GapBridge {
  /** White noise that by the gap's end has spread as far as a constant unknown would have: rad²/s and m²/s³. */
  readonly gyroNoise: number;
  readonly accelNoise: number;
  /** Variance of the heading beyond that, rad², due at the gap's end. */
  readonly headingVariance: number;
  private readonly held = new Float64Array(6);
  private readonly last = new Float64Array(6);

  /** The gap before sample k, `duration` s long. */
  constructor(
    imu: ImuColumns,
    k: number,
    private readonly duration: number,
    private readonly nominalS: number,
  ) {
    const toRate = imu.sampling === 'increment' ? 1 / nominalS : 1;
    [...imu.gyro, ...imu.accel].forEach((axis, i) => {
      this.held[i] = axis[k - 1]! * toRate;
      this.last[i] = axis[k]! * toRate;
    });
    const turn = (RATE_FLOOR + toRate * unrest(imu.gyro, imu.timeS, k)) * duration;
    const speed = (ACCEL_FLOOR + toRate * unrest(imu.accel, imu.timeS, k)) * duration;
    const tilt = Math.min(turn, TILT_LIMIT);
    this.gyroNoise = tilt ** 2 / duration;
    this.accelNoise = Math.min(speed, VELOCITY_LIMIT) ** 2 / duration;
    this.headingVariance = Math.min(turn, HEADING_LIMIT) ** 2 - tilt ** 2;
  }

  /** Fills an interval of the whole gap with the rates that hold around the share `at` of it. */
  fill(interval: Float64Array, at: number, strapdown: Strapdown): void {
    const since = at * this.duration;
    interval[DURATION] = this.duration;
    for (let i = ANGLE_BEND; i < INTERVAL_SIZE; i += 1) interval[i] = 0;
    if (since > this.duration - this.nominalS) this.set(interval, this.last);
    else if (since <= HOLD_S) this.set(interval, this.held);
    else this.setQuiet(interval, strapdown);
  }

  private set(interval: Float64Array, rates: Float64Array): void {
    for (let i = 0; i < 6; i += 1) interval[ANGLE + i] = rates[i]! * this.duration;
  }

  /** No turn, no acceleration: what the sensors would show of that, their biases included. */
  private setQuiet(interval: Float64Array, { nav, dcm, earth }: Strapdown): void {
    for (let i = 0; i < 3; i += 1) {
      interval[ANGLE + i] = nav[NAV_GYRO_BIAS + i]! * this.duration;
      const force = -dcm[6 + i]! * earth[GRAVITY]! + nav[NAV_ACCEL_BIAS + i]!;
      interval[VELOCITY_INCREMENT + i] = force * this.duration;
    }
  }
}

/** Spread of the liveliest axis around the gap, and its step across it. */
function unrest(axes: ImuColumns['gyro'], timeS: Float64Array, k: number): number {
  let low = k - 1;
  while (low > 0 && timeS[k - 1]! - timeS[low - 1]! <= WINDOW_S) low -= 1;
  let high = k;
  while (high + 1 < timeS.length && timeS[high + 1]! - timeS[k]! <= WINDOW_S) high += 1;
  let worst = 0;
  for (const axis of axes) {
    const before = moments(axis, low, k - 1);
    const after = moments(axis, k, high);
    worst = Math.max(worst, Math.hypot(before.sigma, after.sigma, after.mean - before.mean));
  }
  return worst;
}

function moments(x: Float64Array, from: number, to: number): { mean: number; sigma: number } {
  let sum = 0;
  for (let i = from; i <= to; i += 1) sum += x[i]!;
  const mean = sum / (to - from + 1);
  let squares = 0;
  for (let i = from; i <= to; i += 1) squares += (x[i]! - mean) ** 2;
  return { mean, sigma: Math.sqrt(squares / (to - from + 1)) };
}
