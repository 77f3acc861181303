/** The units of an IMU's columns: what the headers say, held against the size of gravity; else from the values alone. */
import type { AccelUnit, GyroUnit } from '@/shared/contracts/recordings';
import { formatNumber } from '@/shared/format';
import { STANDARD_GRAVITY_M_S2 } from '@/shared/units';
import type { CsvHead } from './csv';
import { magnitudes, typicalSize, type Triple } from './pattern-columns';

export interface GuessedUnit<U extends string = string> {
  unit: U;
  fromHeader: boolean;
  confidence: number;
  /** A whole sentence. */
  reason: string;
}

/** Faster than this in rad/s hardly any vehicle turns: the numbers are degrees. */
const MAX_LIKELY_RATE = 6;
const GRAVITY_IN: Partial<Record<AccelUnit, number>> = {
  'm/s^2': STANDARD_GRAVITY_M_S2,
  g: 1,
  mg: 1000,
};

/** A vehicle on average feels gravity: its size tells the unit, or whether the header can be right. */
export function accelUnitOf(head: CsvHead, columns: Triple, increments: boolean): GuessedUnit<AccelUnit> {
  const stated = unitOfAll(columns) as AccelUnit | null;
  const size = typicalSize(head, columns);
  const shown = `The typical length of the vector is ${formatNumber(size)}`;
  if (stated) {
    const gravity = GRAVITY_IN[stated];
    const share = gravity === undefined ? NaN : size / gravity;
    if (share < 0.3 || share > 3)
      return {
        unit: stated,
        fromHeader: true,
        confidence: 0.3,
        reason: `The headers say ${stated}, but ${lower(shown)}, which is far from gravity (${formatNumber(gravity!)} ${stated}).`,
      };
    const fits = Number.isNaN(share) ? '' : ` ${shown}, which fits gravity.`;
    return { unit: stated, fromHeader: true, confidence: 0.98, reason: `The headers say ${stated}.${fits}` };
  }
  if (increments)
    return {
      unit: 'm/s',
      fromHeader: false,
      confidence: 0.6,
      reason: 'Increments without a unit are taken as m/s.',
    };
  for (const unit of ['g', 'mg'] as const) {
    const share = size / GRAVITY_IN[unit]!;
    if (share > 0.5 && share < 2)
      return { unit, fromHeader: false, confidence: 0.9, reason: `${shown}: gravity in ${unit}.` };
  }
  const share = size / STANDARD_GRAVITY_M_S2;
  const fits = share > 0.5 && share < 2;
  return {
    unit: 'm/s^2',
    fromHeader: false,
    confidence: fits ? 0.9 : 0.3,
    reason: fits
      ? `${shown}: gravity in m/s².`
      : `${shown}, which is gravity in no usual unit: m/s² is only a guess.`,
  };
}

export function gyroUnitOf(
  head: CsvHead,
  columns: Triple,
  accelUnit: AccelUnit,
  increments: boolean,
): GuessedUnit<GyroUnit> {
  const stated = unitOfAll(columns) as GyroUnit | null;
  const sizes = magnitudes(head, columns);
  const largest = sizes.at(-1) ?? NaN;
  const shown = `The fastest turn in the first ${sizes.length} samples is ${formatNumber(largest)}`;
  if (stated === 'rad/s' && largest > 4 * MAX_LIKELY_RATE)
    return {
      unit: stated,
      fromHeader: true,
      confidence: 0.4,
      reason: `The headers say rad/s, but ${lower(shown)}: it may be °/s.`,
    };
  if (stated)
    return { unit: stated, fromHeader: true, confidence: 0.98, reason: `The headers say ${stated}.` };
  if (increments)
    return {
      unit: 'rad',
      fromHeader: false,
      confidence: 0.6,
      reason: 'Increments without a unit are taken as rad.',
    };
  if (largest > MAX_LIKELY_RATE)
    return { unit: 'deg/s', fromHeader: false, confidence: 0.9, reason: `${shown}, too much for rad/s.` };
  if (accelUnit === 'g' || accelUnit === 'mg')
    return {
      unit: 'deg/s',
      fromHeader: false,
      confidence: 0.7,
      reason: 'Sensors that count gravity in g mostly count turns in °/s.',
    };
  return {
    unit: 'rad/s',
    fromHeader: false,
    confidence: 0.6,
    reason: `${shown}: both rad/s and °/s are possible, and the accelerometer counts in m/s².`,
  };
}

/** The unit that the headers agree on. */
const unitOfAll = (columns: Triple) =>
  columns.every((column) => column.unit === columns[0].unit) ? columns[0].unit : null;

const lower = (text: string) => text.charAt(0).toLowerCase() + text.slice(1);
