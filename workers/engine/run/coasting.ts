/** Compares the coasting solution with its reference: the coasting table, and drift points per window. */
import type { BudgetPoint, DriftPoint, OutageResult } from '@/shared/contracts/runs';
import { radToDeg } from '@/shared/units';
import type { BudgetShare } from '../filter/error-budget';
import { POSITION, sizeOf } from '../filter/states';
import { NAV_SIZE } from '../strapdown/navigation-state';
import type { ReferenceColumns } from '../types';
import { emptyError, emptyReference, referenceFromNav, ReferenceReader, stateError } from './reference';
import { CoastingWriter } from './tables';
import { comparedSamples, lowerBound, type CoastWindow } from './windows';

export class CoastingComparison {
  readonly writer: CoastingWriter;
  private readonly samples: Int32Array;
  /** Aided navigation states at `samples`, NAV_SIZE each. */
  private readonly aided: Float64Array;
  private recorded = 0;
  private next = 0;
  private readonly error = emptyError();
  private readonly aidedState = emptyReference();
  private readonly points: DriftPoint[][];
  private readonly budgets: BudgetPoint[][];

  constructor(
    private readonly windows: readonly CoastWindow[],
    private readonly kept: Uint8Array,
    private readonly timeS: Float64Array,
    private readonly truth: ReferenceColumns | null,
  ) {
    this.samples = comparedSamples(windows, kept);
    this.aided = truth === null ? new Float64Array(this.samples.length * NAV_SIZE) : new Float64Array(0);
    this.writer = new CoastingWriter(this.samples.length);
    this.points = windows.map(() => []);
    this.budgets = windows.map(() => []);
    this.reader = truth === null ? null : new ReferenceReader(truth);
  }

  private readonly reader: ReferenceReader | null;

  /** The aided pass at sample k: kept for later where the coasting pass will want it. */
  record(k: number, nav: Float64Array): void {
    if (this.reader !== null || this.samples[this.recorded] !== k) return;
    this.aided.set(nav, this.recorded * NAV_SIZE);
    this.recorded += 1;
  }

  /** Is sample k compared in some window? */
  isCompared(k: number): boolean {
    return this.reader === null && this.samples[lowerBound(this.samples, k)] === k;
  }

  /** A smoothed state takes the place of the aided one at a compared sample. */
  recordSmoothed(k: number, nav: Float64Array): void {
    if (!this.isCompared(k)) return;
    this.aided.set(nav, lowerBound(this.samples, k) * NAV_SIZE);
    this.isSmoothed = true;
  }
  private isSmoothed = false;

  /** Does the coasting pass have to be compared at sample k? */
  wants(k: number): boolean {
    return this.samples[this.next] === k;
  }

  /** The coasting pass at a wanted sample, with its covariance there. */
  compare(k: number, nav: Float64Array, p: Float64Array, budget: () => BudgetShare[] | null): void {
    const at = this.next;
    this.next += 1;
    const timeS = this.timeS[k]!;
    if (this.reader === null) {
      referenceFromNav(this.aided.subarray(at * NAV_SIZE, (at + 1) * NAV_SIZE), this.aidedState);
      stateError(nav, this.aidedState, this.error);
    } else {
      if (!this.reader.read(timeS)) return;
      stateError(nav, this.reader.state, this.error);
    }
    const w = this.windows.findIndex((window) => k >= window.first && k <= window.last);
    const { position, velocity, attitude } = this.error;
    const diagonal = sizeOf(p) + 1;
    const predicted = Math.sqrt(p[0]! + p[diagonal]!);
    const predictedVertical = Math.sqrt(p[(POSITION + 2) * diagonal]!);
    const horizontal = Math.hypot(position[0]!, position[1]!);
    if (this.kept[k] === 1)
      this.writer.write({
        time_s: timeS,
        outage: this.windows[w]!.index,
        horizontal_m: horizontal,
        vertical_m: Math.abs(position[2]!),
        north_m: position[0]!,
        east_m: position[1]!,
        predicted_horizontal_m: predicted,
        predicted_vertical_m: predictedVertical,
      });
    for (const { afterS, sample } of this.windows[w]!.drift) {
      if (sample !== k) continue;
      this.points[w]!.push({
        afterS,
        horizontalM: horizontal,
        verticalM: Math.abs(position[2]!),
        velocityMPerS: Math.hypot(velocity[0]!, velocity[1]!, velocity[2]!),
        headingDeg: Math.abs(radToDeg(attitude[2]!)),
        predictedHorizontalM: predicted,
        predictedVerticalM: predictedVertical,
      });
      const shares = budget();
      if (shares !== null) this.budgets[w]!.push({ afterS, shares });
    }
  }

  private get reference(): OutageResult['reference'] {
    if (this.truth !== null) return 'truth';
    return this.isSmoothed ? 'smoothed' : 'aided';
  }

  /** One result a window, in the request's order. */
  results(): OutageResult[] {
    return this.windows
      .map(({ outage, index }, w) => ({
        index,
        result: {
          startS: outage.startS,
          endS: outage.endS,
          withhold: outage.withhold,
          reference: this.reference,
          points: this.points[w]!,
          ...(this.budgets[w]!.length > 0 ? { budget: this.budgets[w]! } : {}),
        },
      }))
      .sort((a, b) => a.index - b.index)
      .map(({ result }) => result);
  }
}
