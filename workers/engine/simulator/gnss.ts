/** A GNSS receiver: what it reports of the antenna's motion. */
import type { GnssErrors } from '@/shared/contracts/scenarios';
import { nedToGeodetic, EARTH_RATE } from '../geodesy';
import { dcmFromQuat, quatFromEuler } from '../attitude';
import type { RandomSource } from '../random';
import type { GnssColumns, ReferenceColumns } from '../types';
import { GaussMarkov } from './gauss-markov';
import { TrackWalker, emptyReference, type Place } from './inverse';
import type { Motion } from './motion';

/** Local names: a global looked up in each call costs more than the call. */
const { cos, floor, hypot, max, sin } = Math;

export interface GnssOptions extends GnssErrors {
  rateHz: number;
  leverArmM: readonly [number, number, number];
  /** Time of the first epoch after the recording's start, s. */
  phaseS?: number;
  /** What an epoch reports is this old, s. */
  latencyS?: number;
  /** Velocity is older than position by this, s. */
  velocityLagS?: number;
  /** The accuracies that the receiver claims ÷ the true ones. */
  claimedSigmaFactor?: number;
}

/** Fixes, and the exact antenna state behind each; `outlier` marks positions (1) and velocities (2) that were spoilt. */
export interface SimulatedGnss {
  gnss: GnssColumns;
  truth: ReferenceColumns;
  outlier: Uint8Array;
}

/** Fixes over [startS, endS] of a motion that is at `start` at startS. */
export function simulateGnss(
  motion: Motion,
  start: Place,
  startS: number,
  endS: number,
  options: GnssOptions,
  random: RandomSource,
): SimulatedGnss {
  const epochs = epochTimes(startS, endS, options);
  const latency = options.latencyS ?? 0;
  const truth = antennaTrack(
    motion,
    start,
    startS,
    epochs.map((t) => t - latency),
    options.leverArmM,
  );
  const lag = options.velocityLagS ?? 0;
  if (lag !== 0) {
    const late = antennaTrack(
      motion,
      start,
      startS,
      epochs.map((t) => t - latency - lag),
      options.leverArmM,
    );
    for (const axis of [0, 1, 2] as const) truth.velocityNed[axis].set(late.velocityNed[axis]);
  }
  return measure(epochs, truth, options, random);
}

/** Exact antenna position and velocity, and the body's attitude, at the given times (increasing). */
export function antennaTrack(
  motion: Motion,
  start: Place,
  startS: number,
  timeS: Float64Array,
  lever: readonly [number, number, number],
): ReferenceColumns {
  const walker = new TrackWalker(motion, start, startS);
  const truth = emptyReference(timeS);
  const place = new Float64Array(3);
  const q = new Float64Array(4);
  const c = new Float64Array(9);
  const [lx, ly, lz] = lever;
  for (let k = 0; k < timeS.length; k += 1) {
    walker.advanceTo(timeS[k]!);
    walker.writeTruth(truth, k);
    if (lx === 0 && ly === 0 && lz === 0) continue;
    const m = walker.kinematics;
    const b = walker.here();
    dcmFromQuat(quatFromEuler(m.roll, m.pitch, m.yaw, q), c);
    const turn = (row: number, x: number, y: number, z: number) =>
      c[3 * row]! * x + c[3 * row + 1]! * y + c[3 * row + 2]! * z;
    const [n, e, d] = [turn(0, lx, ly, lz), turn(1, lx, ly, lz), turn(2, lx, ly, lz)];
    nedToGeodetic(walker.lat, walker.lon, walker.height, n, e, d, place);
    truth.latRad[k] = place[0]!;
    truth.lonRad[k] = place[1]!;
    truth.heightM[k] = place[2]!;
    // C (ω_ib × l) − ω_ie × (C l): the arm's end as seen from the Earth.
    const vx = b.wy * lz - b.wz * ly;
    const vy = b.wz * lx - b.wx * lz;
    const vz = b.wx * ly - b.wy * lx;
    const ieN = EARTH_RATE * cos(walker.lat);
    const ieD = -EARTH_RATE * sin(walker.lat);
    truth.velocityNed[0][k]! += turn(0, vx, vy, vz) + ieD * e;
    truth.velocityNed[1][k]! += turn(1, vx, vy, vz) - (ieD * n - ieN * d);
    truth.velocityNed[2][k]! += turn(2, vx, vy, vz) - ieN * e;
  }
  return truth;
}

