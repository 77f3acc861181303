/** Position and velocity at the start: given, or from the first fix. */
import type { Parameters } from '@/shared/contracts/parameters';
import { degToRad } from '@/shared/units';
import type { Fixes } from '../filter/fixes';
import { ALL_AXES } from '../filter/fixes';
import { meridianRadius, transverseRadius } from '../geodesy';
import type { ImuColumns } from '../types';
import type { FoundAttitude } from './find-attitude';
import { trackVelocity } from './track';

/** Velocity of a vehicle seen to stand still, 1σ, m/s. */
const REST_SIGMA = 0.03;
/** Where no velocity is known at all, 1σ, m/s. */
const UNKNOWN_SPEED_SIGMA = 10;
/** Height where the first fix has none, 1σ, m. */
const UNKNOWN_HEIGHT_SIGMA = 500;

export interface Place {
  /** Latitude, longitude (rad), height (m) of the IMU. */
  position: [number, number, number];
  velocity: [number, number, number];
  positionVariance: [number, number, number];
  velocityVariance: [number, number, number];
  /** Lever arm in n (m) where the position hangs on it, else null. */
  armNed: [number, number, number] | null;
  nextFix: number;
}

export function findPlace(
  imu: ImuColumns,
  fixes: Fixes,
  parameters: Parameters,
  leverArm: readonly [number, number, number],
  dcm: Float64Array,
  found: FoundAttitude,
): Place {
  const { initial, gnss } = parameters;
  const startS = imu.timeS[found.sample]!;
  const velocity = startVelocity(imu, fixes, parameters, leverArm, dcm, found);
  let nextFix = 0;
  while (nextFix < fixes.count && fixes.timeS[nextFix]! <= startS - 1e-7) nextFix += 1;
  if (initial.position !== undefined) {
    const sigma = initial.positionSigmaNedM ?? [
      gnss.positionSigmaHorizontalM,
      gnss.positionSigmaHorizontalM,
      gnss.positionSigmaVerticalM,
    ];
    const { latDeg, lonDeg, heightM } = initial.position;
    return {
      position: [degToRad(latDeg), degToRad(lonDeg), heightM],
      positionVariance: squares(sigma),
      armNed: null,
      nextFix,
      ...velocity,
    };
  }
  const j = found.fix;
  const arm = rotate(dcm, leverArm);
  const age = found.rest !== null ? 0 : startS - fixes.timeS[j]!;
  const lat = fixes.latRad[j]!;
  const [vn, ve, vd] = velocity.velocity;
  const hasHeight = fixes.positionAxes[j] === ALL_AXES;
  const height = hasHeight ? fixes.heightM[j]! : 0;
  const variance = [0, 1, 2].map((i) => fixes.positionVariance[3 * j + i]!);
  if (!hasHeight) variance[2] = UNKNOWN_HEIGHT_SIGMA ** 2;
  return {
    position: [
      lat + (vn * age - arm[0]) / (meridianRadius(lat) + height),
      fixes.lonRad[j]! + (ve * age - arm[1]) / ((transverseRadius(lat) + height) * Math.cos(lat)),
      height - vd * age + arm[2],
    ],
    positionVariance: initial.positionSigmaNedM
      ? squares(initial.positionSigmaNedM)
      : (variance as [number, number, number]),
    armNed: arm,
    // The fix that gave the position is not counted twice.
    nextFix: Math.max(nextFix, j + 1),
    ...velocity,
  };
}

function startVelocity(
  imu: ImuColumns,
  fixes: Fixes,
  parameters: Parameters,
  leverArm: readonly [number, number, number],
  dcm: Float64Array,
  found: FoundAttitude,
): Pick<Place, 'velocity' | 'velocityVariance'> {
  const { initial, gnss } = parameters;
  if (initial.velocityNedMPerS !== undefined) {
    const sigma = initial.velocitySigmaNedMPerS ?? [
      gnss.velocitySigmaHorizontalMPerS,
      gnss.velocitySigmaHorizontalMPerS,
      gnss.velocitySigmaVerticalMPerS,
    ];
    return { velocity: [...initial.velocityNedMPerS], velocityVariance: squares(sigma) };
  }
  const given = initial.velocitySigmaNedMPerS;
  const choose = (sigma: readonly [number, number, number]) => squares(given ?? sigma);
  if (found.rest !== null)
    return { velocity: [0, 0, 0], velocityVariance: choose([REST_SIGMA, REST_SIGMA, REST_SIGMA]) };
  const startS = imu.timeS[found.sample]!;
  const track = found.fix >= 0 ? nearestVelocity(fixes, found.fix, startS) : null;
  if (track === null) {
    const s = UNKNOWN_SPEED_SIGMA;
    return { velocity: [0, 0, 0], velocityVariance: choose([s, s, s]) };
  }
  // A velocity of another moment is off by what the vehicle may have accelerated since.
  const stale = 2 * Math.abs(startS - track.timeS);
  const spin = armSpin(imu, found, leverArm, dcm);
  const h = Math.hypot(track.sigma, stale);
  return {
    velocity: [track.north - spin[0], track.east - spin[1], track.down - spin[2]],
    velocityVariance: choose([h, h, Math.hypot(track.sigmaDown, stale)]),
  };
}

/** Velocity at fix j or at the first later one within two seconds that has any. */
function nearestVelocity(fixes: Fixes, j: number, startS: number) {
  for (let i = j; i < fixes.count && fixes.timeS[i]! <= startS + 2; i += 1) {
    const track = trackVelocity(fixes, i);
    if (track !== null) return track;
  }
  return null;
}

/** C(ω × l): what the antenna moves by the vehicle's turning, m/s. */
function armSpin(
  imu: ImuColumns,
  found: FoundAttitude,
  [lx, ly, lz]: readonly [number, number, number],
  dcm: Float64Array,
): [number, number, number] {
  const [gx, gy, gz] = imu.gyro;
  const k = found.sample;
  const w = [gx, gy, gz].map((axis, i) => axis[k]! * found.rateScale - found.gyroOffset[i]!);
  return rotate(dcm, [w[1]! * lz - w[2]! * ly, w[2]! * lx - w[0]! * lz, w[0]! * ly - w[1]! * lx]);
}

function rotate(dcm: Float64Array, v: readonly [number, number, number]): [number, number, number] {
  const row = (i: number) => dcm[3 * i]! * v[0] + dcm[3 * i + 1]! * v[1] + dcm[3 * i + 2]! * v[2];
  return [row(0), row(1), row(2)];
}

const squares = ([a, b, c]: readonly [number, number, number]): [number, number, number] => [
  a * a,
  b * b,
  c * c,
];
