import { lazy, Suspense, useMemo, useState, type ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { Skeleton } from '@/components/ui/Skeleton';
import { Text } from '@/components/ui/Text';
import { VisuallyHidden } from '@/components/charts/VisuallyHidden';
import { space } from '@/constants/theme';
import { formatNumber } from '@/shared/format';
import type { InnovationGroup } from './innovation-charts';
import { driftGrowth, innovationDistribution, unitNormal } from './quiet-data';
import { useSummary, type Bench } from './use-bench';

// By dynamic import: the library behind them stays out of the first chunk.
const DriftGrowthChart = lazy(() => import('@/components/charts/quiet/DriftGrowthChart'));
const HistogramChart = lazy(() => import('@/components/charts/quiet/HistogramChart'));

const EXPECTED = Array.from({ length: 81 }, (_, i) => ({ x: -4 + i / 10, density: unitNormal(-4 + i / 10) }));

/** How the drift of all windows grows, against the prediction. Redrawn when a run is done. */
export function DriftGrowth({ bench, height }: { bench: Bench; height: number }) {
  const summary = useSummary(bench);
  const growth = useMemo(
    () => (summary ? driftGrowth(bench.live.data.current) : null),
    [summary, bench.live],
  );
  const words = growth
    ? growth.windows
        .map((window, i) => {
          const last = window[window.length - 1]!;
          return `Window ${i + 1}: ${formatNumber(last.errorM)} m after ${formatNumber(last.afterS)} s.`;
        })
        .join(' ')
    : 'No window has coasted yet: draw an outage on the strip.';
  return (
    <QuietFrame
      title="Drift growth, horizontal"
      aside="every window, 1σ dashed · m"
      words={words}
      height={height}
    >
      {(width) => (growth ? <DriftGrowthChart {...growth} width={width} height={height - HEAD_PX} /> : null)}
    </QuietFrame>
  );
}

/** Normalised innovations against the unit normal. */
export function InnovationHistogram({
  bench,
  group,
  height,
}: {
  bench: Bench;
  group: InnovationGroup;
  height: number;
}) {
  const summary = useSummary(bench);
  const found = useMemo(
    () => (summary ? innovationDistribution(bench.live.data.current, group, summary) : null),
    [summary, bench.live, group],
  );
  const words = found
    ? `${found.count} values of accepted fixes, ${found.beyond} beyond ±4 σ; the curve is the unit normal.`
    : summary
      ? 'Not shown: of so long a recording only the extremes of the innovations are here.'
      : 'No figures yet.';
  return (
    <QuietFrame
      title={`${group === 'position' ? 'Position' : 'Velocity'} innovation ÷ σ`}
      aside="distribution, unit normal in green"
      words={words}
      height={height}
    >
      {(width) =>
        found ? (
          <HistogramChart
            bins={found.bins}
            expected={EXPECTED}
            xLabel="innovation ÷ predicted σ"
            width={width}
            height={height - HEAD_PX}
          />
        ) : null
      }
    </QuietFrame>
  );
}

function QuietFrame(props: {
  title: string;
  aside: string;
  /** The chart in a sentence; shown in its place where there is none. */
  words: string;
  height: number;
  children: (width: number) => ReactNode;
}) {
  const [width, setWidth] = useState(0);
  const drawn = width > 0 ? props.children(width) : null;
  return (
    <View
      style={{ height: props.height }}
      onLayout={(event) => setWidth(Math.floor(event.nativeEvent.layout.width))}
    >
      <View style={styles.head}>
        <Text variant="label" strong level={3}>
          {props.title}
        </Text>
        <Text variant="small" tone="soft">
          {props.aside}
        </Text>
      </View>
      {drawn ? (
        <>
          <View aria-hidden>
            <Suspense fallback={<Skeleton height={props.height - HEAD_PX} />}>{drawn}</Suspense>
          </View>
          <VisuallyHidden>
            <Text>{props.words}</Text>
          </VisuallyHidden>
        </>
      ) : (
        <Text variant="label" tone="soft" style={styles.words}>
          {props.words}
        </Text>
      )}
    </View>
  );
}

const HEAD_PX = 26;
const styles = StyleSheet.create({
  head: {
    height: HEAD_PX,
    flexDirection: 'row',
    alignItems: 'center',
    justifyContent: 'space-between',
    gap: space.m,
    paddingLeft: 46,
    paddingRight: space.s,
  },
  words: { paddingLeft: 46, paddingVertical: space.l },
});
