/** What is noticed of the IMU while its samples pass by, in memory that does not grow with the log. */
import type { ImuSampling } from '../engine/types';
import { FlatTopFinder, mergeIntervals } from './clipping';
import { MotionIntegrator, type MotionIntegrals } from '../engine/motion-match/motion-integrals';
import { ShockFinder, type Shock } from './shocks';
import { StuckFinder, type StuckStretch } from './stuck-axes';
import { QuietWindowFinder, type QuietWindow } from './quiet-window';

export interface ImuFacts {
  samples: number;
  startS: number;
  endS: number;
  /** Median interval in the head of the file, s. */
  nominalS: number;
  rateHz: number;
  /** RMS deviation of the intervals from the nominal one, gaps left out, s. */
  jitterS: number;
  /** Stretches without samples, the first MAX_GAPS of them. */
  gapsS: [number, number][];
  gapCount: number;
  duplicates: number;
  /** Rows that came late and were put in their places, and the stretches in which they did, s. */
  late: number;
  lateS: [number, number][];
  /** Rows with a repeated stamp but other values. */
  repeatedStamps: number;
  firstRepeatedLine: number | null;
  incompleteRows: number;
  firstIncompleteLine: number | null;
  clippedS: [number, number][];
  stuck: StuckStretch[];
  shocks: Shock[];
  quiet: QuietWindow | null;
  /** Mean length of the specific force, m/s². */
  meanForce: number;
  motion: MotionIntegrals;
}

const MAX_GAPS = 1000;
/** No usual sensor has a smaller range, rad/s and m/s². */
const SMALLEST_GYRO_RANGE = 1.5;
const SMALLEST_ACCEL_RANGE = 15;

export class ImuHealth {
  private readonly quiet = new QuietWindowFinder();
  private readonly motion = new MotionIntegrator();
  private readonly stuck = new StuckFinder();
  private readonly shocks = new ShockFinder();
  private readonly flatTops: FlatTopFinder[];
  private readonly rates = new Float64Array(6);
  private readonly gapLimitS: number;
  private readonly isIncrement: boolean;
  private readonly gaps: [number, number][] = [];
  private samples = 0;
  private startS = NaN;
  private lastS = NaN;
  private gapCount = 0;
  private gapTimeS = 0;
  private squaredJitter = 0;
  private forceSum = 0;
  private duplicates = 0;
  private late = 0;
  private readonly lateStretches: [number, number][] = [];
  private repeatedStamps = 0;
  private firstRepeatedLine: number | null = null;
  private incompleteRows = 0;
  private firstIncompleteLine: number | null = null;

  constructor(
    private readonly nominalS: number,
    sampling: ImuSampling,
  ) {
    this.isIncrement = sampling === 'increment';
    this.gapLimitS = gapLimit(nominalS);
    const scale = this.isIncrement ? nominalS : 1;
    const finder = (range: number) => new FlatTopFinder(range * scale);
    this.flatTops = [0, 1, 2, 3, 4, 5].map((i) => finder(i < 3 ? SMALLEST_GYRO_RANGE : SMALLEST_ACCEL_RANGE));
  }

  /** `values`: gyro x y z, accelerometer x y z, body frame, SI, as they are stored. */
  add(timeS: number, values: Float64Array): void {
    const interval = this.samples === 0 ? this.nominalS : timeS - this.lastS;
    if (this.samples === 0) this.startS = timeS;
    else this.checkInterval(timeS, interval);
    const perSecond = this.isIncrement ? 1 / Math.min(interval, this.gapLimitS) : 1;
    for (let i = 0; i < 6; i += 1) {
      this.rates[i] = values[i]! * perSecond;
      this.flatTops[i]!.add(timeS, values[i]!);
    }
    const [x, y, z] = [this.rates[3]!, this.rates[4]!, this.rates[5]!];
    this.forceSum += Math.sqrt(x * x + y * y + z * z);
    this.quiet.add(timeS, this.rates);
    this.motion.add(timeS, this.rates);
    this.stuck.add(timeS, values);
    this.shocks.add(timeS, x, y, z);
    this.samples += 1;
    this.lastS = timeS;
  }

  addDuplicate(): void {
    this.duplicates += 1;
  }

  /** A row of `timeS` that came after one of `afterS`. */
  addLate(timeS: number, afterS: number): void {
    this.late += 1;
    const last = this.lateStretches.at(-1);
    if (last && timeS - last[1] < 1) last[1] = Math.max(last[1], afterS);
    else if (this.lateStretches.length < MAX_GAPS) this.lateStretches.push([timeS, afterS]);
  }

  addRepeatedStamp(line: number): void {
    this.repeatedStamps += 1;
    this.firstRepeatedLine ??= line;
  }

  addIncomplete(line: number): void {
    this.incompleteRows += 1;
    this.firstIncompleteLine ??= line;
  }

  finish(): ImuFacts {
    const intervals = this.samples - 1 - this.gapCount;
    const coveredS = this.lastS - this.startS - this.gapTimeS;
    const flat = this.flatTops.flatMap((finder) => finder.finish());
    return {
      samples: this.samples,
      startS: this.startS,
      endS: this.lastS,
      nominalS: this.nominalS,
      rateHz: coveredS > 0 ? Number((intervals / coveredS).toPrecision(6)) : 0,
      jitterS: intervals > 0 ? Math.sqrt(this.squaredJitter / intervals) : 0,
      gapsS: this.gaps,
      gapCount: this.gapCount,
      duplicates: this.duplicates,
      late: this.late,
      lateS: this.lateStretches,
      repeatedStamps: this.repeatedStamps,
      firstRepeatedLine: this.firstRepeatedLine,
      incompleteRows: this.incompleteRows,
      firstIncompleteLine: this.firstIncompleteLine,
      clippedS: mergeIntervals(flat, 10 * this.nominalS),
      stuck: this.stuck.finish(),
      shocks: this.shocks.finish(),
      quiet: this.quiet.finish(),
      meanForce: this.forceSum / Math.max(1, this.samples),
      motion: this.motion.finish(),
    };
  }

  private checkInterval(timeS: number, interval: number): void {
    if (interval > this.gapLimitS) {
      this.gapCount += 1;
      this.gapTimeS += interval;
      if (this.gaps.length < MAX_GAPS) this.gaps.push([this.lastS, timeS]);
    } else {
      this.squaredJitter += (interval - this.nominalS) ** 2;
    }
  }
}

/** An interval longer than this is a gap, s. */
export const gapLimit = (nominalS: number) => Math.max(5 * nominalS, 0.1);
