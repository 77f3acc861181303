/** Sensors besides IMU and GNSS: what they report of a motion. */
import { dcmFromQuat, quatFromEuler, quatFromRotationVector, quatMultiply, eulerFromQuat } from '../attitude';
import { wrapAngle } from '../geodesy';
import type { RandomSource } from '../random';
import type { AidColumns, ReferenceColumns } from '../types';
import { antennaTrack } from './gnss';
import type { Place } from './inverse';
import type { Motion } from './motion';

/** Local names: a global looked up in each call costs more than the call. */
const { floor, max, sqrt } = Math;

interface SensorErrors {
  rateHz: number;
  /** Time of the first reading after the recording's start, s: readings need not lie on IMU samples. */
  phaseS?: number;
}

/** White noise 1σ of each sensor that is there; the barometer has an offset drawn once and a random walk besides. */
export interface AidErrors {
  barometer?: SensorErrors & { sigmaM: number; offsetSigmaM?: number; walkMPerSqrtS?: number };
  heading?: SensorErrors & { sigmaRad: number };
  odometer?: SensorErrors & { sigmaMPerS: number };
  /** 1σ about each of forward, right, down. */
  attitude?: SensorErrors & { sigmaRad: number };
}

/** Readings, and the barometer's true offset at each of its own, m. */
export interface SimulatedAids {
  aids: AidColumns;
  barometerBias: Float64Array;
}

/** Readings over [startS, endS] of a motion that is at `start` at startS; each sensor claims its true 1σ. */
export function simulateAids(
  motion: Motion,
  start: Place,
  startS: number,
  endS: number,
  errors: AidErrors,
  random: RandomSource,
): SimulatedAids {
  const truthFor = (sensor: SensorErrors) => {
    const first = startS + (sensor.phaseS ?? 0);
    const count = max(0, floor((endS - first) * sensor.rateHz + 1e-6) + 1);
    const timeS = Float64Array.from({ length: count }, (_, k) => first + k / sensor.rateHz);
    return antennaTrack(motion, start, startS, timeS, [0, 0, 0]);
  };
  const { barometer, heading, odometer, attitude } = errors;
  const height = barometer && senseHeight(truthFor(barometer), barometer, random.split('barometer'));
  return {
    aids: {
      barometer: height?.columns ?? null,
      heading: heading ? senseHeading(truthFor(heading), heading.sigmaRad, random.split('heading')) : null,
      odometer: odometer
        ? senseSpeed(truthFor(odometer), odometer.sigmaMPerS, random.split('odometer'))
        : null,
      attitude: attitude
        ? senseAttitude(truthFor(attitude), attitude.sigmaRad, random.split('attitude'))
        : null,
    },
    barometerBias: height?.bias ?? new Float64Array(0),
  };
}

function senseHeight(
  truth: ReferenceColumns,
  { sigmaM, offsetSigmaM = 0, walkMPerSqrtS = 0, rateHz }: NonNullable<AidErrors['barometer']>,
  random: RandomSource,
) {
  const { timeS } = truth;
  const bias = new Float64Array(timeS.length);
  let offset = offsetSigmaM * random.normal();
  const heightM = truth.heightM.map((h, k) => {
    bias[k] = offset;
    offset += (walkMPerSqrtS / sqrt(rateHz)) * random.normal();
    return h + bias[k] + sigmaM * random.normal();
  });
  return { columns: { timeS, heightM, sigmaM: constant(timeS, sigmaM) }, bias };
}

function senseHeading(truth: ReferenceColumns, sigma: number, random: RandomSource) {
  const headingRad = truth.attitude[2].map((yaw) => wrapAngle(yaw + sigma * random.normal()));
  return { timeS: truth.timeS, headingRad, sigmaRad: constant(truth.timeS, sigma) };
}

/** Forward part of Cᵀv: an axle straight behind the IMU rolls no faster in a turn. */
function senseSpeed(truth: ReferenceColumns, sigma: number, random: RandomSource) {
  const [vn, ve, vd] = truth.velocityNed;
  const [roll, pitch, yaw] = truth.attitude;
  const q = new Float64Array(4);
  const c = new Float64Array(9);
  const speedMPerS = truth.timeS.map((_, k) => {
    dcmFromQuat(quatFromEuler(roll[k]!, pitch[k]!, yaw[k]!, q), c);
    return c[0]! * vn[k]! + c[3]! * ve[k]! + c[6]! * vd[k]! + sigma * random.normal();
  });
  return { timeS: truth.timeS, speedMPerS, sigmaMPerS: constant(truth.timeS, sigma) };
}

/** Attitude turned by a small rotation about the body's own axes. */
function senseAttitude(truth: ReferenceColumns, sigma: number, random: RandomSource) {
  const { timeS } = truth;
  const columns = [
    new Float64Array(timeS.length),
    new Float64Array(timeS.length),
    new Float64Array(timeS.length),
  ] as const;
  const q = new Float64Array(4);
  const turn = new Float64Array(4);
  const euler = new Float64Array(3);
  const noise = () => sigma * random.normal();
  for (let k = 0; k < timeS.length; k += 1) {
    const [roll, pitch, yaw] = truth.attitude;
    quatFromEuler(roll[k]!, pitch[k]!, yaw[k]!, q);
    quatFromRotationVector(noise(), noise(), noise(), turn);
    eulerFromQuat(quatMultiply(q, turn, q), euler);
    for (const axis of [0, 1, 2] as const) columns[axis][k] = euler[axis]!;
  }
  const sigmas = [constant(timeS, sigma), constant(timeS, sigma), constant(timeS, sigma)] as const;
  return { timeS, attitude: columns, sigmaRad: sigmas };
}

const constant = (timeS: Float64Array, value: number) => new Float64Array(timeS.length).fill(value);
