/**
 * State and covariance with what measurements do to them: each group is judged at its gate, taken in, and its
 * correction fed back at once (closed loop). When they come is the business of ErrorStateFilter.
 */
import type { Parameters } from '@/shared/contracts/parameters';
import type { Outage } from '@/shared/contracts/runs';
import { ImuIntervals } from '../strapdown/imu-intervals';
import type { ImuColumns } from '../types';
import { resetAttitudeCovariance } from './attitude-feedback';
import { bendAccelBias, BiasTurn, tiltInBody } from './bias-feedback';
import { CarriedState } from './carried-state';
import { correctState } from './correct-state';
import type { AidName, FilterListener, GroupName } from './filter-types';
import { ALL_AXES } from './fixes';
import { gatesOf, type Gate } from './gate';
import { HeadingWatch } from './heading-watch';
import type { MeasurementUpdate } from './measurement-update';
import { recoverGroups } from './recovery';
import { ATTITUDE } from './states';
import { updateOf } from './wide-update';

export class CorrectedState extends CarriedState {
  /** IMU sample that the state belongs to. */
  sample = 0;
  readonly gates: Readonly<Record<GroupName | AidName, Gate>>;
  /** Windows that may name aids. */
  protected outages: readonly Outage[] = [];
  protected readonly intervals: ImuIntervals;
  protected readonly update: MeasurementUpdate;
  protected readonly headingWatch = new HeadingWatch();
  /** Tilt part of the last correction, in b, rad, and what it does to the accelerometer bias. */
  private readonly tilt = new Float64Array(3);
  private readonly biasTurn = new BiasTurn();

  constructor(
    protected readonly imu: ImuColumns,
    parameters: Parameters,
    leverArmM: readonly [number, number, number],
    protected readonly listener: FilterListener,
  ) {
    super(parameters, leverArmM);
    this.update = updateOf(this.layout);
    this.intervals = new ImuIntervals(imu);
    this.gates = gatesOf(parameters.gate);
  }

  get timeS(): number {
    return this.imu.timeS[this.sample]!;
  }

  protected watchHeading(): void {
    this.headingWatch.restart(this.timeS, Math.sqrt(this.p[(ATTITUDE + 2) * (this.layout.size + 1)]!));
  }

  /** The GNSS group whose innovation, H and R `update` holds, at a time that the state has reached. */
  protected judge(group: GroupName, timeS: number, axes: number): void {
    const { update } = this;
    update.prepare(this.p);
    const verdict = this.gates[group].judge(timeS, update.rows, update.nis);
    this.listener.onInnovation(group, timeS, axes, update, verdict === 'accept');
    if (verdict === 'accept') {
      this.take(update, 'GNSS noise');
    } else if (verdict === 'recover') {
      recoverGroups(this, group, timeS, axes, update);
    }
  }

  /** An aid at a time that the filter has reached: `setUp` forms innovation, H and R, or says false: nothing measured. True where it was taken in. */
  aid(name: AidName, setUp: (update: MeasurementUpdate) => unknown, timeS = this.timeS): boolean {
    const { update } = this;
    if (this.outages.some((w) => w.withhold === name && timeS >= w.startS && timeS < w.endS)) return false;
    this.covarianceStep();
    if (setUp(update) === false) return false;
    update.prepare(this.p);
    // An aid that is refused says that it does not hold here; it never moves the state by force.
    const accepted = this.gates[name].judge(timeS, update.rows, update.nis) === 'accept';
    this.listener.onInnovation(name, timeS, ALL_AXES, update, accepted);
    if (accepted) this.take(update, 'aids');
    return accepted;
  }

  private take(update: MeasurementUpdate, source: 'GNSS noise' | 'aids'): void {
    update.apply(this.p);
    this.budget?.update(update, source);
    tiltInBody(this.strapdown.dcm, update.correction, this.tilt);
    this.tape?.writeUpdate(update, this.tilt);
    this.feedBack(update.correction);
  }

  /** Adds a correction (measured − predicted, through the gain) to the state and turns P into the new attitude. */
  feedBack(correction: Float64Array): void {
    const { strapdown, p, tilt, biasTurn } = this;
    const wrong = this.headingWatch.add(-correction[ATTITUDE + 2]!);
    if (wrong !== null) this.warn('heading-corrected', wrong, this.timeS);
    tiltInBody(strapdown.dcm, correction, tilt);
    bendAccelBias(tilt, correction);
    correctState(strapdown.nav, strapdown.earth, correction);
    this.optional?.correct(correction, this.intervals.interval);
    strapdown.attitudeChanged();
    resetAttitudeCovariance(p, correction);
    biasTurn.form(tilt);
    biasTurn.covariance(p);
    this.budget?.reset(correction, biasTurn);
  }

  warn(code: string, sentence: string, timeS: number): void {
    this.listener.onWarning(code, sentence, timeS);
  }
}
