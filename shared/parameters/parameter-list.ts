/** Every parameter that has a name, in the order of the bench: what is slid first, then what is typed or switched, group by group. */
import { FIELD_GROUPS, type FieldGroup, type ParameterField } from './parameter-field';
import { FIELDS } from './parameter-fields';
import { SLIDERS } from './parameter-specs';

export const PARAMETER_LIST: readonly ParameterField[] = (Object.keys(FIELD_GROUPS) as FieldGroup[]).flatMap(
  (group) => [
    ...SLIDERS.filter((slider) => slider.group === group).map(({ path, label, quantity }) => ({
      path,
      label,
      quantity,
      group,
    })),
    ...FIELDS.filter((field) => field.group === group),
  ],
);

const BY_PATH = new Map(PARAMETER_LIST.map((field) => [field.path, field]));

/** The parameter at a dotted path; undefined where none is named so. */
export const parameterAt = (path: string): ParameterField | undefined => BY_PATH.get(path);
