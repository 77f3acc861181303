/** When the aids speak: zero velocity and zero rotation at the end of still windows, the non-holonomic constraint at its interval. */
import type { Parameters } from '@/shared/contracts/parameters';
import { medianSpacing } from '../strapdown/imu-intervals';
import type { ImuColumns } from '../types';
import { nonHolonomic, zeroRotation, zeroVelocity } from './aid-models';
import type { CorrectedState } from './corrected-state';
import type { Fixes } from './fixes';
import { ATTITUDE, VELOCITY } from './states';
import { StopDetector } from './stop-detector';
import { StopEvidence } from './stop-evidence';
import { GRAVITY } from '../strapdown/local-earth';
import { VN } from '../strapdown/navigation-state';

/** Slower than this a vehicle may also slide or settle, m/s. */
const CONSTRAINT_MIN_SPEED = 1;

/** North and east, as bits. */
const HORIZONTAL = 3;

/** What a window's velocity may change by beyond the accelerometers' spread: this many σ of tilt, times gravity. */
const TILT_SIGMAS = 3;

export class VehicleAids {
  private readonly stops: StopDetector;
  private readonly evidence: StopEvidence;
  private nextConstraintS = -Infinity;
  private readonly rateScale: number;
  /** Velocity in n where the window under way began, m/s. */
  private readonly before = new Float64Array(3);

  /** Null where no aid is switched on: nothing is spent then. */
  static of(imu: ImuColumns, parameters: Parameters): VehicleAids | null {
    const { zeroVelocity: velocity, zeroRotation: rotation, nonHolonomic: constraint } = parameters.aids;
    return velocity.enabled || rotation.enabled || constraint.enabled
      ? new VehicleAids(imu, parameters)
      : null;
  }

  private constructor(
    private readonly imu: ImuColumns,
    private readonly parameters: Parameters,
  ) {
    this.stops = new StopDetector(imu, parameters.aids.stopDetection);
    this.evidence = new StopEvidence(parameters.aids.stopDetection);
    this.rateScale = imu.sampling === 'increment' ? 1 / medianSpacing(imu.timeS) : 1;
  }

  /** After the filter has reached sample k: the aids that are due. */
  apply(k: number, filter: CorrectedState): void {
    const { aids } = this.parameters;
    if (this.stops.add(k)) this.endWindow(k, filter);
    if (aids.nonHolonomic.enabled && this.imu.timeS[k]! >= this.nextConstraintS) this.constrain(k, filter);
  }

  /** Fix j was taken in, with the given axes of its velocity. */
  addFix(fixes: Fixes, j: number, velocityAxes: number, filter: CorrectedState): void {
    const time = fixes.timeS[j]!;
    if ((velocityAxes & HORIZONTAL) !== HORIZONTAL) {
      this.evidence.addFix(time, speedOf(filter), speedSigma(filter), false);
      return;
    }
    const [north, east] = fixes.velocity;
    const variance = fixes.velocityVariance[3 * j]! + fixes.velocityVariance[3 * j + 1]!;
    this.evidence.addFix(time, Math.hypot(north[j]!, east[j]!), Math.sqrt(variance), true);
  }

  /** A window ends: a stop, or word of how fast the vehicle is. */
  private endWindow(k: number, filter: CorrectedState): void {
    const { evidence, stops, imu } = this;
    const speed = speedOf(filter);
    const sigma = speedSigma(filter);
    evidence.addEstimate(speed, sigma);
    if (stops.isStill && this.isSteady(filter) && evidence.bearsOut(imu.timeS[k]!, speed, sigma))
      if (this.stand(filter)) evidence.stopped();
    for (let i = 0; i < 3; i += 1) this.before[i] = filter.strapdown.nav[VN + i]!;
  }

  /** Even braking and pulling away are quiet too: the velocity has not changed by more than a tilt explains. */
  private isSteady({ strapdown: { nav, earth }, p, layout }: CorrectedState): boolean {
    const { before, stops } = this;
    const change = Math.hypot(nav[VN]! - before[0]!, nav[VN + 1]! - before[1]!, nav[VN + 2]! - before[2]!);
    const tilt = Math.sqrt(p[ATTITUDE * (layout.size + 1)]! + p[(ATTITUDE + 1) * (layout.size + 1)]!);
    const limit = this.parameters.aids.stopDetection.accelSpreadMPerS2 + TILT_SIGMAS * tilt * earth[GRAVITY]!;
    return change < limit * stops.windowS;
  }

  /** The aids of a stop; true where one was taken in. */
  private stand(filter: CorrectedState): boolean {
    const { aids, gyro } = this.parameters;
    let used = false;
    if (aids.zeroVelocity.enabled)
      used = filter.aid('zero-velocity', (update) =>
        zeroVelocity(filter.strapdown, aids.zeroVelocity.sigmaMPerS ** 2, update),
      );
    if (!aids.zeroRotation.enabled) return used;
    const variance =
      gyro.whiteNoiseRadPerSqrtS ** 2 / this.stops.windowS + aids.zeroRotation.sigmaRadPerS ** 2;
    const turnUsed = filter.aid('zero-rotation', (update) =>
      zeroRotation(filter.strapdown, this.stops.meanRate, variance, update),
    );
    return used || turnUsed;
  }

  private constrain(k: number, filter: CorrectedState): void {
    const { nonHolonomic: constraint } = this.parameters.aids;
    this.nextConstraintS = this.imu.timeS[k]! + constraint.intervalS - 1e-6;
    const { nav } = filter.strapdown;
    if (Math.hypot(nav[VN]!, nav[VN + 1]!, nav[VN + 2]!) < CONSTRAINT_MIN_SPEED) return;
    // Ahead of the unsteered axle the vehicle swings sideways as it turns.
    const turn = Math.abs(this.imu.gyro[2][k]! * this.rateScale);
    const lateral = constraint.lateralSigmaMPerS ** 2 + (turn * constraint.axleArmM) ** 2;
    filter.aid('non-holonomic', (update) =>
      nonHolonomic(filter.strapdown, lateral, constraint.verticalSigmaMPerS ** 2, update),
    );
  }

  save(): readonly number[] {
    return [this.nextConstraintS, ...this.before, ...this.evidence.save(), ...this.stops.save()];
  }
  restore(saved: readonly number[]): void {
    this.nextConstraintS = saved[0]!;
    this.before.set(saved.slice(1, 4));
    this.evidence.restore(saved.slice(4, 6));
    this.stops.restore(saved.slice(6));
  }
}

const speedOf = ({ strapdown: { nav } }: CorrectedState) => Math.hypot(nav[VN]!, nav[VN + 1]!, nav[VN + 2]!);

/** Root of the velocity's three variances, m/s. */
function speedSigma({ p, layout }: CorrectedState): number {
  const at = (i: number) => p[(VELOCITY + i) * (layout.size + 1)]!;
  return Math.sqrt(at(0) + at(1) + at(2));
}
