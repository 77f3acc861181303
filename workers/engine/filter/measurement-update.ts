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

export class MeasurementUpdate {
  /** Rows in use, 1…3. */
  rows = 0;
  /** H, row by row, MAX_ROWS × 15. Columns not in `columns` must be 0. */
  readonly h = new Float64Array(MAX_ROWS * STATES);
  /** Columns of H that may hold something, and how many of them count. */
  readonly columns = new Int32Array(STATES);
  columnCount = 0;
  /** Diagonal of R. */
  readonly r = new Float64Array(MAX_ROWS);
  readonly innovation = new Float64Array(MAX_ROWS);
  /** S = HPHᵀ + R, row by row, after `prepare`. */
  readonly s = new Float64Array(MAX_ROWS * MAX_ROWS);
  /** νᵀS⁻¹ν after `prepare`. */
  nis = 0;
  /** Kν after `apply`: what to add to the state. */
  readonly correction = new Float64Array(STATES);
  /** K, row by row, 15 × MAX_ROWS, after `apply`. */
  readonly gain = new Float64Array(STATES * MAX_ROWS);
  private readonly ph = new Float64Array(STATES * MAX_ROWS);
  private readonly inverse = new Float64Array(MAX_ROWS * MAX_ROWS);
  private readonly reduced = new Float64Array(STATES * STATES);
  private readonly rest = new Float64Array(STATES * MAX_ROWS);

  /** Clears H and says which of its columns will be filled. */
  begin(rows: number, columns: readonly number[]): void {
    this.rows = rows;
    this.h.fill(0);
    this.columnCount = columns.length;
    for (let i = 0; i < columns.length; i += 1) this.columns[i] = columns[i]!;
  }

  /** PHᵀ, S, its inverse and the NIS; P (15×15) is only read. */
  prepare(p: Float64Array): void {
    const { rows, h, columns, columnCount, ph, s, r } = this;
    for (let i = 0; i < STATES; i += 1)
      for (let m = 0; m < rows; m += 1) {
        let sum = 0;
        for (let c = 0; c < columnCount; c += 1) {
          const j = columns[c]!;
          sum += p[i * STATES + j]! * h[m * STATES + j]!;
        }
        ph[i * MAX_ROWS + m] = sum;
      }
    for (let a = 0; a < rows; a += 1)
      for (let b = a; b < rows; b += 1) {
        let sum = a === b ? r[a]! : 0;
        for (let c = 0; c < columnCount; c += 1) {
          const j = columns[c]!;
          sum += h[a * STATES + j]! * ph[j * MAX_ROWS + b]!;
        }
        s[a * MAX_ROWS + b] = sum;
        s[b * MAX_ROWS + a] = sum;
      }
    invertSymmetric(s, rows, this.inverse);
    this.nis = this.quadratic();
  }

  private quadratic(): number {
    const { rows, inverse, innovation } = this;
    let sum = 0;
    for (let a = 0; a < rows; a += 1)
      for (let b = 0; b < rows; b += 1) sum += innovation[a]! * inverse[a * MAX_ROWS + b]! * innovation[b]!;
    return sum;
  }

  /** After `prepare`: K, the correction, and P in place. */
  apply(p: Float64Array): void {
    const { rows, gain, ph, inverse, innovation, correction } = this;
    for (let i = 0; i < STATES; i += 1) {
      let change = 0;
      for (let m = 0; m < rows; m += 1) {
        let sum = 0;
        for (let k = 0; k < rows; k += 1) sum += ph[i * MAX_ROWS + k]! * inverse[k * MAX_ROWS + m]!;
        gain[i * MAX_ROWS + m] = sum;
        change += sum * innovation[m]!;
      }
      correction[i] = change;
    }
    this.joseph(p);
  }

  /** P ← A + (KR − AHᵀ)Kᵀ with A = P − K(HP): Joseph's form multiplied out, upper triangle, then mirrored. */
  private joseph(p: Float64Array): void {
    const { rows, h, columns, columnCount, gain, ph, reduced, rest, r } = this;
    for (let i = 0; i < STATES; i += 1)
      for (let j = 0; j < STATES; j += 1) {
        let value = p[i * STATES + j]!;
        for (let m = 0; m < rows; m += 1) value -= gain[i * MAX_ROWS + m]! * ph[j * MAX_ROWS + m]!;
        reduced[i * STATES + j] = value;
      }
    for (let i = 0; i < STATES; i += 1)
      for (let m = 0; m < rows; m += 1) {
        let sum = gain[i * MAX_ROWS + m]! * r[m]!;
        for (let c = 0; c < columnCount; c += 1) {
          const j = columns[c]!;
          sum -= reduced[i * STATES + j]! * h[m * STATES + j]!;
        }
        rest[i * MAX_ROWS + m] = sum;
      }
    for (let i = 0; i < STATES; i += 1)
      for (let j = i; j < STATES; j += 1) {
        let value = reduced[i * STATES + j]!;
        for (let m = 0; m < rows; m += 1) value += rest[i * MAX_ROWS + m]! * gain[j * MAX_ROWS + m]!;
        p[i * STATES + j] = value;
        p[j * STATES + i] = value;
      }
  }
}

/** Inverse of a symmetric positive definite matrix of 1…3 rows (stride MAX_ROWS) by cofactors. */
function invertSymmetric(s: Float64Array, rows: number, out: Float64Array): void {
  if (rows === 1) {
    out[0] = 1 / s[0]!;
    return;
  }
  const a = s[0]!;
  const b = s[1]!;
  const d = s[4]!;
  if (rows === 2) {
    const det = 1 / (a * d - b * b);
    out[0] = d * det;
    out[1] = -b * det;
    out[3] = out[1]!;
    out[4] = a * det;
    return;
  }
  const c = s[2]!;
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
