/** Readings of barometer, heading and odometer to metres, radians and m/s; NaN where a reading is missing. */
import type { AidsMap } from '@/shared/contracts/recordings';
import { KNOT_M_S, RAD_PER_DEG } from '@/shared/units';
import type { AidKind } from '../recordings/aids';

/** One reading in SI; `timeS` may move: a speed from distances is that of the middle between two readings. */
export interface AidReading {
  timeS: number;
  value: number;
  sigma: number;
}

/** Readings of one sensor, in order of time; null where a reading gives nothing yet. */
export type AidConverter = (timeS: number, value: number, sigma: number) => AidReading | null;

const PRESSURE_PA = { Pa: 1, hPa: 100, kPa: 1000 } as const;
const LENGTH_M = { m: 1, mm: 1e-3, ft: 0.3048 } as const;
const SPEED_M_S = { 'm/s': 1, 'mm/s': 1e-3, 'km/h': 1 / 3.6, kn: KNOT_M_S } as const;
/** International Standard Atmosphere below 11 km (ISO 2533:1975): sea-level pressure, T₀/L, and R·L/g. */
const SEA_LEVEL_PA = 101_325;
const SCALE_M = 288.15 / 0.0065;
const EXPONENT = 0.190263;

export function aidConverter(kind: AidKind, map: AidsMap): AidConverter {
  if (kind === 'barometer') return barometer(map.barometer!.unit);
  if (kind === 'heading') return heading(map.heading!);
  return odometer(map.odometer!);
}

function barometer(unit: NonNullable<AidsMap['barometer']>['unit']): AidConverter {
  if (unit === 'm' || unit === 'mm' || unit === 'ft') {
    const scale = LENGTH_M[unit];
    return (timeS, value, sigma) => ({ timeS, value: value * scale, sigma: sigma * scale });
  }
  const scale = PRESSURE_PA[unit];
  return (timeS, value, sigma) => {
    const ratio = (value * scale) / SEA_LEVEL_PA;
    if (!(ratio > 0)) return null;
    const slope = (SCALE_M * EXPONENT * ratio ** EXPONENT) / (value * scale);
    return { timeS, value: SCALE_M * (1 - ratio ** EXPONENT), sigma: sigma * scale * slope };
  };
}

/** Clockwise from north, to [0, 2π). */
function heading({ unit, offsetDeg = 0 }: NonNullable<AidsMap['heading']>): AidConverter {
  const scale = unit === 'deg' ? RAD_PER_DEG : 1;
  const turn = 2 * Math.PI;
  return (timeS, value, sigma) => {
    const angle = (value * scale + offsetDeg * RAD_PER_DEG) % turn;
    return { timeS, value: angle < 0 ? angle + turn : angle, sigma: sigma * scale };
  };
}

function odometer({ unit, scale = 1 }: NonNullable<AidsMap['odometer']>): AidConverter {
  if (unit !== 'm' && unit !== 'count') {
    const si = SPEED_M_S[unit] * scale;
    return (timeS, value, sigma) => ({ timeS, value: value * si, sigma: sigma * si });
  }
  let before: { timeS: number; value: number } | null = null;
  return (timeS, value) => {
    const last = before;
    before = { timeS, value };
    // A distance that falls was set back to zero.
    if (!last || value < last.value || timeS <= last.timeS) return null;
    const speed = ((value - last.value) * scale) / (timeS - last.timeS);
    return { timeS: (timeS + last.timeS) / 2, value: speed, sigma: NaN };
  };
}
