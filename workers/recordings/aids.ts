/** Barometer, heading and odometer at rest: which columns each file holds, and how the engine wants them. */
import type { AidColumns } from '../engine/types';
import type { Columns } from './arrow-file';

export const AID_KINDS = ['barometer', 'heading', 'odometer'] as const;
export type AidKind = (typeof AID_KINDS)[number];

/** Time, value in SI, 1σ (NaN where the log gives none). */
export const AID_FILE_COLUMNS: Record<AidKind, readonly [string, string, string]> = {
  barometer: ['time_s', 'height_m', 'sigma_m'],
  heading: ['time_s', 'heading_rad', 'sigma_rad'],
  odometer: ['time_s', 'speed_m_s', 'sigma_m_s'],
};

/** From the tables of those that a recording has; null where it has none. */
export function aidColumns(tables: Partial<Record<AidKind, Columns>>): AidColumns | null {
  const { barometer: b, heading: h, odometer: o } = tables;
  if (!b && !h && !o) return null;
  return {
    barometer: b ? { timeS: b.time_s!, heightM: b.height_m!, sigmaM: known(b.sigma_m!) } : null,
    heading: h ? { timeS: h.time_s!, headingRad: h.heading_rad!, sigmaRad: known(h.sigma_rad!) } : null,
    odometer: o ? { timeS: o.time_s!, speedMPerS: o.speed_m_s!, sigmaMPerS: known(o.sigma_m_s!) } : null,
  };
}

const known = (sigma: Float64Array) => (sigma.some((value) => !Number.isNaN(value)) ? sigma : null);
