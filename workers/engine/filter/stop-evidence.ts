/**
 * Does what is known of a vehicle's speed bear out that it stands still? Steady driving on a smooth road is as quiet as a
 * stop, and a false stop believes itself: after the first one the filter is sure. So a quiet stretch counts only where
 *
 *   no GNSS velocity of the last two seconds says that the vehicle moves,
 *   the estimated speed may be zero: v̂ < max(stated speed, 3σ), and
 *   a vehicle that moved has been seen to brake: v̂ + 3σ lies below half the speed that it was last known to have. For one that
 *   was not known to move, v̂ + 3σ lies below four times the stated speed.
 *
 * The last is what tells rest from steady motion once σ has grown: the forces since then must have taken the speed away
 * by more than their own uncertainty. After long coasting a true stop may go unused by it; that costs less.
 */
import type { Parameters } from '@/shared/contracts/parameters';

/** Certain means this many σ. */
const SIGMAS = 3;
/** A GNSS velocity speaks for this long, s. */
const FIX_LASTS_S = 2;
/** Share of the last known speed that may be left, and what an unknown one may be, in stated speeds. */
const LEFT_SHARE = 0.5;
const UNKNOWN_SPEEDS = 4;

export class StopEvidence {
  private movingFixS = -Infinity;
  /** Speed that the vehicle was last known to have, m/s; 0: not known to move. */
  private known = 0;
  private readonly limit: number;

  constructor({ speedMPerS }: Parameters['aids']['stopDetection']) {
    this.limit = speedMPerS;
  }

  /** A fix was taken in at `timeS`: speed and its 1σ, m/s, measured where `isMeasured`, else as estimated after it. */
  addFix(timeS: number, speed: number, sigma: number, isMeasured: boolean): void {
    const moves = speed > this.mayBeZero(sigma);
    this.known = moves ? speed : 0;
    if (isMeasured) this.movingFixS = moves ? timeS : -Infinity;
  }

  /** Between fixes: the estimated speed and its 1σ, m/s. What is certain of it counts as known. */
  addEstimate(speed: number, sigma: number): void {
    const certain = speed - SIGMAS * sigma;
    if (certain > this.limit) this.known = Math.max(this.known, certain);
  }

  /** Do an estimated speed and its 1σ, m/s, at `timeS` bear out a stop? */
  bearsOut(timeS: number, speed: number, sigma: number): boolean {
    if (timeS - this.movingFixS <= FIX_LASTS_S || speed >= this.mayBeZero(sigma)) return false;
    const left = this.known > 0 ? LEFT_SHARE * this.known : UNKNOWN_SPEEDS * this.limit;
    return speed + SIGMAS * sigma < left;
  }

  /** The stop was used: there is no speed to brake from any more. */
  stopped(): void {
    this.known = 0;
  }

  private mayBeZero(sigma: number): number {
    return Math.max(this.limit, SIGMAS * sigma);
  }

  save(): readonly number[] {
    return [this.movingFixS, this.known];
  }
  restore(saved: readonly number[]): void {
    this.movingFixS = saved[0]!;
    this.known = saved[1]!;
  }
}
