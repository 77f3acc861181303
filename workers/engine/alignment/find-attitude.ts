/** Where the filter can start and what attitude the vehicle has there: given, levelled at rest, or levelled moving. */
import type { Parameters } from '@/shared/contracts/parameters';
import type { RunSummary } from '@/shared/contracts/runs';
import { degToRad } from '@/shared/units';
import { initialBiasVariance } from '../filter/bias-models';
import { biasParameters } from '../filter/bias-parameters';
import type { Fixes } from '../filter/fixes';
import { EARTH_RATE } from '../geodesy';
import { normalGravity } from '../gravity';
import { medianSpacing } from '../strapdown/imu-intervals';
import { EngineError, type AidColumns, type ImuColumns } from '../types';
import { searchHeading, type FoundHeading, type HeadingQuestion } from './heading-search';
import { gyrocompass, type CompassHeading } from './gyrocompass';
import { headingFromAid } from './heading-aid';
import { levelMoving } from './moving-level';
import { restBiasVariance } from './rest-bias';
import { firstUsable } from './start';
import { findStaticStretch, type StaticStretch } from './static-stretch';

type Three = [number, number, number];

export interface FoundAttitude {
  /** IMU sample of the start, and the fix that gives the position there; −1: the position is given. */
  sample: number;
  fix: number;
  roll: number;
  pitch: number;
  yaw: number;
  /** Variances of roll, pitch, yaw (rad²) beyond what biases explain. */
  eulerVariance: Three;
  headingArm: Three | null;
  rest: StaticStretch | null;
  /** Factor from gyro column to rad/s, and what is to be taken off it (bias, at rest the Earth rate too), rad/s. */
  rateScale: number;
  gyroOffset: Three;
  levelling: RunSummary['alignment']['levelling'];
  heading: RunSummary['alignment']['heading'];
  levelSentence: string;
  headingSentence: string;
  /** Readings of a heading aid up to here were used, s. */
  headingUntilS?: number;
  /** The heading is from the Earth's rotation: it shares the gyro bias towards east. */
  compass?: CompassHeading;
}

/** 1σ of a given attitude whose σ was not given, rad. */
const GIVEN_TILT_SIGMA = degToRad(1);
const GIVEN_HEADING_SIGMA = degToRad(5);

