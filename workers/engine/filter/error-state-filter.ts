/**
 * The error-state filter over a recording, 15 states and those that are switched on behind them: strapdown at full rate,
 * covariance at its own rate, GNSS fixes and other sensors' readings at their exact measurement times, errors fed back at
 * once (closed loop).
 *
 * Read in this order: `advanceSample` (one IMU interval with the fixes that lie in it), `CarriedState.covarianceStep`,
 * `applyFix`, `CorrectedState.judge`, `take` and `feedBack`, then recovery.ts.
 */
import type { Parameters } from '@/shared/contracts/parameters';
import type { Outage } from '@/shared/contracts/runs';
import type { AidColumns, ImuColumns } from '../types';
import { ANGLE, ANGLE_BEND, DURATION } from '../strapdown/imu-intervals';
import { NAV_GYRO_BIAS } from '../strapdown/navigation-state';
import { findClipping } from './clipping';
import { ClippingWatch } from './clipping-watch';
import { CorrectedState } from './corrected-state';
import { DataAids } from './data-aids';
import type { FilterListener, FilterSnapshot } from './filter-types';
import type { Fixes } from './fixes';
import { GapBridge } from './gap-bridge';
import { GnssModels } from './gnss-models';
import { VehicleAids } from './vehicle-aids';
import { ATTITUDE } from './states';

/** A fix this close to an IMU sample, s, counts as simultaneous. */
const SAME_TIME_S = 1e-7;
/** Gaps are bridged in steps of at most this, s. */
const GAP_STEP_S = 0.02;

export class ErrorStateFilter extends CorrectedState {
  /** Next fix to be looked at. */
  private fix = 0;
  private readonly aids: VehicleAids | null;
  private readonly data: DataAids | null;
  private readonly models: GnssModels;
  private readonly rate = new Float64Array(3);
  private readonly stepS: number;
  private readonly clipping: ClippingWatch;

  /** `withheld`: bits of `withheldBy` for each fix. `data`: what other sensors logged. */
  constructor(
    imu: ImuColumns,
    private readonly fixes: Fixes,
    private withheld: Uint8Array,
    parameters: Parameters,
    leverArmM: readonly [number, number, number],
    listener: FilterListener,
    data: AidColumns | null = null,
  ) {
    super(imu, parameters, leverArmM, listener);
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
      this.judge('position', fixes.timeS[j]!, positionAxes);
    }
    if (velocityAxes !== 0) {
      this.rateAt(at);
      this.models.velocity(strapdown, this.rate, fixes, j, velocityAxes, update);
      this.judge('velocity', fixes.timeS[j]!, velocityAxes);
    }
    this.aids?.addFix(fixes, j, velocityAxes, this);
  }

  /** Angular rate at the share `at` of the loaded interval, rates linear in time, bias taken off. */
  private rateAt(at: number): void {
    const { interval } = this.intervals;
    for (let i = 0; i < 3; i += 1)
      this.rate[i] =
        (interval[ANGLE + i]! + (2 * at - 1) * interval[ANGLE_BEND + i]!) / interval[DURATION]! -
        this.strapdown.nav[NAV_GYRO_BIAS + i]!;
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
