/**
 * One set of parameters over one recording: the filter's pass, every fix scored, and a fork at each coasting window's
 * start, so that many windows cost one pass plus the windows themselves.
 */
import type { Parameters } from '@/shared/contracts/parameters';
import { align } from '../alignment/align';
import { ErrorStateFilter } from '../filter/error-state-filter';
import type { FilterListener, FilterSnapshot } from '../filter/filter-types';
import { prepareFixes, withheldBy, type Fixes } from '../filter/fixes';
import {
  emptyError,
  emptyReference,
  referenceFromNav,
  ReferenceReader,
  stateError,
  truthCovers,
} from '../run/reference';
import { layWindows, type CoastWindow } from '../run/windows';
import { NAV_SIZE, VN } from '../strapdown/navigation-state';
import { EngineError } from '../types';
import { gaussianScore, mixedScore, Tally, wideScore } from './score';
import type { Interval, SearchCase } from './types';

/**
 * After a start this long is not scored, s, but at most this share of the pass. Until the first turns tell tilt from
 * accelerometer bias, what the levelling left enters to second order (b²/2g along the vertical: 8 mm/s² for 40 mg), which
 * a filter of first order takes for noise; and the fixes that gave the heading are not news to the filter.
 */
const SETTLE_S = 120;
const SETTLE_SHARE = 0.2;
/** While a search goes on, a good fix in ten million is rejected. */
const OPEN_GATE = 0.9999999;

export interface TrialRules {
  outlierShare: number;
  /** σ of the wide density, m and m/s. */
  wideSigma: Readonly<Record<'position' | 'velocity', number>>;
  /** Fixes before this are not scored, s: the same ones for all parameters. null: a little after this trial's own start. */
  scoredFromS: number | null;
  /** The pass may end here, s. */
  untilS: number;
}

export class Trial {
  readonly training = new Tally();
  readonly heldOut = new Tally();
  /** Where scoring begins, s. */
  readonly scoredFromS: number;
  private readonly filter: ErrorStateFilter;
  private readonly fixes: Fixes;
  private readonly timeS: Float64Array;
  private readonly last: number;
  private readonly windows: CoastWindow[];
  private readonly none: Uint8Array;
  private readonly truth: ReferenceReader | null;
  private nextWindow = 0;
  private fork: FilterSnapshot | null = null;
  /** Coasted states that wait for the aided pass to reach the end of their window. */
  private readonly waiting: { window: CoastWindow; nav: Float64Array }[] = [];
  private readonly reference = emptyReference();
  private readonly error = emptyError();

  /** @throws EngineError where the recording cannot be aligned with these parameters. */
  constructor(
    private readonly source: SearchCase,
    parameters: Parameters,
    private readonly rules: TrialRules,
  ) {
    const { imu, gnss, reference } = source.recording;
    const gate = { ...parameters.gate, enabled: rules.outlierShare > 0, probability: OPEN_GATE };
    const judged = { ...parameters, gate };
    this.timeS = imu.timeS;
    this.fixes = prepareFixes(gnss, judged.gnss);
    const aids = source.recording.aids ?? null;
    const { sample, fix, nav, p, headingUntilS } = align(imu, this.fixes, judged, source.leverArmM, aids);
    this.scoredFromS = rules.scoredFromS ?? settledAt(imu.timeS, sample, rules.untilS);
    this.none = new Uint8Array(this.fixes.count);
    const outages = (source.outages ?? []).filter(({ endS }) => endS <= rules.untilS);
    this.windows = layWindows(imu.timeS, sample, outages).filter((w) => w.last > w.first);
    const covered = reference !== null && truthCovers(reference, this.windows, imu.timeS);
    this.truth = covered ? new ReferenceReader(reference) : null;
    this.filter = new ErrorStateFilter(
      imu, this.fixes, this.none, judged, source.leverArmM, this.listener(), aids,
    ); // prettier-ignore
    this.filter.start(sample, fix, nav, p, headingUntilS);
    let last = imu.timeS.length - 1;
    while (last > sample + 1 && imu.timeS[last - 1]! >= rules.untilS) last -= 1;
    this.last = last;
  }

