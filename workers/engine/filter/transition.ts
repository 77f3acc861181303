/**
 * The transition Φ of the error states over a covariance step.
 *
 * Φ is the second-order transition of the phi-angle error model (Titterton & Weston 2004, ch. 12; Groves 2013,
 * ch. 14, signs for computed minus true, position in metres), applied in the order attitude → velocity → position,
 * each step using the mean of the two ends of what it integrates: that is where the second-order terms
 * (velocity–gyro bias, position–attitude, position–accelerometer bias) come from. f_n and C enter as their integrals
 * over the step. Nothing but Φ's non-zero entries is touched.
 */
import { STATES } from './states';
import { COEFFICIENTS as C, formCoefficients, type TransitionSource } from './transition-coefficients';

export class Transition {
  /** Number of states. */
  readonly size: number = STATES;
  /** Coefficients, see transition-coefficients.ts. */
  readonly coefficients = new Float64Array(C.size);
  /** For `dense`: the identity, and what it becomes. */
  private unit: Float64Array | null = null;
  private columns: Float64Array | null = null;

  /**
   * Fills the transition from the sums that the strapdown gathered over the step and the state at its end.
   * `gyroDecayRate`, `accelDecayRate`: 1/τ of decaying biases, 1/s.
   */
  form(source: TransitionSource, gyroDecayRate: number, accelDecayRate: number): void {
    formCoefficients(this.coefficients, source, gyroDecayRate, accelDecayRate);
  }

  /**
   * y = Φx for `count` vectors of states: vector v has its elements at v·vectorStep + i·elementStep of `source`; results go
   * one after the other into `target`.
   */
  apply(
    source: Float64Array,
    vectorStep: number,
    elementStep: number,
    target: Float64Array,
    count: number,
  ): void {
    this.attitudeRows(source, vectorStep, elementStep, target, count);
    this.velocityRows(source, vectorStep, elementStep, target, count);
    this.positionAndBiasRows(source, vectorStep, elementStep, target, count);
  }

  /** φ' = φ − ω_in×φ + δω_in(δr, δv) + C δb_g */
  private attitudeRows(x: Float64Array, vectorStep: number, s: number, y: Float64Array, count: number): void {
    const t = this.coefficients;
    const wn = t[23]!;
    const we = t[24]!;
    const wd = t[25]!;
    const nByN = t[26]!;
    const nByD = t[27]!;
    const eByD = t[28]!;
    const dByN = t[29]!;
    const dByD = t[30]!;
    const nByVe = t[31]!;
    const eByVn = t[32]!;
    const dByVe = t[33]!;
    const c00 = t[34]!;
    const c01 = t[35]!;
    const c02 = t[36]!;
    const c10 = t[37]!;
    const c11 = t[38]!;
    const c12 = t[39]!;
    const c20 = t[40]!;
    const c21 = t[41]!;
    const c22 = t[42]!;
    for (let v = 0; v < count; v += 1) {
      const at = v * vectorStep;
      const to = v * STATES;
      const rn = x[at]!;
      const rd = x[at + 2 * s]!;
      const ve = x[at + 4 * s]!;
      const pn = x[at + 6 * s]!;
      const pe = x[at + 7 * s]!;
      const pd = x[at + 8 * s]!;
      const gx = x[at + 9 * s]!;
      const gy = x[at + 10 * s]!;
      const gz = x[at + 11 * s]!;
      y[to + 6] =
        pn - we * pd + wd * pe + nByN * rn + nByD * rd + nByVe * ve + c00 * gx + c01 * gy + c02 * gz;
      y[to + 7] =
        pe - wd * pn + wn * pd + eByD * rd + eByVn * x[at + 3 * s]! + c10 * gx + c11 * gy + c12 * gz;
      y[to + 8] =
        pd - wn * pe + we * pn + dByN * rn + dByD * rd + dByVe * ve + c20 * gx + c21 * gy + c22 * gz;
    }
  }

