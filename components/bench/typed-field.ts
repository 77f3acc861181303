/** A typed parameter: what stands in its field, and what a text means. Pure. */
import { parseNumber } from '@/components/forms/parse-number';
import type { DisplayUnits } from '@/shared/display-units';
import { formatNumber } from '@/shared/format';
import { fromDisplay, toDisplay } from '@/shared/units';
import { fieldUnit, type ParameterField } from '@/shared/parameters/parameter-field';
import type { ParameterValue } from '@/shared/parameters/parameter-path';
import type { ParameterLeaf } from './parameter-schema';
import { parseTyped } from './slider-model';

export type TypedResult = { value: number | null } | { message: string };

/** The value as it stands in the field, in the display unit: as short as it can be told, four digits where it is endless. */
export function fieldText(field: ParameterField, value: ParameterValue, chosen: DisplayUnits = {}): string {
  if (typeof value !== 'number') return '';
  const unit = fieldUnit(field, chosen);
  const exact = unit ? toDisplay(value, unit) : value;
  const short = [1, 2, 3, 4, 5, 6, 7]
    .map((digits) => Number(exact.toPrecision(digits)))
    .find((one) => Math.abs(one - exact) <= 1e-9 * Math.abs(exact));
  return String(short ?? Number(exact.toPrecision(4))).replace('-', '−');
}

/**
 * What was typed, SI; null where the field was emptied and may be. With or without a unit of the field's kind; without one
 * it is in the unit shown. What cannot be read or lies outside the contract's bounds is said in words.
 */
export function readField(
  field: ParameterField,
  leaf: ParameterLeaf,
  text: string,
  chosen: DisplayUnits = {},
): TypedResult {
  const unit = fieldUnit(field, chosen) ?? { symbol: '', toSi: 1 };
  if (text.trim() === '')
    return leaf.optional
      ? { value: null }
      : { message: `Type a number${unit.symbol && ` in ${unit.symbol}`}.` };
  if (field.quantity) {
    const typed = parseTyped(text, field.quantity, unit, leaf);
    return 'value' in typed ? { value: Math.min(leaf.high, Math.max(leaf.low, typed.value)) } : typed;
  }
  const number = parseNumber(text.replace('−', '-'));
  if (number === undefined || !Number.isFinite(number))
    return { message: `Type a number${unit.symbol && ` in ${unit.symbol}`}.` };
  const value = fromDisplay(number, unit);
  return value >= leaf.low && value <= leaf.high ? { value } : { message: boundsWords(leaf, unit) };
}

function boundsWords({ low, high }: ParameterLeaf, unit: { symbol: string; toSi: number }): string {
  const shown = (value: number) => formatNumber(toDisplay(value, unit));
  if (low === -Infinity) return `At most ${shown(high)} ${unit.symbol}.`;
  if (high === Infinity) return `At least ${shown(low)} ${unit.symbol}.`;
  return `Between ${shown(low)} and ${shown(high)} ${unit.symbol}.`;
}
