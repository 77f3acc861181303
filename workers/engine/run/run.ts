/**
 * A run: alignment, then the filter over the recording, slice by slice.
 *
 * Without outage windows, or where truth covers them, one pass does it. Else the fully aided pass goes first: until
 * the first window it is the reported solution, so that results come at once; there a snapshot is taken, the aided pass
 * goes on unreported to the end as the reference, and the coasting pass forks from the snapshot and reports the rest.
 */
import { radToDeg } from '@/shared/units';
import type { Alignment } from '../alignment/align';
import { initialBudget } from '../alignment/initial-covariance';
import type { ErrorStateFilter } from '../filter/error-state-filter';
import type { FilterListener, FilterSnapshot } from '../filter/filter-types';
import { BiasSpread } from '../filter/bias-spread';
import { ErrorBudget } from '../filter/error-budget';
import { layoutOf, type StateLayout } from '../filter/states';
import { Tape, type TapeMark } from '../filter/tape';
import { HEIGHT, LAT, LON, VN } from '../strapdown/navigation-state';
import {
  EngineError,
  type EngineRun,
  type RecordingColumns,
  type RunRequest,
  type RunResult,
} from '../types';
import { AidTally } from './aid-tally';
import { CoastingComparison } from './coasting';
import { countKept } from './output-grid';
import { planRun, startFilter, type RunPlan } from './plan';
import { SmoothingPass } from './smoothing';
import { summarise } from './summary';
import { InnovationWriter, SolutionWriter } from './tables';
import { TruthComparison } from './truth-comparison';
import { Warnings } from './warnings';
import { lowerBound } from './windows';

/** What a sample of smoothing costs against one of filtering, and how many samples' work an output stands for. */
const SMOOTHING_SHARE = 0.5;
const SAMPLES_AN_OUTPUT = 20;

/** Checks, aligns and makes ready. Throws EngineError for data or parameters that do not allow a run. */
export function createRun(recording: RecordingColumns, request: RunRequest): EngineRun {
  return new Run(recording, request);
}

export class Run implements EngineRun {
  readonly extentS: readonly [number, number];
  readonly origin: { latDeg: number; lonDeg: number; heightM: number };
  readonly warnings = new Warnings();
  readonly alignment: Alignment;
  readonly solution: SolutionWriter;
  readonly position: InnovationWriter;
  readonly velocity: InnovationWriter;
  readonly aids = new AidTally();
  readonly coasting: CoastingComparison;
  readonly truth: TruthComparison | null;
  private readonly filter: ErrorStateFilter;
  private readonly plan: RunPlan;
  private readonly timeS: Float64Array;
  private readonly last: number;
  private readonly layout: StateLayout;
  private readonly p: Float64Array;
  private readonly biasSpread = new BiasSpread();
  private snapshot: FilterSnapshot | null = null;
  private phase: 'reported' | 'reference' | 'smooth-reference' | 'smooth-reported' | 'done' = 'reported';
  private readonly tape: Tape | null;
  private readonly budget: ErrorBudget | null;
  private forkMark: TapeMark | null = null;
  private smoothing: SmoothingPass | null = null;
  readonly smoothed: SolutionWriter | null = null;
  readonly smoothedTruth: TruthComparison | null = null;
  private done = 0;

  constructor(
    readonly recording: RecordingColumns,
    readonly request: RunRequest,
  ) {
    const { imu, reference } = recording;
    const plan = planRun(recording, request);
    this.plan = plan;
    this.alignment = plan.alignment;
    this.layout = layoutOf(request.parameters);
    this.p = new Float64Array(this.layout.size ** 2);
    this.timeS = imu.timeS;
    this.last = imu.timeS.length - 1;
    this.extentS = [imu.timeS[this.alignment.sample]!, imu.timeS[this.last]!];
    this.coasting = new CoastingComparison(plan.windows, plan.kept, imu.timeS, plan.truth);
    this.filter = startFilter(plan, recording, request, this.listener());

    this.tape = request.smooth === true ? new Tape(this.layout.size) : null;
    this.filter.tape = this.tape;
    this.budget =
      request.errorBudget === true
        ? new ErrorBudget(initialBudget(this.alignment.causes), this.layout)
        : null;
    this.filter.budget = this.budget;

    this.solution = new SolutionWriter(countKept(plan.kept), this.layout);
    this.position = new InnovationWriter(plan.fixes.count);
    this.velocity = new InnovationWriter(plan.fixes.count);
    this.truth = reference === null ? null : new TruthComparison(reference);
    if (this.tape !== null) {
      this.smoothed = new SolutionWriter(countKept(plan.kept), this.layout);
      this.smoothedTruth = reference === null ? null : new TruthComparison(reference);
    }
    const { nav } = this.alignment;
    this.origin = { latDeg: radToDeg(nav[LAT]!), lonDeg: radToDeg(nav[LON]!), heightM: nav[HEIGHT]! };
    this.report();
    if (this.filter.sample === plan.forkSample) this.fork();
  }

  private listener(): FilterListener {
    return {
      onInnovation: (group, timeS, axes, update, accepted) => {
        if (this.phase !== 'reported') return;
        if (group === 'position' || group === 'velocity') this[group].write(timeS, axes, update, accepted);
        else this.aids.add(group, update, accepted);
      },
      onWarning: (code, sentence, timeS) => {
        if (this.phase !== 'reported') return;
        this.warnings.add(code, sentence, timeS);
      },
    };
  }

  get tables() {
    return {
      solution: this.solution.table,
      position: this.position.table,
      velocity: this.velocity.table,
      coasting: this.coasting.writer.table,
    };
  }

