/**
 * The error-state filter over a recording, 15 states and those that are switched on behind them: strapdown at full rate,
 * covariance at its own rate, GNSS fixes and other sensors' readings at their exact measurement times, errors fed back at
 * once (closed loop).
 *
 * Read in this order: `advanceSample` (one IMU interval with the fixes that lie in it), `CarriedState.covarianceStep`,
 * `applyFix`, `aid`, `feedBack`, then recovery.ts.
 */
import type { Parameters } from '@/shared/contracts/parameters';
import type { Outage } from '@/shared/contracts/runs';
import type { AidColumns, ImuColumns } from '../types';
import { ANGLE, ANGLE_BEND, DURATION, ImuIntervals } from '../strapdown/imu-intervals';
import { NAV_GYRO_BIAS } from '../strapdown/navigation-state';
import { CarriedState } from './carried-state';
import { findClipping } from './clipping';
import { ClippingWatch } from './clipping-watch';
import { resetAttitudeCovariance } from './attitude-feedback';
import { correctState } from './correct-state';
import { DataAids } from './data-aids';
import type { AidName, FilterListener, FilterSnapshot, GroupName } from './filter-types';
import { ALL_AXES, type Fixes } from './fixes';
import { GapBridge } from './gap-bridge';
import { gatesOf, type Gate } from './gate';
import { GnssModels } from './gnss-models';
import { HeadingWatch } from './heading-watch';
import type { MeasurementUpdate } from './measurement-update';
import { recoverGroups } from './recovery';
import { VehicleAids } from './vehicle-aids';
import { ATTITUDE } from './states';
import { updateOf } from './wide-update';

/** A fix this close to an IMU sample, s, counts as simultaneous. */
const SAME_TIME_S = 1e-7;
/** Gaps are bridged in steps of at most this, s. */
const GAP_STEP_S = 0.02;

export class ErrorStateFilter extends CarriedState {
  /** IMU sample that the state belongs to. */
  sample = 0;
  /** Next fix to be looked at. */
  private fix = 0;
  readonly gates: Readonly<Record<GroupName | AidName, Gate>>;
  private readonly aids: VehicleAids | null;
  private readonly data: DataAids | null;
  /** Windows that may name aids. */
  private outages: readonly Outage[] = [];
  private readonly intervals: ImuIntervals;
  private readonly update: MeasurementUpdate;
  private readonly models: GnssModels;
  private readonly rate = new Float64Array(3);
  private readonly stepS: number;
  private readonly headingWatch = new HeadingWatch();
  private readonly clipping: ClippingWatch;

  /** `withheld`: bits of `withheldBy` for each fix. `data`: what other sensors logged. */
  constructor(
    private readonly imu: ImuColumns,
    private readonly fixes: Fixes,
    private withheld: Uint8Array,
    parameters: Parameters,
    leverArmM: readonly [number, number, number],
    private readonly listener: FilterListener,
    data: AidColumns | null = null,
  ) {
    super(parameters, leverArmM);
    this.update = updateOf(this.layout);
    this.intervals = new ImuIntervals(imu);
    this.gates = gatesOf(parameters.gate);
    this.aids = VehicleAids.of(imu, parameters);
    this.data = DataAids.of(data, parameters.aids);
    // A rate drawn on from the last two intervals has 2.5 times the variance of one.
    const { nominalS } = this.intervals;
    const rateNoise = nominalS > 0 ? (2.5 * this.noise.gyroWhite) / nominalS : 0;
    this.models = new GnssModels(this.optional?.leverArm ?? leverArmM, rateNoise, this.layout);
    this.clipping = new ClippingWatch(findClipping(imu, parameters.clipping));
    this.stepS = parameters.mechanisation.covarianceIntervalS - 0.5 * this.intervals.nominalS;
  }

  /**
   * Starts at IMU sample `sample` with a state and covariance (both copied); fixes before `fix` are past, and a heading
   * aid's readings up to `headingS`.
   */
  start(sample: number, fix: number, nav: Float64Array, p: Float64Array, headingS = -Infinity): void {
    this.sample = sample;
    this.fix = fix;
    this.strapdown.start(nav);
    this.p.set(p);
    this.watchHeading();
    this.clipping.start(sample);
    this.data?.start(this.timeS, headingS);
  }

  private watchHeading(): void {
    this.headingWatch.restart(this.timeS, Math.sqrt(this.p[(ATTITUDE + 2) * (this.layout.size + 1)]!));
  }

  get timeS(): number {
    return this.imu.timeS[this.sample]!;
  }

