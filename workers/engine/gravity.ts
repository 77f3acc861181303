/** Normal gravity of the WGS-84 ellipsoid. */
import { EARTH_RATE, WGS84_A, WGS84_B, WGS84_E2, WGS84_F, WGS84_GM } from './geodesy';

/** Local names: a global looked up in each call costs more than the call. */
const { sin, sqrt } = Math;

/** Normal gravity at the equator and at the poles, m/s² (NGA.STND.0036; the poles' to full digits by Moritz 2000's closed form). */
export const GAMMA_EQUATOR = 9.78032533590389;
export const GAMMA_POLE = 9.832184937863401;
const K = (WGS84_B * GAMMA_POLE) / (WGS84_A * GAMMA_EQUATOR) - 1;
const M = (EARTH_RATE * EARTH_RATE * WGS84_A * WGS84_A * WGS84_B) / WGS84_GM;

/**
 * Gravity along the ellipsoid's normal, m/s², positive down, at a geodetic latitude (rad) and a height (m):
 * Somigliana with the second-order height term (Heiskanen & Moritz 1967, eq. 2-124). Within 2e-6 m/s² of the closed
 * form up to 20 km.
 */
export function normalGravity(latRad: number, heightM: number): number {
  const s = sin(latRad);
  const s2 = s * s;
  const surface = (GAMMA_EQUATOR * (1 + K * s2)) / sqrt(1 - WGS84_E2 * s2);
  const x = heightM / WGS84_A;
  return surface * (1 - 2 * (1 + WGS84_F + M - 2 * WGS84_F * s2) * x + 3 * x * x);
}

/**
 * North component of gravity above the ellipsoid, m/s² (negative in the northern hemisphere: the plumb line bends):
 * first order in height, −8.1436e-9·sin 2φ·h. Within 1e-7 m/s² up to 10 km.
 */
export function normalGravityNorth(latRad: number, heightM: number): number {
  // γ_N = −(h/R)·∂γ/∂φ: the surface γ(φ) ≈ γ_e (1 + f* sin²φ), f* = (γ_p − γ_e)/γ_e.
  return -NORTH_RATE * sin(2 * latRad) * heightM;
}
const NORTH_RATE = 8.1436e-9;
