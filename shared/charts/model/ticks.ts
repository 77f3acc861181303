/** Where axes are ruled and what is written there. */
import { formatClock, formatNumber } from '@/shared/format';
import { decimalsOf, niceTicks } from './nice';

export interface Tick {
  value: number;
  label: string;
}

/** Steps that a clock reads well, s. */
const CLOCK_STEPS = [
  0.001, 0.002, 0.005, 0.01, 0.02, 0.05, 0.1, 0.2, 0.5, 1, 2, 5, 10, 20, 30, 60, 120, 300, 600, 1200, 1800, 3600,
  7200, 14_400, 21_600, 43_200, 86_400,
] as const; // prettier-ignore

/** Ticks of a time axis over `[fromS, toS]`, at most `most` of them, at round clock times. */
export function timeTicks(fromS: number, toS: number, most: number): Tick[] {
  const span = toS - fromS;
  if (!(span > 0) || most < 1) return [];
  const step = CLOCK_STEPS.find((candidate) => span / candidate <= most) ?? Math.ceil(span / most);
  const first = Math.ceil(fromS / step - 1e-9);
  const last = Math.floor(toS / step + 1e-9);
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, i) => {
    const value = (first + i) * step;
    return { value, label: formatAxisTime(value, step) };
  });
}

/** A time on an axis whose ticks lie `stepS` apart: 7:05, or 7:05.2 where whole seconds would repeat. */
export function formatAxisTime(seconds: number, stepS: number): string {
  if (stepS >= 1) return formatClock(seconds);
  const decimals = Math.min(3, Math.ceil(-Math.log10(stepS) - 1e-9));
  const units = Math.round(Math.abs(seconds) * 10 ** decimals);
  const whole = Math.floor(units / 10 ** decimals);
  const fraction = String(units - whole * 10 ** decimals).padStart(decimals, '0');
  return `${seconds < 0 && units > 0 ? '−' : ''}${formatClock(whole)}.${fraction}`;
}

/** Ticks of a linear value axis: round values, about `count` of them, labels with one common number of decimals. */
export function valueTicks(low: number, high: number, count: number): Tick[] {
  if (!(high > low)) return [];
  const values = niceTicks(low, high, count);
  const step = values.length > 1 ? values[1]! - values[0]! : high - low;
  const decimals = decimalsOf(step);
  return values.map((value) => ({ value, label: fixed(value, decimals) }));
}

/** 1-2-5 marks of a logarithmic scale between `low` and `high` (> 0); `major` marks the decades. */
export function logMarks(low: number, high: number): { value: number; major: boolean; digit: number }[] {
  const marks: { value: number; major: boolean; digit: number }[] = [];
  for (let exponent = Math.floor(Math.log10(low)) - 1; exponent <= Math.ceil(Math.log10(high)); exponent++)
    for (const digit of [1, 2, 5]) {
      const value = Number(`${digit}e${exponent}`);
      if (value >= low * (1 - 1e-9) && value <= high * (1 + 1e-9))
        marks.push({ value, major: digit === 1, digit });
    }
  return marks;
}

function fixed(value: number, decimals: number): string {
  if (Math.abs(value) >= 1e5) return formatNumber(value, 3);
  const text = Math.abs(value).toFixed(decimals);
  return value < 0 && Number(text) !== 0 ? `−${text}` : text;
}
