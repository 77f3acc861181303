/** Propagation of the error covariance over a covariance step, P ← Φ(P + ½Q)Φᵀ + ½Q (trapezoidal process noise). */
import { ACCEL_BIAS, GYRO_BIAS, STATES } from './states';
import { Transition } from './transition';

export class Propagation {
  /** Φ: to be formed before `propagate`. */
  readonly transition: Transition;
  private readonly product: Float64Array;

  constructor(transition = new Transition()) {
    this.transition = transition;
    this.product = new Float64Array(transition.size * transition.size);
  }

  /**
   * P (size × size, row by row, symmetric) over the step that `transition` describes. `halfNoise` (size): what to add to
   * the diagonal before and again after Φ.
   */
  propagate(p: Float64Array, halfNoise: Float64Array): void {
    const { product: m, transition } = this;
    const { size } = transition;
    const diagonal = size + 1;
    for (let i = 0, at = 0; i < size; i += 1, at += diagonal) p[at] = p[at]! + halfNoise[i]!;
    // Row c of m becomes column c of ΦP.
    transition.apply(p, size, 1, m, size);
    // Row i of P becomes Φ times row i of ΦP; the rows of biases and what follows them come from symmetry.
    transition.apply(m, 1, size, p, GYRO_BIAS);
    this.biasRows(p, size);
    for (let i = 1, row = size; i < size; i += 1, row += size) {
      const end = i < GYRO_BIAS ? i : GYRO_BIAS;
      for (let j = 0, mirror = i; j < end; j += 1, mirror += size) p[row + j] = p[mirror]!;
    }
    for (let i = 0, at = 0; i < size; i += 1, at += diagonal) p[at] = p[at]! + halfNoise[i]!;
  }

  /** Biases, and what follows them, among themselves: only the decay acts. */
  private biasRows(p: Float64Array, size: number): void {
    const gyro = this.transition.gyroDecay;
    const accel = this.transition.accelDecay;
    if (gyro === 1 && accel === 1) return;
    const factor = (i: number) => (i < ACCEL_BIAS ? gyro : i < STATES ? accel : 1);
    for (let i = GYRO_BIAS; i < size; i += 1)
      for (let j = GYRO_BIAS; j < size; j += 1) p[i * size + j] = p[i * size + j]! * (factor(i) * factor(j));
  }
}
