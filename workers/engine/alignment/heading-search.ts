/**
 * Heading from GNSS, carried back by the gyros to the moment at which the filter starts, so that a standing start
 * costs no data. Two ways, each fix giving an estimate with its own σ:
 *
 * - match: after a standstill the IMU alone tells for a while how velocity changes in the vehicle's own level frame;
 *   turned to agree with the change of GNSS velocity (or with the way from the start), that gives the heading of any
 *   vehicle, one that reverses or flies sideways included (see velocity-match.ts);
 * - course: the vehicle is taken to point where it goes.
 */
import type { Parameters } from '@/shared/contracts/parameters';
import { wrapAngle } from '../geodesy';
import type { Fixes } from '../filter/fixes';
import type { ImuColumns } from '../types';
import { DeadReckoning } from './dead-reckoning';
import { HeadingAverage, type HeadingEstimate } from './heading-average';
import type { StaticStretch } from './static-stretch';
import { trackVelocity } from './track';
import { VelocityMatch } from './velocity-match';

/** An estimate poorer than this is passed over while better ones may come, rad. */
const GOOD_SIGMA = 0.1;
const GOOD_SIGMA_OF_POSITIONS = 0.25;
/** A vehicle does not point exactly where it goes: 1σ, rad, and the arm between IMU and unsteered axle, m. */
const SLIP_SIGMA = (0.5 * Math.PI) / 180;
const AXLE_ARM_M = 1.5;
/** A chord bent all the way round tells nothing, rad. */
const CURVE_SIGMA = 2;
/** A course is not believed before a match had this long to contradict it, s. */
const MATCH_GRACE_S = 30;
/**
 * The filter will draw the matched heading from the same velocities once more: its start is held this many times less
 * certain, so that counting twice changes nothing to speak of.
 */
const MATCH_CAUTION = 3;
export interface HeadingQuestion {
  imu: ImuColumns;
  fixes: Fixes;
  parameters: Parameters;
  leverArm: readonly [number, number, number];
  start: number;
  roll: number;
  pitch: number;
  rest: StaticStretch | null;
  /** Taken off the gyros: bias, and at rest the Earth rate with it, rad/s. */
  rateOffset: readonly [number, number, number];
  accelOffset: readonly [number, number, number];
  /** 1σ of what is left of the gyro bias (rad/s) and of the accelerometer bias (m/s²). */
  gyroBiasSigma: number;
  accelBiasSigma: number;
}

export interface FoundHeading extends HeadingEstimate {
  way: 'course' | 'match';
  carriedS: number;
}

/** Null when neither way gives anything in the whole log. */
export function searchHeading(question: HeadingQuestion): FoundHeading | null {
  const { imu, fixes, start, rest } = question;
  const moveFrom = rest?.to ?? start;
  const gravity = rest === null ? 9.8 : Math.hypot(...rest.accel.map((f, i) => f - question.accelOffset[i]!));
  const reckoning = new DeadReckoning(
    imu, start, moveFrom, question.roll, question.pitch, question.rateOffset, question.accelOffset, gravity,
  ); // prettier-ignore
  const goodSigma = fixes.velocityAxes.some((axes) => axes !== 0) ? GOOD_SIGMA : GOOD_SIGMA_OF_POSITIONS;
  const course = new HeadingAverage(goodSigma, SLIP_SIGMA);
  const match = new HeadingAverage(goodSigma, 0);
  const pointing = new CourseMatch(question, reckoning, course);
  const matcher = rest === null ? null : new VelocityMatch(question, reckoning, rest, match);
  const time = imu.timeS;
  let j = 0;
  while (j < fixes.count && fixes.timeS[j]! < time[start]!) j += 1;
  for (let k = start + 1; k < time.length; k += 1) {
    reckoning.step();
    for (; j < fixes.count && fixes.timeS[j]! <= time[k]!; j += 1) {
      pointing.add(j);
      matcher?.add(j);
    }
    const grace = matcher === null || !Number.isFinite(matcher.sinceS) ? 0 : MATCH_GRACE_S;
    if (match.isFull(time[k]!) || course.isFull(time[k]! - grace)) break;
  }
  return choose(course.result(), match.result(), time[start]!);
}

function choose(
  course: HeadingEstimate | null,
  match: HeadingEstimate | null,
  startS: number,
): FoundHeading | null {
  if (match !== null) match.sigma *= MATCH_CAUTION;
  // What they differ by may be a slip as well as the match's error.
  if (course !== null && match !== null)
    course.sigma = pointsWhereItGoes(course, match)
      ? Math.hypot(course.sigma, wrapAngle(course.yaw - match.yaw))
      : Infinity;
  if (match !== null && (course === null || match.sigma <= course.sigma))
    return { ...match, way: 'match', carriedS: match.timeS - startS };
  return course && { ...course, way: 'course', carriedS: course.timeS - startS };
}

/**
 * Is the difference of both ways likelier where course and heading are one, and it is the estimates' error, than where
 * the vehicle flies or slides to any side alike? Of even odds: N(Δ; 0, σ²) > 1/2π.
 */
function pointsWhereItGoes(course: HeadingEstimate, match: HeadingEstimate): boolean {
  const sigma = Math.hypot(course.sigma, match.sigma / MATCH_CAUTION);
  const z = wrapAngle(course.yaw - match.yaw) / sigma;
  return z * z < 2 * Math.max(1, Math.log(Math.sqrt(2 * Math.PI) / sigma));
}

/** Takes the vehicle to point where it goes: course of a fix less what the gyros say the vehicle has turned. */
class CourseMatch {
  /** The way at unit speed where the vehicle points, up to each fix, s. */
  private readonly pointed = new Map<number, [number, number]>();

  constructor(
    private readonly question: HeadingQuestion,
    private readonly reckoning: DeadReckoning,
    private readonly average: HeadingAverage,
  ) {}

  /** Takes in fix j; the dead reckoning stands at the sample at or just after it. */
  add(j: number): void {
    const { imu, fixes, parameters, leverArm } = this.question;
    const { rate, yaw, yawRate, pointed, sample } = this.reckoning;
    const lag = imu.timeS[sample]! - fixes.timeS[j]!;
    const here: [number, number] = [pointed[0]! - Math.cos(yaw) * lag, pointed[1]! - Math.sin(yaw) * lag];
    this.pointed.set(j, here);
    const track = trackVelocity(fixes, j);
    if (track === null) return;
    const speed = Math.hypot(track.north, track.east);
    if (speed < parameters.initial.courseSpeedMPerS) return;
    // The antenna moves sideways as the vehicle turns.
    const sideways = rate[2]! * leverArm[0] - rate[0]! * leverArm[2];
    const slip = track.from < 0 ? Math.asin(Math.max(-1, Math.min(1, sideways / speed))) : 0;
    let pointing = yaw - yawRate * lag;
    let curve = 0;
    if (track.from >= 0) {
      // Between two positions the vehicle pointed in many directions: on the whole along this chord.
      const there = this.pointed.get(track.from);
      if (there === undefined) return;
      const north = here[0] - there[0];
      const east = here[1] - there[1];
      pointing = Math.atan2(east, north);
      curve = CURVE_SIGMA * (1 - Math.hypot(north, east) / (fixes.timeS[j]! - fixes.timeS[track.from]!));
    }
    const sigma = Math.hypot(track.sigma / speed, SLIP_SIGMA, (yawRate * AXLE_ARM_M) / speed, curve);
    const course = Math.atan2(track.east, track.north) - slip;
    this.average.add(wrapAngle(course - pointing), sigma, track.timeS, speed, this.reckoning.biasArm);
  }
}