  get counts() {
    return {
      solution: this.solution.count,
      position: this.position.count,
      velocity: this.velocity.count,
      coasting: this.coasting.writer.count,
    };
  }

  get progress(): number {
    if (this.phase === 'done') return 1;
    const { last } = this;
    const { forkSample } = this.plan;
    const whole = last - this.alignment.sample;
    const beyond = forkSample >= 0 ? last - forkSample : 0;
    const smoothing = this.tape === null ? 0 : SMOOTHING_SHARE * (whole + beyond);
    const smoothed = this.smoothing === null ? 0 : SMOOTHING_SHARE * (last - this.smoothing.reached);
    const before = this.phase === 'smooth-reported' || this.snapshotTaken ? SMOOTHING_SHARE * beyond : 0;
    return (this.done + smoothed + (this.tape === null ? 0 : before)) / (whole + beyond + smoothing);
  }

  /** The coasting pass goes on from the fork. */
  private get snapshotTaken(): boolean {
    return this.phase === 'reported' && this.snapshot !== null;
  }

  get reachedS(): number {
    const { count, table } = this.solution;
    return count === 0 ? this.extentS[0] : table.time_s![count - 1]!;
  }

  get imuSamples(): number {
    return this.last - this.alignment.sample + 1;
  }

  advance(samples: number): boolean {
    const { filter } = this;
    const { forkSample } = this.plan;
    for (let i = 0; i < samples && this.phase !== 'done'; i += 1) {
      if (this.smoothing !== null) {
        i += SAMPLES_AN_OUTPUT;
        if (this.smoothing.advance(1)) this.endSmoothing();
        continue;
      }
      if (filter.sample < this.last) {
        filter.advanceSample();
        this.done += 1;
        if (this.phase === 'reported') this.report();
        else this.recordReference();
        if (filter.sample === forkSample && this.snapshot === null) this.fork();
      }
      if (filter.sample === this.last) this.endPass();
    }
    return this.phase === 'done';
  }

  private recordReference(): void {
    const { filter, coasting, tape } = this;
    const k = filter.sample;
    coasting.record(k, filter.strapdown.nav);
    if (tape !== null && coasting.isCompared(k))
      tape.writeOutput(k, filter.motion, filter.covarianceNow(this.p), filter.optional?.values);
  }

  /** The reported solution at the filter's sample, where it is kept or compared. */
  private report(): void {
    const { filter } = this;
    const { kept } = this.plan;
    const k = filter.sample;
    const compared = this.coasting.wants(k);
    if (kept[k] === 0 && !compared) return;
    const { nav } = filter.strapdown;
    if (!Number.isFinite(nav[VN]! + nav[LAT]! + nav[LON]!))
      throw new EngineError(
        'not-finite',
        `The solution broke down near ${this.timeS[k]!.toFixed(2)} s: an IMU value there is not a number. Check the recording's health report.`,
      );
    filter.covarianceNow(this.p);
    if (kept[k] === 1) {
      this.tape?.writeOutput(k, filter.motion, this.p, filter.optional?.values);
      this.biasSpread.add(this.p, filter.strapdown.dcm);
      this.solution.write(this.timeS[k]!, nav, this.p, filter.optional?.values);
      this.truth?.add(this.timeS[k]!, nav, this.p);
    }
    if (compared) this.coasting.compare(k, nav, this.p, () => filter.budgetNow());
  }

  private fork(): void {
    this.snapshot = this.filter.save();
    this.forkMark = this.tape?.mark() ?? null;
    this.phase = 'reference';
    this.filter.budget = null;
  }

  /** The recording's end is reached: on to the smoother, back to the fork, or done. */
  private endPass(): void {
    const { tape, filter, last } = this;
    if (tape !== null) {
      filter.covarianceStep();
      const isReference = this.phase === 'reference';
      this.phase = isReference ? 'smooth-reference' : 'smooth-reported';
      const until = isReference ? this.forkMark : null;
      this.smoothing = new SmoothingPass(tape, until, filter.noise, this.layout, last, this.smoothedOutput);
    } else if (this.phase === 'reference') this.backToFork();
    else this.phase = 'done';
  }

  /** Rows of the smoothed solution come last first. */
  private readonly smoothedOutput = (
    k: number,
    nav: Float64Array,
    p: Float64Array,
    optional: Float64Array,
  ): void => {
    if (this.phase === 'smooth-reference') {
      this.coasting.recordSmoothed(k, nav);
      return;
    }
    const row = lowerBound(this.solution.table.time_s!.subarray(0, this.solution.count), this.timeS[k]!);
    this.smoothed!.writeAt(row, this.timeS[k]!, nav, p, optional);
    this.smoothedTruth?.add(this.timeS[k]!, nav, p);
  };

  private endSmoothing(): void {
    this.smoothing = null;
    if (this.phase === 'smooth-reference') {
      this.tape!.forgetBeyond();
      this.backToFork();
      return;
    }
    this.smoothed!.count = this.solution.count;
    this.phase = 'done';
  }

  private backToFork(): void {
    this.filter.budget = this.budget;
    this.filter.restore(this.snapshot!);
    this.filter.withhold(this.plan.withheld, this.request.outages);
    this.phase = 'reported';
  }

  finish(): RunResult {
    if (this.phase !== 'done') throw new Error('finish() before advance() answered true.');
    return {
      solution: this.solution.finish(),
      position: this.position.finish(),
      velocity: this.velocity.finish(),
      coasting: this.coasting.writer.finish(),
      smoothed: this.smoothed?.finish() ?? null,
      summary: summarise(this),
    };
  }
}