  /** Moves on to the next IMU sample, taking in the fixes measured on the way, those at its own time included. */
  advanceSample(): void {
    const { intervals, fixes, imu, data } = this;
    const k = this.sample + 1;
    intervals.load(k);
    const start = imu.timeS[k - 1]!;
    const end = imu.timeS[k]!;
    if (intervals.isGap) this.reportGap(start, end);
    else this.optional?.scaleInterval(intervals.interval);
    if (k >= this.clipping.from) this.clipping.enter(k, this);
    let from = 0;
    while (this.fix < fixes.count && fixes.timeS[this.fix]! <= end + SAME_TIME_S) {
      const j = this.fix;
      this.fix += 1;
      if ((fixes.positionAxes[j]! | fixes.velocityAxes[j]!) === 0) continue;
      const time = fixes.timeS[j]!;
      if (data !== null && data.nextS <= time) from = this.takeData(data, time, from);
      const to = this.shareAt(time, from);
      if (to > from) this.move(from, to);
      from = to;
      this.applyFix(j, to);
    }
    if (data !== null && data.nextS <= end + SAME_TIME_S) from = this.takeData(data, end + SAME_TIME_S, from);
    if (from < 1) this.move(from, 1);
    this.sample = k;
    if (this.strapdown.sumForce[3]! >= this.stepS) this.covarianceStep();
    if (k >= this.clipping.from) this.clipping.leave(k, this);
    this.aids?.apply(k, this);
  }

  /** Share of the loaded interval at a time, s; not before `from`. */
  private shareAt(timeS: number, from: number): number {
    const start = this.imu.timeS[this.sample]!;
    const end = this.imu.timeS[this.sample + 1]!;
    return end - timeS <= SAME_TIME_S ? 1 : Math.max(from, (timeS - start) / (end - start));
  }

  /** Other sensors' readings up to a time, each where it was measured; the share that has been reached. */
  private takeData(data: DataAids, untilS: number, from: number): number {
    let at = from;
    while (data.nextS <= untilS) {
      const to = this.shareAt(data.nextS, at);
      if (to > at) this.move(at, to);
      at = to;
      data.apply(this);
    }
    return at;
  }

  /** Strapdown over a part of the loaded interval; a gap goes in small steps with noise of its own. */
  private move(from: number, to: number): void {
    const { interval, isGap } = this.intervals;
    if (!isGap) {
      this.strapdown.advance(interval, from, to);
      this.optional?.gather(interval, from, to);
      return;
    }
    const duration = interval[DURATION]!;
    const bridge = new GapBridge(this.imu, this.sample + 1, duration, this.intervals.nominalS);
    this.noise.gyroExtra = bridge.gyroNoise;
    this.noise.accelExtra = bridge.accelNoise;
    const steps = Math.ceil(((to - from) * duration) / GAP_STEP_S);
    for (let i = 0; i < steps; i += 1) {
      const a = from + ((to - from) * i) / steps;
      const b = from + ((to - from) * (i + 1)) / steps;
      bridge.fill(interval, (a + b) / 2, this.strapdown);
      this.strapdown.advance(interval, a, b);
      this.optional?.gather(interval, a, b);
      this.covarianceStep();
    }
    this.noise.gyroExtra = 0;
    this.noise.accelExtra = 0;
    if (to < 1) return;
    const heading = (ATTITUDE + 2) * (this.layout.size + 1);
    this.p[heading] = this.p[heading]! + bridge.headingVariance;
    this.budget?.add(ATTITUDE + 2, bridge.headingVariance);
    this.watchHeading();
  }

  private reportGap(start: number, end: number): void {
    this.covarianceStep();
    this.listener.onWarning(
      'gap-bridged',
      `The IMU gave nothing for ${(end - start).toFixed(2)} s; the last rates were held and the uncertainty widened.`,
      start,
    );
  }

  /** Position, then velocity of fix j, at the share `at` of the loaded interval. */
  private applyFix(j: number, at: number): void {
    const { fixes, strapdown, update, parameters } = this;
    const withheld = this.withheld[j]!;
    const positionAxes = parameters.gnss.usePosition && (withheld & 1) === 0 ? fixes.positionAxes[j]! : 0;
    const velocityAxes = parameters.gnss.useVelocity && (withheld & 2) === 0 ? fixes.velocityAxes[j]! : 0;
    if ((positionAxes | velocityAxes) === 0) return;
    this.covarianceStep();
    if (positionAxes !== 0) {
      this.models.position(strapdown, fixes, j, positionAxes, update);
      this.judge('position', j, positionAxes);
    }
    if (velocityAxes !== 0) {
      this.rateAt(at);
      this.models.velocity(strapdown, this.rate, fixes, j, velocityAxes, update);
      this.judge('velocity', j, velocityAxes);
    }
  }

