/**
 * The non-zero entries of Φ over a covariance step (phi-angle error model: Titterton & Weston 2004, ch. 12; Groves 2013,
 * ch. 14), signs for computed minus true, position in metres.
 */
import { EARTH_RATE } from '../geodesy';
import { GRAVITY, MERIDIAN_PLUS_H, TRANSVERSE_PLUS_H } from '../strapdown/local-earth';
import { LAT, VD, VE, VN } from '../strapdown/navigation-state';

/** Coefficients of Φ, already times the step: see `formCoefficients`. */
export const COEFFICIENTS = {
  positionFromPosition: 0, // NN, ND, EN, EE, ED
  velocityFromVelocity: 5, // row by row
  velocityFromPosition: 14, // N: N D, E: N D, D: N D
  force: 20, // ∫f_n dt
  attitudeFromAttitude: 23, // ω_in dt
  attitudeFromPosition: 26, // N: N D, E: D, D: N D
  attitudeFromVelocity: 31, // N: E, E: N, D: E
  gyroAxes: 34, // ∫C dt of the gyro biases
  accelAxes: 43, // ∫C dt of the accelerometer biases
  halfStep: 52,
  gyroDecay: 53,
  accelDecay: 54,
  size: 55,
} as const;
const C = COEFFICIENTS;

/** What a transition is formed from: the strapdown itself, or what was kept of it. */
export interface TransitionSource {
  readonly nav: Float64Array;
  readonly earth: Float64Array;
  readonly sumDcm: Float64Array;
  readonly sumForce: Float64Array;
  /** With scale factors as states: ∫ω dt (rad) and ∫f dt (m/s) about the body's axes, biases not taken off. */
  readonly sumMeasured?: Float64Array;
}

/**
 * Fills `t` from the sums that the strapdown gathered over the step and the state at its end.
 * `gyroDecayRate`, `accelDecayRate`: 1/τ of decaying biases, 1/s.
 */
export function formCoefficients(
  t: Float64Array,
  source: TransitionSource,
  gyroDecayRate: number,
  accelDecayRate: number,
): void {
  const { nav, earth, sumDcm, sumForce } = source;
  const dt = sumForce[3]!;
  const vn = nav[VN]!;
  const ve = nav[VE]!;
  const vd = nav[VD]!;
  const sinLat = Math.sin(nav[LAT]!);
  const cosLat = Math.cos(nav[LAT]!);
  const tanLat = sinLat / cosLat;
  const perM = 1 / earth[MERIDIAN_PLUS_H]!;
  const perN = 1 / earth[TRANSVERSE_PLUS_H]!;
  const earthN = EARTH_RATE * cosLat;
  const earthD = -EARTH_RATE * sinLat;
  const transportN = ve * perN;
  const transportE = -vn * perM;
  const transportD = -ve * perN * tanLat;

  let at: number = C.positionFromPosition;
  t[at] = -vd * perM * dt;
  t[at + 1] = vn * perM * dt;
  t[at + 2] = ve * tanLat * perM * dt;
  t[at + 3] = -(vd * perN + tanLat * vn * perM) * dt;
  t[at + 4] = ve * perN * dt;

  // −(2ω_ie + ω_en)×δv and v×δω_en(δv).
  const wn = 2 * earthN + transportN;
  const we = transportE;
  const wd = 2 * earthD + transportD;
  at = C.velocityFromVelocity;
  t[at] = vd * perM * dt;
  t[at + 1] = (wd - ve * tanLat * perN) * dt;
  t[at + 2] = -we * dt;
  t[at + 3] = -wd * dt;
  t[at + 4] = (vd + vn * tanLat) * perN * dt;
  t[at + 5] = wn * dt;
  t[at + 6] = (we - vn * perM) * dt;
  t[at + 7] = -(wn + ve * perN) * dt;
  t[at + 8] = 0;

  // Change of ω_ie with δr_N, of ω_en with δr_N and δr_D.
  const earthNPerN = -EARTH_RATE * sinLat * perM;
  const earthDPerN = -EARTH_RATE * cosLat * perM;
  const transportDPerN = (-ve * perN * perM) / (cosLat * cosLat);
  const transportNPerD = ve * perN * perN;
  const transportEPerD = -vn * perM * perM;
  const transportDPerD = -ve * tanLat * perN * perN;
  // v × (2δω_ie + δω_en), and gravity's gradient 2g/R.
  const turnN = 2 * earthNPerN;
  const turnD = 2 * earthDPerN + transportDPerN;
  at = C.velocityFromPosition;
  t[at] = ve * turnD * dt;
  t[at + 1] = (ve * transportDPerD - vd * transportEPerD) * dt;
  t[at + 2] = (vd * turnN - vn * turnD) * dt;
  t[at + 3] = (vd * transportNPerD - vn * transportDPerD) * dt;
  t[at + 4] = -ve * turnN * dt;
  t[at + 5] = (vn * transportEPerD - ve * transportNPerD + 2 * earth[GRAVITY]! * Math.sqrt(perM * perN)) * dt;

  for (let i = 0; i < 3; i += 1) t[C.force + i] = sumForce[i]!;

  at = C.attitudeFromAttitude;
  t[at] = (earthN + transportN) * dt;
  t[at + 1] = transportE * dt;
  t[at + 2] = (earthD + transportD) * dt;
  at = C.attitudeFromPosition;
  t[at] = earthNPerN * dt;
  t[at + 1] = transportNPerD * dt;
  t[at + 2] = transportEPerD * dt;
  t[at + 3] = (earthDPerN + transportDPerN) * dt;
  t[at + 4] = transportDPerD * dt;
  at = C.attitudeFromVelocity;
  t[at] = perN * dt;
  t[at + 1] = -perM * dt;
  t[at + 2] = -tanLat * perN * dt;

  // A decaying bias acts on the step with its mean, 1 − dt/2τ.
  const gyroMean = 1 - 0.5 * gyroDecayRate * dt;
  const accelMean = 1 - 0.5 * accelDecayRate * dt;
  for (let i = 0; i < 9; i += 1) {
    t[C.gyroAxes + i] = sumDcm[i]! * gyroMean;
    t[C.accelAxes + i] = sumDcm[i]! * accelMean;
  }
  t[C.halfStep] = 0.5 * dt;
  t[C.gyroDecay] = Math.exp(-gyroDecayRate * dt);
  t[C.accelDecay] = Math.exp(-accelDecayRate * dt);
}
