/**
 * The transition with states behind the fifteen. A scale factor error s acts as a bias of its size times what is
 * measured (Groves 2013, § 4.4.2): over a step, ∫C diag(ω) dt ≈ ∫C dt · diag(mean ω), and likewise for the specific force. The
 * states themselves, and lever arm and barometer bias with them, stay as they are.
 */
import { ACCEL_BIAS, GYRO_BIAS, STATES, type StateLayout } from './states';
import { Transition, type TransitionSource } from './transition';

export class WideTransition extends Transition {
  override readonly size: number;
  /** Mean angular rate (rad/s) and specific force (m/s²) of the step. */
  private readonly mean = new Float64Array(6);
  private readonly x = new Float64Array(STATES);
  private readonly y = new Float64Array(STATES);

  constructor(private readonly layout: StateLayout) {
    super();
    this.size = layout.size;
  }

  /** As `Transition.form`; `source` must have `sumMeasured`. */
  override form(source: TransitionSource, gyroDecayRate: number, accelDecayRate: number): void {
    super.form(source, gyroDecayRate, accelDecayRate);
    const dt = source.sumForce[3]!;
    for (let i = 0; i < 6; i += 1) this.mean[i] = dt > 0 ? source.sumMeasured![i]! / dt : 0;
  }

  override apply(
    source: Float64Array,
    vectorStep: number,
    elementStep: number,
    target: Float64Array,
    count: number,
  ): void {
    const { x, y, size } = this;
    for (let v = 0; v < count; v += 1) {
      const at = v * vectorStep;
      const to = v * size;
      for (let i = 0; i < STATES; i += 1) x[i] = source[at + i * elementStep]!;
      this.addScale(this.layout.gyroScale, GYRO_BIAS, 0, source, at, elementStep);
      this.addScale(this.layout.accelScale, ACCEL_BIAS, 3, source, at, elementStep);
      super.apply(x, STATES, 1, y, 1);
      for (let i = 0; i < GYRO_BIAS; i += 1) target[to + i] = y[i]!;
      for (let i = GYRO_BIAS; i < size; i += 1)
        target[to + i] = this.decay(i) * source[at + i * elementStep]!;
    }
  }

  /** Adds scale × measured to the biases in `x`. */
  private addScale(
    first: number,
    bias: number,
    mean: number,
    source: Float64Array,
    at: number,
    step: number,
  ): void {
    if (first < 0) return;
    for (let i = 0; i < 3; i += 1)
      this.x[bias + i] = this.x[bias + i]! + this.mean[mean + i]! * source[at + (first + i) * step]!;
  }

  private decay(i: number): number {
    if (i >= STATES) return 1;
    return i < ACCEL_BIAS ? this.gyroDecay : this.accelDecay;
  }
}

/** The transition that fits a layout. */
export const transitionOf = (layout: StateLayout): Transition =>
  layout.size === STATES ? new Transition() : new WideTransition(layout);
