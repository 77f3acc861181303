/** Which file a sensor beside IMU and GNSS is in, and how that tells time. */
import type { ChannelMap, FileRole, TimeMap } from '@/shared/contracts/recordings';
import type { AidKind } from '../recordings/aids';
import type { CsvHead } from './csv';
import { ColumnFinder } from './find-columns';
import { guessTime } from './guess-time';
import { sensorRoles } from './map-columns';

export interface AidPlace {
  role: FileRole;
  time: TimeMap;
}

/** Null where the map names no such sensor, or its file is not there or tells no time. */
export function aidPlace(
  kind: AidKind,
  map: ChannelMap,
  heads: ReadonlyMap<FileRole, CsvHead>,
): AidPlace | null {
  const aid = map.aids?.[kind];
  const role = aid?.file ?? (heads.has('aids') ? 'aids' : 'imu');
  const head = heads.get(role);
  if (!aid || !head) return null;
  const time = aid.time ?? mainTime(role, map, heads) ?? guessTime(head, new ColumnFinder(head), role)?.map;
  return time ? { role, time } : null;
}

/** The time of the sensor that the file is there for. */
function mainTime(role: FileRole, map: ChannelMap, heads: ReadonlyMap<FileRole, CsvHead>): TimeMap | undefined {
  if (role === 'gnss' || role === 'reference') return map[role]?.time;
  if (role === 'aids' || !map.imu) return undefined;
  return sensorRoles(map.imu, heads).gyro === role ? map.imu.time : map.imu.accelTime;
} // prettier-ignore
