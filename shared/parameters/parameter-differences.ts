/** What differs between two sets of parameters, one entry a parameter, for people and for programs. Pure. */
import type { Parameters } from '../contracts/parameters';
import { FIELD_GROUPS } from './parameter-field';
import { PARAMETER_LIST, parameterAt } from './parameter-list';
import { differences, readPath, type ParameterValue } from './parameter-path';
import { shownValue, unitSymbol } from './parameter-words';

export interface ParameterDifference {
  path: string;
  /** Title of the group that the bench shows it in; '' for one that is not shown there. */
  group: string;
  label: string;
  /** Of `before` and `after`; '' for what has none. */
  unit: string;
  /** In the unit, or in words; null: not set. */
  before: number | string | null;
  after: number | string | null;
  /** Change in percent of the value before; null where either is no number, or the one before is zero. */
  percent: number | null;
}

/** In the order of the bench; what has no name there comes last, by its path. */
export function parameterDifferences(from: Parameters, to: Parameters): ParameterDifference[] {
  const found = differences(from, to).map(({ path, value }) => describe(path, readPath(from, path), value));
  const place = ({ path }: ParameterDifference) => {
    const at = PARAMETER_LIST.findIndex((field) => field.path === path);
    return at < 0 ? PARAMETER_LIST.length : at;
  };
  return found.sort((a, b) => place(a) - place(b));
}

function describe(path: string, before: ParameterValue, after: ParameterValue): ParameterDifference {
  const field = parameterAt(path);
  const percent = percentOf(before, after);
  if (!field) {
    return { path, group: '', label: path, unit: '', before: plain(before), after: plain(after), percent };
  }
  return {
    path,
    group: FIELD_GROUPS[field.group],
    label: field.label,
    unit: unitSymbol(field),
    before: shownValue(field, before),
    after: shownValue(field, after),
    percent,
  };
}

const percentOf = (before: ParameterValue, after: ParameterValue): number | null =>
  typeof before === 'number' && typeof after === 'number' && before !== 0
    ? ((after - before) / Math.abs(before)) * 100
    : null;

const plain = (value: ParameterValue): number | string | null =>
  value === null || typeof value === 'number'
    ? value
    : Array.isArray(value)
      ? value.join(', ')
      : String(value);
