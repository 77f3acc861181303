import { StyleSheet, View } from 'react-native';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { fonts, hairline, radius, space } from '@/constants/theme';
import { formatNumber } from '@/shared/format';
import type { AidStatistics } from '@/shared/contracts/runs';
import { useSummary, type Bench } from './use-bench';

/** What each aid did in the last run. Nothing where none was on. */
export function AidFigures({ bench }: { bench: Bench }) {
  const { palette } = useTheme();
  const aids = useSummary(bench)?.aids ?? [];
  if (aids.length === 0) return null;
  return (
    <View
      role="region"
      aria-label="Aids"
      style={[styles.card, { backgroundColor: palette.sheet, borderColor: palette.rule }]}
    >
      <Text variant="small" strong tone="soft" level={2} style={styles.title}>
        AIDS
      </Text>
      {aids.map((aid) => (
        <View key={aid.aid} style={[styles.row, { borderTopColor: palette.rule }]}>
          <View style={styles.words}>
            <Text variant="label" strong>
              {aidName(aid.aid)}
            </Text>
            <Text variant="small" tone={aid.rejected > aid.used ? 'vermilion' : 'soft'}>
              {`${count(aid.used)} used, ${count(aid.rejected)} rejected`}
            </Text>
          </View>
          {aid.nisMean === null ? null : (
            <View style={styles.nis}>
              <Text variant="small" tone="soft">
                mean NIS
              </Text>
              <Text variant="body" style={styles.value}>
                {formatNumber(aid.nisMean)}
                <Text variant="small" tone="soft">{`\u202fof ${aid.dimension}`}</Text>
              </Text>
            </View>
          )}
        </View>
      ))}
    </View>
  );
}

/** "Zero velocity", "Non-holonomic". */
export const aidName = (aid: AidStatistics['aid']): string =>
  aid === 'non-holonomic' ? 'Non-holonomic' : aid[0]!.toUpperCase() + aid.slice(1).replaceAll('-', ' ');

/** Whole, with thin spaces between thousands. */
const count = (value: number) => formatNumber(value, Math.max(1, String(value).length));

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
  nis: { alignItems: 'flex-end' },
  value: { fontFamily: fonts.number },
});
