/** Every parameter as a row of a table: its name, its display unit, its value there, and what it was in the version before. */
import { FIELD_GROUPS, type FieldGroup } from '@/shared/parameters/parameter-field';
import { PARAMETER_LIST } from '@/shared/parameters/parameter-list';
import { readPath } from '@/shared/parameters/parameter-path';
import { shownValue, unitSymbol } from '@/shared/parameters/parameter-words';
import type { DisplayUnits } from '@/shared/display-units';
import type { Parameters } from '@/shared/contracts/parameters';

export interface ParameterRow {
  path: string;
  label: string;
  unit: string;
  /** In the display unit, or in words; null: not set. */
  value: number | string | null;
  before: number | string | null;
  changed: boolean;
}

export interface ParameterSection {
  title: string;
  rows: ParameterRow[];
}

/** Sections in the order of the bench; `parent` null: a first version. Rows that were never set are left out. */
export function parameterSections(
  parameters: Parameters,
  parent: Parameters | null,
  chosen: DisplayUnits = {},
): ParameterSection[] {
  const sections = new Map<FieldGroup, ParameterRow[]>();
  for (const spec of PARAMETER_LIST) {
    const now = readPath(parameters, spec.path);
    const then = parent ? readPath(parent, spec.path) : null;
    if (now === null && then === null) continue;
    const rows = sections.get(spec.group) ?? [];
    sections.set(spec.group, rows);
    rows.push({
      path: spec.path,
      label: spec.label,
      unit: unitSymbol(spec, chosen),
      value: shownValue(spec, now, chosen),
      before: shownValue(spec, then, chosen),
      changed: parent !== null && JSON.stringify(now) !== JSON.stringify(then),
    });
  }
  return [...sections].map(([group, rows]) => ({ title: FIELD_GROUPS[group], rows }));
}

/** How many parameters a version changed. */
export const changeCount = (sections: readonly ParameterSection[]): number =>
  sections.reduce((sum, { rows }) => sum + rows.filter((row) => row.changed).length, 0);
