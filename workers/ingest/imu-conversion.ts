/** From a file's IMU units, signs and axes to SI in the body frame (forward–right–down). */
import type { AccelUnit, GyroUnit, ImuMap } from '@/shared/contracts/recordings';
import { axisRow, type AxisMap } from '@/shared/contracts/vehicles';
import { RAD_PER_DEG, STANDARD_GRAVITY_M_S2 } from '@/shared/units';

const GYRO_SI: Record<GyroUnit, number> = {
  'rad/s': 1,
  'deg/s': RAD_PER_DEG,
  'deg/h': RAD_PER_DEG / 3600,
  rad: 1,
  deg: RAD_PER_DEG,
};
const ACCEL_SI: Record<AccelUnit, number> = {
  'm/s^2': 1,
  g: STANDARD_GRAVITY_M_S2,
  mg: STANDARD_GRAVITY_M_S2 / 1000,
  'm/s': 1,
  'g*s': STANDARD_GRAVITY_M_S2,
};

export interface ImuConversion {
  /** For each of gyro and accelerometer, body axis i = sample[source[i]] × factor[i]; samples hold gyro x y z, accel x y z. */
  source: readonly number[];
  factor: readonly number[];
}

export function imuConversion(map: ImuMap, axes: AxisMap): ImuConversion {
  const rows = [axes.forward, axes.right, axes.down].map(axisRow);
  const index = rows.map((row) => row.findIndex((value) => value !== 0));
  const sign = rows.map((row, i) => row[index[i]!]!);
  const gyro = GYRO_SI[map.gyro.unit];
  const accel = ACCEL_SI[map.accel.unit] * (map.accel.sign === 'opposite' ? -1 : 1);
  return {
    source: [...index, ...index.map((i) => i + 3)],
    factor: [...sign.map((s) => s * gyro), ...sign.map((s) => s * accel)],
  };
}

/** What is added to a stamp so that it stands at the end of its interval, s. */
export const stampShift = (stamp: 'end' | 'middle' | 'start', intervalS: number) =>
  stamp === 'end' ? 0 : stamp === 'middle' ? intervalS / 2 : intervalS;

/** Whether the units are increments, and agree with what the map says of the sampling. */
export function samplingFault(map: ImuMap): string | null {
  const gyro = map.gyro.unit === 'rad' || map.gyro.unit === 'deg';
  const accel = map.accel.unit === 'm/s' || map.accel.unit === 'g*s';
  const wanted = map.sampling === 'increment';
  if (gyro === wanted && accel === wanted) return null;
  return wanted
    ? 'The channel map says increments, but the units are rates.'
    : 'The units are increments, but the channel map does not say so.';
}
