import { StyleSheet, View } from 'react-native';
import { Text } from '@/components/ui/Text';
import { Toggle } from '@/components/ui/Toggle';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, space } from '@/constants/theme';
import { ChoiceSetting } from './ChoiceSetting';
import { NumberSetting } from './NumberSetting';
import { FIELD_GROUPS, type FieldGroup, type ParameterField } from '@/shared/parameters/parameter-field';
import { fieldsThatCount } from '@/shared/parameters/parameter-fields';
import { readPath } from '@/shared/parameters/parameter-path';
import { leafAt } from './parameter-schema';
import type { Bench } from './use-bench';

/** A section of settings under its name: switches, and the values of those that are on. */
export function FieldSettings({ bench, group, ruled }: { bench: Bench; group: FieldGroup; ruled: boolean }) {
  const { palette } = useTheme();
  const title = FIELD_GROUPS[group];
  const fields = fieldsThatCount(group, (path) => readPath(bench.config.parameters, path) === true);
  return (
    <View
      role="group"
      aria-label={title}
      style={[styles.section, ruled ? [styles.ruled, { borderTopColor: palette.rule }] : null]}
    >
      <Text variant="label" strong level={3}>
        {title}
      </Text>
      {fields.map((field) => (
        <Setting key={field.path} bench={bench} field={field} />
      ))}
    </View>
  );
}

function Setting({ bench, field }: { bench: Bench; field: ParameterField }) {
  const { kind, options } = leafAt(field.path);
  if (kind === 'switch')
    return (
      <Toggle
        label={field.label}
        hint={field.hint}
        value={readPath(bench.config.parameters, field.path) === true}
        onChange={(value) => bench.setParameter(field.path, value, true)}
        disabled={bench.locked !== null}
      />
    );
  if (kind === 'choice')
    return (
      <ChoiceSetting
        bench={bench}
        path={field.path}
        label={field.label}
        options={options.map((value) => ({ value, label: field.words?.[value] ?? value }))}
      />
    );
  return kind === 'number' ? <NumberSetting bench={bench} field={field} /> : null;
}

const styles = StyleSheet.create({
  section: { gap: space.s, paddingTop: space.m },
  ruled: { borderTopWidth: hairline },
});
