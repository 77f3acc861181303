/** What ideal inertial sensors feel: body rate and specific force of a motion over the turning Earth. */
import { EARTH_RATE, WGS84_A, WGS84_E2 } from '../geodesy';
import { normalGravity } from '../gravity';
import type { Kinematics } from './motion';

/** Local names: a global looked up in each call costs more than the call. */
const { cos, sin, sqrt } = Math;

/** Rates and forces at one instant. */
export interface BodyMotion {
  /** Rate against inertial space in body axes, rad/s. */
  wx: number;
  wy: number;
  wz: number;
  /** Specific force in body axes, m/s². */
  fx: number;
  fy: number;
  fz: number;
  /** Rates of latitude, longitude (rad/s) and height (m/s). */
  latRate: number;
  lonRate: number;
  heightRate: number;
}

export const newBodyMotion = (): BodyMotion => ({
  wx: 0,
  wy: 0,
  wz: 0,
  fx: 0,
  fy: 0,
  fz: 0,
  latRate: 0,
  lonRate: 0,
  heightRate: 0,
});

/**
 * The navigation equations read backwards (Titterton & Weston 2004, ch. 3):
 * f_n = v̇ + (2ω_ie + ω_en) × v − g, ω_ib = ω_nb + Cᵀ(ω_ie + ω_en). Gravity is `normalGravity` straight down, as in the
 * mechanisation. Latitude in rad, height in m.
 */
export function bodyMotion(k: Kinematics, lat: number, height: number, out: BodyMotion): BodyMotion {
  const sl = sin(lat);
  const cl = cos(lat);
  const w2 = 1 - WGS84_E2 * sl * sl;
  const rn = WGS84_A / sqrt(w2);
  const rm = (rn * (1 - WGS84_E2)) / w2;
  const { vn, ve, vd } = k;
  out.latRate = vn / (rm + height);
  out.lonRate = ve / ((rn + height) * cl);
  out.heightRate = -vd;
  const enN = ve / (rn + height);
  const enE = -out.latRate;
  const enD = -enN * (sl / cl);
  const ieN = EARTH_RATE * cl;
  const ieD = -EARTH_RATE * sl;
  const cN = 2 * ieN + enN;
  const cD = 2 * ieD + enD;
  const fN = k.an + enE * vd - cD * ve;
  const fE = k.ae + cD * vn - cN * vd;
  const fD = k.ad + cN * ve - enE * vn - normalGravity(lat, height);
  const inN = ieN + enN;
  const inD = ieD + enD;

  const sr = sin(k.roll);
  const cr = cos(k.roll);
  const sp = sin(k.pitch);
  const cp = cos(k.pitch);
  const sy = sin(k.yaw);
  const cy = cos(k.yaw);
  // Rows of b←n.
  const xN = cp * cy;
  const xE = cp * sy;
  const yN = sr * sp * cy - cr * sy;
  const yE = sr * sp * sy + cr * cy;
  const yD = sr * cp;
  const zN = cr * sp * cy + sr * sy;
  const zE = cr * sp * sy - sr * cy;
  const zD = cr * cp;
  out.fx = xN * fN + xE * fE - sp * fD;
  out.fy = yN * fN + yE * fE + yD * fD;
  out.fz = zN * fN + zE * fE + zD * fD;
  out.wx = k.rollRate - k.yawRate * sp + xN * inN + xE * enE - sp * inD;
  out.wy = k.pitchRate * cr + k.yawRate * sr * cp + yN * inN + yE * enE + yD * inD;
  out.wz = -k.pitchRate * sr + k.yawRate * cr * cp + zN * inN + zE * enE + zD * inD;
  return out;
}
