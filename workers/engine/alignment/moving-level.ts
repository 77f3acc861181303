/**
 * Coarse level of a vehicle that never stands still: the specific force summed in the body's axes must equal the
 * change of GNSS velocity less gravity (vector matching with the heading known).
 */
import { quatFromRotationVector, quatMultiply, quatNormalise, dcmFromQuat } from '../attitude';
import type { Fixes } from '../filter/fixes';
import { normalGravity } from '../gravity';
import { medianSpacing } from '../strapdown/imu-intervals';
import type { ImuColumns } from '../types';
import { trackVelocity } from './track';

/** Tilt wanted from GNSS velocity noise alone, rad: sets how long is averaged, within limits in s. */
const WANTED_TILT = 0.008;
const SHORTEST_S = 1;
const LONGEST_S = 5;

export interface MovingLevel {
  roll: number;
  pitch: number;
  /** 1σ of roll and pitch from GNSS velocity noise, rad; biases come on top. */
  sigma: number;
  durationS: number;
}

/**
 * Roll and pitch (rad) at sample `start` given yaw (rad) there; `gyroOffset` (rad/s) and `accelBias` (m/s²) are taken
 * off. Null when GNSS gives no velocity at two times that far apart.
 */
export function levelMoving(
  imu: ImuColumns,
  fixes: Fixes,
  start: number,
  yaw: number,
  gyroOffset: readonly [number, number, number],
  accelBias: readonly [number, number, number],
): MovingLevel | null {
  const span = velocitySpan(fixes, imu.timeS[start]!);
  if (span === null) return null;
  const sum = sumInStartAxes(imu, start, span.from, span.to, gyroOffset, accelBias);
  if (sum === null) return null;
  const { a, b } = span;
  const dt = b.timeS - a.timeS;
  const g = normalGravity(fixes.latRad[span.fix]!, 0);
  // Specific force in axes level and turned to the heading, m/s².
  const north = (b.north - a.north) / dt;
  const east = (b.east - a.east) / dt;
  const down = (b.down - a.down) / dt - g;
  const forward = north * Math.cos(yaw) + east * Math.sin(yaw);
  const right = -north * Math.sin(yaw) + east * Math.cos(yaw);
  const [fx, fy, fz] = sum.map((v) => v / dt) as [number, number, number];
  // R_x(roll): y cos r − z sin r = right; R_y(pitch): x cos p + (y sin r + z cos r) sin p = forward.
  const lateral = Math.hypot(fy, fz);
  const roll = Math.atan2(-fy, -fz) + Math.asin(clamp(right / lateral));
  const rolled = fy * Math.sin(roll) + fz * Math.cos(roll);
  const pitch = solvePitch(fx, rolled, forward, down);
  const sigma = Math.hypot(a.sigma, b.sigma) / dt / g;
  return { roll, pitch, sigma, durationS: dt };
}

const clamp = (x: number) => Math.max(-1, Math.min(1, x));

/** Angle that turns (x, z) towards (forward, down). */
function solvePitch(x: number, z: number, forward: number, down: number): number {
  // forward = x cos p + z sin p, down = −x sin p + z cos p
  return Math.atan2(z * forward - x * down, x * forward + z * down);
}

function velocitySpan(fixes: Fixes, startS: number) {
  let first = -1;
  for (let j = 0; j < fixes.count; j += 1) {
    if (fixes.timeS[j]! < startS) continue;
    const b = trackVelocity(fixes, j);
    if (b === null || b.timeS < startS) continue;
    if (first < 0) {
      first = j;
      continue;
    }
    const a = trackVelocity(fixes, first)!;
    const dt = b.timeS - a.timeS;
    const wanted = Math.hypot(a.sigma, b.sigma) / 9.8 / WANTED_TILT;
    if (dt >= Math.min(LONGEST_S, Math.max(SHORTEST_S, wanted)) - 1e-6)
      return { a, b, fix: first, from: a.timeS, to: b.timeS };
  }
  return null;
}

/** ∫ C(start←t) f dt over [from, to], m/s. */
function sumInStartAxes(
  imu: ImuColumns,
  start: number,
  from: number,
  to: number,
  gyroOffset: readonly [number, number, number],
  accelBias: readonly [number, number, number],
): [number, number, number] | null {
  const scale = imu.sampling === 'increment' ? 1 / medianSpacing(imu.timeS) : 1;
  const q = Float64Array.of(1, 0, 0, 0);
  const turn = new Float64Array(4);
  const c = new Float64Array(9);
  const sum: [number, number, number] = [0, 0, 0];
  const time = imu.timeS;
  if (to > time[time.length - 1]!) return null;
  for (let k = start + 1; k < time.length && time[k - 1]! < to; k += 1) {
    const dt = time[k]! - time[k - 1]!;
    const half = [0, 1, 2].map((i) => (imu.gyro[i as 0 | 1 | 2][k]! * scale - gyroOffset[i]!) * dt * 0.5);
    quatFromRotationVector(half[0]!, half[1]!, half[2]!, turn);
    quatMultiply(q, turn, q);
    dcmFromQuat(q, c);
    const part = Math.max(0, Math.min(to, time[k]!) - Math.max(from, time[k - 1]!));
    const f = [0, 1, 2].map((i) => imu.accel[i as 0 | 1 | 2][k]! * scale - accelBias[i]!);
    for (let i = 0; i < 3; i += 1)
      sum[i] = sum[i]! + part * (c[3 * i]! * f[0]! + c[3 * i + 1]! * f[1]! + c[3 * i + 2]! * f[2]!);
    quatMultiply(q, turn, q);
    quatNormalise(q);
  }
  return sum;
}
