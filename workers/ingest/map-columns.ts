/** Which columns a part of a channel map names, and in which file the sensors of an IMU are. */
import type { ChannelMap, FileRole, ImuMap } from '@/shared/contracts/recordings';
import { columnIndex } from './cells';
import type { CsvHead } from './csv';

type ImuRole = 'imu' | 'imu2';

/** All names of columns in the part of a GNSS or reference file. */
export function columnsOf(part: NonNullable<ChannelMap['gnss' | 'reference']>): string[] {
  const { position, velocity } = part;
  const { lat, lon, height, latHemisphere, lonHemisphere } = position;
  const names = [
    ...part.time.columns,
    lat,
    lon,
    height ?? [],
    latHemisphere ?? [],
    lonHemisphere ?? [],
  ].flat();
  if (velocity && 'columns' in velocity) names.push(...velocity.columns);
  else if (velocity) names.push(velocity.speed, velocity.course, ...(velocity.climb ? [velocity.climb] : []));
  if ('attitude' in part && part.attitude) names.push(...part.attitude.columns);
  if ('positionSigma' in part && part.positionSigma) names.push(...part.positionSigma.columns);
  if ('velocitySigma' in part && part.velocitySigma) names.push(...part.velocitySigma.columns);
  if ('quality' in part && part.quality) names.push(part.quality);
  return names;
}

/** Columns of one sensor, with its time. */
export function columnsOfImu(part: ImuMap, sensor: 'gyro' | 'accel'): string[] {
  const time = sensor === 'accel' ? (part.accelTime?.columns ?? []) : part.time.columns;
  return [...time, ...part[sensor].columns];
}

/** The file of each sensor: as the map says, else the first that has all of its columns. */
export function sensorRoles(
  part: ImuMap,
  heads: ReadonlyMap<FileRole, CsvHead>,
): Record<'gyro' | 'accel', ImuRole> {
  const roleOf = (sensor: 'gyro' | 'accel'): ImuRole => {
    const stated = part[sensor].file;
    if (stated && heads.has(stated)) return stated;
    const has = (role: ImuRole) =>
      part[sensor].columns.every((name) => columnIndex(heads.get(role)?.headers ?? [], name) >= 0);
    return !has('imu') && has('imu2') ? 'imu2' : 'imu';
  };
  return { gyro: roleOf('gyro'), accel: roleOf('accel') };
}
