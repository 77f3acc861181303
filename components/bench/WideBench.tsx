import { ScrollView, StyleSheet, View } from 'react-native';
import { FirstHint } from '@/components/layout/FirstHint';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { StripEditor } from '@/components/strip/StripEditor';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { web } from '@/components/ui/web-props';
import { hairline, radius, space } from '@/constants/theme';
import { ChartDeck } from './ChartDeck';
import type { ViewId } from './chart-views';
import { Findings } from './Findings';
import { Headline } from './Headline';
import { ParameterPanel } from './ParameterPanel';
import { RunFigures } from './RunFigures';
import { RunProblem, RunProgressLine } from './RunStatus';
import type { Bench } from './use-bench';
import { useStripChoices } from './use-strip-choices';

/** Wide: the strip over three columns, parameters, charts, figures and findings; two where there is less room. */
export function WideBench({
  bench,
  view,
  onView,
}: {
  bench: Bench;
  view: ViewId;
  onView: (view: ViewId) => void;
}) {
  const { extraWide, height } = useBreakpoint();
  const { palette } = useTheme();
  const choices = useStripChoices(bench);
  const deck = <ChartDeck bench={bench} view={view} onView={onView} />;
  const figures = (
    <>
      <RunProblem bench={bench} />
      <FirstHint hint="bench" />
      <Headline bench={bench} columns={extraWide ? 2 : 3} />
      <RunFigures bench={bench} />
      <Findings bench={bench} />
    </>
  );
  return (
    <View style={styles.page}>
      <StripEditor
        strip={bench.start.recording.strip}
        height={96}
        windows={bench.config.outages}
        onChange={bench.locked === null ? bench.setOutages : undefined}
        group={bench.group}
        {...choices}
      />
      <RunProgressLine bench={bench} />
      <View style={styles.columns}>
        <ScrollView
          style={[
            styles.side,
            styles.card,
            { width: 300, backgroundColor: palette.sheet, borderColor: palette.rule },
          ]}
          contentContainerStyle={styles.panel}
        >
          {bench.locked ? (
            <Text variant="label" tone="ochre" style={styles.locked}>
              {bench.locked}
            </Text>
          ) : null}
          <MarksKey />
          <ParameterPanel bench={bench} />
        </ScrollView>
        {extraWide ? (
          <>
            {deck}
            <ScrollView
              role="region"
              aria-label="Figures and findings"
              // Where no finding has a button the keyboard must still reach what lies below.
              {...web({ tabIndex: 0 })}
              style={[styles.side, { width: 276 }]}
              contentContainerStyle={styles.figures}
            >
              {figures}
            </ScrollView>
          </>
        ) : (
          <ScrollView style={styles.fill} contentContainerStyle={styles.figures}>
            <View style={{ height: Math.max(420, height - 320) }}>{deck}</View>
            {figures}
          </ScrollView>
        )}
      </View>
    </View>
  );
}

/** What the marks on the rules mean. */
function MarksKey() {
  return (
    <Text variant="small" tone="soft" style={styles.key}>
      {'\u25b3 default   \u2502 baseline   double tap returns to it'}
    </Text>
  );
}

const styles = StyleSheet.create({
  page: { flex: 1, minHeight: 0, gap: space.m, marginBottom: -space.l },
  columns: { flex: 1, flexDirection: 'row', gap: space.m, minHeight: 0 },
  side: { flexGrow: 0, flexShrink: 0 },
  card: { borderWidth: hairline, borderRadius: radius },
  panel: { paddingHorizontal: space.m, paddingBottom: space.m },
  figures: { gap: space.m },
  fill: { flex: 1 },
  locked: { paddingTop: space.m },
  key: { paddingVertical: space.s },
});
