import { useEffect, useState } from 'react';
import { ScrollView, StyleSheet, View } from 'react-native';
import { TimeChart } from '@/components/charts/TimeChart';
import { VisuallyHidden } from '@/components/charts/VisuallyHidden';
import { FirstHint } from '@/components/layout/FirstHint';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { around, StripEditor } from '@/components/strip/StripEditor';
import { Button } from '@/components/ui/Button';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, radius, space } from '@/constants/theme';
import { BudgetOff, BudgetView, useSplit } from './BudgetView';
import { NoWindows, Track } from './ChartDeck';
import { PHONE_CHARTS, type PhoneChart, type ViewId } from './chart-views';
import { Findings } from './Findings';
import { Headline } from './Headline';
import { ParameterSheet } from './ParameterSheet';
import { DriftGrowth, InnovationHistogram } from './QuietCharts';
import { RunFigures } from './RunFigures';
import { RunProblem, RunProgressLine } from './RunStatus';
import { useSwipe } from './use-swipe';
import { useTimeCharts } from './use-charts';
import type { Bench } from './use-bench';
import { useStripChoices } from './use-strip-choices';
import { ViewTabs } from './ViewTabs';
import { WhitenessView } from './WhitenessView';

/** Narrow: strip, one chart with a switcher, headline figures, and the parameters in a sheet of half the height. */
export function PhoneBench({
  bench,
  view,
  onView,
}: {
  bench: Bench;
  view: ViewId;
  onView: (view: ViewId) => void;
}) {
  const { height } = useBreakpoint();
  const [room, setRoom] = useState(0);
  const { palette } = useTheme();
  const choices = useStripChoices(bench);
  const [open, setOpen] = useState(false);
  const [chart, setChart] = useState<PhoneChart>(
    () => PHONE_CHARTS.find((one) => one.view === view)?.id ?? 'coasting.horizontal',
  );
  const choose = (next: PhoneChart) => {
    setChart(next);
    onView(PHONE_CHARTS.find((one) => one.id === next)!.view);
  };
  useFirstWindow(bench);
  const swipe = useSwipe((by) => {
    const at = PHONE_CHARTS.findIndex((one) => one.id === chart);
    const next = PHONE_CHARTS[at + by];
    if (next) choose(next.id);
  });
  const sheetPx = Math.max(LEAST_SHEET_PX, Math.min(Math.round(height * 0.46), height - BESIDE_SHEET_PX));
  // With the sheet open the chart takes exactly what is left above it.
  const chartPx = open ? Math.max(150, room - TABS_PX) : Math.max(240, Math.round(height * 0.36));
  const list = (
    <>
      {open ? null : (
        <StripEditor
          strip={bench.start.recording.strip}
          height={84}
          windows={bench.config.outages}
          onChange={bench.locked === null ? bench.setOutages : undefined}
          group={bench.group}
          {...choices}
        />
      )}
      <RunProgressLine bench={bench} />
      {open ? null : <RunProblem bench={bench} />}
      <View style={[styles.card, { backgroundColor: palette.sheet, borderColor: palette.rule }]}>
        <VisuallyHidden>
          <Text level={2}>Charts</Text>
        </VisuallyHidden>
        <View ref={swipe} style={styles.tabs}>
          <ViewTabs views={PHONE_CHARTS} value={chart} onChange={choose} />
          <Button
            label="Show all the time"
            icon="fit"
            iconOnly
            kind="plain"
            onPress={() => bench.group.viewport.reset()}
          />
        </View>
        <View style={styles.chart}>
          <OneChart bench={bench} chart={chart} height={chartPx} />
        </View>
      </View>
      {open ? null : (
        <>
          <FirstHint hint="bench" />
          <Headline bench={bench} columns={2} />
          <RunFigures bench={bench} />
          <Findings bench={bench} />
        </>
      )}
    </>
  );
  return (
    <View style={styles.root}>
      <ScrollView
        style={styles.fill}
        contentContainerStyle={open ? styles.tight : styles.page}
        onLayout={(event) => setRoom(Math.floor(event.nativeEvent.layout.height))}
      >
        {list}
      </ScrollView>
      <View style={styles.sheet}>
        <ParameterSheet bench={bench} open={open} onOpen={setOpen} height={sheetPx} />
      </View>
    </View>
  );
}

/** On a narrow screen an outage of a minute is a few pixels wide: the longest one is shown large at first. */
function useFirstWindow({ group, start }: Bench): void {
  useEffect(() => {
    const [longest] = [...start.config.outages].sort((a, b) => b.endS - b.startS - (a.endS - a.startS));
    if (longest && !group.viewport.zoomed) group.viewport.show(around(longest));
  }, [group, start]);
}

function OneChart({ bench, chart, height }: { bench: Bench; chart: PhoneChart; height: number }) {
  const charts = useTimeCharts(bench);
  const split = useSplit(bench);
  const hasWindows = bench.config.outages.length > 0;
  if (chart === 'track') return <Track bench={bench} height={height} />;
  if (chart === 'histogram.position' || chart === 'histogram.velocity')
    return (
      <InnovationHistogram
        bench={bench}
        group={chart === 'histogram.position' ? 'position' : 'velocity'}
        height={height}
      />
    );
  if (!hasWindows && (chart === 'growth' || chart === 'coasting.horizontal')) return <NoWindows />;
  if (chart === 'budget.horizontal' || chart === 'budget.vertical') {
    if (!hasWindows) return <NoWindows />;
    if (!split) return <BudgetOff bench={bench} />;
    const direction = chart === 'budget.horizontal' ? 'horizontal' : 'vertical';
    return <BudgetView bench={bench} direction={direction} height={height} />;
  }
  if (chart === 'whiteness.position' || chart === 'whiteness.velocity') {
    const group = chart === 'whiteness.position' ? 'position' : 'velocity';
    return <WhitenessView bench={bench} group={group} height={height} />;
  }
  if (chart === 'growth') return <DriftGrowth bench={bench} height={height} />;
  return <TimeChart key={chart} content={charts[chart]} group={bench.group} height={height} />;
}

/** Title, bottom bar and the least chart with its switcher stay in sight beside the open sheet, px. */
const BESIDE_SHEET_PX = 112 + 64 + 150 + 76;
const LEAST_SHEET_PX = 200;
/** The switcher over the chart and the margins around it, px. */
const TABS_PX = 76;

const styles = StyleSheet.create({
  fill: { flex: 1, minHeight: 0 },
  root: { flex: 1, minHeight: 0, marginBottom: -space.xxl },
  tight: { gap: space.s, paddingBottom: space.s },
  page: { gap: space.m, paddingBottom: space.l },
  tabs: { flexDirection: 'row', alignItems: 'center' },
  card: { borderWidth: hairline, borderRadius: radius, overflow: 'hidden' },
  chart: { padding: space.s, paddingRight: space.xs },
  sheet: { marginHorizontal: -space.m },
});
