/**
 * Feeding an attitude correction back, and what that does to the covariance.
 *
 * The error is fed back as heading after tilt, C = R_z(φ_D) exp(φ_N, φ_E) Ĉ, not as one rotation vector: to first order
 * the same, but a tilt that an accelerometer bias has caused turns with the vehicle when a large heading error is
 * corrected. The covariance has to turn its tilts along, or the filter takes the changed relation of tilt and bias
 * for knowledge and grows sure of a heading that nothing has shown (the reset of Markley, JGCD 26, 2003, 311–317, for
 * this way of composing).
 */
import { QUAT } from '../strapdown/navigation-state';
import { ATTITUDE, GYRO_BIAS } from './states';

/** q ← q_z(−c_D) ⊗ q(−c_N, −c_E) ⊗ q for the attitude part c of a correction (rad, in n; φ̂ = −c). */
export function turnAttitude(nav: Float64Array, correction: Float64Array): void {
  const n = correction[ATTITUDE]!;
  const e = correction[ATTITUDE + 1]!;
  const d = correction[ATTITUDE + 2]!;
  const tilt = Math.sqrt(n * n + e * e);
  const k = tilt < 1e-9 ? -0.5 : -Math.sin(tilt / 2) / tilt;
  const w = Math.cos(tilt / 2);
  const x = k * n;
  const y = k * e;
  const q0 = nav[QUAT]!;
  const q1 = nav[QUAT + 1]!;
  const q2 = nav[QUAT + 2]!;
  const q3 = nav[QUAT + 3]!;
  const r0 = w * q0 - x * q1 - y * q2;
  const r1 = w * q1 + x * q0 + y * q3;
  const r2 = w * q2 - x * q3 + y * q0;
  const r3 = w * q3 + x * q2 - y * q1;
  const c = Math.cos(d / 2);
  const s = -Math.sin(d / 2);
  nav[QUAT] = c * r0 - s * r3;
  nav[QUAT + 1] = c * r1 - s * r2;
  nav[QUAT + 2] = c * r2 + s * r1;
  nav[QUAT + 3] = c * r3 + s * r0;
}

/** P ← GPGᵀ, on the attitude G = R_z(−c_D)(I − ½[c_t×]) with the tilt part c_t of the correction (as long as P is wide). */
export function resetAttitudeCovariance(p: Float64Array, correction: Float64Array): void {
  const size = correction.length;
  const n = 0.5 * correction[ATTITUDE]!;
  const e = 0.5 * correction[ATTITUDE + 1]!;
  const d = correction[ATTITUDE + 2]!;
  if (n * n + e * e + d * d < 1e-14) return;
  const c = Math.cos(d);
  const s = Math.sin(d);
  const at = ATTITUDE * size;
  for (let j = 0; j < size; j += 1) {
    const x = p[at + j]!;
    const y = p[at + size + j]!;
    const z = p[at + 2 * size + j]!;
    const tx = x - e * z;
    const ty = y + n * z;
    p[at + j] = c * tx + s * ty;
    p[at + size + j] = c * ty - s * tx;
    p[at + 2 * size + j] = z - (n * y - e * x);
  }
  for (let i = 0; i < size; i += 1) {
    const row = i * size + ATTITUDE;
    const x = p[row]!;
    const y = p[row + 1]!;
    const z = p[row + 2]!;
    const tx = x - e * z;
    const ty = y + n * z;
    p[row] = c * tx + s * ty;
    p[row + 1] = c * ty - s * tx;
    p[row + 2] = z - (n * y - e * x);
  }
  // Equal to the last bit again.
  for (let i = ATTITUDE; i < GYRO_BIAS; i += 1)
    for (let j = ATTITUDE; j < i; j += 1) p[i * size + j] = p[j * size + i]!;
}
