/**
 * Where the uncertainty comes from: the covariance split by cause and propagated side by side under the filter's own gains
 * (Gelb, Applied Optimal Estimation, 1974, § 7.2). Each part sees the same Φ, K and H; noise enters the part that it
 * belongs to. All is linear in the causes, so that the parts sum to the filter's covariance.
 */
import { resetAttitudeCovariance } from './attitude-feedback';
import type { BiasTurn } from './bias-feedback';
import type { MeasurementUpdate } from './measurement-update';
import type { ProcessNoise } from './process-noise';
import type { Propagation } from './propagation';
import { ACCEL_BIAS, ATTITUDE, GYRO_BIAS, PLAIN_LAYOUT, STATES, VELOCITY, type StateLayout } from './states';

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
/** The same for states behind the fifteen; told only where they are carried. */
const OPTIONAL_SOURCES = ['scale factors', 'lever arm', 'barometer bias'] as const;
export type BudgetSource = (typeof BUDGET_SOURCES)[number] | (typeof OPTIONAL_SOURCES)[number];

/** The causes that a layout can tell apart. */
export function budgetSources({
  gyroScale,
  accelScale,
  leverArm,
  barometerBias,
}: StateLayout): BudgetSource[] {
  const carried = [Math.max(gyroScale, accelScale), leverArm, barometerBias];
  return [...BUDGET_SOURCES, ...OPTIONAL_SOURCES.filter((_, i) => carried[i]! >= 0)];
}

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
  private readonly sources: readonly BudgetSource[];
  private readonly size: number;
  private readonly half: Float64Array;
  private readonly copy: Float64Array;

  /** `start`: covariances at the start by cause, size × size; causes left out begin at zero. */
  constructor(
    start: Partial<Record<BudgetSource, Float64Array>>,
    private readonly layout: StateLayout = PLAIN_LAYOUT,
  ) {
    const { size } = layout;
    this.size = size;
    this.half = new Float64Array(size);
    this.copy = new Float64Array(size * size);
    this.sources = budgetSources(layout);
    this.parts = this.sources.map((source) => start[source]?.slice() ?? new Float64Array(size * size));
  }

  /** The step whose Φ `propagation` holds and whose noise `noise` has filled. */
  step(propagation: Propagation, noise: ProcessNoise): void {
    this.sources.forEach((source, i) => propagation.propagate(this.parts[i]!, this.halfOf(source, noise)));
  }

  /** An accepted update, after its gain was formed; its R belongs to `source`. */
  update(update: MeasurementUpdate, source: 'GNSS noise' | 'aids'): void {
    this.sources.forEach((name, i) => update.applyGain(this.parts[i]!, name === source));
  }

  /** After a correction was fed back: as the filter's covariance. */
  reset(correction: Float64Array, biasTurn: BiasTurn): void {
    for (const part of this.parts) {
      resetAttitudeCovariance(part, correction);
      biasTurn.covariance(part);
    }
  }

  /** A recovery: states scaled (DPD), some cut off and given a variance by GNSS. */
  recover(scale: Float64Array, cut: Float64Array, variance: Float64Array): void {
    const { size } = this;
    for (const part of this.parts)
      for (let i = 0; i < size; i += 1)
        for (let j = 0; j < size; j += 1)
          part[i * size + j] = cut[i] === 1 || cut[j] === 1 ? 0 : part[i * size + j]! * scale[i]! * scale[j]!;
    const gnss = this.partOf('GNSS noise');
    for (let i = 0; i < size; i += 1) if (cut[i] === 1) gnss[i * (size + 1)] = variance[i]!;
  }

  /** Variance that a gap adds to a state. */
  add(state: number, variance: number): void {
    const at = state * (this.size + 1);
    const part = this.partOf('gyro white noise');
    part[at] = part[at]! + variance;
  }

  /** Shares at a moment, after a further part of a step where `propagation` is given. */
  shares(propagation: Propagation | null, noise: ProcessNoise): BudgetShare[] {
    const { size } = this;
    return this.sources.map((source, i) => {
      this.copy.set(this.parts[i]!);
      if (propagation !== null) propagation.propagate(this.copy, this.halfOf(source, noise));
      const p = this.copy;
      return {
        source,
        horizontalM: Math.sqrt(p[0]! + p[size + 1]!),
        verticalM: Math.sqrt(p[2 * (size + 1)]!),
      };
    });
  }

  private halfOf(source: BudgetSource, noise: ProcessNoise): Float64Array {
    const { layout } = this;
    this.half.fill(0);
    const take = (from: number, to: number) => {
      for (let i = Math.max(from, 0); i < to; i += 1) this.half[i] = noise.half[i]!;
    };
    if (source === 'scale factors') take(STATES, STATES + scaleStates(layout));
    if (source === 'barometer bias') take(layout.barometerBias, layout.barometerBias + 1);
    const first = NOISE_STATES[source];
    if (first !== undefined) take(first, first + 3);
    return this.half;
  }

  private partOf(source: BudgetSource): Float64Array {
    return this.parts[this.sources.indexOf(source)]!;
  }

  save(): Float64Array[] {
    return this.parts.map((part) => part.slice());
  }
  restore(saved: readonly Float64Array[]): void {
    this.parts.forEach((part, i) => part.set(saved[i]!));
  }
}

/** Scale factors come first behind the fifteen. */
const scaleStates = ({ gyroScale, accelScale }: StateLayout) =>
  (gyroScale < 0 ? 0 : 3) + (accelScale < 0 ? 0 : 3);
