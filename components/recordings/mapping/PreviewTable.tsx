import { ScrollView, StyleSheet, View } from 'react-native';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { web } from '@/components/ui/web-props';
import { fonts, hairline, radius, space } from '@/constants/theme';
import type { FilePreview } from '@/shared/contracts/recordings';

export interface PreviewTableProps {
  preview: FilePreview;
  /** How the file is called. */
  title: string;
  /** Header → what it is taken for. */
  parts: ReadonlyMap<string, string>;
  rows?: number;
}

/** The first rows of a file as it writes them; each column says what it is taken for. */
export function PreviewTable({ preview, title, parts, rows = 4 }: PreviewTableProps) {
  const { palette } = useTheme();
  return (
    <ScrollView
      horizontal
      aria-label={`First rows: ${title}`}
      {...web({ tabIndex: 0 })}
      style={[styles.box, { borderColor: palette.rule, backgroundColor: palette.well }]}
    >
      <View role="table" aria-label={`First rows: ${title}`}>
        <View role="row" style={styles.row}>
          {preview.headers.map((header, at) => {
            const part = parts.get(header);
            return (
              <View
                key={at}
                role="columnheader"
                style={[
                  styles.cell,
                  styles.header,
                  { borderBottomColor: part ? palette.petrol : palette.rule, borderRightColor: palette.rule },
                ]}
              >
                <Text
                  variant="small"
                  tone={part ? 'petrol' : 'soft'}
                  strong={Boolean(part)}
                  numberOfLines={1}
                >
                  {part ?? 'not used'}
                </Text>
                <Text variant="label" strong numberOfLines={1}>
                  {header}
                </Text>
              </View>
            );
          })}
        </View>
        {preview.rows.slice(0, rows).map((cells, line) => (
          <View key={line} role="row" style={styles.row}>
            {preview.headers.map((header, at) => (
              <View key={at} role="cell" style={[styles.cell, { borderRightColor: palette.rule }]}>
                <Text
                  variant="small"
                  tone={parts.has(header) ? 'ink' : 'soft'}
                  numberOfLines={1}
                  style={{ fontFamily: fonts.number }}
                >
                  {cells[at] ?? ''}
                </Text>
              </View>
            ))}
          </View>
        ))}
      </View>
    </ScrollView>
  );
}

const styles = StyleSheet.create({
  box: { borderWidth: hairline, borderRadius: radius, flexGrow: 0 },
  row: { flexDirection: 'row' },
  cell: { width: 128, paddingHorizontal: space.s, paddingVertical: space.xs, borderRightWidth: hairline },
  header: { borderBottomWidth: 2 },
});
