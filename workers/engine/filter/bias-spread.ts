/**
 * How far the accelerometer bias may lie from where a covariance along the curve of tilt and bias puts it
 * (bias-feedback.ts): the filter's errors are straight along the curve, b = b̂ + x + ½ w×x, and what is read off them as σ of
 * b itself lacks q = ½ w×x. Until turns have told tilt from bias that is the greater part of the vertical one.
 */
import { ACCEL_BIAS, ATTITUDE, sizeOf } from './states';

/** Row i of w×x is w_j x_k − w_k x_j with the axes j and k next to i and last to it. */
const NEXT: readonly number[] = [1, 2, 0];
const LAST: readonly number[] = [2, 0, 1];

/** Less than this share of the smallest bias variance is not worth adding. */
const NEGLIGIBLE = 1e-3;

export class BiasSpread {
  /** Covariances of w (rad) and x (m/s²) in b, 3×3, row by row. */
  private readonly ww = new Float64Array(9);
  private readonly wx = new Float64Array(9);
  private readonly xx = new Float64Array(9);

  /**
   * P's accelerometer-bias block ← + E[qqᵀ], q's mean included (Isserlis' theorem for the fourth moments of w and x).
   * `p`: size × size, what is handed out, never what is propagated; `dcm`: n←b, row by row.
   */
  add(p: Float64Array, dcm: Float64Array): void {
    const size = sizeOf(p);
    if (isStraight(p, size)) return;
    this.read(p, dcm);
    const first = ACCEL_BIAS * (size + 1);
    for (let i = 0; i < 3; i += 1)
      for (let l = 0; l < 3; l += 1) {
        const j = NEXT[i]!;
        const k = LAST[i]!;
        const m = NEXT[l]!;
        const n = LAST[l]!;
        const sum = this.moment(j, k, m, n) - this.moment(k, j, m, n) - this.moment(j, k, n, m) + this.moment(k, j, n, m); // prettier-ignore
        const at = first + i * size + l;
        p[at] = p[at]! + 0.25 * sum;
      }
  }

  /** E[w_j x_k w_m x_n]. */
  private moment(j: number, k: number, m: number, n: number): number {
    const { ww, wx, xx } = this;
    return (
      wx[3 * j + k]! * wx[3 * m + n]! + ww[3 * j + m]! * xx[3 * k + n]! + wx[3 * j + n]! * wx[3 * m + k]!
    );
  }

  /** w = Cᵀφ of the two tilts, x = δb: both signs turned against the filter's correction, so that q is the same. */
  private read(p: Float64Array, dcm: Float64Array): void {
    const size = sizeOf(p);
    const tilt = ATTITUDE * size;
    const between = p[tilt + ATTITUDE + 1]!;
    for (let i = 0; i < 3; i += 1)
      for (let k = 0; k < 3; k += 1) {
        const ni = dcm[i]!;
        const ei = dcm[3 + i]!;
        const nk = dcm[k]!;
        const ek = dcm[3 + k]!;
        this.ww[3 * i + k] =
          ni * nk * p[tilt + ATTITUDE]! +
          (ni * ek + ei * nk) * between +
          ei * ek * p[tilt + size + ATTITUDE + 1]!;
        this.wx[3 * i + k] = ni * p[tilt + ACCEL_BIAS + k]! + ei * p[tilt + size + ACCEL_BIAS + k]!;
        this.xx[3 * i + k] = p[(ACCEL_BIAS + i) * size + ACCEL_BIAS + k]!;
      }
  }
}

/** |q|² ≤ ¼|w|²|x|²: with tilts this well known the curve is as good as its tangent. */
function isStraight(p: Float64Array, size: number): boolean {
  const tilt = p[ATTITUDE * (size + 1)]! + p[(ATTITUDE + 1) * (size + 1)]!;
  const x = p[ACCEL_BIAS * (size + 1)]!;
  const y = p[(ACCEL_BIAS + 1) * (size + 1)]!;
  const z = p[(ACCEL_BIAS + 2) * (size + 1)]!;
  return tilt * (x + y + z) < NEGLIGIBLE * Math.min(x, y, z);
}
