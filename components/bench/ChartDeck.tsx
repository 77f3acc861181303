import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { TimeChart } from '@/components/charts/TimeChart';
import { TrackChart } from '@/components/charts/TrackChart';
import { Button } from '@/components/ui/Button';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, radius, space } from '@/constants/theme';
import { BudgetOff, BudgetView, useSplit } from './BudgetView';
import { chartsOf, WIDE_VIEWS, type ViewId } from './chart-views';
import { DriftGrowth, InnovationHistogram } from './QuietCharts';
import { ViewTabs } from './ViewTabs';
import { WhitenessView } from './WhitenessView';
import { useTimeCharts, useTrackContent } from './use-charts';
import type { Bench } from './use-bench';

export interface ChartDeckProps {
  bench: Bench;
  view: ViewId;
  onView: (view: ViewId) => void;
}

/** The charts' column when wide: a row of views, and under it the charts that share time and cursor. */
export function ChartDeck({ bench, view, onView }: ChartDeckProps) {
  const { palette } = useTheme();
  const [height, setHeight] = useState(0);
  return (
    <View style={[styles.card, { backgroundColor: palette.sheet, borderColor: palette.rule }]}>
      <View style={[styles.tabs, { borderBottomColor: palette.rule }]}>
        <ViewTabs views={WIDE_VIEWS} value={view} onChange={onView} />
        <Button
          label="Show all the time"
          icon="fit"
          iconOnly
          kind="plain"
          onPress={() => bench.group.viewport.reset()}
        />
      </View>
      <View style={styles.fill} onLayout={(event) => setHeight(Math.floor(event.nativeEvent.layout.height))}>
        {height > 0 ? <Charts bench={bench} view={view} height={height} /> : null}
      </View>
    </View>
  );
}

function Charts({ bench, view, height }: { bench: Bench; view: ViewId; height: number }) {
  const charts = useTimeCharts(bench);
  const hasWindows = bench.config.outages.length > 0;
  const ids = chartsOf(view, hasWindows);
  const extra = view === 'innovations' || (view === 'coasting' && hasWindows) ? 1 : 0;
  const each = Math.max(LEAST_CHART_PX, Math.floor(height / (ids.length + extra || 1)));
  return (
    <View style={[styles.stack, ids.length * each > height ? styles.scroll : null]}>
      {ids.map((id, i) => (
        <TimeChart
          key={id}
          content={charts[id]}
          group={bench.group}
          height={each}
          timeAxis={i === ids.length - 1}
        />
      ))}
      {view === 'track' ? <Track bench={bench} height={height} /> : null}
      {view === 'coasting' && hasWindows ? <DriftGrowth bench={bench} height={each} /> : null}
      {view === 'coasting' && !hasWindows ? <NoWindows /> : null}
      {view === 'budget' ? <Budgets bench={bench} height={height} /> : null}
      {view === 'whiteness' ? (
        <>
          <WhitenessView bench={bench} group="position" height={Math.floor(height / 2)} />
          <WhitenessView bench={bench} group="velocity" height={Math.floor(height / 2)} />
        </>
      ) : null}
      {view === 'innovations' ? (
        <View style={styles.pair}>
          <View style={styles.half}>
            <InnovationHistogram bench={bench} group="position" height={each} />
          </View>
          <View style={styles.half}>
            <InnovationHistogram bench={bench} group="velocity" height={each} />
          </View>
        </View>
      ) : null}
    </View>
  );
}

function Budgets({ bench, height }: { bench: Bench; height: number }) {
  const split = useSplit(bench);
  if (bench.config.outages.length === 0) return <NoWindows />;
  if (!split) return <BudgetOff bench={bench} />;
  const each = Math.floor(height / 2);
  return (
    <>
      <BudgetView bench={bench} direction="horizontal" height={each} />
      <BudgetView bench={bench} direction="vertical" height={each} />
    </>
  );
}

export function Track({ bench, height }: { bench: Bench; height: number }) {
  return <TrackChart content={useTrackContent(bench)} group={bench.group} height={height} />;
}

/** In place of the coasting charts while no window is drawn. */
export function NoWindows() {
  return (
    <View style={styles.empty}>
      <Text variant="body" strong align="center">
        GNSS has not been cut yet
      </Text>
      <Text variant="label" tone="soft" align="center">
        Drag on the strip above to draw an outage window: the error that builds up without GNSS appears here,
        beside what the filter predicted.
      </Text>
    </View>
  );
}

const LEAST_CHART_PX = 128;

const styles = StyleSheet.create({
  card: { flex: 1, minWidth: 0, minHeight: 0, borderWidth: hairline, borderRadius: radius },
  tabs: {
    flexDirection: 'row',
    alignItems: 'center',
    justifyContent: 'space-between',
    borderBottomWidth: hairline,
    paddingLeft: space.s,
  },
  fill: { flex: 1, minHeight: 0, margin: space.s, marginRight: space.xs },
  stack: { flex: 1 },
  scroll: { overflow: 'scroll' },
  pair: { flexDirection: 'row' },
  half: { flex: 1, minWidth: 0 },
  empty: { padding: space.xxl, gap: space.s, alignItems: 'center', maxWidth: 480, alignSelf: 'center' },
});
