/** The first heading: given, read from a heading aid, from the Earth's rotation, or from GNSS. */
import type { Parameters } from '@/shared/contracts/parameters';
import type { RunSummary } from '@/shared/contracts/runs';
import { degToRad } from '@/shared/units';
import { initialBiasVariance } from '../filter/bias-models';
import { biasParameters } from '../filter/bias-parameters';
import type { Fixes } from '../filter/fixes';
import { EARTH_RATE } from '../geodesy';
import { EngineError, type AidColumns, type ImuColumns } from '../types';
import { gyrocompass, type CompassHeading } from './gyrocompass';
import { headingFromAid } from './heading-aid';
import { searchHeading, type FoundHeading, type HeadingQuestion } from './heading-search';
import { restBiasVariance } from './rest-bias';
import type { StaticStretch } from './static-stretch';

type Three = [number, number, number];

/** 1σ of a given heading whose σ was not given, rad. */
export const GIVEN_HEADING_SIGMA = degToRad(5);

/** What is known where the filter is to start. */
export interface Situation {
  imu: ImuColumns;
  fixes: Fixes;
  parameters: Parameters;
  leverArm: readonly [number, number, number];
  sample: number;
  fix: number;
  rest: StaticStretch | null;
  rateScale: number;
  gyroOffset: Three;
  aids: AidColumns | null;
}

export interface HeadingPart {
  /** At the start, rad. */
  yaw: number;
  yawVariance: number;
  headingArm: Three | null;
  heading: RunSummary['alignment']['heading'];
  headingSentence: string;
  /** Readings of a heading aid up to here were used, s. */
  headingUntilS?: number;
  /** The heading is from the Earth's rotation: it shares the gyro bias towards east. */
  compass?: CompassHeading;
}

/**
 * Of the ways that the data allow the best, in that order where they are equal. Throws EngineError when none works.
 * `roll`, `pitch`: rad.
 */
export function findHeading(s: Situation, roll: number, pitch: number): HeadingPart {
  const known = knownHeading(s);
  if (known !== null) return known;
  const compass = s.rest && gyrocompass(s.rest, s.parameters, roll, pitch, latitude(s));
  const asked = question(s, roll, pitch);
  const found = searchHeading(asked);
  if (compass !== null && (found === null || compass.totalVariance < carriedVariance(asked, found)))
    return compassPart(s, compass);
  if (found === null) throw noHeading(s.parameters);
  return headingPart(s, found);
}

/** Of a heading found from GNSS, at the start, what the gyro bias does to it on the way included, rad². */
function carriedVariance({ gyroBiasSigma }: HeadingQuestion, { sigma, biasArm }: FoundHeading): number {
  return sigma ** 2 + (gyroBiasSigma * Math.hypot(...biasArm)) ** 2;
}

function compassPart(s: Situation, compass: CompassHeading): HeadingPart {
  return {
    yaw: compass.yaw,
    yawVariance: compass.ownVariance,
    headingArm: null,
    heading: 'gyrocompass',
    headingSentence: `heading by gyrocompassing over ${s.rest!.meanDurationS.toFixed(1)} s`,
    compass,
  };
}

/** Given, or read from a heading aid at the start; null where neither is there. */
export function knownHeading(s: Situation): HeadingPart | null {
  const { headingDeg, attitudeSigmaDeg } = s.parameters.initial;
  if (headingDeg !== undefined) {
    const sigma = attitudeSigmaDeg ? degToRad(attitudeSigmaDeg[2]) : GIVEN_HEADING_SIGMA;
    return {
      yaw: degToRad(headingDeg),
      yawVariance: sigma * sigma,
      headingArm: null,
      heading: 'given',
      headingSentence: 'heading as given',
    };
  }
  const aid = headingFromAid(s.imu, s.sample, s.aids, s.parameters, s.rateScale);
  if (aid === null) return null;
  return {
    yaw: aid.yaw,
    yawVariance: aid.variance,
    headingArm: null,
    heading: 'aid',
    headingSentence: `heading from the heading aid at ${aid.timeS.toFixed(1)} s`,
    headingUntilS: aid.timeS,
  };
}

/** What the search for a heading in GNSS starts from. */
export function question(s: Situation, roll: number, pitch: number): HeadingQuestion {
  const { imu, fixes, parameters, leverArm, rest } = s;
  const bias = biasParameters(parameters);
  const prior = initialBiasVariance(bias.gyro);
  return {
    imu,
    fixes,
    parameters,
    leverArm,
    start: s.sample,
    roll,
    pitch,
    rest,
    rateOffset: s.gyroOffset,
    accelOffset: parameters.initial.accelBiasMPerS2 ?? [0, 0, 0],
    gyroBiasSigma: Math.sqrt(rest === null ? prior : restBiasVariance(rest, parameters)),
    accelBiasSigma: Math.sqrt(initialBiasVariance(bias.accel)),
  };
}

function headingPart(s: Situation, found: FoundHeading): HeadingPart {
  // Angle random walk of the carrying counts once more when the filter runs over the same stretch.
  const carried = s.parameters.gyro.whiteNoiseRadPerSqrtS ** 2 * found.carriedS;
  // An offset not read at rest holds no Earth rate: its vertical part turns the heading carried.
  const restOffset = s.rest !== null && s.parameters.initial.gyroBiasRadPerS === undefined;
  const earth = restOffset ? 0 : -EARTH_RATE * Math.sin(latitude(s)) * found.carriedS;
  const back = found.carriedS > 1 ? ', carried back to the start by the gyros' : '';
  const how = found.way === 'course' ? 'course' : 'velocity matched with that dead-reckoned from rest,';
  return {
    yaw: found.yaw + earth,
    yawVariance: found.sigma ** 2 + carried,
    headingArm: found.biasArm,
    heading: 'course',
    headingSentence: `heading from GNSS ${how} at ${found.timeS.toFixed(1)} s (${found.speed.toFixed(1)} m/s)${back}`,
  };
}

/** What is missing and what would help. */
export function noHeading(parameters: Parameters): EngineError {
  return new EngineError(
    'no-heading',
    `Heading cannot be found: the log never exceeds ${parameters.initial.courseSpeedMPerS} m/s. Give initial.headingDeg, switch on a heading aid, or lower initial.courseSpeedMPerS. Gyros find north by themselves only at rest and with a turn-on bias of some thousandths of the Earth rate.`,
  );
}

/** Of the place to start from, rad. */
export function latitude(s: Situation): number {
  if (s.parameters.initial.position) return degToRad(s.parameters.initial.position.latDeg);
  return s.fixes.latRad[s.fix]!;
}
