/** The propagation of a covariance with states behind the fifteen: as Propagation, of any size. */
import { Propagation } from './propagation';
import { ACCEL_BIAS, GYRO_BIAS, STATES, type StateLayout } from './states';
import type { Transition } from './transition';
import { WideTransition } from './wide-transition';

export class WidePropagation extends Propagation {
  override readonly transition: Transition;
  private readonly wideProduct: Float64Array;

  constructor(private readonly layout: StateLayout) {
    super();
    this.transition = new WideTransition(layout);
    this.wideProduct = new Float64Array(layout.size ** 2);
  }

  /** As `Propagation.propagate`; P size × size, `halfNoise` (size). */
  override propagate(p: Float64Array, halfNoise: Float64Array): void {
    const { wideProduct: m, transition } = this;
    const { size } = this.layout;
    for (let i = 0; i < size; i += 1) p[i * (size + 1)] = p[i * (size + 1)]! + halfNoise[i]!;
    transition.apply(p, size, 1, m, size);
    transition.apply(m, 1, size, p, GYRO_BIAS);
    this.decayRows(p);
    for (let i = 1; i < size; i += 1) {
      const end = Math.min(i, GYRO_BIAS);
      for (let j = 0; j < end; j += 1) p[i * size + j] = p[j * size + i]!;
    }
    for (let i = 0; i < size; i += 1) p[i * (size + 1)] = p[i * (size + 1)]! + halfNoise[i]!;
  }

  /** Biases, and what follows them, among themselves: only the biases' decay acts. */
  private decayRows(p: Float64Array): void {
    const { size } = this.layout;
    const { gyroDecay, accelDecay } = this.transition;
    if (gyroDecay === 1 && accelDecay === 1) return;
    const factor = (i: number) => (i < ACCEL_BIAS ? gyroDecay : i < STATES ? accelDecay : 1);
    for (let i = GYRO_BIAS; i < size; i += 1)
      for (let j = GYRO_BIAS; j < size; j += 1) p[i * size + j] = p[i * size + j]! * (factor(i) * factor(j));
  }
}

/** The propagation that fits a layout. */
export const propagationOf = (layout: StateLayout): Propagation =>
  layout.size === STATES ? new Propagation() : new WidePropagation(layout);
