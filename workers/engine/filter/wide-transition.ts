/**
 * The transition with states behind the fifteen. A scale factor error s acts as a bias of its size times what is
 * measured (Groves 2013, § 4.4.2): over a step, ∫C diag(ω) dt ≈ ∫C dt · diag(mean ω), and likewise for the specific force. The
 * states themselves, and lever arm and barometer bias with them, stay as they are.
 */
import { ACCEL_BIAS, GYRO_BIAS, STATES, type StateLayout } from './states';
import { Transition } from './transition';
import type { TransitionSource } from './transition-coefficients';

export class WideTransition extends Transition {
  override readonly size: number;
  /** Mean angular rate (rad/s) and specific force (m/s²) of the step. */
  private readonly mean = new Float64Array(6);
  /** The fifteen of each vector, biases with what the scale factors add to them; and Φ times that. */
  private readonly x: Float64Array;
  private readonly y: Float64Array;

  constructor(private readonly layout: StateLayout) {
    super();
    this.size = layout.size;
    this.x = new Float64Array(layout.size * STATES);
    this.y = new Float64Array(layout.size * STATES);
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
    const { x, y, size, layout } = this;
    for (let v = 0, at = 0, to = 0; v < count; v += 1, at += vectorStep, to += STATES) {
      for (let i = 0, from = at; i < STATES; i += 1, from += elementStep) x[to + i] = source[from]!;
      if (layout.gyroScale >= 0)
        this.addScale(to + GYRO_BIAS, 0, source, at + layout.gyroScale * elementStep, elementStep);
      if (layout.accelScale >= 0)
        this.addScale(to + ACCEL_BIAS, 3, source, at + layout.accelScale * elementStep, elementStep);
    }
    super.apply(x, STATES, 1, y, count);
    for (let v = 0, at = 0, to = 0; v < count; v += 1, at += vectorStep, to += size) {
      const own = v * STATES;
      for (let i = 0; i < GYRO_BIAS; i += 1) target[to + i] = y[own + i]!;
      for (let i = GYRO_BIAS; i < size; i += 1)
        target[to + i] = this.decay(i) * source[at + i * elementStep]!;
    }
  }

  /** Adds scale × measured to the three biases from `bias` on in `x`. */
  private addScale(bias: number, mean: number, source: Float64Array, at: number, step: number): void {
    for (let i = 0; i < 3; i += 1)
      this.x[bias + i] = this.x[bias + i]! + this.mean[mean + i]! * source[at + i * step]!;
  }

  private decay(i: number): number {
    if (i >= STATES) return 1;
    return i < ACCEL_BIAS ? this.gyroDecay : this.accelDecay;
  }
}

/** The transition that fits a layout. */
export const transitionOf = (layout: StateLayout): Transition =>
  layout.size === STATES ? new Transition() : new WideTransition(layout);
