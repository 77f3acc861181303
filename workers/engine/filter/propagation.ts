/**
 * Propagation of the error covariance, P ← Φ(P + ½Q)Φᵀ + ½Q (trapezoidal process noise), over a covariance step.
 *
 * Φ is the second-order transition of the phi-angle error model (Titterton & Weston 2004, ch. 12; Groves 2013,
 * ch. 14, signs for computed minus true, position in metres), applied in the order attitude → velocity → position,
 * each step using the mean of the two ends of what it integrates: that is where the second-order terms
 * (velocity–gyro bias, position–attitude, position–accelerometer bias) come from. f_n and C enter as their integrals over the step.
 * Nothing but Φ's non-zero entries is touched.
 */
import { EARTH_RATE } from '../geodesy';
import { GRAVITY, MERIDIAN_PLUS_H, TRANSVERSE_PLUS_H } from '../strapdown/local-earth';
import { LAT, VD, VE, VN } from '../strapdown/navigation-state';
import type { Strapdown } from '../strapdown/strapdown';
import { ACCEL_BIAS, ATTITUDE, GYRO_BIAS, POSITION, STATES, VELOCITY } from './states';

/** Process noise of a filter: densities of white noise and of the biases, and the biases' decay. */
export interface ProcessNoise {
  /** N_g², rad²/s. */
  gyroWhite: number;
  /** N_a², m²/s³. */
  accelWhite: number;
}

