import { View } from 'react-native';
import { space } from '@/constants/theme';
import { FieldSettings } from './FieldSettings';
import { FIELD_GROUPS, type FieldGroup } from '@/shared/parameters/parameter-field';
import { FIELDS } from '@/shared/parameters/parameter-fields';
import { readPath } from '@/shared/parameters/parameter-path';
import { leafAt } from './parameter-schema';
import { RunOptions } from './RunOptions';
import type { Bench } from './use-bench';
import type { Parameters } from '@/shared/contracts/parameters';

/** Groups of what helps the filter besides GNSS, in the order of the bench. */
export const AID_GROUPS: readonly FieldGroup[] = ['clipping', 'stops', 'vehicle', 'sensors', 'states'];

/** Clipping, the vehicle's own aids, and what the run works out besides. */
export function AidSettings({ bench }: { bench: Bench }) {
  return (
    <View style={{ gap: space.l }}>
      {AID_GROUPS.map((group, i) => (
        <FieldSettings key={group} bench={bench} group={group} ruled={i > 0} />
      ))}
      <RunOptions bench={bench} />
    </View>
  );
}

/** What of it is on, in a line: "Clipping on" or "Clipping, stops on". */
export function aidWords(parameters: Parameters): string {
  const on = AID_GROUPS.filter((group) =>
    FIELDS.some(
      ({ group: own, path }) =>
        own === group && leafAt(path).kind === 'switch' && readPath(parameters, path) === true,
    ),
  ).map((group) => FIELD_GROUPS[group]);
  if (on.length === 0) return 'All off';
  return `On: ${on.map((title, i) => (i === 0 ? title : title[0]!.toLowerCase() + title.slice(1))).join(', ')}`;
}
