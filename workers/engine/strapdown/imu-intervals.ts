/**
 * IMU samples as intervals: sample k covers (t_{k−1}, t_k] and gives the angle and velocity increments over it, and
 * how the rates change within it, so that coning and sculling can be corrected and the interval cut where a fix lies.
 *
 * Within an interval rates are taken as linear in time, ω(t) = a + b·t; the previous interval's mean rate gives b
 * (the two-interval algorithm: for equal intervals its coning term is Δθ_{k−1}×Δθ_k/12; Miller, JGCD 6, 1983;
 * Ignagni, JGCD 13, 1990).
 */
import type { ImuColumns } from '../types';

/** Offsets into an interval, Float64Array(INTERVAL_SIZE); increments are raw: biases are not taken off. */
export const DURATION = 0; // s
export const ANGLE = 1; // Δθ, rad
export const VELOCITY_INCREMENT = 4; // Δv, m/s
export const ANGLE_BEND = 7; // b·T²/2 of the angular rate, rad
export const VELOCITY_BEND = 10; // b·T²/2 of the specific force, m/s
export const INTERVAL_SIZE = 13;

/** Intervals longer than this many nominal ones, and than GAP_MIN_S, are gaps. */
export const GAP_NOMINAL_INTERVALS = 5;
export const GAP_MIN_S = 0.1;
/** Spacings within this share of each other count as even. */
const EVEN = 0.05;

export class ImuIntervals {
  /** The interval that `load` filled. */
  readonly interval = new Float64Array(INTERVAL_SIZE);
  /** The loaded interval is a gap: only its duration is filled in. */
  isGap = false;
  readonly nominalS: number;
  readonly gapLimitS: number;
  private current = new Float64Array(6);
  private previous = new Float64Array(6);
  /** Sample whose increments `current` holds; −1: none. */
  private loaded = -1;

  constructor(readonly imu: ImuColumns) {
    this.nominalS = medianSpacing(imu.timeS);
    this.gapLimitS = Math.max(GAP_NOMINAL_INTERVALS * this.nominalS, GAP_MIN_S);
  }

  /** Fills `interval` with sample k, k ≥ 1; of a gap only the duration. */
  load(k: number): void {
    const { interval } = this;
    const time = this.imu.timeS;
    const duration = time[k]! - time[k - 1]!;
    interval[DURATION] = duration;
    this.isGap = duration > this.gapLimitS;
    if (this.isGap) {
      this.loaded = -1;
      return;
    }
    const before = k > 1 ? time[k - 1]! - time[k - 2]! : Infinity;
    if (this.loaded !== k - 1 && k > 1) this.increments(k - 1, before, this.current);
    const previous = this.current;
    const current = this.previous;
    this.previous = previous;
    this.current = current;
    this.increments(k, duration, current);
    this.loaded = k;
    for (let i = 0; i < 6; i += 1) interval[ANGLE + i] = current[i]!;
    if (before > this.gapLimitS) {
      for (let i = ANGLE_BEND; i < INTERVAL_SIZE; i += 1) interval[i] = 0;
      return;
    }
    if (this.imu.sampling === 'instantaneous') {
      this.bendOfInstants(k, duration);
      return;
    }
    // b·T²/2 with b the change of the mean rate from interval to interval, over half the sum of the two.
    const own = duration / (before + duration);
    const other = (own * duration) / before;
    for (let i = 0; i < 6; i += 1) interval[ANGLE_BEND + i] = own * current[i]! - other * previous[i]!;
  }

  /** Increments of sample k over `duration` s by the way the log samples: Δθ (rad), Δv (m/s) into `out`. */
  private increments(k: number, duration: number, out: Float64Array): void {
    const { gyro, accel, sampling } = this.imu;
    if (sampling === 'instantaneous') {
      this.integrateInstants(k, duration, out);
      return;
    }
    const factor = sampling === 'increment' ? 1 : duration;
    out[0] = gyro[0][k]! * factor;
    out[1] = gyro[1][k]! * factor;
    out[2] = gyro[2][k]! * factor;
    out[3] = accel[0][k]! * factor;
    out[4] = accel[1][k]! * factor;
    out[5] = accel[2][k]! * factor;
  }

  /**
   * Integral of rates sampled at instants: the mean of the two neighbours; where four instants are evenly spaced,
   * the cubic through them (weights −1, 13, 13, −1 over 24), which keeps the amplitude of vibration that the plain
   * mean loses.
   */
  private integrateInstants(k: number, duration: number, out: Float64Array): void {
    const { gyro, accel } = this.imu;
    const cubic = this.evenAround(k, duration);
    for (let axis = 0; axis < 6; axis += 1) {
      const rate = axis < 3 ? gyro[axis as 0 | 1 | 2] : accel[(axis - 3) as 0 | 1 | 2];
      const near = rate[k - 1]! + rate[k]!;
      out[axis] = cubic ? (duration * (13 * near - rate[k - 2]! - rate[k + 1]!)) / 24 : (duration * near) / 2;
    }
  }

  private evenAround(k: number, duration: number): boolean {
    const time = this.imu.timeS;
    if (k < 2 || k + 1 >= time.length) return false;
    const limit = EVEN * duration;
    return (
      Math.abs(time[k - 1]! - time[k - 2]! - duration) < limit &&
      Math.abs(time[k + 1]! - time[k]! - duration) < limit
    );
  }

  private bendOfInstants(k: number, duration: number): void {
    const { gyro, accel } = this.imu;
    for (let i = 0; i < 3; i += 1) {
      const axis = i as 0 | 1 | 2;
      this.interval[ANGLE_BEND + i] = (gyro[axis][k]! - gyro[axis][k - 1]!) * (duration / 2);
      this.interval[VELOCITY_BEND + i] = (accel[axis][k]! - accel[axis][k - 1]!) * (duration / 2);
    }
  }
}

/** Median spacing of increasing times, s, from at most about a thousand of them; 0 for fewer than two. */
export function medianSpacing(timeS: Float64Array): number {
  if (timeS.length < 2) return 0;
  const stride = Math.max(1, Math.floor(timeS.length / 1000));
  const spacings: number[] = [];
  for (let k = 1; k < timeS.length; k += stride) spacings.push(timeS[k]! - timeS[k - 1]!);
  spacings.sort((a, b) => a - b);
  return spacings[Math.floor(spacings.length / 2)]!;
}
