/** The ruled logarithmic slider's arithmetic: values, places along the rule, keys, typed text. Pure. */
import { formatNumber } from '@/shared/format';
import { unitsOf } from '@/shared/display-units';
import { fromDisplay, toDisplay, type DisplayUnit, type Quantity } from '@/shared/units';
import type { LogRange } from '@/shared/parameters/parameter-specs';

/** Place of `value` along the rule, 0…1, held inside. */
export function fractionOf(value: number, { low, high }: LogRange): number {
  return clamp(Math.log(value / low) / Math.log(high / low), 0, 1);
}

/** Value at `fraction` of the rule, rounded to three significant digits in `unit`. */
export function valueAt(fraction: number, { low, high }: LogRange, unit: DisplayUnit): number {
  const raw = low * Math.exp(clamp(fraction, 0, 1) * Math.log(high / low));
  return clamp(roundShown(raw, unit), low, high);
}

/** `value` with three significant digits as shown in `unit`: what a person reads is what the filter gets. */
export function roundShown(value: number, unit: DisplayUnit): number {
  return fromDisplay(Number(toDisplay(value, unit).toPrecision(3)), unit);
}

/** Factors of one press. */
const STEP = 10 ** (1 / 20);
const FINE_STEP = 10 ** (1 / 100);

/** The value after `key`; null when the key is not the slider's. `home` is the baseline's value. */
export function sliderKey(
  value: number,
  range: LogRange,
  unit: DisplayUnit,
  key: string,
  shift: boolean,
  home: number,
): number | null {
  const step = shift ? FINE_STEP : STEP;
  const held = (next: number) => clamp(roundShown(next, unit), range.low, range.high);
  switch (key) {
    case 'ArrowRight':
    case 'ArrowUp':
      return held(moved(value, value * step, unit));
    case 'ArrowLeft':
    case 'ArrowDown':
      return held(moved(value, value / step, unit));
    case 'PageUp':
      return held(nextMark(value, unit, 1));
    case 'PageDown':
      return held(nextMark(value, unit, -1));
    case 'Home':
      return range.low;
    case 'End':
      return range.high;
    case 'Backspace':
    case 'Delete':
      return home;
    default:
      return null;
  }
}

/** A step that rounding would swallow still moves the last digit. */
function moved(from: number, to: number, unit: DisplayUnit): number {
  if (roundShown(to, unit) !== roundShown(from, unit)) return to;
  const shown = toDisplay(from, unit);
  const digit = 10 ** (Math.floor(Math.log10(shown)) - 2);
  return fromDisplay(shown + (to > from ? digit : -digit), unit);
}

/** The next 1, 2 or 5 above (`direction` 1) or below (−1) the value as shown. */
function nextMark(value: number, unit: DisplayUnit, direction: 1 | -1): number {
  const shown = toDisplay(value, unit);
  const decade = 10 ** Math.floor(Math.log10(shown) + 1e-9);
  const marks = [0.5, 1, 2, 5, 10, 20].map((digit) => digit * decade);
  const next =
    direction > 0
      ? marks.find((mark) => mark > shown * (1 + 1e-6))
      : marks.reverse().find((mark) => mark < shown * (1 - 1e-6));
  return fromDisplay(next ?? shown, unit);
}

export type Typed = { value: number } | { message: string };

/**
 * A typed quantity: a number with or without a unit of its kind ("0.3", "0,3 °/√h", "5e-5 rad/√s").
 * Without a unit it is in `unit`. What cannot be read or is out of range is said in words.
 */
export function parseTyped(text: string, quantity: Quantity, unit: DisplayUnit, range: LogRange): Typed {
  const match = /^\s*([+-]?(?:\d+(?:[.,]\d*)?|[.,]\d+)(?:e[+-]?\d+)?)\s*(.*?)\s*$/i.exec(
    text.replace('−', '-').replace(/[\u2009\u202f]/g, ''),
  );
  if (!match) return { message: `Type a number, with or without a unit (${symbols(quantity)}).` };
  const found = match[2] === '' ? unit : unitOf(match[2]!, quantity);
  if (!found) return { message: `“${match[2]}” is not a unit of this: use ${symbols(quantity)}.` };
  const value = fromDisplay(Number(match[1]!.replace(',', '.')), found);
  if (!(value >= range.low * (1 - 1e-9) && value <= range.high * (1 + 1e-9)))
    return {
      message: `Between ${formatNumber(toDisplay(range.low, unit))} and ${formatNumber(toDisplay(range.high, unit))} ${unit.symbol}.`,
    };
  return { value };
}

function unitOf(text: string, quantity: Quantity): DisplayUnit | undefined {
  const plain = (symbol: string) =>
    symbol
      .toLowerCase()
      .replace(/deg/g, '°')
      .replace(/sqrt\(?(\w+)\)?/g, '√$1')
      .replace(/u(?=g)/, 'µ')
      .replace(/\s|²/g, (c) => (c === '²' ? '2' : ''));
  return unitsOf(quantity).find((unit) => plain(unit.symbol) === plain(text.replace('^', '')));
}

const symbols = (quantity: Quantity) =>
  unitsOf(quantity)
    .map((unit) => unit.symbol)
    .join(', ');
const clamp = (value: number, low: number, high: number) => Math.min(high, Math.max(low, value));