/** Coefficients of Φ, already times the step: see `formTransition`. */
const C = {
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

export class Propagation {
  readonly transition = new Float64Array(C.size);
  private readonly product = new Float64Array(STATES * STATES);

  /**
   * Fills the transition from the sums that the strapdown gathered over the step and the state at its end.
   * `gyroDecayRate`, `accelDecayRate`: 1/τ of decaying biases, 1/s.
   */
  formTransition(strapdown: Strapdown, gyroDecayRate: number, accelDecayRate: number): void {
    const { nav, earth, sumDcm, sumForce } = strapdown;
    const t = this.transition;
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
    t[at + 5] =
      (vn * transportEPerD - ve * transportNPerD + 2 * earth[GRAVITY]! * Math.sqrt(perM * perN)) * dt;

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

  /**
   * y = Φx for the 15-vector that starts at `source[from]` with stride `step`, into `target[to…]`, contiguous.
   */
  private apply(source: Float64Array, from: number, step: number, target: Float64Array, to: number): void {
    const t = this.transition;
    const rn = source[from]!;
    const re = source[from + step]!;
    const rd = source[from + 2 * step]!;
    const vn = source[from + 3 * step]!;
    const ve = source[from + 4 * step]!;
    const vd = source[from + 5 * step]!;
    const pn = source[from + 6 * step]!;
    const pe = source[from + 7 * step]!;
    const pd = source[from + 8 * step]!;
    const gx = source[from + 9 * step]!;
    const gy = source[from + 10 * step]!;
    const gz = source[from + 11 * step]!;
    const ax = source[from + 12 * step]!;
    const ay = source[from + 13 * step]!;
    const az = source[from + 14 * step]!;

    // φ' = φ − ω_in×φ + δω_in + C b_g
    const pnNew =
      pn - t[24]! * pd + t[25]! * pe + t[26]! * rn + t[27]! * rd + t[31]! * ve +
      t[34]! * gx + t[35]! * gy + t[36]! * gz; // prettier-ignore
    const peNew =
      pe - t[25]! * pn + t[23]! * pd + t[28]! * rd + t[32]! * vn + t[37]! * gx + t[38]! * gy + t[39]! * gz;
    const pdNew =
      pd - t[23]! * pe + t[24]! * pn + t[29]! * rn + t[30]! * rd + t[33]! * ve +
      t[40]! * gx + t[41]! * gy + t[42]! * gz; // prettier-ignore

    // v' = v + f×φ − C b_a + Coriolis, transport and gravity terms
    const n = 0.5 * (pn + pnNew);
    const e = 0.5 * (pe + peNew);
    const d = 0.5 * (pd + pdNew);
    const vnNew =
      vn + t[5]! * vn + t[6]! * ve + t[7]! * vd + t[14]! * rn + t[15]! * rd + t[21]! * d - t[22]! * e -
      t[43]! * ax - t[44]! * ay - t[45]! * az; // prettier-ignore
    const veNew =
      ve + t[8]! * vn + t[9]! * ve + t[10]! * vd + t[16]! * rn + t[17]! * rd + t[22]! * n - t[20]! * d -
      t[46]! * ax - t[47]! * ay - t[48]! * az; // prettier-ignore
    const vdNew =
      vd + t[11]! * vn + t[12]! * ve + t[18]! * rn + t[19]! * rd + t[20]! * e - t[21]! * n -
      t[49]! * ax - t[50]! * ay - t[51]! * az; // prettier-ignore

    const half = t[52]!;
    target[to] = rn + t[0]! * rn + t[1]! * rd + half * (vn + vnNew);
    target[to + 1] = re + t[2]! * rn + t[3]! * re + t[4]! * rd + half * (ve + veNew);
    target[to + 2] = rd + half * (vd + vdNew);
    target[to + 3] = vnNew;
    target[to + 4] = veNew;
    target[to + 5] = vdNew;
    target[to + 6] = pnNew;
    target[to + 7] = peNew;
    target[to + 8] = pdNew;
    target[to + 9] = t[53]! * gx;
    target[to + 10] = t[53]! * gy;
    target[to + 11] = t[53]! * gz;
    target[to + 12] = t[54]! * ax;
    target[to + 13] = t[54]! * ay;
    target[to + 14] = t[54]! * az;
  }

  /**
   * P (15×15, row by row, symmetric) over the step that `formTransition` described. `halfNoise` (15): what to add to
   * the diagonal before and again after Φ.
   */
  propagate(p: Float64Array, halfNoise: Float64Array): void {
    const m = this.product;
    for (let i = 0; i < STATES; i += 1) p[i * 16] = p[i * 16]! + halfNoise[i]!;
    // Row c of m becomes column c of ΦP.
    for (let c = 0; c < STATES; c += 1) this.apply(p, c * STATES, 1, m, c * STATES);
    // Row i of P becomes Φ times row i of ΦP; the biases' rows follow from symmetry.
    for (let i = 0; i < GYRO_BIAS; i += 1) this.apply(m, i, STATES, p, i * STATES);
    this.biasRows(p);
    for (let i = 1; i < STATES; i += 1)
      for (let j = 0; j < Math.min(i, GYRO_BIAS); j += 1) p[i * STATES + j] = p[j * STATES + i]!;
    for (let i = 0; i < STATES; i += 1) p[i * 16] = p[i * 16]! + halfNoise[i]!;
  }

  /** Biases among themselves: only the decay acts. */
  private biasRows(p: Float64Array): void {
    const gyro = this.transition[C.gyroDecay]!;
    const accel = this.transition[C.accelDecay]!;
    if (gyro === 1 && accel === 1) return;
    for (let i = GYRO_BIAS; i < STATES; i += 1)
      for (let j = GYRO_BIAS; j < STATES; j += 1)
        p[i * STATES + j] =
          p[i * STATES + j]! * (i < ACCEL_BIAS ? gyro : accel) * (j < ACCEL_BIAS ? gyro : accel);
  }

  /** Φ as a dense matrix (15×15, row by row) in `out`: for the smoother, the tests and study. */
  dense(out: Float64Array): Float64Array {
    const unit = new Float64Array(STATES);
    const column = new Float64Array(STATES);
    for (let c = 0; c < STATES; c += 1) {
      unit.fill(0);
      unit[c] = 1;
      this.apply(unit, 0, 1, column, 0);
      for (let r = 0; r < STATES; r += 1) out[r * STATES + c] = column[r]!;
    }
    return out;
  }
}

/** Half of a step's noise on the diagonal: white noise on velocity and attitude, and the biases' own. */
export function fillHalfNoise(
  out: Float64Array,
  noise: ProcessNoise,
  dt: number,
  gyroBiasHalf: number,
  accelBiasHalf: number,
): void {
  for (let i = 0; i < 3; i += 1) {
    out[POSITION + i] = 0;
    out[VELOCITY + i] = 0.5 * noise.accelWhite * dt;
    out[ATTITUDE + i] = 0.5 * noise.gyroWhite * dt;
    out[GYRO_BIAS + i] = gyroBiasHalf;
    out[ACCEL_BIAS + i] = accelBiasHalf;
  }
}