  /** Angular rate at the share `at` of the loaded interval, rates linear in time, bias taken off. */
  private rateAt(at: number): void {
    const { interval } = this.intervals;
    for (let i = 0; i < 3; i += 1)
      this.rate[i] =
        (interval[ANGLE + i]! + (2 * at - 1) * interval[ANGLE_BEND + i]!) / interval[DURATION]! -
        this.strapdown.nav[NAV_GYRO_BIAS + i]!;
  }

  private judge(group: GroupName, j: number, axes: number): void {
    const { update, fixes } = this;
    update.prepare(this.p);
    const time = fixes.timeS[j]!;
    const verdict = this.gates[group].judge(time, update.rows, update.nis);
    this.listener.onInnovation(group, time, axes, update, verdict === 'accept');
    if (verdict === 'accept') {
      this.take(update, 'GNSS noise');
    } else if (verdict === 'recover') {
      recoverGroups(this, group, time, axes, update);
    }
  }

  /** An aid at a time that the filter has reached: `setUp` forms innovation, H and R, or says false: nothing measured. */
  aid(name: AidName, setUp: (update: MeasurementUpdate) => unknown, timeS = this.timeS): void {
    const { update } = this;
    if (this.outages.some((w) => w.withhold === name && timeS >= w.startS && timeS < w.endS)) return;
    this.covarianceStep();
    if (setUp(update) === false) return;
    update.prepare(this.p);
    // An aid that is refused says that it does not hold here; it never moves the state by force.
    const accepted = this.gates[name].judge(timeS, update.rows, update.nis) === 'accept';
    this.listener.onInnovation(name, timeS, ALL_AXES, update, accepted);
    if (accepted) this.take(update, 'aids');
  }

  private take(update: MeasurementUpdate, source: 'GNSS noise' | 'aids'): void {
    update.apply(this.p);
    this.budget?.update(update, source);
    this.tape?.writeUpdate(update);
    this.feedBack(update.correction);
  }

  /** Adds a correction (measured − predicted, through the gain) to the state and turns P into the new attitude. */
  feedBack(correction: Float64Array): void {
    const { strapdown, p } = this;
    const wrong = this.headingWatch.add(-correction[ATTITUDE + 2]!);
    if (wrong !== null) this.warn('heading-corrected', wrong, this.timeS);
    correctState(strapdown.nav, strapdown.earth, correction);
    this.optional?.correct(correction, this.intervals.interval);
    strapdown.attitudeChanged();
    resetAttitudeCovariance(p, correction);
    this.budget?.reset(correction);
  }

  warn(code: string, sentence: string, timeS: number): void {
    this.listener.onWarning(code, sentence, timeS);
  }

  /** Replaces the outage mask, and the windows that may name aids: what is withheld from here on. */
  withhold(withheld: Uint8Array, outages: readonly Outage[] = []): void {
    this.withheld = withheld;
    this.outages = outages;
  }

  save(): FilterSnapshot {
    return {
      strapdown: this.strapdown.save(),
      p: this.p.slice(),
      sample: this.sample,
      fix: this.fix,
      clipped: this.clipping.save(),
      extraNoise: [this.noise.gyroExtra, this.noise.accelExtra],
      heading: this.headingWatch.save(),
      aids: this.aids?.save() ?? [],
      data: this.data?.save() ?? [],
      optional: this.optional?.save() ?? null,
      budget: this.budget?.save() ?? null,
      gates: Object.values(this.gates).map((gate) => gate.save()),
    };
  }

  restore(saved: FilterSnapshot): void {
    this.strapdown.restore(saved.strapdown);
    this.p.set(saved.p);
    this.sample = saved.sample;
    this.fix = saved.fix;
    this.clipping.restore(saved.clipped);
    [this.noise.gyroExtra, this.noise.accelExtra] = saved.extraNoise;
    this.headingWatch.restore(saved.heading);
    this.aids?.restore(saved.aids);
    this.data?.restore(saved.data);
    if (saved.optional !== null) this.optional?.restore(saved.optional);
    if (saved.budget !== null) this.budget?.restore(saved.budget);
    Object.values(this.gates).forEach((gate, i) => gate.restore(saved.gates[i]!));
  }
}