  private listener(): FilterListener {
    const { rules } = this;
    return {
      onInnovation: (group, timeS, _axes, update) => {
        if (this.fork !== null || timeS < this.scoredFromS) return;
        if (group !== 'position' && group !== 'velocity') return;
        const tally = this.sideOf(timeS);
        if (tally === null) return;
        const wide = rules.outlierShare === 0 ? 0 : wideScore(update, rules.wideSigma[group]);
        tally.groups += 1;
        tally.score += mixedScore(gaussianScore(update), wide, rules.outlierShare);
      },
      onWarning: () => undefined,
    };
  }

  private sideOf(timeS: number): Tally | null {
    if (holds(this.source.trainingS, timeS)) return this.training;
    return holds(this.source.heldOutS, timeS) ? this.heldOut : null;
  }

  get isDone(): boolean {
    return this.fork === null && this.filter.sample >= this.last;
  }

  /**
   * Works on at most `samples` IMU samples and answers how many it took.
   * @throws EngineError 'not-finite' when the solution breaks down.
   */
  advance(samples: number): number {
    const { filter } = this;
    let used = 0;
    while (used < samples && !this.isDone) {
      if (this.fork === null && this.isForkDue()) this.beginCoasting();
      filter.advanceSample();
      used += 1;
      if (this.fork !== null) {
        if (filter.sample >= this.windows[this.nextWindow]!.last) this.endCoasting();
      } else this.compareWaiting();
    }
    if (!Number.isFinite(filter.strapdown.nav[VN]! + this.training.score))
      throw new EngineError('not-finite', 'The solution broke down with these parameters.');
    return used;
  }

  private isForkDue(): boolean {
    const window = this.windows[this.nextWindow];
    return window !== undefined && this.filter.sample >= window.first - 1;
  }

  private beginCoasting(): void {
    const { filter, fixes, windows } = this;
    const { outage } = windows[this.nextWindow]!;
    this.fork = filter.save();
    filter.withhold(withheldBy(fixes, [outage]), [outage]);
  }

  private endCoasting(): void {
    const { filter } = this;
    const window = this.windows[this.nextWindow]!;
    const { nav } = filter.strapdown;
    if (this.truth === null) this.waiting.push({ window, nav: nav.slice(0, NAV_SIZE) });
    else if (this.truth.read(this.timeS[window.last]!)) {
      stateError(nav, this.truth.state, this.error);
      this.addDrift(window);
    }
    filter.restore(this.fork!);
    filter.withhold(this.none);
    this.fork = null;
    this.nextWindow += 1;
  }

  /** Without truth the aided solution of the same parameters is the reference. */
  private compareWaiting(): void {
    const first = this.waiting[0];
    if (first === undefined || this.filter.sample < first.window.last) return;
    this.waiting.shift();
    referenceFromNav(this.filter.strapdown.nav, this.reference);
    stateError(first.nav, this.reference, this.error);
    this.addDrift(first.window);
  }

  private addDrift({ outage }: CoastWindow): void {
    const { position } = this.error;
    const tally = this.sideOf(outage.startS);
    if (tally === null) return;
    tally.windows += 1;
    tally.driftSquares += position[0]! ** 2 + position[1]! ** 2;
  }
}

function settledAt(timeS: Float64Array, start: number, untilS: number): number {
  const startS = timeS[start]!;
  const endS = Math.min(untilS, timeS[timeS.length - 1]!);
  return startS + Math.min(SETTLE_S, SETTLE_SHARE * (endS - startS));
}

const holds = (intervals: readonly Interval[], timeS: number) =>
  intervals.some(([from, to]) => timeS >= from && timeS < to);
