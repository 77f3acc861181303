/** Running integrals of an IMU's rates on a coarse grid: small enough to keep for any log, fine enough to align clocks. */

/** Grid, s. */
const STEP_S = 0.04;
/** A longer pause adds nothing: what happened in it is not known, s. */
const LONGEST_INTERVAL_S = 0.5;

/** N rows: time (s), ∫ω dt of x y z (rad), ∫f dt of x y z (m/s); body frame. */
export interface MotionIntegrals {
  timeS: Float64Array;
  gyro: readonly [Float64Array, Float64Array, Float64Array];
  accel: readonly [Float64Array, Float64Array, Float64Array];
  /** Ends of pauses: what happened in them is not in the integrals, s. */
  breaksS: Float64Array;
}

/** Gathers them while samples pass by; memory grows by 56 bytes a grid step. */
export class MotionIntegrator {
  private readonly sum = new Float64Array(6);
  private readonly rows: number[][] = [[], [], [], [], [], [], []];
  private lastS = NaN;
  private writtenS = -Infinity;
  private readonly breaks: number[] = [];

  /** `rates`: gyro x y z rad/s, accelerometer x y z m/s², mean over the interval that ends at `timeS`. */
  add(timeS: number, rates: Float64Array): void {
    const interval = timeS - this.lastS;
    if (interval > 0 && interval <= LONGEST_INTERVAL_S)
      for (let i = 0; i < 6; i += 1) this.sum[i]! += rates[i]! * interval;
    else if (interval > 0) this.breaks.push(timeS);
    this.lastS = timeS;
    if (timeS - this.writtenS < STEP_S) return;
    this.writtenS = timeS;
    this.rows[0]!.push(timeS);
    for (let i = 0; i < 6; i += 1) this.rows[i + 1]!.push(this.sum[i]!);
  }

  finish(): MotionIntegrals {
    const column = (i: number) => Float64Array.from(this.rows[i]!);
    return {
      timeS: column(0),
      gyro: [column(1), column(2), column(3)],
      accel: [column(4), column(5), column(6)],
      breaksS: Float64Array.from(this.breaks),
    };
  }
}
