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

/** A vehicle does not point exactly where it goes: 1σ, rad, and the arm between IMU and unsteered axle, m. */
const SLIP_SIGMA = (0.5 * Math.PI) / 180;
const AXLE_ARM_M = 1.5;
/** A course is not believed before a match had this long to contradict it, s. */
const MATCH_GRACE_S = 30;
/**
 * The filter will draw the matched heading from the same velocities once more: its start is held this many times less
 * certain, so that counting twice changes nothing to speak of.
 */
const MATCH_CAUTION = 3;
/** Estimates of both ways further apart than this many σ: the vehicle does not go where it points. */
const DISAGREE_SIGMAS = 4;

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
  const course = new HeadingAverage(SLIP_SIGMA);
  const match = new HeadingAverage(0);
  const matcher = rest === null ? null : new VelocityMatch(question, reckoning, rest, match);
  const time = imu.timeS;
  let j = 0;
  while (j < fixes.count && fixes.timeS[j]! < time[start]!) j += 1;
  for (let k = start + 1; k < time.length; k += 1) {
    reckoning.step();
    for (; j < fixes.count && fixes.timeS[j]! <= time[k]!; j += 1) {
      addCourse(question, reckoning, j, course);
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
  const chosen = match === null || (course !== null && agree(course, match) && course.sigma < match.sigma);
  if (chosen) return course && { ...course, way: 'course', carriedS: course.timeS - startS };
  return { ...match, way: 'match', carriedS: match.timeS - startS };
}

function agree(course: HeadingEstimate, match: HeadingEstimate): boolean {
  const own = match.sigma / MATCH_CAUTION;
  return Math.abs(wrapAngle(course.yaw - match.yaw)) <= DISAGREE_SIGMAS * Math.hypot(course.sigma, own);
}

/** Course of fix j less what the gyros say the vehicle has turned. */
function addCourse(
  { imu, fixes, parameters, leverArm }: HeadingQuestion,
  reckoning: DeadReckoning,
  j: number,
  average: HeadingAverage,
): void {
  const track = trackVelocity(fixes, j);
  if (track === null) return;
  const speed = Math.hypot(track.north, track.east);
  if (speed < parameters.initial.courseSpeedMPerS) return;
  const { rate, yawRate } = reckoning;
  const yawThen = reckoning.yaw - yawRate * (imu.timeS[reckoning.sample]! - track.timeS);
  // The antenna moves sideways as the vehicle turns.
  const sideways = rate[2]! * leverArm[0] - rate[0]! * leverArm[2];
  const slip = Math.asin(Math.max(-1, Math.min(1, sideways / speed)));
  const sigma = Math.hypot(track.sigma / speed, SLIP_SIGMA, (yawRate * AXLE_ARM_M) / speed);
  const yaw = Math.atan2(track.east, track.north) - slip - yawThen;
  average.add(wrapAngle(yaw), sigma, track.timeS, speed, reckoning.biasArm);
}
