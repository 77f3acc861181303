import { StyleSheet, View } from 'react-native';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { fonts, hairline, radius, space } from '@/constants/theme';

export interface FigureRow {
  key: string;
  label: string;
  /** Under the label. */
  note: string;
  /** The note says what should not be. */
  alarming?: boolean;
  /** Over the value. */
  of?: string;
  /** Written out; null: there is none. */
  value: string | null;
  unit: string;
}

/** Figures of a run in ruled rows under a name. Nothing where there are none. */
export function FigureRows({ title, rows }: { title: string; rows: readonly FigureRow[] }) {
  const { palette } = useTheme();
  if (rows.length === 0) return null;
  return (
    <View
      role="region"
      aria-label={title}
      style={[styles.card, { backgroundColor: palette.sheet, borderColor: palette.rule }]}
    >
      <Text variant="small" strong tone="soft" level={2} style={styles.title}>
        {title.toUpperCase()}
      </Text>
      {rows.map((row) => (
        <View key={row.key} style={[styles.row, { borderTopColor: palette.rule }]}>
          <View style={styles.words}>
            <Text variant="label" strong>
              {row.label}
            </Text>
            <Text variant="small" tone={row.alarming ? 'ochre' : 'soft'}>
              {row.note}
            </Text>
          </View>
          {row.value === null ? null : (
            <View style={styles.value}>
              {row.of ? (
                <Text variant="small" tone="soft">
                  {row.of}
                </Text>
              ) : null}
              <Text variant="body" style={styles.digits}>
                {row.value}
                <Text variant="small" tone="soft">{`\u202f${row.unit}`}</Text>
              </Text>
            </View>
          )}
        </View>
      ))}
    </View>
  );
}

const styles = StyleSheet.create({
  card: { borderWidth: hairline, borderRadius: radius },
  title: { padding: space.m, letterSpacing: 1 },
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    justifyContent: 'space-between',
    gap: space.m,
    paddingVertical: space.s,
    paddingHorizontal: space.m,
    borderTopWidth: hairline,
  },
  words: { flexShrink: 1 },
  value: { alignItems: 'flex-end', flexShrink: 0 },
  digits: { fontFamily: fonts.number },
});
