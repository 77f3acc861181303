/** Adds a correction to a navigation state. */
import { HEIGHT, LAT, LON, NAV_ACCEL_BIAS, NAV_GYRO_BIAS, VN } from '../strapdown/navigation-state';
import { MERIDIAN_PLUS_H, TRANSVERSE_PLUS_H } from '../strapdown/local-earth';
import { turnAttitude } from './attitude-feedback';
import { ACCEL_BIAS, GYRO_BIAS, POSITION, VELOCITY } from './states';

/**
 * `correction` (15, true − computed): position in metres north, east, down over the radii in `earth` (R_M + h, R_N + h),
 * velocity, attitude (rad, in n, heading after tilt), biases.
 */
export function correctState(nav: Float64Array, earth: Float64Array, correction: Float64Array): void {
  nav[LON] = nav[LON]! + correction[POSITION + 1]! / (earth[TRANSVERSE_PLUS_H]! * Math.cos(nav[LAT]!));
  nav[LAT] = nav[LAT]! + correction[POSITION]! / earth[MERIDIAN_PLUS_H]!;
  nav[HEIGHT] = nav[HEIGHT]! - correction[POSITION + 2]!;
  for (let i = 0; i < 3; i += 1) {
    nav[VN + i] = nav[VN + i]! + correction[VELOCITY + i]!;
    nav[NAV_GYRO_BIAS + i] = nav[NAV_GYRO_BIAS + i]! + correction[GYRO_BIAS + i]!;
    nav[NAV_ACCEL_BIAS + i] = nav[NAV_ACCEL_BIAS + i]! + correction[ACCEL_BIAS + i]!;
  }
  turnAttitude(nav, correction);
}
