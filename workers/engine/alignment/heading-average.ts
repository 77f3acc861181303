/** Collects heading estimates: a good one starts an average, poor ones before it are kept for want of better. */
import { wrapAngle } from '../geodesy';

/** Averaged over this long after the first good estimate, s. */
const AVERAGE_S = 2;
/** An estimate poorer than this is passed over while a better one may come, rad. */
const GOOD_SIGMA = 0.1;

export interface HeadingEstimate {
  /** Yaw at the start, rad, and its 1σ as far as it does not come from the carrying. */
  yaw: number;
  sigma: number;
  /** When it was first and last taken, s; speed then, m/s. */
  firstS: number;
  timeS: number;
  speed: number;
  /** ∫C_D· dt from the start to then, s: what a gyro bias error does to the heading carried back. */
  biasArm: [number, number, number];
}

export class HeadingAverage {
  private reference = 0;
  private weight = 0;
  private weighted = 0;
  private best = Infinity;
  private firstS = 0;
  private timeS = 0;
  private speed = 0;
  private goodSinceS = Infinity;
  private readonly arm = new Float64Array(3);

  /** `floorSigma`: the part of σ that all estimates share and that does not average out, rad. */
  constructor(private readonly floorSigma: number) {}

  add(yaw: number, sigma: number, timeS: number, speed: number, arm: Float64Array): void {
    const good = sigma <= GOOD_SIGMA;
    const startsGood = good && this.goodSinceS === Infinity;
    if (!good && (this.goodSinceS < Infinity || sigma >= this.best)) return;
    if (startsGood) this.goodSinceS = timeS;
    if (!good) this.best = sigma;
    if (startsGood || !good) {
      this.weight = 0;
      this.weighted = 0;
      this.reference = yaw;
      this.firstS = timeS;
    }
    const w = 1 / (sigma * sigma);
    this.weighted += w * wrapAngle(yaw - this.reference);
    this.weight += w;
    this.timeS = timeS;
    this.speed = speed;
    this.arm.set(arm);
  }

  isFull(nowS: number): boolean {
    return nowS - this.goodSinceS > AVERAGE_S;
  }

  result(): HeadingEstimate | null {
    if (this.weight === 0) return null;
    return {
      yaw: wrapAngle(this.reference + this.weighted / this.weight),
      sigma: Math.hypot(Math.sqrt(1 / this.weight), this.floorSigma),
      firstS: this.firstS,
      timeS: this.timeS,
      speed: this.speed,
      biasArm: [this.arm[0]!, this.arm[1]!, this.arm[2]!],
    };
  }
}
