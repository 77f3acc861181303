/** Velocity and course at GNSS fixes: the receiver's own velocity, else differences of position. */
import type { Fixes } from '../filter/fixes';
import { meridianRadius, transverseRadius, wrapAngle } from '../geodesy';

export interface TrackVelocity {
  north: number;
  east: number;
  /** 0 where it is not measured. */
  down: number;
  /** 1σ of each horizontal component and of the vertical one, m/s. */
  sigma: number;
  sigmaDown: number;
  /** Time that it belongs to, s. */
  timeS: number;
  /** Fix that it is measured from; −1: it is the receiver's own velocity at one moment. */
  from: number;
}

/** σ of an unmeasured vertical velocity: what a vehicle may do, m/s. */
const UNMEASURED_DOWN_SIGMA = 1;
/** Position differences span this much time, s, or longer up to the limit until the way is this many σ. */
const DIFFERENCE_MIN_S = 1;
const DIFFERENCE_MAX_S = 10;
const DIFFERENCE_SIGMAS = 15;

export function horizontalSpeed(fixes: Fixes, j: number): number {
  return Math.hypot(fixes.velocity[0][j]!, fixes.velocity[1][j]!);
}

export function horizontalDistance(fixes: Fixes, i: number, j: number): number {
  return Math.hypot(northBetween(fixes, i, j), eastBetween(fixes, i, j));
}

/** Velocity of the antenna at fix j, or null where neither velocity nor an earlier position tells. */
export function trackVelocity(fixes: Fixes, j: number): TrackVelocity | null {
  if (fixes.velocityAxes[j] === 0) return fromPositions(fixes, j);
  const hasDown = (fixes.velocityAxes[j]! & 4) !== 0;
  return {
    north: fixes.velocity[0][j]!,
    east: fixes.velocity[1][j]!,
    down: hasDown ? fixes.velocity[2][j]! : 0,
    sigma: Math.sqrt((fixes.velocityVariance[3 * j]! + fixes.velocityVariance[3 * j + 1]!) / 2),
    sigmaDown: hasDown ? Math.sqrt(fixes.velocityVariance[3 * j + 2]!) : UNMEASURED_DOWN_SIGMA,
    timeS: fixes.timeS[j]!,
    from: -1,
  };
}

/** Difference against an earlier fix: the mean velocity, which belongs to the middle of the two. */
function fromPositions(fixes: Fixes, j: number): TrackVelocity | null {
  if (fixes.positionAxes[j] === 0) return null;
  const variance = (k: number, axis: number) => fixes.positionVariance[3 * k + axis]!;
  const sigmaOf = (i: number) =>
    Math.sqrt((variance(i, 0) + variance(i, 1) + variance(j, 0) + variance(j, 1)) / 2);
  let best = -1;
  for (let i = j - 1; i >= 0 && fixes.timeS[j]! - fixes.timeS[i]! <= DIFFERENCE_MAX_S + 1e-6; i -= 1) {
    if (fixes.positionAxes[i] === 0) continue;
    if (fixes.timeS[j]! - fixes.timeS[i]! < DIFFERENCE_MIN_S - 1e-6) continue;
    best = i;
    if (horizontalDistance(fixes, i, j) > DIFFERENCE_SIGMAS * sigmaOf(i)) break;
  }
  if (best < 0) return null;
  const dt = fixes.timeS[j]! - fixes.timeS[best]!;
  const hasHeight = (fixes.positionAxes[best]! & fixes.positionAxes[j]! & 4) !== 0;
  return {
    north: northBetween(fixes, best, j) / dt,
    east: eastBetween(fixes, best, j) / dt,
    down: hasHeight ? -(fixes.heightM[j]! - fixes.heightM[best]!) / dt : 0,
    sigma: sigmaOf(best) / dt,
    sigmaDown: hasHeight ? Math.sqrt(variance(best, 2) + variance(j, 2)) / dt : UNMEASURED_DOWN_SIGMA,
    timeS: (fixes.timeS[best]! + fixes.timeS[j]!) / 2,
    from: best,
  };
}

export function northBetween(fixes: Fixes, i: number, j: number): number {
  return (fixes.latRad[j]! - fixes.latRad[i]!) * meridianRadius(fixes.latRad[i]!);
}

export function eastBetween(fixes: Fixes, i: number, j: number): number {
  const lat = fixes.latRad[i]!;
  return wrapAngle(fixes.lonRad[j]! - fixes.lonRad[i]!) * transverseRadius(lat) * Math.cos(lat);
}
