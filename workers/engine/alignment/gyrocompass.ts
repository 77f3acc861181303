/**
 * Heading from the Earth's rotation as gyros at rest feel it (Titterton & Weston 2004, § 10.3): in the levelled frame the
 * horizontal part of the rate points north. What spoils it is the gyro bias towards east:
 *   φ_D = −(C δb_g)_E/(Ω cos φ) + n_E/(Ω cos φ) − tan φ · φ_N.
 */
import type { Parameters } from '@/shared/contracts/parameters';
import { degToRad } from '@/shared/units';
import { dcmFromQuat, quatFromEuler } from '../attitude';
import { initialBiasVariance } from '../filter/bias-models';
import { biasParameters } from '../filter/bias-parameters';
import { EARTH_RATE } from '../geodesy';
import { normalGravity } from '../gravity';
import { restNoiseVariance } from './rest-bias';
import type { StaticStretch } from './static-stretch';

/** A heading poorer than this, 1σ, is not worth having, rad. */
const MAX_SIGMA = degToRad(3);

export interface CompassHeading {
  /** rad. */
  yaw: number;
  /** Variance of all that spoils it, and of the part that no other state shares (noise of the mean), rad². */
  totalVariance: number;
  ownVariance: number;
  /** Variance of the gyro bias towards east, which this cannot tell from the Earth's rotation, (rad/s)². */
  eastBiasVariance: number;
}

/** Null where the gyros' turn-on bias or noise would leave more than 3° (1σ). `roll`, `pitch`, `latRad`: rad. */
export function gyrocompass(
  rest: StaticStretch,
  parameters: Parameters,
  roll: number,
  pitch: number,
  latRad: number,
): CompassHeading | null {
  const { gyro, accel } = biasParameters(parameters);
  const north = EARTH_RATE * Math.cos(latRad);
  const bias = initialBiasVariance(gyro);
  const noise = restNoiseVariance(rest, parameters);
  const tilt = (initialBiasVariance(accel) / normalGravity(latRad, 0) ** 2) * Math.tan(latRad) ** 2;
  const totalVariance = (bias + noise) / north ** 2 + tilt;
  if (!(totalVariance < MAX_SIGMA ** 2)) return null;
  const c = dcmFromQuat(quatFromEuler(roll, pitch, 0, new Float64Array(4)), new Float64Array(9));
  const given = parameters.initial.gyroBiasRadPerS ?? [0, 0, 0];
  const rate = rest.gyro.map((w, i) => w - given[i]!);
  const level = (row: number) =>
    c[3 * row]! * rate[0]! + c[3 * row + 1]! * rate[1]! + c[3 * row + 2]! * rate[2]!;
  return {
    yaw: Math.atan2(-level(1), level(0)),
    totalVariance,
    ownVariance: noise / north ** 2,
    eastBiasVariance: bias,
  };
}