interface Situation {
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

/** Throws EngineError when there is no place to start, no level or no heading. */
export function findAttitude(
  imu: ImuColumns,
  fixes: Fixes,
  parameters: Parameters,
  leverArm: readonly [number, number, number],
  aids: AidColumns | null,
): FoundAttitude {
  const { wanted, sample: atFix, fix } = firstUsable(imu, fixes, parameters);
  // A vehicle that still stands when the first fix comes has stood where that says from the log's first sample on.
  const early = wanted < atFix ? findStaticStretch(imu, fixes, wanted) : null;
  const stoodUntilFix = early !== null && early.to >= atFix;
  const sample = stoodUntilFix ? wanted : atFix;
  const rest = stoodUntilFix ? early : findStaticStretch(imu, fixes, atFix);
  const rateScale = imu.sampling === 'increment' ? 1 / medianSpacing(imu.timeS) : 1;
  const gyroOffset: Three = parameters.initial.gyroBiasRadPerS ?? rest?.gyro ?? [0, 0, 0];
  const situation = { imu, fixes, parameters, leverArm, sample, fix, rest, rateScale, gyroOffset, aids };
  if (parameters.initial.attitude !== undefined) return givenAttitude(situation);
  return rest !== null ? levelledAtRest(situation, rest) : levelledMoving(situation);
}

function givenAttitude(s: Situation): FoundAttitude {
  const { attitude, attitudeSigmaDeg } = s.parameters.initial;
  const sigma = attitudeSigmaDeg?.map(degToRad) ?? [GIVEN_TILT_SIGMA, GIVEN_TILT_SIGMA, GIVEN_HEADING_SIGMA];
  return {
    ...common(s),
    roll: degToRad(attitude!.rollDeg),
    pitch: degToRad(attitude!.pitchDeg),
    yaw: degToRad(attitude!.yawDeg),
    eulerVariance: sigma.map((x) => x * x) as Three,
    headingArm: null,
    levelling: 'given',
    heading: 'given',
    levelSentence: 'Attitude as given;',
    headingSentence: 'heading as given',
  };
}

function common({ sample, fix, rest, rateScale, gyroOffset }: Situation) {
  return { sample, fix, rest, rateScale, gyroOffset };
}

function levelledAtRest(s: Situation, rest: StaticStretch): FoundAttitude {
  const { parameters } = s;
  const bias = parameters.initial.accelBiasMPerS2 ?? [0, 0, 0];
  const [fx, fy, fz] = rest.accel.map((f, i) => f - bias[i]!) as Three;
  const roll = Math.atan2(-fy, -fz);
  const pitch = Math.atan2(fx, Math.hypot(fy, fz));
  const g = normalGravity(latitude(s), 0);
  const noise = parameters.accel.whiteNoiseMPerSPerSqrtS ** 2 / rest.meanDurationS / (g * g);
  const heading = findHeading(s, roll, pitch);
  return {
    ...common(s),
    ...heading,
    roll,
    pitch,
    eulerVariance: [noise, noise, heading.yawVariance],
    levelling: 'static',
    levelSentence: `Levelled over ${rest.meanDurationS.toFixed(1)} s at rest;`,
  };
}

function levelledMoving(s: Situation): FoundAttitude {
  const { imu, fixes, parameters } = s;
  const start = knownHeading(s) === null ? sampleOfFirstCourse(s) : s;
  const situation = { ...s, ...start };
  const heading = findHeading(situation, 0, 0);
  const bias = parameters.initial.accelBiasMPerS2 ?? [0, 0, 0];
  const level = levelMoving(imu, fixes, start.sample, heading.yaw, s.gyroOffset, bias);
  if (level === null)
    throw new EngineError(
      'no-level',
      'Roll and pitch cannot be found: the vehicle never stands still at the start and GNSS gives no velocity to level against. Give initial.attitude, or start at a standstill (initial.timeS).',
    );
  const gyroDrift = (parameters.gyro.turnOnBiasSigmaRadPerS * level.durationS) / 2;
  const variance = level.sigma ** 2 + gyroDrift ** 2;
  return {
    ...common(situation),
    ...heading,
    roll: level.roll,
    pitch: level.pitch,
    eulerVariance: [variance, variance, heading.yawVariance],
    levelling: 'moving',
    levelSentence: `Levelled while moving against ${level.durationS.toFixed(1)} s of GNSS velocity;`,
  };
}

/** Moves the start to where the first usable course is: before it there is neither level nor heading. */
function sampleOfFirstCourse(s: Situation): { sample: number; fix: number } {
  const { imu, fixes, parameters } = s;
  const course = searchHeading(question(s, 0, 0));
  if (course === null) throw noHeading(parameters);
  let fix = -1;
  for (let j = 0; j < fixes.count && fixes.timeS[j]! <= course.firstS + 1e-7; j += 1)
    if (fixes.positionAxes[j] !== 0) fix = j;
  let sample = s.sample;
  while (sample < imu.timeS.length - 1 && imu.timeS[sample]! < course.firstS) sample += 1;
  return { sample, fix: s.fix < 0 ? -1 : Math.max(fix, s.fix) };
}

interface HeadingPart {
  yaw: number;
  yawVariance: number;
  headingArm: Three | null;
  heading: FoundAttitude['heading'];
  headingSentence: string;
  headingUntilS?: number;
  compass?: CompassHeading;
}

function findHeading(s: Situation, roll: number, pitch: number): HeadingPart {
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
function knownHeading(s: Situation): HeadingPart | null {
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

function question(s: Situation, roll: number, pitch: number): HeadingQuestion {
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

function noHeading(parameters: Parameters): EngineError {
  return new EngineError(
    'no-heading',
    `Heading cannot be found: the log never exceeds ${parameters.initial.courseSpeedMPerS} m/s. Give initial.headingDeg, switch on a heading aid, or lower initial.courseSpeedMPerS. Gyros find north by themselves only at rest and with a turn-on bias of some thousandths of the Earth rate.`,
  );
}

function latitude(s: Situation): number {
  if (s.parameters.initial.position) return degToRad(s.parameters.initial.position.latDeg);
  return s.fixes.latRad[s.fix]!;
}
