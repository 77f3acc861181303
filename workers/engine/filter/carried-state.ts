/** State and covariance carried through time by the IMU alone: no measurement in sight. */
import type { Parameters } from '@/shared/contracts/parameters';
import { NAV_ACCEL_BIAS, NAV_GYRO_BIAS } from '../strapdown/navigation-state';
import { Strapdown } from '../strapdown/strapdown';
import type { BudgetShare, ErrorBudget } from './error-budget';
import { OptionalStates } from './optional-states';
import { ProcessNoise } from './process-noise';
import type { Propagation } from './propagation';
import { layoutOf, type StateLayout } from './states';
import type { Tape } from './tape';
import type { TransitionSource } from './transition-coefficients';
import { propagationOf } from './wide-propagation';

export class CarriedState {
  readonly strapdown: Strapdown;
  /** Where which state lies. */
  readonly layout: StateLayout;
  /** States behind the fifteen; null where there are none. */
  readonly optional: OptionalStates | null;
  /** What the covariance's steps are formed from. */
  readonly motion: TransitionSource;
  /** Covariance of the error states, size × size, row by row. */
  readonly p: Float64Array;
  readonly noise: ProcessNoise;
  /** Takes down what the smoother needs, where one is wanted. */
  tape: Tape | null = null;
  /** Splits the covariance by cause, where that is wanted. */
  budget: ErrorBudget | null = null;
  private readonly propagation: Propagation;

  constructor(
    readonly parameters: Parameters,
    leverArmM: readonly [number, number, number],
  ) {
    this.strapdown = new Strapdown(parameters.mechanisation.scheme);
    this.layout = layoutOf(parameters);
    this.p = new Float64Array(this.layout.size ** 2);
    this.optional = OptionalStates.of(this.layout, leverArmM);
    this.motion = this.optional?.motionOf(this.strapdown) ?? this.strapdown;
    this.propagation = propagationOf(this.layout);
    this.noise = new ProcessNoise(parameters);
  }

  /** Carries the covariance (and decaying biases) up to the strapdown's time. */
  covarianceStep(): void {
    const { strapdown, noise } = this;
    const dt = strapdown.sumForce[3]!;
    if (dt === 0) return;
    this.propagate(this.p, dt);
    this.tape?.writeStep(this.motion);
    this.budget?.step(this.propagation, noise);
    strapdown.resetSums();
    this.optional?.resetSums();
    if (noise.gyroDecay > 0) this.decay(NAV_GYRO_BIAS, Math.exp(-noise.gyroDecay * dt));
    if (noise.accelDecay > 0) this.decay(NAV_ACCEL_BIAS, Math.exp(-noise.accelDecay * dt));
  }

  private propagate(p: Float64Array, dt: number): void {
    const { motion, propagation, noise } = this;
    propagation.transition.form(motion, noise.gyroDecay, noise.accelDecay);
    noise.fill(dt);
    propagation.propagate(p, noise.half);
  }

  private decay(at: number, factor: number): void {
    const { nav } = this.strapdown;
    for (let i = 0; i < 3; i += 1) nav[at + i] = nav[at + i]! * factor;
  }

  /** The covariance at the current sample in `out`, the filter's own left as it is between its steps. */
  covarianceNow(out: Float64Array): Float64Array {
    out.set(this.p);
    const dt = this.strapdown.sumForce[3]!;
    if (dt > 0) this.propagate(out, dt);
    return out;
  }

  /** The error budget at the current sample; null where none is kept. */
  budgetNow(): BudgetShare[] | null {
    if (this.budget === null) return null;
    const dt = this.strapdown.sumForce[3]!;
    if (dt > 0) this.propagation.transition.form(this.motion, this.noise.gyroDecay, this.noise.accelDecay);
    if (dt > 0) this.noise.fill(dt);
    return this.budget.shares(dt > 0 ? this.propagation : null, this.noise);
  }
}
