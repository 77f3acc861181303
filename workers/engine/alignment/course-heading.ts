/**
 * Heading from GNSS course: where the vehicle moves the way it points. The gyros carry the course back to the moment
 * at which the filter starts, so that a standing start costs no data.
 */
import type { Fixes } from '../filter/fixes';
import {
  dcmFromQuat,
  eulerFromQuat,
  quatFromEuler,
  quatFromRotationVector,
  quatMultiply,
  quatNormalise,
} from '../attitude';
import { wrapAngle } from '../geodesy';
import type { ImuColumns } from '../types';
import { medianSpacing } from '../strapdown/imu-intervals';
import { trackVelocity } from './track';

/** Course is averaged over this long after it first shows, s. */
const AVERAGE_S = 2;
/** A course poorer than this is passed over while a better one may come, rad. */
const GOOD_SIGMA = 0.1;
/** A vehicle does not point exactly where it goes: 1σ, rad, and the arm between IMU and unsteered axle, m. */
const SLIP_SIGMA = (0.5 * Math.PI) / 180;
const AXLE_ARM_M = 1.5;

export interface CourseHeading {
  /** Yaw at the start sample, rad, and its 1σ as far as it comes from the course itself. */
  yaw: number;
  sigma: number;
  /** When the course was first and last taken, s. */
  firstS: number;
  timeS: number;
  speed: number;
  /** ∫C_D· dt from the start to then (s, three body axes): what a gyro bias error does to the heading carried back. */
  biasArm: [number, number, number];
  carriedS: number;
}

/**
 * Heading at sample `start` for an attitude levelled to `roll`, `pitch` (rad) there; `rateOffset` (rad/s, body) is
 * taken off the gyros: bias and Earth rate. Null when the log never shows a course above `minSpeed` m/s.
 */
export function headingFromCourse(
  imu: ImuColumns,
  fixes: Fixes,
  start: number,
  roll: number,
  pitch: number,
  rateOffset: readonly [number, number, number],
  leverArm: readonly [number, number, number],
  minSpeed: number,
): CourseHeading | null {
  const scale = imu.sampling === 'increment' ? 1 / medianSpacing(imu.timeS) : 1;
  const q = quatFromEuler(roll, pitch, 0, new Float64Array(4));
  const turn = new Float64Array(4);
  const dcm = new Float64Array(9);
  const euler = new Float64Array(3);
  const arm = new Float64Array(3);
  const average = new CourseAverage();
  const time = imu.timeS;
  let j = 0;
  while (j < fixes.count && fixes.timeS[j]! < time[start]!) j += 1;
  for (let k = start + 1; k < time.length; k += 1) {
    const dt = time[k]! - time[k - 1]!;
    const wx = imu.gyro[0][k]! * scale - rateOffset[0];
    const wy = imu.gyro[1][k]! * scale - rateOffset[1];
    const wz = imu.gyro[2][k]! * scale - rateOffset[2];
    quatMultiply(q, quatFromRotationVector(wx * dt, wy * dt, wz * dt, turn), q);
    quatNormalise(q);
    dcmFromQuat(q, dcm);
    for (let i = 0; i < 3; i += 1) arm[i] = arm[i]! + dcm[6 + i]! * dt;
    for (; j < fixes.count && fixes.timeS[j]! <= time[k]!; j += 1) {
      const track = trackVelocity(fixes, j);
      if (track === null) continue;
      const speed = Math.hypot(track.north, track.east);
      if (speed < minSpeed) continue;
      eulerFromQuat(q, euler);
      const yawRate = dcm[6]! * wx + dcm[7]! * wy + dcm[8]! * wz;
      // Yaw at the time of the fix and of the velocity; sideways velocity of the antenna by the turn.
      const yawThen = euler[2]! - yawRate * (time[k]! - track.timeS);
      const sideways = wz * leverArm[0] - wx * leverArm[2];
      const slip = Math.asin(Math.max(-1, Math.min(1, sideways / speed)));
      const course = Math.atan2(track.east, track.north) - slip;
      const sigma = Math.hypot(track.sigma / speed, SLIP_SIGMA, (yawRate * AXLE_ARM_M) / speed);
      average.add(wrapAngle(course - yawThen), sigma, track.timeS, speed, arm);
    }
    if (average.isFull(time[k]!)) break;
  }
  return average.result(time[start]!);
}

/** Collects courses; a good one starts the average, poor ones before it are kept for want of better. */
class CourseAverage {
  private reference = 0;
  private weight = 0;
  private weighted = 0;
  private best = Infinity;
  private firstS = 0;
  private timeS = 0;
  private speed = 0;
  private firstGoodS = Infinity;
  private readonly arm = new Float64Array(3);

  add(yaw: number, sigma: number, timeS: number, speed: number, arm: Float64Array): void {
    const good = sigma <= GOOD_SIGMA;
    if (good && this.firstGoodS === Infinity) {
      this.firstGoodS = timeS;
      this.weight = 0;
      this.weighted = 0;
    } else if (!good && (this.firstGoodS < Infinity || sigma >= this.best)) return;
    if (!good) {
      this.weight = 0;
      this.weighted = 0;
      this.best = sigma;
    }
    if (this.weight === 0) {
      this.reference = yaw;
      this.firstS = timeS;
    }
    const w = 1 / (sigma * sigma);
    this.weighted += w * wrapAngle(yaw - this.reference);
    this.weight += w;
    this.timeS = timeS;
    this.speed = speed;
    this.arm.set(arm);
  }

  isFull(nowS: number): boolean {
    return nowS - this.firstGoodS > AVERAGE_S;
  }

  result(startS: number): CourseHeading | null {
    if (this.weight === 0) return null;
    return {
      yaw: wrapAngle(this.reference + this.weighted / this.weight),
      // Slip does not average out.
      sigma: Math.hypot(Math.sqrt(1 / this.weight), SLIP_SIGMA),
      firstS: this.firstS,
      timeS: this.timeS,
      speed: this.speed,
      biasArm: [this.arm[0]!, this.arm[1]!, this.arm[2]!],
      carriedS: this.timeS - startS,
    };
  }
}