  /** v' = v + f×½(φ + φ') − C δb_a + Coriolis, transport and gravity terms in δv and δr; φ' is in `y` already. */
  private velocityRows(x: Float64Array, vectorStep: number, s: number, y: Float64Array, count: number): void {
    const t = this.coefficients;
    const nn = 1 + t[5]!;
    const ne = t[6]!;
    const nd = t[7]!;
    const en = t[8]!;
    const ee = 1 + t[9]!;
    const ed = t[10]!;
    const dn = t[11]!;
    const de = t[12]!;
    const nByN = t[14]!;
    const nByD = t[15]!;
    const eByN = t[16]!;
    const eByD = t[17]!;
    const dByN = t[18]!;
    const dByD = t[19]!;
    const fn = 0.5 * t[20]!;
    const fe = 0.5 * t[21]!;
    const fd = 0.5 * t[22]!;
    for (let v = 0; v < count; v += 1) {
      const at = v * vectorStep;
      const to = v * STATES;
      const rn = x[at]!;
      const rd = x[at + 2 * s]!;
      const vn = x[at + 3 * s]!;
      const ve = x[at + 4 * s]!;
      const vd = x[at + 5 * s]!;
      const pn = x[at + 6 * s]! + y[to + 6]!;
      const pe = x[at + 7 * s]! + y[to + 7]!;
      const pd = x[at + 8 * s]! + y[to + 8]!;
      y[to + 3] = nn * vn + ne * ve + nd * vd + nByN * rn + nByD * rd + fe * pd - fd * pe;
      y[to + 4] = en * vn + ee * ve + ed * vd + eByN * rn + eByD * rd + fd * pn - fn * pd;
      y[to + 5] = dn * vn + de * ve + vd + dByN * rn + dByD * rd + fn * pe - fe * pn;
    }
    const c00 = t[43]!;
    const c01 = t[44]!;
    const c02 = t[45]!;
    const c10 = t[46]!;
    const c11 = t[47]!;
    const c12 = t[48]!;
    const c20 = t[49]!;
    const c21 = t[50]!;
    const c22 = t[51]!;
    for (let v = 0; v < count; v += 1) {
      const at = v * vectorStep;
      const to = v * STATES;
      const ax = x[at + 12 * s]!;
      const ay = x[at + 13 * s]!;
      const az = x[at + 14 * s]!;
      y[to + 3] = y[to + 3]! - c00 * ax - c01 * ay - c02 * az;
      y[to + 4] = y[to + 4]! - c10 * ax - c11 * ay - c12 * az;
      y[to + 5] = y[to + 5]! - c20 * ax - c21 * ay - c22 * az;
    }
  }

  /** r' = r + ½Δt(v + v') and curvature; biases decay. v' is in `y` already. */
  private positionAndBiasRows(
    x: Float64Array,
    vectorStep: number,
    s: number,
    y: Float64Array,
    count: number,
  ): void {
    const t = this.coefficients;
    const nn = 1 + t[0]!;
    const nd = t[1]!;
    const en = t[2]!;
    const ee = 1 + t[3]!;
    const ed = t[4]!;
    const half = t[52]!;
    const gyro = t[53]!;
    const accel = t[54]!;
    for (let v = 0; v < count; v += 1) {
      const at = v * vectorStep;
      const to = v * STATES;
      const rn = x[at]!;
      const rd = x[at + 2 * s]!;
      y[to] = nn * rn + nd * rd + half * (x[at + 3 * s]! + y[to + 3]!);
      y[to + 1] = en * rn + ee * x[at + s]! + ed * rd + half * (x[at + 4 * s]! + y[to + 4]!);
      y[to + 2] = rd + half * (x[at + 5 * s]! + y[to + 5]!);
      y[to + 9] = gyro * x[at + 9 * s]!;
      y[to + 10] = gyro * x[at + 10 * s]!;
      y[to + 11] = gyro * x[at + 11 * s]!;
      y[to + 12] = accel * x[at + 12 * s]!;
      y[to + 13] = accel * x[at + 13 * s]!;
      y[to + 14] = accel * x[at + 14 * s]!;
    }
  }

  /** 1/τ-decay of gyro and accelerometer biases over the step, as factors. */
  get gyroDecay(): number {
    return this.coefficients[C.gyroDecay]!;
  }
  get accelDecay(): number {
    return this.coefficients[C.accelDecay]!;
  }

  /** Φ as a dense matrix (size × size, row by row) in `out`: for the smoother, the tests and study. */
  dense(out: Float64Array): Float64Array {
    const { size } = this;
    this.unit ??= identity(size);
    this.columns ??= new Float64Array(size * size);
    const { columns } = this;
    this.apply(this.unit, size, 1, columns, size);
    for (let r = 0, row = 0; r < size; r += 1, row += size)
      for (let c = 0, at = r; c < size; c += 1, at += size) out[row + c] = columns[at]!;
    return out;
  }
}

function identity(size: number): Float64Array {
  const unit = new Float64Array(size * size);
  for (let i = 0; i < size; i += 1) unit[i * (size + 1)] = 1;
  return unit;
}
