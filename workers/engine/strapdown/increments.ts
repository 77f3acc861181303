/**
 * From an interval's raw increments to what the strapdown integrates: biases off, coning, rotation compensation and
 * sculling in (Miller, JGCD 6, 1983, 287–291; Ignagni, JGCD 13, 1990, 363–369; Savage, JGCD 21, 1998, 19–28, 208–221).
 */
import { ANGLE, ANGLE_BEND, DURATION, VELOCITY_BEND, VELOCITY_INCREMENT } from './imu-intervals';
import { NAV_ACCEL_BIAS, NAV_GYRO_BIAS } from './navigation-state';

/**
 * Rotation vector (rad, `out[0..2]`) and velocity increment in the axes of the part's start (m/s, `out[3..5]`) of the
 * part (from, to] of an interval, with the biases of `nav` taken off. With rates linear in time over the interval, the
 * part's own increments are share·Δ − shift·bend, and its coning and sculling integrals those of the whole times
 * share³. Without `coningSculling` rates are taken as constant.
 */
export function formIncrements(
  interval: Float64Array,
  from: number,
  to: number,
  nav: Float64Array,
  coningSculling: boolean,
  out: Float64Array,
): void {
  const duration = interval[DURATION]!;
  const share = to - from;
  // Whole interval, biases taken off: angle a, velocity v; bends e and d.
  const ax = interval[ANGLE]! - nav[NAV_GYRO_BIAS]! * duration;
  const ay = interval[ANGLE + 1]! - nav[NAV_GYRO_BIAS + 1]! * duration;
  const az = interval[ANGLE + 2]! - nav[NAV_GYRO_BIAS + 2]! * duration;
  const vx = interval[VELOCITY_INCREMENT]! - nav[NAV_ACCEL_BIAS]! * duration;
  const vy = interval[VELOCITY_INCREMENT + 1]! - nav[NAV_ACCEL_BIAS + 1]! * duration;
  const vz = interval[VELOCITY_INCREMENT + 2]! - nav[NAV_ACCEL_BIAS + 2]! * duration;
  const bent = coningSculling ? 1 : 0;
  const ex = bent * interval[ANGLE_BEND]!;
  const ey = bent * interval[ANGLE_BEND + 1]!;
  const ez = bent * interval[ANGLE_BEND + 2]!;
  const dx = bent * interval[VELOCITY_BEND]!;
  const dy = bent * interval[VELOCITY_BEND + 1]!;
  const dz = bent * interval[VELOCITY_BEND + 2]!;

  const shift = to * (1 - to) - from * (1 - from);
  const px = share * ax - shift * ex;
  const py = share * ay - shift * ey;
  const pz = share * az - shift * ez;
  const ux = share * vx - shift * dx;
  const uy = share * vy - shift * dy;
  const uz = share * vz - shift * dz;

  // Coning Δθ×e/6: the rotation vector of the part.
  const sixth = (share * share * share) / 6;
  out[0] = px + sixth * (ay * ez - az * ey);
  out[1] = py + sixth * (az * ex - ax * ez);
  out[2] = pz + sixth * (ax * ey - ay * ex);

  // Rotation compensation ((1−cos θ)/θ²) θ×Δv + ((θ−sin θ)/θ³) θ×(θ×Δv), coefficients by series.
  const p2 = px * px + py * py + pz * pz;
  const first = 0.5 - p2 / 24 + (p2 * p2) / 720;
  const second = 1 / 6 - p2 / 120 + (p2 * p2) / 5040;
  const cx = py * uz - pz * uy;
  const cy = pz * ux - px * uz;
  const cz = px * uy - py * ux;
  // Sculling (Δθ×d + Δv×e)/6.
  out[3] = ux + first * cx + second * (py * cz - pz * cy) + sixth * (ay * dz - az * dy + vy * ez - vz * ey);
  out[4] = uy + first * cy + second * (pz * cx - px * cz) + sixth * (az * dx - ax * dz + vz * ex - vx * ez);
  out[5] = uz + first * cz + second * (px * cy - py * cx) + sixth * (ax * dy - ay * dx + vx * ey - vy * ex);
}

/** For study: the increments of the part as they stand, only the biases taken off. */
export function sumIncrements(
  interval: Float64Array,
  from: number,
  to: number,
  nav: Float64Array,
  out: Float64Array,
): void {
  const share = to - from;
  const duration = interval[DURATION]!;
  for (let i = 0; i < 3; i += 1) {
    out[i] = share * (interval[ANGLE + i]! - nav[NAV_GYRO_BIAS + i]! * duration);
    out[i + 3] = share * (interval[VELOCITY_INCREMENT + i]! - nav[NAV_ACCEL_BIAS + i]! * duration);
  }
}
