/** The quietest second of a log: there the vehicle most likely stood still, and the sensors show gravity and their bias. */

const WINDOW_S = 1;
const MIN_SAMPLES = 5;

export interface QuietWindow {
  startS: number;
  endS: number;
  /** rad/s, body frame. */
  gyroMean: [number, number, number];
  /** m/s², body frame. */
  accelMean: [number, number, number];
  /** Root of the summed variances over the axes: rad/s and m/s². */
  gyroSpread: number;
  accelSpread: number;
}

export class QuietWindowFinder {
  private readonly sum = new Float64Array(6);
  private readonly squares = new Float64Array(6);
  private count = 0;
  private startS = NaN;
  private lastS = NaN;
  private best: QuietWindow | null = null;
  private bestScore = Infinity;

  /** `rates`: gyro x y z rad/s, accelerometer x y z m/s². */
  add(timeS: number, rates: Float64Array): void {
    if (!(timeS - this.startS < WINDOW_S)) {
      this.close();
      this.startS = timeS;
    }
    for (let i = 0; i < 6; i += 1) {
      const value = rates[i]!;
      this.sum[i]! += value;
      this.squares[i]! += value * value;
    }
    this.count += 1;
    this.lastS = timeS;
  }

  /** Null where the log is shorter than a window. */
  finish(): QuietWindow | null {
    this.close();
    return this.best;
  }

  private close(): void {
    if (this.count >= MIN_SAMPLES) this.weigh();
    this.sum.fill(0);
    this.squares.fill(0);
    this.count = 0;
  }

  private weigh(): void {
    const mean = (i: number) => this.sum[i]! / this.count;
    const variance = (i: number) => Math.max(0, this.squares[i]! / this.count - mean(i) ** 2);
    const gyroSpread = Math.sqrt(variance(0) + variance(1) + variance(2));
    const accelSpread = Math.sqrt(variance(3) + variance(4) + variance(5));
    // A gyro jitter of 0.01 rad/s weighs as much as one of 0.1 m/s².
    const score = gyroSpread / 0.01 + accelSpread / 0.1;
    if (score >= this.bestScore) return;
    this.bestScore = score;
    this.best = {
      startS: this.startS,
      endS: this.lastS,
      gyroMean: [mean(0), mean(1), mean(2)],
      accelMean: [mean(3), mean(4), mean(5)],
      gyroSpread,
      accelSpread,
    };
  }
}
