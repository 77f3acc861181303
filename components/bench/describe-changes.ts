/** What differs between two parameter sets, in lines for people. Pure. */
import type { Parameters } from '@/shared/contracts/parameters';
import type { DisplayUnits } from '@/shared/display-units';
import { formatNumber } from '@/shared/format';
import { FIELD_GROUPS, type ParameterField } from '@/shared/parameters/parameter-field';
import { FIELDS } from '@/shared/parameters/parameter-fields';
import { differences, readPath, type ParameterValue } from '@/shared/parameters/parameter-path';
import { GROUP_TITLES, SLIDERS } from '@/shared/parameters/parameter-specs';
import { shownValue, unitSymbol } from '@/shared/parameters/parameter-words';

/** "Gyro white noise (ARW): 0.299 → 0.32 °/√h", "Stops, zero-velocity update: off → on". */
export function describeChanges(from: Parameters, to: Parameters, chosen: DisplayUnits = {}): string[] {
  return differences(from, to).map(({ path, value }) => describe(path, readPath(from, path), value, chosen));
}

function describe(path: string, before: ParameterValue, after: ParameterValue, chosen: DisplayUnits): string {
  const slider = SLIDERS.find((one) => one.path === path);
  if (slider) {
    const field: ParameterField = { ...slider, group: slider.group };
    return `${GROUP_TITLES[slider.group]} ${lower(slider.label)}: ${change(field, before, after, chosen)}`;
  }
  const field = FIELDS.find((one) => one.path === path);
  return field
    ? `${FIELD_GROUPS[field.group]}, ${lower(field.label)}: ${change(field, before, after, chosen)}`
    : `${path}: ${plain(before)} → ${plain(after)}`;
}

function change(
  field: ParameterField,
  before: ParameterValue,
  after: ParameterValue,
  chosen: DisplayUnits,
): string {
  const shown = (value: ParameterValue) => {
    const one = shownValue(field, value, chosen);
    return one === null ? (field.unset ?? 'not set') : typeof one === 'number' ? formatNumber(one) : one;
  };
  const unit = unitSymbol(field, chosen);
  return `${shown(before)} → ${shown(after)}${unit && after !== null ? ` ${unit}` : ''}`;
}

/** The first letter small where it begins a word and not an abbreviation. */
const lower = (label: string) =>
  /^[A-Z][a-z]/.test(label) ? label[0]!.toLowerCase() + label.slice(1) : label;

const plain = (value: ParameterValue): string =>
  value === null ? 'not set' : Array.isArray(value) ? value.join(', ') : String(value);
