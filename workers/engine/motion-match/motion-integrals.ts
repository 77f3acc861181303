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

/** Rows that are kept at most, 59 MB: half a day on the finest grid. A longer log is kept on a coarser one. */
const MOST_ROWS = 1 << 20;
const FIRST_ROWS = 1 << 15;
const COLUMNS = 7;

/** Gathers them while samples pass by, in memory that stops growing. */
export class MotionIntegrator {
  private readonly sum = new Float64Array(6);
  private columns = emptyColumns(FIRST_ROWS);
  private count = 0;
  private stepS = STEP_S;
  private lastS = NaN;
  private writtenS = -Infinity;
  private readonly breaks: number[] = [];

  constructor(private readonly mostRows = MOST_ROWS) {}

  /** `rates`: gyro x y z rad/s, accelerometer x y z m/s², mean over the interval that ends at `timeS`. */
  add(timeS: number, rates: Float64Array): void {
    const { sum } = this;
    const interval = timeS - this.lastS;
    if (interval > 0 && interval <= LONGEST_INTERVAL_S)
      for (let i = 0; i < 6; i += 1) sum[i]! += rates[i]! * interval;
    else if (interval > 0) this.breaks.push(timeS);
    this.lastS = timeS;
    if (timeS - this.writtenS < this.stepS) return;
    this.writtenS = timeS;
    this.keep(timeS);
  }

  finish(): MotionIntegrals {
    const column = (i: number) => this.columns[i]!.subarray(0, this.count);
    return {
      timeS: column(0),
      gyro: [column(1), column(2), column(3)],
      accel: [column(4), column(5), column(6)],
      breaksS: Float64Array.from(this.breaks),
    };
  }

  private keep(timeS: number): void {
    if (this.count === this.mostRows) this.coarsen();
    else if (this.count === this.columns[0]!.length) this.grow();
    const { columns, count, sum } = this;
    columns[0]![count] = timeS;
    for (let i = 0; i < 6; i += 1) columns[i + 1]![count] = sum[i]!;
    this.count += 1;
  }

  /** Every second row falls out; integrals at the rows that stay are as exact as before. */
  private coarsen(): void {
    const kept = Math.ceil(this.count / 2);
    for (const column of this.columns) for (let i = 1; i < kept; i += 1) column[i] = column[2 * i]!;
    this.count = kept;
    this.stepS *= 2;
  }

  private grow(): void {
    const wider = emptyColumns(Math.min(this.mostRows, 2 * this.count));
    for (const [i, column] of this.columns.entries()) wider[i]!.set(column);
    this.columns = wider;
  }
}

const emptyColumns = (rows: number) => Array.from({ length: COLUMNS }, () => new Float64Array(rows));
