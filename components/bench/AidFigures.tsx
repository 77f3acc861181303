import { StyleSheet, View } from 'react-native';
import { AlignedNumber } from '@/components/ui/AlignedNumber';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, radius, space } from '@/constants/theme';
import type { AidStatistics } from '@/shared/contracts/runs';
import { useSummary, type Bench } from './use-bench';

/** What each aid did in the last run. Nothing where none was on. */
export function AidFigures({ bench }: { bench: Bench }) {
  const { palette } = useTheme();
  const aids = useSummary(bench)?.aids ?? [];
  if (aids.length === 0) return null;
  return (
    <View
      role="table"
      aria-label="Aids"
      style={[styles.card, { backgroundColor: palette.sheet, borderColor: palette.rule }]}
    >
      <View role="row" style={[styles.row, { borderBottomColor: palette.ink }]}>
        <Head style={styles.name}>AIDS</Head>
        <Head style={styles.count}>used</Head>
        <Head style={styles.count}>rejected</Head>
        <Head style={styles.nis}>mean NIS</Head>
      </View>
      {aids.map((aid, i) => (
        <View
          key={aid.aid}
          role="row"
          style={[styles.row, i + 1 < aids.length ? { borderBottomColor: palette.rule } : styles.last]}
        >
          <View role="rowheader" style={styles.name}>
            <Text variant="label">{aidName(aid.aid)}</Text>
          </View>
          <Count>{aid.used}</Count>
          <Count tone={aid.rejected > aid.used ? 'vermilion' : 'ink'}>{aid.rejected}</Count>
          <View role="cell" style={styles.nis}>
            <AlignedNumber value={aid.nisMean} />
            <Text variant="small" tone="soft">{`of ${aid.dimension}`}</Text>
          </View>
        </View>
      ))}
    </View>
  );
}

/** "Zero velocity". */
export const aidName = (aid: AidStatistics['aid']): string =>
  aid === 'non-holonomic' ? 'Non-holonomic' : aid[0]!.toUpperCase() + aid.slice(1).replaceAll('-', ' ');

function Count({ children, tone = 'ink' }: { children: number; tone?: 'ink' | 'vermilion' }) {
  return (
    <View role="cell" style={styles.count}>
      <Text variant="label" tone={tone} align="right">
        {children.toLocaleString('en-GB').replaceAll(',', '\u2009')}
      </Text>
    </View>
  );
}

function Head({ children, style }: { children: string; style: object }) {
  return (
    <View role="columnheader" style={style}>
      <Text variant="small" strong tone="soft">
        {children}
      </Text>
    </View>
  );
}

const styles = StyleSheet.create({
  card: { borderWidth: hairline, borderRadius: radius, paddingHorizontal: space.m },
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    gap: space.s,
    paddingVertical: 6,
    borderBottomWidth: hairline,
  },
  last: { borderBottomWidth: 0 },
  name: { flex: 1, minWidth: 0 },
  count: { width: 50, alignItems: 'flex-end' },
  nis: { width: 84, flexDirection: 'row', alignItems: 'baseline', gap: space.xs },
});
