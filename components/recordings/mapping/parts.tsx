import type { Control, FieldPath } from 'react-hook-form';
import { StyleSheet, View } from 'react-native';
import { FormChoice } from '@/components/forms/FormChoice';
import { Text } from '@/components/ui/Text';
import { space } from '@/constants/theme';
import type { MapDraft } from './map-draft';

export interface PartProps {
  control: Control<MapDraft>;
  headers: readonly string[];
}

export const fields = StyleSheet.create({
  row: { flexDirection: 'row', flexWrap: 'wrap', gap: space.m, alignItems: 'flex-start' },
  cell: { flexGrow: 1, flexShrink: 1, flexBasis: 150, minWidth: 0 },
  roomy: { flexBasis: 250 },
  group: { gap: space.m },
});

/** A heading inside a file's card. */
export function Group({ title, children }: { title: string; children: React.ReactNode }) {
  return (
    <View role="group" aria-label={title} style={fields.group}>
      <Text variant="label" strong level={3} tone="soft" style={{ letterSpacing: 0.6 }}>
        {title}
      </Text>
      {children}
    </View>
  );
}

export interface ColumnProps extends PartProps {
  name: FieldPath<MapDraft>;
  label: string;
  optional?: boolean;
}

/** Picks one of the file's columns. */
export function Column({ control, headers, name, label, optional }: ColumnProps) {
  return (
    <View style={fields.cell}>
      <FormChoice
        control={control}
        name={name}
        label={label}
        placeholder={optional ? 'None' : 'Choose a column'}
        options={headers.map((header) => ({ value: header, label: header }))}
      />
    </View>
  );
}

export interface PickProps<V extends string> {
  control: Control<MapDraft>;
  name: FieldPath<MapDraft>;
  label: string;
  options: readonly { value: V; label: string }[];
  hint?: string;
  /** For long options: takes the phone's whole width. */
  roomy?: boolean;
}

/** Picks one of a few meanings. */
export function Pick<V extends string>({ control, name, label, options, hint, roomy }: PickProps<V>) {
  return (
    <View style={[fields.cell, roomy ? fields.roomy : null]}>
      <FormChoice control={control} name={name} label={label} options={options} hint={hint} />
    </View>
  );
}

/** Options whose label is the value itself. */
export const plain = <V extends string>(values: readonly V[], labels: Partial<Record<V, string>> = {}) =>
  values.map((value) => ({ value, label: labels[value] ?? value }));