function epochTimes(startS: number, endS: number, options: GnssOptions): Float64Array {
  const first = startS + (options.phaseS ?? 0);
  const count = floor((endS - first) * options.rateHz + 1e-6) + 1;
  return Float64Array.from({ length: max(count, 0) }, (_, k) => first + k / options.rateHz).filter(
    (t) => !options.outagesS.some(([from, to]) => t >= from && t < to),
  );
}

function measure(
  epochs: Float64Array,
  truth: ReferenceColumns,
  options: GnssOptions,
  random: RandomSource,
): SimulatedGnss {
  const n = epochs.length;
  const positionSigma = [
    options.positionSigmaHorizontalM,
    options.positionSigmaHorizontalM,
    options.positionSigmaVerticalM,
  ] as const;
  const velocitySigma = [
    options.velocitySigmaHorizontalMPerS,
    options.velocitySigmaHorizontalMPerS,
    options.velocitySigmaVerticalMPerS,
  ] as const;
  const claim = options.claimedSigmaFactor ?? 1;
  const columns = <T>(make: (axis: 0 | 1 | 2) => T) => [make(0), make(1), make(2)] as const;
  const gnss: GnssColumns = {
    timeS: epochs,
    latRad: new Float64Array(n),
    lonRad: new Float64Array(n),
    heightM: new Float64Array(n),
    velocityNed: columns(() => new Float64Array(n)),
    positionSigma: columns((axis) => new Float64Array(n).fill(claim * positionSigma[axis])),
    velocitySigma: columns((axis) => new Float64Array(n).fill(claim * velocitySigma[axis])),
  };
  const outlier = new Uint8Array(n);
  const wander = columns(
    (axis) =>
      new GaussMarkov(positionSigma[axis], options.correlationTimeS, random.split(`position-${axis}`)),
  );
  const noise = random.split('velocity');
  const chance = random.split('outliers');
  const place = new Float64Array(3);
  const error = new Float64Array(3);
  for (let k = 0; k < n; k += 1) {
    for (const axis of [0, 1, 2] as const)
      error[axis] = k === 0 ? wander[axis].value : wander[axis].step(epochs[k]! - epochs[k - 1]!);
    if (spoil(error, positionSigma, options, chance)) outlier[k]! |= 1;
    nedToGeodetic(
      truth.latRad[k]!,
      truth.lonRad[k]!,
      truth.heightM[k]!,
      error[0]!,
      error[1]!,
      error[2]!,
      place,
    );
    gnss.latRad[k] = place[0]!;
    gnss.lonRad[k] = place[1]!;
    gnss.heightM[k] = place[2]!;
    for (const axis of [0, 1, 2] as const) error[axis] = velocitySigma[axis] * noise.normal();
    if (spoil(error, velocitySigma, options, chance)) outlier[k]! |= 2;
    for (const axis of [0, 1, 2] as const)
      gnss.velocityNed[axis][k] = truth.velocityNed[axis][k]! + error[axis]!;
  }
  return { gnss, truth, outlier };
}

/** With the stated chance pushes the error `outlierSigmas` σ off in a random direction. */
function spoil(
  error: Float64Array,
  sigma: readonly [number, number, number],
  options: GnssOptions,
  chance: RandomSource,
): boolean {
  if (!(chance.uniform() < options.outlierShare)) return false;
  const [x, y, z] = [chance.normal(), chance.normal(), chance.normal()];
  const scale = options.outlierSigmas / hypot(x, y, z);
  error[0]! += scale * x * sigma[0];
  error[1]! += scale * y * sigma[1];
  error[2]! += scale * z * sigma[2];
  return true;
}
