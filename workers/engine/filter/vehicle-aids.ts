/** When the aids speak: zero velocity and zero rotation at the end of still windows, the non-holonomic constraint at its interval. */
import type { Parameters } from '@/shared/contracts/parameters';
import { medianSpacing } from '../strapdown/imu-intervals';
import type { ImuColumns } from '../types';
import { nonHolonomic, zeroRotation, zeroVelocity } from './aid-models';
import type { CorrectedState } from './corrected-state';
import { VELOCITY } from './states';
import { StopDetector } from './stop-detector';
import { VN } from '../strapdown/navigation-state';

/** Slower than this a vehicle may also slide or settle, m/s. */
const CONSTRAINT_MIN_SPEED = 1;

/** A vehicle that certainly moves, steadily as it may, has not stopped: faster than this, m/s, and this many σ. */
const STOP_MAX_SPEED = 0.5;
const STOP_SIGMAS = 4;

export class VehicleAids {
  private readonly stops: StopDetector;
  private nextConstraintS = -Infinity;
  private readonly rateScale: number;

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
    this.rateScale = imu.sampling === 'increment' ? 1 / medianSpacing(imu.timeS) : 1;
  }

  /** After the filter has reached sample k: the aids that are due. */
  apply(k: number, filter: CorrectedState): void {
    const { aids, gyro } = this.parameters;
    if (this.stops.add(k) && mayStand(filter)) {
      if (aids.zeroVelocity.enabled)
        filter.aid('zero-velocity', (update) =>
          zeroVelocity(filter.strapdown, aids.zeroVelocity.sigmaMPerS ** 2, update),
        );
      if (aids.zeroRotation.enabled) {
        const white = gyro.whiteNoiseRadPerSqrtS ** 2 / this.stops.windowS;
        filter.aid('zero-rotation', (update) =>
          zeroRotation(
            filter.strapdown,
            this.stops.meanRate,
            white + aids.zeroRotation.sigmaRadPerS ** 2,
            update,
          ),
        );
      }
    }
    if (aids.nonHolonomic.enabled && this.imu.timeS[k]! >= this.nextConstraintS) this.constrain(k, filter);
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
    return [this.nextConstraintS, ...this.stops.save()];
  }
  restore(saved: readonly number[]): void {
    this.nextConstraintS = saved[0]!;
    this.stops.restore(saved.slice(1));
  }
}

function mayStand({ strapdown: { nav }, p, layout }: CorrectedState): boolean {
  const speed = Math.hypot(nav[VN]!, nav[VN + 1]!, nav[VN + 2]!);
  const at = (i: number) => p[(VELOCITY + i) * (layout.size + 1)]!;
  return speed < STOP_MAX_SPEED + STOP_SIGMAS * Math.sqrt(at(0) + at(1) + at(2));
}
