/**
 * Heading by matching changes of velocity: what GNSS saw between two fixes in n against what dead reckoning saw in the
 * vehicle's level frame. No assumption about where the vehicle points; it only has to accelerate.
 */
import { wrapAngle } from '../geodesy';
import type { DeadReckoning } from './dead-reckoning';
import type { HeadingAverage } from './heading-average';
import type { HeadingQuestion } from './heading-search';
import type { StaticStretch } from './static-stretch';
import { eastBetween, northBetween } from './track';

/** Fixes are paired with earlier ones this far back, s. */
const PAIR_MIN_S = 1;
const PAIR_MAX_S = 10;
/** A change of velocity smaller than this tells no direction, m/s; likewise a way, m. */
const MIN_CHANGE = 0.7;
const MIN_WAY = 3;
const OUTLIER_SIGMAS = 4;
const GRAVITY = 9.8;

/** GNSS and dead-reckoned velocity of the antenna, north and east, at one fix. */
interface Pair {
  timeS: number;
  gnssN: number;
  gnssE: number;
  ownN: number;
  ownE: number;
  variance: number;
}

export class VelocityMatch {
  private readonly pairs: Pair[] = [];
  private anchor = -1;

  constructor(
    private readonly question: HeadingQuestion,
    private readonly reckoning: DeadReckoning,
    private readonly rest: StaticStretch,
    private readonly average: HeadingAverage,
  ) {
    const restS = question.imu.timeS[rest.to]!;
    this.pairs.push({ timeS: restS, gnssN: 0, gnssE: 0, ownN: 0, ownE: 0, variance: 0 });
  }

  /** When the vehicle left its rest, s. */
  get sinceS(): number {
    return this.pairs[0]!.timeS;
  }

  /** Takes in fix j; the dead reckoning stands at the sample at or just after it. */
  add(j: number): void {
    const { fixes } = this.question;
    if (this.anchor < 0 && fixes.positionAxes[j] !== 0) this.anchor = j;
    if (this.reckoning.sample <= this.rest.to) return;
    if (fixes.velocityAxes[j] !== 0) this.addVelocity(j);
    else if (fixes.positionAxes[j] !== 0 && this.pairs.length === 1) this.addWay(j);
  }

  private addVelocity(j: number): void {
    const { fixes } = this.question;
    const now = this.pairAt(j);
    let best: Pair | null = null;
    let bestSigma = Infinity;
    for (const then of this.pairs) {
      if (now.timeS - then.timeS < PAIR_MIN_S) break;
      const change = Math.hypot(now.gnssN - then.gnssN, now.gnssE - then.gnssE);
      const own = Math.hypot(now.ownN - then.ownN, now.ownE - then.ownE);
      if (Math.min(change, own) < MIN_CHANGE) continue;
      const spread = Math.hypot(Math.sqrt(now.variance + then.variance), this.drift(then.timeS, now.timeS));
      // A turn of the frame changes no length: a pair that differs in it holds an outlier.
      if (Math.abs(change - own) > OUTLIER_SIGMAS * spread) continue;
      const sigma = spread / change;
      if (sigma >= bestSigma) continue;
      best = then;
      bestSigma = sigma;
    }
    this.pairs.push(now);
    // The rest itself stays as the first; others are dropped once too old.
    while (this.pairs.length > 2 && now.timeS - this.pairs[1]!.timeS > PAIR_MAX_S) this.pairs.splice(1, 1);
    if (best === null) return;
    const yaw =
      Math.atan2(now.gnssE - best.gnssE, now.gnssN - best.gnssN) -
      Math.atan2(now.ownE - best.ownE, now.ownN - best.ownN);
    const speed = Math.hypot(fixes.velocity[0][j]!, fixes.velocity[1][j]!);
    this.average.add(wrapAngle(yaw), bestSigma, now.timeS, speed, this.reckoning.biasArm);
  }

  private pairAt(j: number): Pair {
    const { fixes, leverArm } = this.question;
    const { velocity, dcm, rate } = this.reckoning;
    const [lx, ly, lz] = leverArm;
    const spinX = rate[1]! * lz - rate[2]! * ly;
    const spinY = rate[2]! * lx - rate[0]! * lz;
    const spinZ = rate[0]! * ly - rate[1]! * lx;
    const own = (i: number) =>
      velocity[i]! + dcm[3 * i]! * spinX + dcm[3 * i + 1]! * spinY + dcm[3 * i + 2]! * spinZ;
    return {
      timeS: fixes.timeS[j]!,
      gnssN: fixes.velocity[0][j]!,
      gnssE: fixes.velocity[1][j]!,
      ownN: own(0),
      ownE: own(1),
      variance: (fixes.velocityVariance[3 * j]! + fixes.velocityVariance[3 * j + 1]!) / 2,
    };
  }

  /** 1σ of the dead-reckoned change of velocity between two times, m/s. */
  private drift(thenS: number, nowS: number): number {
    const { parameters, gyroBiasSigma, accelBiasSigma } = this.question;
    const dt = nowS - thenS;
    const moved = nowS - this.sinceS;
    return Math.hypot(
      // The tilt that the gyro bias has grown meanwhile leaks gravity in.
      GRAVITY * gyroBiasSigma * Math.max(moved - dt / 2, dt / 2) * dt,
      GRAVITY * parameters.gyro.whiteNoiseRadPerSqrtS * Math.sqrt(moved) * dt,
      // A turn uncovers the accelerometer bias that the levelling had taken for tilt.
      accelBiasSigma * Math.min(2, this.reckoning.largestTurn) * dt,
      parameters.accel.whiteNoiseMPerSPerSqrtS * Math.sqrt(dt),
    );
  }

  /** Without GNSS velocity: the way from the place of rest. */
  private addWay(j: number): void {
    const { fixes, imu, leverArm } = this.question;
    const { velocity, way, dcm, sample } = this.reckoning;
    const north = northBetween(fixes, this.anchor, j);
    const east = eastBetween(fixes, this.anchor, j);
    const distance = Math.hypot(north, east);
    const lag = imu.timeS[sample]! - fixes.timeS[j]!;
    // The antenna swings about the IMU as the vehicle turns.
    const [lx, ly] = leverArm;
    const ownN = way[0]! - velocity[0]! * lag + (dcm[0]! - 1) * lx + dcm[1]! * ly;
    const ownE = way[1]! - velocity[1]! * lag + dcm[3]! * lx + (dcm[4]! - 1) * ly;
    const own = Math.hypot(ownN, ownE);
    if (Math.min(distance, own) < MIN_WAY) return;
    const moved = fixes.timeS[j]! - this.sinceS;
    const noise = Math.sqrt(fixes.positionVariance[3 * j]! + fixes.positionVariance[3 * this.anchor]!);
    const spread = Math.hypot(noise, (this.drift(this.sinceS, fixes.timeS[j]!) * moved) / 2);
    if (Math.abs(distance - own) > OUTLIER_SIGMAS * spread) return;
    const sigma = spread / distance;
    const yaw = Math.atan2(east, north) - Math.atan2(ownE, ownN);
    this.average.add(wrapAngle(yaw), sigma, fixes.timeS[j]!, distance / moved, this.reckoning.biasArm);
  }
}
