/** Values of parameters as people read them. Pure. */
import type { DisplayUnits } from '@/shared/display-units';
import { formatNumber } from '@/shared/format';
import { toDisplay } from '@/shared/units';
import { fieldUnit, type ParameterField } from './parameter-field';
import type { ParameterValue } from './parameter-path';

/** The value in the field's display unit, or in words: "on", "the receiver", "1.2, 0, −0.6"; null: not set. */
export function shownValue(
  field: ParameterField,
  value: ParameterValue,
  chosen: DisplayUnits = {},
): number | string | null {
  if (value === null) return null;
  if (typeof value === 'boolean') return value ? 'on' : 'off';
  if (typeof value === 'string') return field.words?.[value] ?? value;
  const unit = fieldUnit(field, chosen);
  const scaled = (one: number) => (unit ? toDisplay(one, unit) : one);
  return typeof value === 'number'
    ? scaled(value)
    : value.map((part) => formatNumber(scaled(part), 4)).join(', ');
}

/** Symbol of the unit beside a value; '' for what has none. */
export const unitSymbol = (field: ParameterField, chosen: DisplayUnits = {}): string =>
  fieldUnit(field, chosen)?.symbol ?? '';
