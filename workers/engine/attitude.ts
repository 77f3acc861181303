/**
 * Attitude algebra. Quaternion n←b: Hamilton product, scalar first, Float64Array(4); v_n = q ⊗ v_b ⊗ q*.
 * Euler angles 3-2-1: C = R_z(yaw) R_y(pitch) R_x(roll). Direction cosine matrices row by row, Float64Array(9).
 * `out` may be one of the inputs.
 */
import { wrapAngle } from './geodesy';

/** Local names: a global looked up in each call costs more than the call. */
const { atan2, hypot, sin, sqrt } = Math;

/** Quaternion n←b from roll, pitch, yaw (rad). */
export function quatFromEuler(roll: number, pitch: number, yaw: number, out: Float64Array): Float64Array {
  const cr = Math.cos(roll / 2);
  const sr = sin(roll / 2);
  const cp = Math.cos(pitch / 2);
  const sp = sin(pitch / 2);
  const cy = Math.cos(yaw / 2);
  const sy = sin(yaw / 2);
  out[0] = cr * cp * cy + sr * sp * sy;
  out[1] = sr * cp * cy - cr * sp * sy;
  out[2] = cr * sp * cy + sr * cp * sy;
  out[3] = cr * cp * sy - sr * sp * cy;
  return out;
}

/**
 * Roll, pitch, yaw (rad) in `out[0..2]`; roll and yaw in (−π, π], pitch in [−π/2, π/2]. At pitch ±90° only
 * yaw ∓ roll is defined: roll is put to 0 and yaw carries it. Works on half sums and differences of the angles, which
 * keep full digits at every attitude (Bernardes & Viollet, PLoS ONE 17, 2022).
 */
export function eulerFromQuat(q: Float64Array, out: Float64Array): Float64Array {
  // w + y = (cos p/2 + sin p/2)·cos((yaw − roll)/2), z − x the sine; w − y and z + x likewise with the sum.
  const differenceCos = q[0]! + q[2]!;
  const differenceSin = q[3]! - q[1]!;
  const sumCos = q[0]! - q[2]!;
  const sumSin = q[3]! + q[1]!;
  const high = sqrt(differenceCos * differenceCos + differenceSin * differenceSin);
  const low = sqrt(sumCos * sumCos + sumSin * sumSin);
  out[1] = 2 * atan2(high, low) - Math.PI / 2;
  const halfDifference = atan2(differenceSin, differenceCos);
  const halfSum = atan2(sumSin, sumCos);
  if (low < GIMBAL || high < GIMBAL) {
    out[0] = 0;
    out[2] = wrapAngle(2 * (low < GIMBAL ? halfDifference : halfSum));
    return out;
  }
  out[0] = wrapAngle(halfSum - halfDifference);
  out[2] = wrapAngle(halfSum + halfDifference);
  return out;
}
/** Below this, roll and yaw can no longer be told apart in double precision. */
const GIMBAL = 1e-12;

/** Direction cosine matrix n←b of a unit quaternion, row by row in `out[0..8]`. */
export function dcmFromQuat(q: Float64Array, out: Float64Array): Float64Array {
  const w = q[0]!;
  const x = q[1]!;
  const y = q[2]!;
  const z = q[3]!;
  out[0] = w * w + x * x - y * y - z * z;
  out[1] = 2 * (x * y - w * z);
  out[2] = 2 * (x * z + w * y);
  out[3] = 2 * (x * y + w * z);
  out[4] = w * w - x * x + y * y - z * z;
  out[5] = 2 * (y * z - w * x);
  out[6] = 2 * (x * z - w * y);
  out[7] = 2 * (y * z + w * x);
  out[8] = w * w - x * x - y * y + z * z;
  return out;
}

/** Unit quaternion (scalar ≥ 0) of a rotation matrix, by the largest of the four squares (Shepperd 1978). */
export function quatFromDcm(c: Float64Array, out: Float64Array): Float64Array {
  const xx = c[0]!;
  const yy = c[4]!;
  const zz = c[8]!;
  const trace = xx + yy + zz;
  if (trace >= xx && trace >= yy && trace >= zz) {
    set(out, 1 + trace, c[7]! - c[5]!, c[2]! - c[6]!, c[3]! - c[1]!);
  } else if (xx >= yy && xx >= zz) {
    set(out, c[7]! - c[5]!, 1 + xx - yy - zz, c[1]! + c[3]!, c[2]! + c[6]!);
  } else if (yy >= zz) {
    set(out, c[2]! - c[6]!, c[1]! + c[3]!, 1 + yy - xx - zz, c[5]! + c[7]!);
  } else {
    set(out, c[3]! - c[1]!, c[2]! + c[6]!, c[5]! + c[7]!, 1 + zz - xx - yy);
  }
  quatNormalise(out);
  if (out[0]! < 0) set(out, -out[0]!, -out[1]!, -out[2]!, -out[3]!);
  return out;
}

/** Hamilton product a ⊗ b. */
export function quatMultiply(a: Float64Array, b: Float64Array, out: Float64Array): Float64Array {
  const aw = a[0]!;
  const ax = a[1]!;
  const ay = a[2]!;
  const az = a[3]!;
  const bw = b[0]!;
  const bx = b[1]!;
  const by = b[2]!;
  const bz = b[3]!;
  out[0] = aw * bw - ax * bx - ay * by - az * bz;
  out[1] = aw * bx + ax * bw + ay * bz - az * by;
  out[2] = aw * by - ax * bz + ay * bw + az * bx;
  out[3] = aw * bz + ax * by - ay * bx + az * bw;
  return out;
}

/** Quaternion of a rotation vector (rad); exact to rounding for any length, zero included. */
export function quatFromRotationVector(x: number, y: number, z: number, out: Float64Array): Float64Array {
  const a2 = x * x + y * y + z * z;
  if (a2 < SMALL_ANGLE_2) {
    // sin(a/2)/a and cos(a/2) by series: the next terms are below 1e-17.
    const s = 0.5 - a2 / 48 + (a2 * a2) / 3840;
    return set(out, 1 - a2 / 8 + (a2 * a2) / 384, s * x, s * y, s * z);
  }
  const a = sqrt(a2);
  const s = sin(a / 2) / a;
  return set(out, Math.cos(a / 2), s * x, s * y, s * z);
}
const SMALL_ANGLE_2 = 1e-4;

/** Rotation vector (rad, length ≤ π) of a unit quaternion, in `out[0..2]`; the sign of q does not matter. */
export function rotationVectorFromQuat(q: Float64Array, out: Float64Array): Float64Array {
  const sign = q[0]! < 0 ? -1 : 1;
  const w = q[0]! * sign;
  const n = hypot(q[1]!, q[2]!, q[3]!);
  const k = n < 1e-9 ? 2 * sign : (2 * sign * atan2(n, w)) / n;
  out[0] = k * q[1]!;
  out[1] = k * q[2]!;
  out[2] = k * q[3]!;
  return out;
}

/** Scales q to length one, in place. */
export function quatNormalise(q: Float64Array): Float64Array {
  const n = 1 / sqrt(q[0]! * q[0]! + q[1]! * q[1]! + q[2]! * q[2]! + q[3]! * q[3]!);
  return set(q, q[0]! * n, q[1]! * n, q[2]! * n, q[3]! * n);
}

function set(q: Float64Array, w: number, x: number, y: number, z: number): Float64Array {
  q[0] = w;
  q[1] = x;
  q[2] = y;
  q[3] = z;
  return q;
}
