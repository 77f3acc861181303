/** Radii and gravity from the sine of latitude: the strapdown has the sine at hand and needs all three at each sample. */
import { EARTH_RATE, WGS84_A, WGS84_B, WGS84_E2, WGS84_F, WGS84_GM } from '../geodesy';
import { GAMMA_EQUATOR, GAMMA_POLE } from '../gravity';

const SOMIGLIANA_K = (WGS84_B * GAMMA_POLE) / (WGS84_A * GAMMA_EQUATOR) - 1;
const PER_A = 1 / WGS84_A;
const RATE_M = (EARTH_RATE * EARTH_RATE * WGS84_A * WGS84_A * WGS84_B) / WGS84_GM;

/** Offsets into the result of `localEarth`. */
export const MERIDIAN_PLUS_H = 0;
export const TRANSVERSE_PLUS_H = 1;
export const GRAVITY = 2;

/**
 * Fills `out` with R_M + h and R_N + h (m) and normal gravity (m/s², positive down) for the square of the sine of
 * geodetic latitude and a height (m). The same formulas as `meridianRadius`, `transverseRadius`, `normalGravity`
 * (WGS-84, Somigliana with the second-order height term), sharing one square root.
 */
export function localEarth(sinLatSquared: number, heightM: number, out: Float64Array): void {
  const w2 = 1 - WGS84_E2 * sinLatSquared;
  const inverseRoot = 1 / Math.sqrt(w2);
  const transverse = WGS84_A * inverseRoot;
  const x = heightM * PER_A;
  const heightFactor = 1 - 2 * (1 + WGS84_F + RATE_M - 2 * WGS84_F * sinLatSquared) * x + 3 * x * x;
  out[MERIDIAN_PLUS_H] = (transverse * (1 - WGS84_E2)) / w2 + heightM;
  out[TRANSVERSE_PLUS_H] = transverse + heightM;
  out[GRAVITY] = GAMMA_EQUATOR * (1 + SOMIGLIANA_K * sinLatSquared) * inverseRoot * heightFactor;
}
