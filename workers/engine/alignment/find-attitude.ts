/** Where the filter can start and what attitude the vehicle has there: given, levelled at rest, or levelled moving. */
import type { Parameters } from '@/shared/contracts/parameters';
import type { RunSummary } from '@/shared/contracts/runs';
import { degToRad } from '@/shared/units';
import type { Fixes } from '../filter/fixes';
import { normalGravity } from '../gravity';
import { medianSpacing } from '../strapdown/imu-intervals';
import { EngineError, type AidColumns, type ImuColumns } from '../types';
import {
  findHeading, GIVEN_HEADING_SIGMA, knownHeading, latitude, noHeading, question, type HeadingPart, type Situation,
} from './find-heading'; // prettier-ignore
import { searchHeading } from './heading-search';
import { levelMoving } from './moving-level';
import { firstUsable } from './start';
import { findStaticStretch, type StaticStretch } from './static-stretch';

type Three = [number, number, number];

export interface FoundAttitude extends Omit<HeadingPart, 'yawVariance'> {
  /** IMU sample of the start, and the fix that gives the position there; −1: the position is given. */
  sample: number;
  fix: number;
  roll: number;
  pitch: number;
  /** Variances of roll, pitch, yaw (rad²) beyond what biases explain. */
  eulerVariance: Three;
  rest: StaticStretch | null;
  /** Factor from gyro column to rad/s, and what is to be taken off it (bias, at rest the Earth rate too), rad/s. */
  rateScale: number;
  gyroOffset: Three;
  levelling: RunSummary['alignment']['levelling'];
  levelSentence: string;
}

/** 1σ of a given tilt whose σ was not given, rad. */
const GIVEN_TILT_SIGMA = degToRad(1);

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
