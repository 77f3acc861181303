/** Closure: noise-free increments of a motion, integrated again by the strapdown, against the motion's own truth. */
import { degToRad } from '@/shared/units';
import { quatFromEuler, quatMultiply, rotationVectorFromQuat } from '@/workers/engine/attitude';
import { nedOffset } from '@/workers/engine/geodesy';
import { inverseMechanisation } from '@/workers/engine/simulator/inverse';
import type { Motion } from '@/workers/engine/simulator/motion';
import { regularTimes } from '@/workers/engine/simulator/scenario';
import { ImuIntervals } from '@/workers/engine/strapdown/imu-intervals';
import { HEIGHT, LAT, LON, NAV_SIZE, QUAT, VD, VE, VN } from '@/workers/engine/strapdown/navigation-state';
import { Strapdown, type Scheme } from '@/workers/engine/strapdown/strapdown';
import type { ImuSampling, ReferenceColumns } from '@/workers/engine/types';

/** Largest errors over the run. */
export interface Closure {
  positionM: number;
  velocityMPerS: number;
  attitudeRad: number;
}

export const CLOSURE_PLACE = { latRad: degToRad(47.21), lonRad: degToRad(-14.63), heightM: 40 };

export function closure(
  motion: Motion,
  durationS: number,
  rateHz: number,
  scheme: Scheme = 'coning-sculling',
  sampling: ImuSampling = 'mean-rate',
): Closure {
  const { imu, truth } = inverseMechanisation(
    motion,
    CLOSURE_PLACE,
    regularTimes(durationS, rateHz),
    sampling,
  );
  const intervals = new ImuIntervals(imu);
  const strapdown = new Strapdown(scheme);
  strapdown.start(navigationState(truth, 0));
  const worst: Closure = { positionM: 0, velocityMPerS: 0, attitudeRad: 0 };
  const stride = Math.max(1, Math.round(rateHz / 10));
  for (let k = 1; k < imu.timeS.length; k += 1) {
    intervals.load(k);
    strapdown.advance(intervals.interval, 0, 1);
    if (k % stride !== 0 && k !== imu.timeS.length - 1) continue;
    const error = stateError(strapdown.nav, navigationState(truth, k));
    worst.positionM = Math.max(worst.positionM, error.positionM);
    worst.velocityMPerS = Math.max(worst.velocityMPerS, error.velocityMPerS);
    worst.attitudeRad = Math.max(worst.attitudeRad, error.attitudeRad);
  }
  return worst;
}

/** Row k of the truth as a navigation state, biases zero. */
export function navigationState(truth: ReferenceColumns, k: number): Float64Array {
  const nav = new Float64Array(NAV_SIZE);
  nav[LAT] = truth.latRad[k]!;
  nav[LON] = truth.lonRad[k]!;
  nav[HEIGHT] = truth.heightM[k]!;
  nav[VN] = truth.velocityNed[0][k]!;
  nav[VE] = truth.velocityNed[1][k]!;
  nav[VD] = truth.velocityNed[2][k]!;
  const [roll, pitch, yaw] = truth.attitude.map((angle) => angle[k]!) as [number, number, number];
  nav.set(quatFromEuler(roll, pitch, yaw, new Float64Array(4)), QUAT);
  return nav;
}

function stateError(nav: Float64Array, truth: Float64Array): Closure {
  const ned = nedOffset(
    truth[LAT]!,
    truth[LON]!,
    truth[HEIGHT]!,
    nav[LAT]!,
    nav[LON]!,
    nav[HEIGHT]!,
    new Float64Array(3),
  );
  const conjugate = truth.slice(QUAT, QUAT + 4).map((value, i) => (i === 0 ? value : -value));
  const q = quatMultiply(nav.slice(QUAT, QUAT + 4), conjugate, new Float64Array(4));
  const angle = rotationVectorFromQuat(q, new Float64Array(3));
  return {
    positionM: Math.hypot(ned[0]!, ned[1]!, ned[2]!),
    velocityMPerS: Math.hypot(nav[VN]! - truth[VN]!, nav[VE]! - truth[VE]!, nav[VD]! - truth[VD]!),
    attitudeRad: Math.hypot(angle[0]!, angle[1]!, angle[2]!),
  };
}
