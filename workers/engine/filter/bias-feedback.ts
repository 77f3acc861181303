/**
 * Feeding back a tilt that an accelerometer bias has caused, to second order.
 *
 * What rest and slow motion show is C(f̃ − b) = f_n: a tilt and a bias that make up for each other cannot be told apart. They
 * lie on a curve, b(c) = f̃ − Ĉᵀ exp([c×]) f_n for a tilt correction c; the filter knows its tangent, δb = −Ĉᵀ[c×]f_n. Then
 *   b(c) − b(0) = δb − ½Ĉᵀ[c×]²f_n + … = δb + ½ w×δb + …,  w = Ĉᵀc,
 * and at its end the tangent is the old one turned by T = exp([w×]). Left out, b²/2g along the vertical (8 mm/s² for 40 mg) comes
 * into a bias that the filter believes it knows from the first turn on. The same follows from a bias error that is
 * carried in n, in a semi-direct product with the attitude (Fornasier, Equivariant Symmetries for Aided Inertial
 * Navigation, 2024, arXiv 2407.14297). Heading is left out: it turns the tilts instead (attitude-feedback.ts).
 */
import { ACCEL_BIAS, ATTITUDE, sizeOf } from './states';

/** A turn below this, rad² (2″), changes no σ by a part in ten thousand, nor do all such turns of a run together. */
const NO_TURN = 1e-10;

/** w = Ĉᵀ(c_N, c_E, 0) of a correction (rad, in b) in `out`; `dcm` n←b, row by row, before it is corrected. */
export function tiltInBody(dcm: Float64Array, correction: Float64Array, out: Float64Array): void {
  const n = correction[ATTITUDE]!;
  const e = correction[ATTITUDE + 1]!;
  for (let i = 0; i < 3; i += 1) out[i] = dcm[i]! * n + dcm[3 + i]! * e;
}

/** δb_a ← δb_a + ½ w×δb_a in a correction that is to be fed back. */
export function bendAccelBias(w: Float64Array, correction: Float64Array): void {
  const a = correction[ACCEL_BIAS]!;
  const b = correction[ACCEL_BIAS + 1]!;
  const c = correction[ACCEL_BIAS + 2]!;
  correction[ACCEL_BIAS] = a + 0.5 * (w[1]! * c - w[2]! * b);
  correction[ACCEL_BIAS + 1] = b + 0.5 * (w[2]! * a - w[0]! * c);
  correction[ACCEL_BIAS + 2] = c + 0.5 * (w[0]! * b - w[1]! * a);
}

/** T = exp([w×]) of the accelerometer bias's rows and columns. */
export class BiasTurn {
  private readonly t = new Float64Array(9);
  private turns = false;

  /** `w`: rad (Rodrigues' formula). */
  form(w: Float64Array): void {
    const { t } = this;
    const x = w[0]!;
    const y = w[1]!;
    const z = w[2]!;
    const square = x * x + y * y + z * z;
    this.turns = square >= NO_TURN;
    if (!this.turns) return;
    const angle = Math.sqrt(square);
    const s = Math.sin(angle) / angle;
    const half = Math.sin(angle / 2);
    const k = (2 * half * half) / square;
    t[0] = 1 - k * (y * y + z * z);
    t[1] = k * x * y - s * z;
    t[2] = k * x * z + s * y;
    t[3] = k * x * y + s * z;
    t[4] = 1 - k * (x * x + z * z);
    t[5] = k * y * z - s * x;
    t[6] = k * x * z - s * y;
    t[7] = k * y * z + s * x;
    t[8] = 1 - k * (x * x + y * y);
  }

  /** P ← TPTᵀ (symmetric, of any size); exactly symmetric after it. */
  covariance(p: Float64Array): void {
    if (this.turns) turnBlock(this.t, p, sizeOf(p));
  }

  /** λ ← Tᵀλ, Λ ← TᵀΛT: a turn the other way, for the smoother. */
  adjoint(lambda: Float64Array, information: Float64Array): void {
    if (!this.turns) return;
    const { t } = this;
    transpose(t);
    turnThree(t, lambda, ACCEL_BIAS, 1);
    turnBlock(t, information, lambda.length);
  }
}

/** Rows of `p` turned, columns mirrored, the block itself turned from both sides. */
function turnBlock(t: Float64Array, p: Float64Array, size: number): void {
  const first = ACCEL_BIAS * size;
  for (let j = 0; j < size; j += 1) turnThree(t, p, first + j, size);
  for (let i = ACCEL_BIAS; i < ACCEL_BIAS + 3; i += 1) turnThree(t, p, i * size + ACCEL_BIAS, 1);
  for (let i = ACCEL_BIAS; i < ACCEL_BIAS + 3; i += 1) {
    for (let j = 0; j < i; j += 1) p[j * size + i] = p[i * size + j]!;
    for (let j = ACCEL_BIAS + 3; j < size; j += 1) p[j * size + i] = p[i * size + j]!;
  }
}

/** The three elements at `at`, `at + step`, `at + 2·step` turned by T. */
function turnThree(t: Float64Array, values: Float64Array, at: number, step: number): void {
  const x = values[at]!;
  const y = values[at + step]!;
  const z = values[at + 2 * step]!;
  values[at] = t[0]! * x + t[1]! * y + t[2]! * z;
  values[at + step] = t[3]! * x + t[4]! * y + t[5]! * z;
  values[at + 2 * step] = t[6]! * x + t[7]! * y + t[8]! * z;
}

function transpose(t: Float64Array): void {
  for (let i = 0; i < 3; i += 1)
    for (let j = 0; j < i; j += 1) {
      const value = t[3 * i + j]!;
      t[3 * i + j] = t[3 * j + i]!;
      t[3 * j + i] = value;
    }
}
