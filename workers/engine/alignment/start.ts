/** Where the filter can start: a sample with a position that can be believed. */
import type { Parameters } from '@/shared/contracts/parameters';
import type { Fixes } from '../filter/fixes';
import { lowerBound } from '../run/windows';
import { EngineError, type ImuColumns } from '../types';
import { horizontalDistance, horizontalSpeed } from './track';

/**
 * The first sample at or after the wanted start, and the first with a position: given, or a fix at or before it (−1:
 * given). Throws EngineError when IMU and GNSS do not overlap or nothing is left to filter.
 */
export function firstUsable(
  imu: ImuColumns,
  fixes: Fixes,
  parameters: Parameters,
): { wanted: number; sample: number; fix: number } {
  const time = imu.timeS;
  const last = time.length - 1;
  const wantedS = Math.max(time[0]!, parameters.initial.timeS ?? -Infinity);
  const wanted = lowerBound(time, wantedS - 1e-7);
  let fix = -1;
  let from = wantedS;
  if (parameters.initial.position === undefined) {
    fix = firstPosition(fixes, wantedS);
    if (fix < 0 || fixes.timeS[fix]! > time[last]!) throw noOverlap(imu, fixes);
    from = fixes.timeS[fix]!;
  }
  const sample = lowerBound(time, from - 1e-7);
  if (sample >= last)
    throw new EngineError(
      'nothing-to-filter',
      `The IMU log ends at ${time[last]!.toFixed(2)} s, before the start at ${from.toFixed(2)} s. Start earlier (initial.timeS) or check the clocks of both files.`,
    );
  return { wanted, sample, fix };
}

/** The first fix with a position that the next ones bear out; one without height only where none has it. */
function firstPosition(fixes: Fixes, fromS: number): number {
  let poor = -1;
  for (let j = 0; j < fixes.count; j += 1) {
    if (fixes.timeS[j]! < fromS - 1e-7 || fixes.positionAxes[j] === 0) continue;
    if ((fixes.positionAxes[j]! & 4) !== 0 && isBorneOut(fixes, j)) return j;
    if (poor < 0) poor = j;
  }
  return poor;
}

/** Fixes looked at, and how far apart two may be: σ, and a vehicle's own way at this speed, m/s. */
const WITNESSES = 3;
const WITNESS_SIGMAS = 6;
const WITNESS_SPEED = 5;

/** Is one of the next fixes where this one and its velocity say? The last fix of a log has no witness and is taken. */
function isBorneOut(fixes: Fixes, j: number): boolean {
  let seen = 0;
  for (let i = j + 1; i < fixes.count && seen < WITNESSES; i += 1) {
    if (fixes.positionAxes[i] === 0) continue;
    seen += 1;
    const dt = fixes.timeS[i]! - fixes.timeS[j]!;
    const moving = fixes.velocityAxes[i] !== 0 ? horizontalSpeed(fixes, i) : 10 * WITNESS_SPEED;
    const sigma = Math.sqrt(fixes.positionVariance[3 * i]! + fixes.positionVariance[3 * j]!);
    const allowed = WITNESS_SIGMAS * sigma + (moving + WITNESS_SPEED) * dt;
    const rise = Math.abs(fixes.heightM[i]! - fixes.heightM[j]!);
    const vertical = Math.sqrt(fixes.positionVariance[3 * i + 2]! + fixes.positionVariance[3 * j + 2]!);
    const level = !(rise > WITNESS_SIGMAS * vertical + (moving + WITNESS_SPEED) * dt);
    if (level && horizontalDistance(fixes, i, j) <= allowed) return true;
  }
  return seen === 0;
}

function noOverlap(imu: ImuColumns, fixes: Fixes): EngineError {
  const range = (t: Float64Array) =>
    t.length === 0 ? 'empty' : `${t[0]!.toFixed(2)} to ${t[t.length - 1]!.toFixed(2)} s`;
  return new EngineError(
    'no-overlap',
    `No GNSS position lies within the IMU log (IMU ${range(imu.timeS)}, GNSS ${range(fixes.timeS)}). Check the clocks of both files, or give initial.position.`,
  );
}
