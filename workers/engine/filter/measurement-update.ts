/**
 * Update of state and covariance by up to three scalar measurements at once.
 *
 * Model: innovation ν = measured − predicted = −H·δx + w, w with diagonal R. The correction to *add* to the computed
 * state is Kν (position, velocity, biases; the attitude error's sign is seen to where it is fed back).
 * The covariance takes Joseph's form, (I − KH)P(I − KH)ᵀ + KRKᵀ, ordered so that H's empty columns cost nothing
 * (Bucy & Joseph 1968; Bar-Shalom, Li, Kirubarajan 2001, § 5.2).
 */
import { STATES } from './states';

export const MAX_ROWS = 3;

/** For the fifteen states; sizes are constants here, as in Propagation. With more of them, WideUpdate. */
export class MeasurementUpdate {
  /** Rows in use, 1…3; the others measure nothing. */
  rows = 0;
  /** H, row by row, MAX_ROWS × size. Columns not in `columns` must be 0. */
  readonly h: Float64Array;
  /** Columns of H that may hold something, and how many of them count. */
  readonly columns: Int32Array;
  columnCount = 0;
  /** Diagonal of R. */
  readonly r = new Float64Array(MAX_ROWS);
  readonly innovation = new Float64Array(MAX_ROWS);
  /** S = HPHᵀ + R, row by row, after `prepare`. */
  readonly s = new Float64Array(MAX_ROWS * MAX_ROWS);
  /** νᵀS⁻¹ν after `prepare`. */
  nis = 0;
  /** Kν after `apply`: what to add to the state. */
  readonly correction: Float64Array;
  /** K, row by row, size × MAX_ROWS, after `apply`. */
  readonly gain: Float64Array;
  private readonly ph: Float64Array;
  /** S⁻¹, row by row, after `prepare`. */
  readonly inverse = new Float64Array(MAX_ROWS * MAX_ROWS);
  private readonly otherPh: Float64Array;
  private readonly otherS = new Float64Array(MAX_ROWS * MAX_ROWS);

  /** `size`: number of states; rows of H and P are that long. */
  constructor(readonly size: number = STATES) {
    this.h = new Float64Array(MAX_ROWS * size);
    this.columns = new Int32Array(size);
    this.correction = new Float64Array(size);
    this.gain = new Float64Array(size * MAX_ROWS);
    this.ph = new Float64Array(size * MAX_ROWS);
    this.otherPh = new Float64Array(size * MAX_ROWS);
  }

  /** Clears H and says which of its columns will be filled. Rows that are not in use measure nothing: H 0, R 1. */
  begin(rows: number, columns: readonly number[]): void {
    this.rows = rows;
    this.h.fill(0);
    this.columnCount = columns.length;
    for (let i = 0; i < columns.length; i += 1) this.columns[i] = columns[i]!;
    for (let m = rows; m < MAX_ROWS; m += 1) {
      this.r[m] = 1;
      this.innovation[m] = 0;
    }
  }

  /** PHᵀ, S, its inverse and the NIS; P (size × size) is only read. */
  prepare(p: Float64Array): void {
    const { ph, s, innovation } = this;
    this.project(p, ph);
    this.innovationCovariance(ph, s);
    invertSymmetric(s, this.inverse);
    this.nis = quadratic(this.inverse, innovation);
  }

  /** After `prepare`: K, the correction, and P in place. */
  apply(p: Float64Array): void {
    this.formGain(this.ph);
    this.joseph(p, this.ph, this.s);
  }

  /** K = PHᵀS⁻¹ and Kν. */
  protected formGain(ph: Float64Array): void {
    const { gain, inverse, innovation, correction } = this;
    const i00 = inverse[0]!;
    const i01 = inverse[1]!;
    const i02 = inverse[2]!;
    const i11 = inverse[4]!;
    const i12 = inverse[5]!;
    const i22 = inverse[8]!;
    for (let i = 0; i < STATES; i += 1) {
      const at = i * MAX_ROWS;
      const a = ph[at]!;
      const b = ph[at + 1]!;
      const c = ph[at + 2]!;
      const ka = a * i00 + b * i01 + c * i02;
      const kb = a * i01 + b * i11 + c * i12;
      const kc = a * i02 + b * i12 + c * i22;
      gain[at] = ka;
      gain[at + 1] = kb;
      gain[at + 2] = kc;
      correction[i] = ka * innovation[0]! + kb * innovation[1]! + kc * innovation[2]!;
    }
  }

