/**
 * Collects heading estimates of single fixes until enough good ones are there, and takes a robust average: fixes that
 * are outliers must not turn the start.
 */
import { wrapAngle } from '../geodesy';
import { percentile } from '../statistics/descriptive';

/** Averaged over this long, s, and at least so many estimates. */
const AVERAGE_S = 2;
const MIN_COUNT = 3;
/** Estimates older than this no longer count if too few have followed, s. */
const STALE_S = 30;
/** Further than this many σ from the median, and than the slack (rad), an estimate is an outlier. */
const OUTLIER_SIGMAS = 4;
const OUTLIER_SLACK = 0.02;

interface Sample {
  yaw: number;
  sigma: number;
  timeS: number;
  speed: number;
  arm: [number, number, number];
}

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
  private good: Sample[] = [];
  private poor: Sample[] = [];

  /**
   * Estimates poorer than `goodSigma` are passed over while better ones may come; `floorSigma` is the part of σ that
   * all estimates share and that does not average out, rad.
   */
  constructor(
    private readonly goodSigma: number,
    private readonly floorSigma: number,
  ) {}

  add(yaw: number, sigma: number, timeS: number, speed: number, arm: Float64Array): void {
    const sample: Sample = { yaw, sigma, timeS, speed, arm: [arm[0]!, arm[1]!, arm[2]!] };
    if (sigma <= this.goodSigma) {
      this.good = this.good.filter((s) => timeS - s.timeS <= STALE_S);
      this.good.push(sample);
    } else if (this.good.length === 0) {
      // The few best so far.
      this.poor.push(sample);
      this.poor.sort((a, b) => a.sigma - b.sigma);
      this.poor.length = Math.min(this.poor.length, MIN_COUNT);
    }
  }

  isFull(nowS: number): boolean {
    return this.good.length >= MIN_COUNT && nowS - this.good[0]!.timeS > AVERAGE_S;
  }

  result(): HeadingEstimate | null {
    const samples = this.good.length > 0 ? this.good : this.poor;
    if (samples.length === 0) return null;
    const middle = circularMedian(samples);
    const inliers = samples.filter(
      (s) => Math.abs(wrapAngle(s.yaw - middle)) <= OUTLIER_SIGMAS * s.sigma + OUTLIER_SLACK,
    );
    // None weighs more than the middling one: a speed that is an outlier makes its own σ small.
    const middling = percentile(
      inliers.map((s) => s.sigma),
      0.5,
    );
    let weight = 0;
    let weighted = 0;
    for (const { yaw, sigma } of inliers) {
      const w = 1 / Math.max(sigma, middling) ** 2;
      weight += w;
      weighted += w * wrapAngle(yaw - middle);
    }
    const last = inliers.reduce((a, b) => (b.timeS > a.timeS ? b : a));
    const first = inliers.reduce((a, b) => (b.timeS < a.timeS ? b : a));
    return {
      yaw: wrapAngle(middle + weighted / weight),
      sigma: Math.hypot(Math.sqrt(1 / weight), this.floorSigma),
      firstS: first.timeS,
      timeS: last.timeS,
      speed: last.speed,
      biasArm: last.arm,
    };
  }
}

/** The estimate whose distances to the others, in their σ, sum to the least. */
function circularMedian(samples: readonly Sample[]): number {
  const cost = (yaw: number) =>
    samples.reduce((sum, s) => sum + Math.abs(wrapAngle(s.yaw - yaw)) / s.sigma, 0);
  return samples.reduce((best, s) => (cost(s.yaw) < cost(best.yaw) ? s : best)).yaw;
}
