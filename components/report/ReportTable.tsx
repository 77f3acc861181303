import { StyleSheet, View } from 'react-native';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { Text, type Tone } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { fonts, hairline, space } from '@/constants/theme';

export interface ReportCell {
  text: string;
  tone?: Tone;
  /** A measured number: set in the mono face. */
  number?: boolean;
}

/** Rows between rules. Where it is narrow, each row folds: its name, then its cells under their titles. */
export function ReportTable({
  label,
  titles,
  rows,
}: {
  label: string;
  titles: readonly string[];
  rows: readonly (readonly ReportCell[])[];
}) {
  const { wide } = useBreakpoint();
  const { palette } = useTheme();
  return (
    <View role="table" aria-label={label}>
      <View role="row" style={wide ? [styles.row, { borderBottomColor: palette.ink }] : styles.hidden}>
        {titles.map((title, i) => (
          <View key={i} role="columnheader" style={i === 0 ? styles.first : styles.cell}>
            <Text variant="small" tone="soft">
              {title}
            </Text>
          </View>
        ))}
      </View>
      {rows.map((row, at) => (
        <View
          key={at}
          role="row"
          style={[styles.row, wide ? null : styles.folded, { borderBottomColor: palette.rule }]}
        >
          {row.map((cell, i) => (
            <View
              key={i}
              role={i === 0 ? 'rowheader' : 'cell'}
              style={i === 0 ? (wide ? styles.first : styles.line) : styles.cell}
            >
              {!wide && i > 0 ? (
                <Text variant="small" tone="soft">
                  {titles[i]}
                </Text>
              ) : null}
              <Text
                variant="label"
                strong={i === 0}
                tone={cell.tone}
                style={cell.number ? styles.number : null}
              >
                {cell.text}
              </Text>
            </View>
          ))}
        </View>
      ))}
    </View>
  );
}

const styles = StyleSheet.create({
  row: {
    flexDirection: 'row',
    alignItems: 'baseline',
    gap: space.m,
    paddingVertical: space.s,
    borderBottomWidth: hairline,
  },
  folded: { flexWrap: 'wrap' },
  hidden: { width: 0, height: 0, overflow: 'hidden' },
  first: { flexGrow: 2, flexBasis: 160, minWidth: 0 },
  line: { width: '100%' },
  cell: { flexGrow: 1, flexBasis: 84, minWidth: 0 },
  number: { fontFamily: fonts.number },
});
