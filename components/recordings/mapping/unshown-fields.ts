/** What a channel map says beyond the mapping form: it stays as it was when the form's map is sent. */
import type { ChannelMap, GnssMap, ImuMap, TimeMap } from '@/shared/contracts/recordings';

/** `map` with what the form has no field for, from the map in force before. */
export function withUnshown(map: ChannelMap, before: ChannelMap | null): ChannelMap {
  const { imu, gnss, reference } = before ?? {};
  return {
    ...(before?.aids ? { aids: before.aids } : null),
    imu: map.imu && imu ? imuWith(map.imu, imu) : map.imu,
    gnss: map.gnss && gnss ? { ...trackWith(map.gnss, gnss), ...pick(gnss, ['repeats']) } : map.gnss,
    reference: map.reference && reference ? trackWith(map.reference, reference) : map.reference,
  };
}

const imuWith = (map: ImuMap, before: ImuMap): ImuMap => ({
  ...map,
  ...pick(before, ['accelTime', 'mounting']),
  time: timeWith(map.time, before.time),
  gyro: sameColumns(map.gyro, before.gyro) ? { ...pick(before.gyro, SENSOR), ...map.gyro } : map.gyro,
  accel: sameColumns(map.accel, before.accel) ? { ...pick(before.accel, SENSOR), ...map.accel } : map.accel,
});

const SENSOR = ['file', 'signs', 'scale'] as const;

const sameColumns = (a: { columns: readonly string[] }, b: { columns: readonly string[] }) =>
  a.columns.join() === b.columns.join();

function trackWith<M extends Pick<GnssMap, 'time' | 'position' | 'velocity'>>(map: M, before: M): M {
  const climb = before.velocity && 'climb' in before.velocity ? { climb: before.velocity.climb } : null;
  return {
    ...map,
    time: timeWith(map.time, before.time),
    position: { ...map.position, ...pick(before.position, ['latHemisphere', 'lonHemisphere']) },
    ...(map.velocity?.frame === 'speed-course' ? { velocity: { ...map.velocity, ...climb } } : null),
  };
}

/** Another base or column makes a new clock. */
const timeWith = (time: TimeMap, before: TimeMap): TimeMap =>
  time.base === before.base && time.columns.join() === before.columns.join()
    ? { ...pick(before, ['scale', 'zoneMin', 'dateOrder', 'date', 'rateHz', 'wrap']), ...time }
    : time;

function pick<T extends object, K extends keyof T>(from: T, keys: readonly K[]): Partial<Pick<T, K>> {
  const picked: Partial<Pick<T, K>> = {};
  for (const key of keys) if (from[key] !== undefined) picked[key] = from[key];
  return picked;
}
