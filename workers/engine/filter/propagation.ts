/** Propagation of the error covariance over a covariance step, P ← Φ(P + ½Q)Φᵀ + ½Q (trapezoidal process noise). */
import { ACCEL_BIAS, GYRO_BIAS, STATES } from './states';
import { Transition } from './transition';

/** The fifteen alone; with more of them, WidePropagation. Sizes are constants here: it costs 5 % of a run if not. */
export class Propagation {
  /** Φ: to be formed before `propagate`. */
  readonly transition: Transition = new Transition();
  private readonly product = new Float64Array(STATES * STATES);

  /**
   * P (15×15, row by row, symmetric) over the step that `transition` describes. `halfNoise` (15): what to add to
   * the diagonal before and again after Φ.
   */
  propagate(p: Float64Array, halfNoise: Float64Array): void {
    const { product: m, transition } = this;
    for (let i = 0; i < STATES; i += 1) p[i * 16] = p[i * 16]! + halfNoise[i]!;
    // Row c of m becomes column c of ΦP.
    transition.apply(p, STATES, 1, m, STATES);
    // Row i of P becomes Φ times row i of ΦP; the biases' rows follow from symmetry.
    transition.apply(m, 1, STATES, p, GYRO_BIAS);
    this.biasRows(p);
    for (let i = 1; i < STATES; i += 1) {
      const end = i < GYRO_BIAS ? i : GYRO_BIAS;
      for (let j = 0; j < end; j += 1) p[i * STATES + j] = p[j * STATES + i]!;
    }
    for (let i = 0; i < STATES; i += 1) p[i * 16] = p[i * 16]! + halfNoise[i]!;
  }

  /** Biases among themselves: only the decay acts. */
  private biasRows(p: Float64Array): void {
    const gyro = this.transition.gyroDecay;
    const accel = this.transition.accelDecay;
    if (gyro === 1 && accel === 1) return;
    for (let i = GYRO_BIAS; i < STATES; i += 1)
      for (let j = GYRO_BIAS; j < STATES; j += 1)
        p[i * STATES + j] =
          p[i * STATES + j]! * ((i < ACCEL_BIAS ? gyro : accel) * (j < ACCEL_BIAS ? gyro : accel));
  }
}
