/**
 * Between the attitude error φ (in n, computed minus true, Ĉ = (I − [φ×])C) and errors of roll, pitch, yaw.
 * A small turn of the body by −φ in n changes the Euler angles by
 *   δroll = −(φ_N cos ψ + φ_E sin ψ)/cos θ,  δpitch = φ_N sin ψ − φ_E cos ψ,
 *   δyaw = −φ_D − tan θ (φ_N cos ψ + φ_E sin ψ)
 * (Titterton & Weston 2004, § 3.6).
 */
import { ATTITUDE, sizeOf } from '../filter/states';

/** Nearer to the vertical than this the Euler angles lose their meaning; σ stay finite. */
const MIN_COS_PITCH = 1e-3;

/** 1σ of roll, pitch, yaw (rad) in `out` from a covariance. */
export function eulerSigmas(p: Float64Array, pitch: number, yaw: number, out: Float64Array): Float64Array {
  const cosYaw = Math.cos(yaw);
  const sinYaw = Math.sin(yaw);
  const cosPitch = Math.max(MIN_COS_PITCH, Math.cos(pitch));
  const tanPitch = Math.sin(pitch) / cosPitch;
  const size = sizeOf(p);
  out[0] = sigmaAlong(p, size, cosYaw / cosPitch, sinYaw / cosPitch, 0);
  out[1] = sigmaAlong(p, size, sinYaw, -cosYaw, 0);
  out[2] = sigmaAlong(p, size, tanPitch * cosYaw, tanPitch * sinYaw, 1);
  return out;
}

function sigmaAlong(p: Float64Array, size: number, n: number, e: number, d: number): number {
  const at = ATTITUDE * size + ATTITUDE;
  const nn = p[at]!;
  const ne = p[at + 1]!;
  const nd = p[at + 2]!;
  const ee = p[at + size + 1]!;
  const ed = p[at + size + 2]!;
  const dd = p[at + 2 * size + 2]!;
  const variance = n * n * nn + e * e * ee + d * d * dd + 2 * (n * e * ne + n * d * nd + e * d * ed);
  return Math.sqrt(Math.max(0, variance));
}

/** Covariance of φ (3×3, row by row, rad²) from independent variances of roll, pitch, yaw (rad²). */
export function tiltFromEulerVariance(
  variance: readonly [number, number, number],
  pitch: number,
  yaw: number,
): Float64Array {
  const cosPitch = Math.cos(pitch);
  // −φ = roll·(body x axis in n) + pitch·(level y axis) + yaw·(down).
  const axes = [
    [cosPitch * Math.cos(yaw), cosPitch * Math.sin(yaw), -Math.sin(pitch)],
    [-Math.sin(yaw), Math.cos(yaw), 0],
    [0, 0, 1],
  ];
  const out = new Float64Array(9);
  for (let i = 0; i < 3; i += 1)
    for (let j = 0; j < 3; j += 1)
      for (let k = 0; k < 3; k += 1)
        out[3 * i + j] = out[3 * i + j]! + variance[k]! * axes[k]![i]! * axes[k]![j]!;
  return out;
}
