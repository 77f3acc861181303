/** How much a vehicle may have moved unseen while the IMU gave nothing. */
import type { ImuColumns } from '../types';

/** Samples of this stretch on either side of a gap show how lively the vehicle is. */
const WINDOW_S = 1;
const RATE_FLOOR = 0.02; // rad/s
const ACCEL_FLOOR = 0.2; // m/s²

/**
 * 1σ of the unknown change of angular rate (rad/s) and specific force (m/s²) during the gap before sample k: spread
 * around the gap plus the step across it, with a floor.
 */
export function gapDisturbance(
  imu: ImuColumns,
  k: number,
  nominalS: number,
): { rate: number; accel: number } {
  const scale = imu.sampling === 'increment' ? 1 / nominalS : 1;
  return {
    rate: RATE_FLOOR + scale * unrest(imu.gyro, imu.timeS, k),
    accel: ACCEL_FLOOR + scale * unrest(imu.accel, imu.timeS, k),
  };
}

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
