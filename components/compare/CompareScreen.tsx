import { useMemo, useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { ChartOrigin, originOf } from '@/components/charts/chart-origin';
import { TimeChart } from '@/components/charts/TimeChart';
import { benchPath, recordingPath } from '@/components/layout/paths';
import { Screen } from '@/components/layout/Screen';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { StripEditor } from '@/components/strip/StripEditor';
import { Card } from '@/components/ui/Card';
import { EmptyState } from '@/components/ui/EmptyState';
import { ErrorState } from '@/components/ui/ErrorState';
import { SkeletonList } from '@/components/ui/Skeleton';
import { Text } from '@/components/ui/Text';
import { TextLink } from '@/components/ui/TextLink';
import { ViewTabs } from '@/components/bench/ViewTabs';
import { space } from '@/constants/theme';
import { useDisplayUnits } from '@/hooks/preferences';
import { useRecording } from '@/hooks/recordings';
import type { Recording } from '@/shared/contracts/recordings';
import { readCompareQuery, type CompareLink, type CompareQuery } from './compare-link';
import { COMPARE_VIEWS, compareCharts, type CompareView } from './compare-charts';
import { differingParameters, figureRows } from './compare-rows';
import { FigureTable, ParameterTable } from './CompareTable';
import { EntryList } from './EntryList';
import { EntryPicker } from './EntryPicker';
import { type Comparison, useComparison } from './use-comparison';

/** Runs and versions side by side over one recording and the same outage windows. */
export function CompareScreen({ query }: { query: Partial<CompareQuery> }) {
  // What the page writes into its own address opens nothing anew.
  const [link] = useState(() => readCompareQuery(query));
  const recording = useRecording(link?.recordingId ?? '');
  if (!link)
    return (
      <Screen title="Compare">
        <EmptyState
          title="Nothing to compare"
          message="This address names no recording. Open a bench and choose Compare there."
          icon="bench"
          actions={<TextLink href="/bench" label="Choose a recording" />}
        />
      </Screen>
    );
  if (recording.isError)
    return (
      <Screen title="Compare" back="/bench">
        <ErrorState
          title="This recording could not be loaded"
          error={recording.error}
          onRetry={() => void recording.refetch()}
        />
      </Screen>
    );
  if (!recording.data)
    return (
      <Screen title="Compare">
        <SkeletonList label="the comparison" rows={3} />
      </Screen>
    );
  const { strip } = recording.data;
  if (recording.data.status !== 'ready' || !strip)
    return (
      <Screen title="Compare">
        <EmptyState
          title={`${recording.data.name} cannot be filtered yet`}
          message="It has to be decoded first."
          icon="recordings"
          actions={<TextLink href={recordingPath(recording.data.id)} label="Open the recording" />}
        />
      </Screen>
    );
  return <Open recording={{ ...recording.data, strip }} link={link} />;
}

type Ready = Recording & { strip: NonNullable<Recording['strip']> };

function Open({ recording, link }: { recording: Ready; link: CompareLink }) {
  const { wide, extraWide } = useBreakpoint();
  const [adding, setAdding] = useState(false);
  const comparison = useComparison(recording, link);
  const { entries, windows, group } = comparison;
  const list = (
    <EntryList
      recordingId={recording.id}
      entries={entries}
      windows={windows}
      stateOf={comparison.stateOf}
      onFirst={comparison.first}
      onRemove={comparison.remove}
      onAdd={() => setAdding(true)}
    />
  );
  return (
    <Screen
      title="Compare"
      subtitle={
        <Text variant="label" tone="soft">{`${recording.name}, the same outage windows for all`}</Text>
      }
      back={benchPath(recording.id)}
      width="full"
    >
      <StripEditor
        strip={recording.strip}
        height={wide ? 96 : 84}
        windows={windows}
        onChange={comparison.mayRun ? comparison.setWindows : undefined}
        group={group}
      />
      {comparison.mayRun ? null : (
        <Text variant="label" tone="ochre">
          Your role reads: finished runs are shown, each over its own windows.
        </Text>
      )}
      <View style={extraWide ? styles.columns : styles.stack}>
        <View style={extraWide ? styles.side : styles.stack}>
          {list}
          <Parameters comparison={comparison} />
        </View>
        <View style={extraWide ? styles.main : styles.stack}>
          <Numbers comparison={comparison} />
          <ChartOrigin.Provider value={originOf(recording.name)}>
            <Curves comparison={comparison} />
          </ChartOrigin.Provider>
        </View>
      </View>
      {adding ? (
        <EntryPicker
          recordingId={recording.id}
          taken={new Set(entries.map(({ key }) => key))}
          onPick={(ref) => {
            comparison.add(ref);
            setAdding(false);
          }}
          onClose={() => setAdding(false)}
        />
      ) : null}
    </Screen>
  );
}

const namesOf = ({ entries }: Comparison) => entries.map(({ name }) => name);

function Numbers({ comparison }: { comparison: Comparison }) {
  const summaries = comparison.entries.map((entry) => comparison.stateOf(entry)?.summary ?? null);
  if (comparison.entries.length === 0)
    return (
      <EmptyState
        title="Nothing is compared yet"
        message="Add two or more runs or versions: their figures and curves stand side by side here."
        icon="bench"
      />
    );
  return (
    <Card title="Figures">
      <FigureTable label="Figures" names={namesOf(comparison)} rows={figureRows(summaries)} />
    </Card>
  );
}

function Parameters({ comparison }: { comparison: Comparison }) {
  const chosen = useDisplayUnits();
  if (comparison.entries.length < 2) return null;
  const rows = differingParameters(
    comparison.entries.map(({ parameters }) => parameters),
    chosen,
  );
  return (
    <Card title="Parameters that differ">
      {rows.length > 0 ? (
        <ParameterTable label="Parameters that differ" names={namesOf(comparison)} rows={rows} />
      ) : (
        <Text tone="soft">All parameters are the same.</Text>
      )}
    </Card>
  );
}

function Curves({ comparison: { runs, windows, group } }: { comparison: Comparison }) {
  const [view, setView] = useState<CompareView>(windows.length > 0 ? 'coasting' : 'sigma');
  const charts = useMemo(() => compareCharts(view, runs, () => windows), [view, runs, windows]);
  if (runs.length === 0) return null;
  return (
    <Card bare>
      <ViewTabs views={COMPARE_VIEWS} value={view} onChange={setView} label="Curves" />
      <View style={styles.charts}>
        {view === 'coasting' && windows.length === 0 ? (
          <Text tone="soft">Draw an outage window on the strip to see how each runs away without GNSS.</Text>
        ) : (
          charts.map((content, i) => (
            <TimeChart
              key={content.id}
              content={content}
              group={group}
              height={CHART_PX}
              timeAxis={i === charts.length - 1}
            />
          ))
        )}
      </View>
    </Card>
  );
}

const CHART_PX = 220;

const styles = StyleSheet.create({
  columns: { flexDirection: 'row', gap: space.l, alignItems: 'flex-start' },
  stack: { gap: space.l },
  side: { width: 460, flexShrink: 0, gap: space.l },
  main: { flex: 1, minWidth: 0, gap: space.l },
  charts: { padding: space.s, gap: space.s },
});
