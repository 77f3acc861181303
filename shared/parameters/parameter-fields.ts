/** All parameters that are typed, switched or chosen, and how one is found. */
import { AID_FIELDS } from './aid-fields';
import { FILTER_FIELDS } from './filter-fields';
import type { FieldGroup, ParameterField } from './parameter-field';

/** In the order of the bench. */
export const FIELDS: readonly ParameterField[] = [...FILTER_FIELDS, ...AID_FIELDS];

/** Fields of a group whose switch, if they hang on one, is on. */
export const fieldsThatCount = (group: FieldGroup, isOn: (path: string) => boolean): ParameterField[] =>
  FIELDS.filter((field) => field.group === group && (field.needs?.some(isOn) ?? true));

/** The field at `path`. Throws where there is none: the path is then mistyped. */
export function fieldAt(path: string): ParameterField {
  const field = FIELDS.find((one) => one.path === path);
  if (!field) throw new Error(`No field is named for ${path}.`);
  return field;
}
