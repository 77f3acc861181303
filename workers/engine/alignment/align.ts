/**
 * Alignment: the state and covariance that the filter starts from. What the parameters give is used as it stands;
 * the rest is found from the data, with an uncertainty that says how it was found.
 */
import type { Parameters } from '@/shared/contracts/parameters';
import type { RunSummary } from '@/shared/contracts/runs';
import { radToDeg } from '@/shared/units';
import { dcmFromQuat, eulerFromQuat, quatFromEuler } from '../attitude';
import { initialBiasVariance } from '../filter/bias-models';
import { biasParameters } from '../filter/bias-parameters';
import type { Fixes } from '../filter/fixes';
import { optionalVariances } from '../filter/optional-states';
import { layoutOf } from '../filter/states';
import { normalGravity } from '../gravity';
import { NAV_ACCEL_BIAS, NAV_GYRO_BIAS, NAV_SIZE, QUAT } from '../strapdown/navigation-state';
import type { AidColumns, ImuColumns } from '../types';
import { eulerSigmas, tiltFromEulerVariance } from './euler-errors';
import { findAttitude, type FoundAttitude } from './find-attitude';
import { initialCovariance, type InitialCauses } from './initial-covariance';
import { findPlace } from './place';
import { restGyroBias } from './rest-bias';

export interface Alignment {
  /** IMU sample of the start, and the first fix that the filter takes in after it. */
  sample: number;
  fix: number;
  nav: Float64Array;
  p: Float64Array;
  /** What `p` is made of. */
  causes: InitialCauses;
  report: RunSummary['alignment'];
  /** A heading aid's readings up to here were used for the start, s; −Infinity: none. */
  headingUntilS: number;
}

/**
 * Throws EngineError, saying what is missing and what would help, when IMU and GNSS do not overlap, nothing levels
 * the vehicle, or no heading can be found.
 */
export function align(
  imu: ImuColumns,
  fixes: Fixes,
  parameters: Parameters,
  leverArm: readonly [number, number, number],
  aids: AidColumns | null = null,
): Alignment {
  const found = findAttitude(imu, fixes, parameters, leverArm, aids);
  const { sample } = found;
  const timeS = imu.timeS[sample]!;
  const q = quatFromEuler(found.roll, found.pitch, found.yaw, new Float64Array(4));
  const dcm = dcmFromQuat(q, new Float64Array(9));
  const place = findPlace(imu, fixes, parameters, leverArm, dcm, found);

  const nav = new Float64Array(NAV_SIZE);
  nav.set(place.position, 0);
  nav.set(place.velocity, 3);
  nav.set(q, QUAT);
  const gyro = gyroBiasAtStart(found, parameters, dcm, place.position[0]);
  nav.set(gyro.bias, NAV_GYRO_BIAS);
  nav.set(parameters.initial.accelBiasMPerS2 ?? [0, 0, 0], NAV_ACCEL_BIAS);

  const accelVariance = initialBiasVariance(biasParameters(parameters).accel);
  const layout = layoutOf(parameters);
  const causes: InitialCauses = {
    layout,
    optionalVariance: optionalVariances(parameters, layout),
    dcm,
    latRad: place.position[0],
    gravity: normalGravity(place.position[0], place.position[2]),
    armNed: place.armNed,
    positionVariance: place.positionVariance,
    velocityVariance: place.velocityVariance,
    gyroBiasVariance: gyro.variance,
    accelBiasVariance: [accelVariance, accelVariance, accelVariance],
    gyroBiasFromRest: gyro.fromRest,
    levelled: found.levelling !== 'given',
    attitudeVariance: tiltFromEulerVariance(found.eulerVariance, found.pitch, found.yaw),
    headingArm: found.headingArm,
    eastBiasVariance: found.compass?.eastBiasVariance ?? null,
  };
  const p = initialCovariance(causes);
  const { headingUntilS = -Infinity } = found;
  return { sample, fix: place.nextFix, nav, p, causes, report: report(found, timeS, q, p), headingUntilS };
}

function gyroBiasAtStart(found: FoundAttitude, parameters: Parameters, dcm: Float64Array, latRad: number) {
  const prior = initialBiasVariance(biasParameters(parameters).gyro);
  const given = parameters.initial.gyroBiasRadPerS;
  if (given !== undefined || found.rest === null)
    return { bias: given ?? [0, 0, 0], variance: [prior, prior, prior] as const, fromRest: false };
  const yawVariance = found.compass?.totalVariance ?? found.eulerVariance[2];
  return { ...restGyroBias(found.rest, parameters, dcm, latRad, yawVariance), fromRest: true };
}

function report(found: FoundAttitude, timeS: number, q: Float64Array, p: Float64Array): Alignment['report'] {
  const euler = eulerFromQuat(q, new Float64Array(3));
  const sigma = eulerSigmas(p, euler[1]!, euler[2]!, new Float64Array(3));
  const degrees = (v: Float64Array): [number, number, number] => [
    radToDeg(v[0]!),
    radToDeg(v[1]!),
    radToDeg(v[2]!),
  ];
  return {
    timeS,
    levelling: found.levelling,
    heading: found.heading,
    sentence: `${found.levelSentence} ${found.headingSentence} (${radToDeg(euler[2]!).toFixed(1)}° ± ${radToDeg(sigma[2]!).toFixed(1)}°, 1σ).`,
    attitudeDeg: degrees(euler),
    attitudeSigmaDeg: degrees(sigma),
  };
}
