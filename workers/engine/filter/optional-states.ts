/**
 * States that a run may carry behind the fifteen: scale factors, lever arm, barometer bias. All stay but for a random
 * walk. What they do to the strapdown is done here: intervals are scaled before they are integrated, and what was
 * measured is summed for the covariance.
 */
import type { Parameters } from '@/shared/contracts/parameters';
import { ANGLE, ANGLE_BEND, VELOCITY_INCREMENT } from '../strapdown/imu-intervals';
import { STATES, type StateLayout } from './states';
import type { TransitionSource } from './transition-coefficients';

const PPM = 1e-6;

/** Calls `each` for every optional state with its parameters, in the order of the states. */
function collect(
  { states }: Pick<Parameters, 'states'>,
  layout: StateLayout,
  read: (sigma: number, walk: number) => number,
): Float64Array {
  const out = new Float64Array(layout.size - STATES);
  const fill = (first: number, count: number, value: number) => {
    if (first >= 0) out.fill(value, first - STATES, first - STATES + count);
  };
  const { gyroScale, accelScale, leverArm, barometerBias } = states;
  fill(layout.gyroScale, 3, read(gyroScale.initialSigmaPpm * PPM, gyroScale.randomWalkPpmPerSqrtS * PPM));
  fill(layout.accelScale, 3, read(accelScale.initialSigmaPpm * PPM, accelScale.randomWalkPpmPerSqrtS * PPM));
  fill(layout.leverArm, 3, read(leverArm.initialSigmaM, 0));
  fill(layout.barometerBias, 1, read(barometerBias.initialSigmaM, barometerBias.randomWalkMPerSqrtS));
  return out;
}

/** Densities of the random walks, unit²/s, one a state of `layout` behind the fifteen. */
export const optionalDensities = (parameters: Pick<Parameters, 'states'>, layout: StateLayout) =>
  collect(parameters, layout, (_sigma, walk) => walk * walk);

/** Variances before anything was measured, the same way. */
export const optionalVariances = (parameters: Pick<Parameters, 'states'>, layout: StateLayout) =>
  collect(parameters, layout, (sigma) => sigma * sigma);

export class OptionalStates {
  /** Estimates in the layout's order: scale factors (1), lever arm (m), barometer bias (m). */
  readonly values: Float64Array;
  /** Since `resetSums`: ∫ω dt (rad) and ∫f dt (m/s) as measured and scaled, biases not taken off. */
  readonly sumMeasured = new Float64Array(6);
  /** What the loaded interval was divided by. */
  private readonly divisor = new Float64Array(6).fill(1);
  private readonly scales: boolean;

  /** Null where the layout has none: nothing is spent then. */
  static of(layout: StateLayout, leverArmM: readonly [number, number, number]): OptionalStates | null {
    return layout.size === STATES ? null : new OptionalStates(layout, leverArmM);
  }

  private constructor(
    private readonly layout: StateLayout,
    leverArmM: readonly [number, number, number],
  ) {
    this.values = new Float64Array(layout.size - STATES);
    if (layout.leverArm >= 0) this.values.set(leverArmM, layout.leverArm - STATES);
    this.scales = layout.gyroScale >= 0 || layout.accelScale >= 0;
  }

  /** What the covariance's steps are formed from: the strapdown's sums, which keep their arrays, and what was measured. */
  motionOf({ nav, earth, sumDcm, sumForce }: TransitionSource): TransitionSource {
    return { nav, earth, sumDcm, sumForce, sumMeasured: this.sumMeasured };
  }

  /** The lever arm as it is estimated (a view, m); null where it is not a state. */
  get leverArm(): Float64Array | null {
    const { leverArm } = this.layout;
    return leverArm < 0 ? null : this.values.subarray(leverArm - STATES, leverArm - STATES + 3);
  }

  get barometerBias(): number {
    const { barometerBias } = this.layout;
    return barometerBias < 0 ? 0 : this.values[barometerBias - STATES]!;
  }

  /** Takes the scale factors off a raw interval: measured = (1 + s) × (true + bias). */
  scaleInterval(interval: Float64Array): void {
    this.divisor.fill(1);
    this.rescaleInterval(interval);
  }

  /** The same for an interval that was scaled with older estimates. */
  private rescaleInterval(interval: Float64Array): void {
    if (!this.scales) return;
    const { layout, values, divisor } = this;
    for (let i = 0; i < 6; i += 1) {
      const first = i < 3 ? layout.gyroScale : layout.accelScale;
      if (first < 0) continue;
      const wanted = 1 + values[first - STATES + (i % 3)]!;
      const factor = divisor[i]! / wanted;
      divisor[i] = wanted;
      interval[ANGLE + i] = interval[ANGLE + i]! * factor;
      interval[ANGLE_BEND + i] = interval[ANGLE_BEND + i]! * factor;
    }
  }

  /** Sums what a scaled interval measured over the part (from, to] of it. */
  gather(interval: Float64Array, from: number, to: number): void {
    const { sumMeasured } = this;
    for (let i = 0; i < 3; i += 1) {
      sumMeasured[i] = sumMeasured[i]! + (to - from) * interval[ANGLE + i]!;
      sumMeasured[3 + i] = sumMeasured[3 + i]! + (to - from) * interval[VELOCITY_INCREMENT + i]!;
    }
  }

  resetSums(): void {
    this.sumMeasured.fill(0);
  }

  /** Adds the last part of a correction (all states) to the estimates, and to the interval that is under way. */
  correct(correction: Float64Array, interval: Float64Array): void {
    addOptional(this.values, correction);
    this.rescaleInterval(interval);
  }

  save(): readonly Float64Array[] {
    return [this.values.slice(), this.sumMeasured.slice()];
  }
  restore(saved: readonly Float64Array[]): void {
    this.values.set(saved[0]!);
    this.sumMeasured.set(saved[1]!);
  }
}

/** Adds the part of a correction behind the fifteen states to `values`. */
export function addOptional(values: Float64Array, correction: Float64Array): void {
  for (let i = 0; i < values.length; i += 1) values[i] = values[i]! + correction[STATES + i]!;
}
