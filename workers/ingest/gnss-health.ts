/** What is noticed of the GNSS fixes. */
import type { Columns } from '../recordings/arrow-file';
import { medianStep } from './guess-time';
import type { GnssFacts } from './gnss-table';

export interface GnssReport extends GnssFacts {
  startS: number;
  endS: number;
  rateHz: number;
  hasVelocity: boolean;
  hasHeight: boolean;
  hasPositionSigma: boolean;
  hasVelocitySigma: boolean;
  /** Stretches without a fix. */
  gapsS: [number, number][];
}

const MAX_GAPS = 500;

export function gnssReport(columns: Columns, facts: GnssFacts): GnssReport {
  const time = columns.time_s!;
  const nominalS = medianStep(Array.from(time.subarray(0, 20_000)));
  const limitS = Math.max(3 * nominalS, 1.5);
  const gapsS: [number, number][] = [];
  for (let i = 1; i < time.length && gapsS.length < MAX_GAPS; i += 1)
    if (time[i]! - time[i - 1]! > limitS) gapsS.push([time[i - 1]!, time[i]!]);
  const holds = (name: string) => columns[name]!.some((value) => !Number.isNaN(value));
  return {
    ...facts,
    startS: time[0] ?? NaN,
    endS: time.at(-1) ?? NaN,
    rateHz: nominalS > 0 ? Number((1 / nominalS).toPrecision(6)) : 0,
    hasVelocity: holds('vn_m_s'),
    hasHeight: holds('height_m'),
    hasPositionSigma: holds('sigma_n_m'),
    hasVelocitySigma: holds('sigma_vn_m_s'),
    gapsS,
  };
}
