/**
 * Where the uncertainty comes from: the covariance split by cause and propagated side by side under the filter's own gains
 * (Gelb, Applied Optimal Estimation, 1974, § 7.2). Each part sees the same Φ, K and H; noise enters the part that it
 * belongs to. All is linear in the causes, so that the parts sum to the filter's covariance.
 */
import { resetAttitudeCovariance } from './attitude-feedback';
import type { MeasurementUpdate } from './measurement-update';
import type { ProcessNoise } from './process-noise';
import type { Propagation } from './propagation';
import { ACCEL_BIAS, ATTITUDE, GYRO_BIAS, STATES, VELOCITY } from './states';

export const BUDGET_SOURCES = [
  'gyro white noise',
  'gyro bias',
  'accelerometer white noise',
  'accelerometer bias',
  'initial attitude',
  'initial velocity',
  'initial position',
  'GNSS noise',
  'aids',
] as const;
export type BudgetSource = (typeof BUDGET_SOURCES)[number];

/** Process noise that belongs to a source: the states whose diagonal it enters. Gaps and clipping count as white noise. */
const NOISE_STATES: Partial<Record<BudgetSource, number>> = {
  'gyro white noise': ATTITUDE,
  'gyro bias': GYRO_BIAS,
  'accelerometer white noise': VELOCITY,
  'accelerometer bias': ACCEL_BIAS,
};

/** Horizontal and vertical 1σ of position, m, that a source alone would leave. */
export interface BudgetShare {
  source: BudgetSource;
  horizontalM: number;
  verticalM: number;
}

export class ErrorBudget {
  private readonly parts: Float64Array[];
  private readonly half = new Float64Array(STATES);
  private readonly copy = new Float64Array(STATES * STATES);

  /** `start`: covariances at the start by cause, 15×15; causes left out begin at zero. */
  constructor(start: Partial<Record<BudgetSource, Float64Array>>) {
    this.parts = BUDGET_SOURCES.map((source) => start[source]?.slice() ?? new Float64Array(STATES * STATES));
  }

  /** The step whose Φ `propagation` holds and whose noise `noise` has filled. */
  step(propagation: Propagation, noise: ProcessNoise): void {
    BUDGET_SOURCES.forEach((source, i) => propagation.propagate(this.parts[i]!, this.halfOf(source, noise)));
  }

  /** An accepted update, after its gain was formed; its R belongs to `source`. */
  update(update: MeasurementUpdate, source: 'GNSS noise' | 'aids'): void {
    BUDGET_SOURCES.forEach((name, i) => update.applyGain(this.parts[i]!, name === source));
  }

  reset(correction: Float64Array): void {
    for (const part of this.parts) resetAttitudeCovariance(part, correction);
  }

  /** A recovery: states scaled (DPD), some cut off and given a variance by GNSS. */
  recover(scale: Float64Array, cut: Float64Array, variance: Float64Array): void {
    for (const part of this.parts)
      for (let i = 0; i < STATES; i += 1)
        for (let j = 0; j < STATES; j += 1)
          part[i * STATES + j] =
            cut[i] === 1 || cut[j] === 1 ? 0 : part[i * STATES + j]! * scale[i]! * scale[j]!;
    const gnss = this.partOf('GNSS noise');
    for (let i = 0; i < STATES; i += 1) if (cut[i] === 1) gnss[i * (STATES + 1)] = variance[i]!;
  }

  /** Variance that a gap adds to a state. */
  add(state: number, variance: number): void {
    const at = state * (STATES + 1);
    const part = this.partOf('gyro white noise');
    part[at] = part[at]! + variance;
  }

  /** Shares at a moment, after a further part of a step where `propagation` is given. */
  shares(propagation: Propagation | null, noise: ProcessNoise): BudgetShare[] {
    return BUDGET_SOURCES.map((source, i) => {
      this.copy.set(this.parts[i]!);
      if (propagation !== null) propagation.propagate(this.copy, this.halfOf(source, noise));
      const p = this.copy;
      return {
        source,
        horizontalM: Math.sqrt(p[0]! + p[STATES + 1]!),
        verticalM: Math.sqrt(p[2 * (STATES + 1)]!),
      };
    });
  }

  private halfOf(source: BudgetSource, noise: ProcessNoise): Float64Array {
    this.half.fill(0);
    const first = NOISE_STATES[source];
    if (first !== undefined) for (let i = first; i < first + 3; i += 1) this.half[i] = noise.half[i]!;
    return this.half;
  }

  private partOf(source: BudgetSource): Float64Array {
    return this.parts[BUDGET_SOURCES.indexOf(source)]!;
  }

  save(): Float64Array[] {
    return this.parts.map((part) => part.slice());
  }
  restore(saved: readonly Float64Array[]): void {
    this.parts.forEach((part, i) => part.set(saved[i]!));
  }
}
