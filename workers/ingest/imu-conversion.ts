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
  /** Where the sensor is turned by measured angles: body = rotation × what the above gives, row by row. */
  rotation: readonly number[] | null;
}

export function imuConversion(map: ImuMap, axes: AxisMap): ImuConversion {
  const rows = [axes.forward, axes.right, axes.down].map(axisRow);
  const index = rows.map((row) => row.findIndex((value) => value !== 0));
  const sign = rows.map((row, i) => row[index[i]!]!);
  const factors = (sensor: ImuMap['gyro'] | ImuMap['accel'], unit: number) =>
    index.map((column, i) => sign[i]! * unit * (sensor.scale ?? 1) * (sensor.signs?.[column] ?? 1));
  const opposite = map.accel.sign === 'opposite' ? -1 : 1;
  return {
    source: [...index, ...index.map((i) => i + 3)],
    factor: [
      ...factors(map.gyro, GYRO_SI[map.gyro.unit]),
      ...factors(map.accel, ACCEL_SI[map.accel.unit] * opposite),
    ],
    rotation: map.mounting ? mountingRotation(map.mounting) : null,
  };
}

/** Converts one sample; `body` may not be `raw`. */
export function convertSample(
  { source, factor, rotation }: ImuConversion,
  raw: Float64Array,
  body: Float64Array,
) {
  for (let i = 0; i < 6; i += 1) body[i] = raw[source[i]!]! * factor[i]!;
  if (!rotation) return;
  for (let from = 0; from < 6; from += 3) {
    const [x, y, z] = [body[from]!, body[from + 1]!, body[from + 2]!];
    for (let i = 0; i < 3; i += 1)
      body[from + i] = rotation[3 * i]! * x + rotation[3 * i + 1]! * y + rotation[3 * i + 2]! * z;
  }
}

/** Body ← sensor for a sensor that is turned in the body by yaw, then pitch, then roll (z–y′–x″). */
function mountingRotation({ rollDeg, pitchDeg, yawDeg }: NonNullable<ImuMap['mounting']>): number[] {
  const [r, p, y] = [rollDeg, pitchDeg, yawDeg].map((angle) => angle * RAD_PER_DEG) as [
    number,
    number,
    number,
  ];
  const [sr, cr, sp, cp, sy, cy] = [
    Math.sin(r),
    Math.cos(r),
    Math.sin(p),
    Math.cos(p),
    Math.sin(y),
    Math.cos(y),
  ];
  return [
    cp * cy, sr * sp * cy - cr * sy, cr * sp * cy + sr * sy,
    cp * sy, sr * sp * sy + cr * cy, cr * sp * sy - sr * cy,
    -sp, sr * cp, cr * cp,
  ]; // prettier-ignore
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
