/** The thin drawing of a whole recording: equal buckets of time with speed, fixes, gaps and clipped stretches. */
import type { Strip } from '@/shared/contracts/recordings';
import { RAD_PER_DEG } from '@/shared/units';
import { nedOffset } from '../engine/geodesy';
import type { Columns } from '../recordings/arrow-file';
import type { ImuFacts } from './imu-health';

const BUCKETS = 600;
/** Fixes further apart than this give no speed by difference, s. */
const MAX_DIFFERENCE_S = 5;

export function stripOf(imu: ImuFacts, gnss: Columns): Strip {
  const { startS, endS } = imu;
  const width = (endS - startS) / BUCKETS;
  const speeds: (number | null)[] = new Array<number | null>(BUCKETS).fill(null);
  const fixes = new Array<number>(BUCKETS).fill(0);
  const time = gnss.time_s!;
  for (let i = 0; i < time.length; i += 1) {
    if (time[i]! < startS || time[i]! > endS) continue;
    const bucket = Math.min(BUCKETS - 1, Math.floor((time[i]! - startS) / width));
    fixes[bucket]! += 1;
    const speed = speedAt(gnss, i);
    if (speed !== null) speeds[bucket] = Math.max(speeds[bucket] ?? 0, speed);
  }
  bridge(speeds, Math.ceil(MAX_DIFFERENCE_S / width));
  return { startS, endS, speedMPerS: speeds, gnssFixes: fixes, gapsS: imu.gapsS, clippedS: imu.clippedS };
}

/** Between fixes that follow one another the speed is drawn through; where GNSS was away it stays open. */
function bridge(speeds: (number | null)[], most: number): void {
  let last = -1;
  speeds.forEach((speed, at) => {
    if (speed === null) return;
    const from = last < 0 ? speed : speeds[last]!;
    if (last >= 0 && at - last <= most)
      for (let k = last + 1; k < at; k += 1)
        speeds[k] = rounded(from + ((speed - from) * (k - last)) / (at - last));
    last = at;
  });
}

/** From the receiver's velocity, else from the way since the last fix. */
function speedAt(gnss: Columns, i: number): number | null {
  const measured = Math.hypot(gnss.vn_m_s![i]!, gnss.ve_m_s![i]!);
  if (!Number.isNaN(measured)) return rounded(measured);
  if (i === 0) return null;
  const interval = gnss.time_s![i]! - gnss.time_s![i - 1]!;
  if (!(interval <= MAX_DIFFERENCE_S)) return null;
  const at = (k: number) => [gnss.lat_deg![k]! * RAD_PER_DEG, gnss.lon_deg![k]! * RAD_PER_DEG] as const;
  const [from, to] = [at(i - 1), at(i)];
  const offset = nedOffset(from[0], from[1], 0, to[0], to[1], 0, new Float64Array(3));
  const speed = Math.hypot(offset[0]!, offset[1]!) / interval;
  return Number.isNaN(speed) ? null : rounded(speed);
}

const rounded = (value: number) => Math.round(value * 1000) / 1000;
