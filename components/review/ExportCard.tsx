import type { ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { FileLink } from '@/components/ui/FileLink';
import { Card } from '@/components/ui/Card';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, space } from '@/constants/theme';
import type { ExportFormat } from '@/shared/contracts/exports';
import { Cautions } from './Cautions';

const FORMATS: readonly { format: ExportFormat; label: string; holds: string }[] = [
  { format: 'json', label: 'JSON', holds: 'all, with provenance and checksum' },
  { format: 'yaml', label: 'YAML', holds: 'the same for people' },
  { format: 'c', label: 'C header', holds: 'constants in SI, to the last bit' },
  { format: 'csv', label: 'CSV', holds: 'a row a parameter, SI and display unit' },
];

/** The version as files for those who build it in. */
export function ExportCard({
  title,
  name,
  urlOf,
  unreleased,
  children,
}: {
  title: string;
  /** For the screen reader: what is exported. */
  name: string;
  urlOf: (format: ExportFormat) => string;
  /** It is not released: each file says so, and so does the card. */
  unreleased: boolean;
  /** Between the files and the cautions. */
  children?: ReactNode;
}) {
  const { palette } = useTheme();
  return (
    <Card title={title}>
      {unreleased ? (
        <Text variant="label" tone="vermilion">
          Not released: every file says so in its text. Do not build it in.
        </Text>
      ) : null}
      {FORMATS.map(({ format, label, holds }, at) => (
        <View
          key={format}
          style={[styles.row, at === 0 ? null : { borderTopWidth: hairline, borderTopColor: palette.rule }]}
        >
          <Text variant="label" tone="soft" style={styles.words}>
            {holds}
          </Text>
          <FileLink href={urlOf(format)} label={label} of={name} />
        </View>
      ))}
      {children}
      <Cautions />
    </Card>
  );
}

const styles = StyleSheet.create({
  row: { flexDirection: 'row', alignItems: 'center', gap: space.m },
  words: { flex: 1, minWidth: 0 },
});