  /** After `apply`: the same gain on another covariance, with the measurements' noise or without. */
  applyGain(p: Float64Array, withNoise: boolean): void {
    const { otherPh, otherS, r } = this;
    this.project(p, otherPh);
    this.innovationCovariance(otherPh, otherS);
    if (!withNoise) for (let m = 0; m < MAX_ROWS; m += 1) otherS[m * 4] = otherS[m * 4]! - r[m]!;
    this.joseph(p, otherPh, otherS);
  }

  /**
   * Joseph's form multiplied out, P − K(HP) + (KS − PHᵀ)Kᵀ with S = HPHᵀ + R: what it adds to the short form is of second
   * order in an error of K. Upper triangle, then mirrored.
   */
  protected joseph(p: Float64Array, ph: Float64Array, s: Float64Array): void {
    const { gain } = this;
    for (let i = 0; i < STATES; i += 1) {
      const row = i * STATES;
      const own = i * MAX_ROWS;
      const ka = gain[own]!;
      const kb = gain[own + 1]!;
      const kc = gain[own + 2]!;
      const ra = ka * s[0]! + kb * s[3]! + kc * s[6]! - ph[own]!;
      const rb = ka * s[1]! + kb * s[4]! + kc * s[7]! - ph[own + 1]!;
      const rc = ka * s[2]! + kb * s[5]! + kc * s[8]! - ph[own + 2]!;
      for (let j = i; j < STATES; j += 1) {
        const at = j * MAX_ROWS;
        const value =
          p[row + j]! -
          (ka * ph[at]! + kb * ph[at + 1]! + kc * ph[at + 2]!) +
          (ra * gain[at]! + rb * gain[at + 1]! + rc * gain[at + 2]!);
        p[row + j] = value;
        p[j * STATES + i] = value;
      }
    }
  }

  /** out = PHᵀ, size × MAX_ROWS. */
  protected project(p: Float64Array, out: Float64Array): void {
    const { h, columns, columnCount } = this;
    for (let i = 0; i < STATES; i += 1) {
      const row = i * STATES;
      let a = 0;
      let b = 0;
      let c = 0;
      for (let n = 0; n < columnCount; n += 1) {
        const j = columns[n]!;
        const value = p[row + j]!;
        a += value * h[j]!;
        b += value * h[STATES + j]!;
        c += value * h[2 * STATES + j]!;
      }
      out[i * MAX_ROWS] = a;
      out[i * MAX_ROWS + 1] = b;
      out[i * MAX_ROWS + 2] = c;
    }
  }

  /** out = H(PHᵀ) + R. */
  protected innovationCovariance(ph: Float64Array, out: Float64Array): void {
    const { h, columns, columnCount, r } = this;
    for (let a = 0; a < MAX_ROWS; a += 1)
      for (let b = a; b < MAX_ROWS; b += 1) {
        let sum = a === b ? r[a]! : 0;
        for (let n = 0; n < columnCount; n += 1) {
          const j = columns[n]!;
          sum += h[a * STATES + j]! * ph[j * MAX_ROWS + b]!;
        }
        out[a * MAX_ROWS + b] = sum;
        out[b * MAX_ROWS + a] = sum;
      }
  }
}

function quadratic(inverse: Float64Array, nu: Float64Array): number {
  const [a, b, c] = [nu[0]!, nu[1]!, nu[2]!];
  return (
    a * a * inverse[0]! +
    b * b * inverse[4]! +
    c * c * inverse[8]! +
    2 * (a * b * inverse[1]! + a * c * inverse[2]! + b * c * inverse[5]!)
  );
}

/** Inverse of a symmetric positive definite 3×3 matrix, row by row, by cofactors. */
function invertSymmetric(s: Float64Array, out: Float64Array): void {
  const a = s[0]!;
  const b = s[1]!;
  const c = s[2]!;
  const d = s[4]!;
  const e = s[5]!;
  const f = s[8]!;
  const c00 = d * f - e * e;
  const c01 = c * e - b * f;
  const c02 = b * e - c * d;
  const det = 1 / (a * c00 + b * c01 + c * c02);
  out[0] = c00 * det;
  out[1] = c01 * det;
  out[2] = c02 * det;
  out[3] = out[1]!;
  out[4] = (a * f - c * c) * det;
  out[5] = (b * c - a * e) * det;
  out[6] = out[2]!;
  out[7] = out[5]!;
  out[8] = (a * d - b * b) * det;
}
