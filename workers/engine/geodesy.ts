/** WGS-84 ellipsoid: radii and conversions. Radians and metres throughout. */

/** Local names: a global looked up in each call costs more than the call. */
const { atan2, ceil, cos, hypot, sqrt } = Math;

/** Semi-major axis, m (NGA.STND.0036, WGS 84, table 3.1). */
export const WGS84_A = 6378137;
/** Flattening (same). */
export const WGS84_F = 1 / 298.257223563;
/** Gravitational constant with the atmosphere, m³/s² (same). */
export const WGS84_GM = 3.986004418e14;
/** Earth rotation rate, rad/s (same). */
export const EARTH_RATE = 7.292115e-5;
/** Semi-minor axis, m. */
export const WGS84_B = WGS84_A * (1 - WGS84_F);
/** First eccentricity squared. */
export const WGS84_E2 = WGS84_F * (2 - WGS84_F);

/** Radius of curvature in the meridian R_M, m, at a geodetic latitude in rad. */
export function meridianRadius(latRad: number): number {
  const s = Math.sin(latRad);
  const w2 = 1 - WGS84_E2 * s * s;
  return (WGS84_A * (1 - WGS84_E2)) / (w2 * sqrt(w2));
}

/** Radius of curvature in the prime vertical R_N, m, at a geodetic latitude in rad. */
export function transverseRadius(latRad: number): number {
  const s = Math.sin(latRad);
  return WGS84_A / sqrt(1 - WGS84_E2 * s * s);
}

/** Geodetic (rad, rad, m above the ellipsoid) to Earth-centred Earth-fixed x, y, z (m) in `out[0..2]`. */
export function geodeticToEcef(lat: number, lon: number, h: number, out: Float64Array): Float64Array {
  const s = Math.sin(lat);
  const c = cos(lat);
  const rn = WGS84_A / sqrt(1 - WGS84_E2 * s * s);
  out[0] = (rn + h) * c * cos(lon);
  out[1] = (rn + h) * c * Math.sin(lon);
  out[2] = (rn * (1 - WGS84_E2) + h) * s;
  return out;
}

/**
 * Earth-centred Earth-fixed (m) to geodetic latitude, longitude (rad), height (m) in `out[0..2]`.
 * Closed start after Bowring (1985), then two Newton steps on the parametric-latitude equation: to rounding for all
 * points more than about 45 km from the Earth's centre. On the polar axis the longitude is 0.
 */
export function ecefToGeodetic(x: number, y: number, z: number, out: Float64Array): Float64Array {
  const p = hypot(x, y);
  const tangent = reducedTangent(p, z);
  const sb = tangent.s;
  const cb = tangent.c;
  const k = 1 - WGS84_F;
  const lat = atan2(sb, k * cb);
  const s = Math.sin(lat);
  const c = cos(lat);
  out[0] = lat;
  out[1] = p === 0 ? 0 : atan2(y, x);
  // Projection on the normal from the foot point: free of the 0/0 of p / cos φ at the poles.
  out[2] = (p - WGS84_A * cb) * c + (z - WGS84_B * sb) * s;
  return out;
}

/**
 * Offset of a point from an origin, in the origin's own north–east–down axes (m), in `out[0..2]`: a straight
 * (chord) difference, exact for any distance.
 */
export function nedOffset(
  originLat: number,
  originLon: number,
  originH: number,
  lat: number,
  lon: number,
  h: number,
  out: Float64Array,
): Float64Array {
  // Differences are formed from half angles: no loss of digits for nearby points.
  const sO = Math.sin(originLat);
  const cO = cos(originLat);
  const s = Math.sin(lat);
  const c = cos(lat);
  const dLon = lon - originLon;
  const dLat = lat - originLat;
  const hav = 2 * Math.sin(dLon / 2) ** 2;
  const rO = WGS84_A / sqrt(1 - WGS84_E2 * sO * sO);
  const rP = WGS84_A / sqrt(1 - WGS84_E2 * s * s);
  const sinD = Math.sin(dLat);
  const versin = 2 * Math.sin(dLat / 2) ** 2;
  // Equatorial radius and height over the equator, of the point less the origin's.
  const rDiff = ((rO * rO * rP * rP) / (WGS84_A * WGS84_A * (rO + rP))) * WGS84_E2 * (s - sO) * (s + sO);
  const dh = h - originH;
  // Normal of the point in the origin's axes: (sin Δφ + s·cO·… , …).
  const nN = sinD + sO * c * hav;
  const nE = c * Math.sin(dLon);
  const nU = 1 - versin - cO * c * hav;
  // r_P − r_O = (R_P + h)·n_P − (R_O + h_O)·n_O − e²(R_P s − R_O sO)·ẑ
  const zTerm = WGS84_E2 * (rDiff * s + rO * (s - sO));
  out[0] = (rP + h) * nN - zTerm * cO;
  out[1] = (rP + h) * nE;
  out[2] = -((rDiff + dh) * nU - (rO + originH) * (1 - nU) - zTerm * sO);
  return out;
}

/** Reverse of `nedOffset`: latitude, longitude (rad), height (m) of a point north, east, down (m) of an origin. */
export function nedToGeodetic(
  originLat: number,
  originLon: number,
  originH: number,
  north: number,
  east: number,
  down: number,
  out: Float64Array,
): Float64Array {
  const sO = Math.sin(originLat);
  const cO = cos(originLat);
  const rO = WGS84_A / sqrt(1 - WGS84_E2 * sO * sO);
  // In axes turned to the origin's meridian, so that the longitude difference keeps its digits.
  const x = (rO + originH) * cO - sO * north - cO * down;
  const z = (rO * (1 - WGS84_E2) + originH) * sO + cO * north - sO * down;
  ecefToGeodetic(x, east, z, out);
  out[1] = wrapAngle(out[1]! + originLon);
  return out;
}

/** Angle in rad to (−π, π]. */
export function wrapAngle(rad: number): number {
  if (rad > -Math.PI && rad <= Math.PI) return rad;
  const turns = ceil((rad - Math.PI) / (2 * Math.PI));
  return rad - 2 * Math.PI * turns;
}

/** Sine and cosine of the reduced latitude of the foot point of (p, z) on the ellipsoid. */
function reducedTangent(p: number, z: number): { s: number; c: number } {
  const k = 1 - WGS84_F;
  const ep2b = (WGS84_E2 / (k * k)) * WGS84_B;
  const ae2 = WGS84_E2 * WGS84_A;
  // First guess of the reduced latitude; height enters through r (Bowring 1985).
  const r = hypot(p, z);
  let s = k * z * (1 + (r === 0 ? 0 : ep2b / r));
  let c = p;
  let n = hypot(s, c) || 1;
  s /= n;
  c /= n;
  for (let i = 0; i < 3; i += 1) {
    // Bowring (1976): tan φ = (z + e'² b sin³β) / (p − e² a cos³β); tan β = (1 − f) tan φ.
    const top = k * (z + ep2b * s * s * s);
    const bottom = p - ae2 * c * c * c;
    n = hypot(top, bottom) || 1;
    s = top / n;
    c = bottom / n;
  }
  return { s, c };
}
