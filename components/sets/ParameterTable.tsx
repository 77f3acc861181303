import { StyleSheet, View } from 'react-native';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { AlignedNumber } from '@/components/ui/AlignedNumber';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, space } from '@/constants/theme';
import type { ParameterRow, ParameterSection } from './parameter-rows';

export interface ParameterTableProps {
  sections: readonly ParameterSection[];
  /** "version 2": what the second column and the change are against; null: nothing came before. */
  parentName: string | null;
}

/** All parameters of a version with their units, beside those of the version it came from. */
export function ParameterTable({ sections, parentName }: ParameterTableProps) {
  const { wide } = useBreakpoint();
  const { palette } = useTheme();
  return (
    <View role="table" aria-label="Parameters">
      <View role="row" style={[styles.row, styles.headRow, { borderBottomColor: palette.ink }]}>
        <Head style={styles.label}>Parameter</Head>
        <Head style={styles.value}>Value</Head>
        {wide ? <Head style={styles.unit}>Unit</Head> : null}
        {parentName && wide ? <Head style={styles.value}>{capital(parentName)}</Head> : null}
        {parentName ? <Head style={wide ? styles.value : styles.change}>Change</Head> : null}
      </View>
      {sections.map((section) => (
        <View key={section.title} role="rowgroup" aria-label={section.title}>
          <View role="row" style={[styles.row, { borderBottomColor: palette.rule }]}>
            <View role="rowheader" style={styles.section}>
              <Text variant="small" strong tone="soft" style={styles.caps}>
                {section.title.toUpperCase()}
              </Text>
            </View>
          </View>
          {section.rows.map((row) => (
            <Row key={row.path} row={row} compared={parentName !== null} wide={wide} />
          ))}
        </View>
      ))}
    </View>
  );
}

function Row({ row, compared, wide }: { row: ParameterRow; compared: boolean; wide: boolean }) {
  const { palette } = useTheme();
  return (
    <View
      role="row"
      style={[
        styles.row,
        { borderBottomColor: palette.rule },
        row.changed ? { backgroundColor: palette.well } : null,
      ]}
    >
      <View role="rowheader" style={styles.label}>
        <Text variant="label" strong={row.changed}>
          {row.label}
          {!wide && row.unit ? <Text variant="label" tone="soft">{` ${row.unit}`}</Text> : null}
        </Text>
      </View>
      <View role="cell" style={styles.value}>
        <Value value={row.value} />
      </View>
      {wide ? (
        <View role="cell" style={styles.unit}>
          <Text variant="label" tone="soft">
            {row.unit}
          </Text>
        </View>
      ) : null}
      {compared && wide ? (
        <View role="cell" style={styles.value}>
          <Value value={row.before} soft />
        </View>
      ) : null}
      {compared ? (
        <View role="cell" style={wide ? styles.value : styles.change}>
          {row.changed ? <Change row={row} /> : null}
        </View>
      ) : null}
    </View>
  );
}

function Value({ value, soft }: { value: ParameterRow['value']; soft?: boolean }) {
  if (typeof value === 'string')
    return (
      <Text variant="label" tone={soft ? 'soft' : 'ink'}>
        {value}
      </Text>
    );
  return <AlignedNumber value={value} tone={soft ? 'soft' : 'ink'} />;
}

function Change({ row }: { row: ParameterRow }) {
  if (typeof row.value === 'number' && typeof row.before === 'number')
    return <AlignedNumber value={row.value - row.before} signed tone="petrol" />;
  return (
    <Text variant="label" tone="petrol">
      {row.before === null ? 'new' : row.value === null ? 'removed' : `was ${row.before}`}
    </Text>
  );
}

function Head({ children, style }: { children: string; style: object }) {
  return (
    <View role="columnheader" style={style}>
      <Text variant="small" tone="soft">
        {children}
      </Text>
    </View>
  );
}

const capital = (word: string) => word.charAt(0).toUpperCase() + word.slice(1);

const styles = StyleSheet.create({
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    gap: space.s,
    paddingVertical: 6,
    paddingHorizontal: space.s,
    borderBottomWidth: hairline,
  },
  headRow: { alignItems: 'flex-end' },
  section: { paddingTop: space.m },
  caps: { letterSpacing: 1 },
  label: { flex: 1, minWidth: 96 },
  value: { width: 112 },
  unit: { width: 64 },
  change: { width: 104 },
});
