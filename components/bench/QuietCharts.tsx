import { useMemo } from 'react';
import { DriftGrowthChart } from '@/components/charts/quiet/DriftGrowthChart';
import { HistogramChart } from '@/components/charts/quiet/HistogramChart';
import { driftGrowthSave, histogramSave } from '@/components/charts/quiet/quiet-saves';
import { useLive } from '@/hooks/use-live-run';
import { useRunCurves } from '@/hooks/runs';
import { formatNumber } from '@/shared/format';
import type { InnovationGroup } from './innovation-charts';
import { driftGrowth, innovationDistribution, unitNormal, type Distribution } from './quiet-data';
import { QuietFrame } from './QuietFrame';
import { useSummary, type Bench } from './use-bench';

const EXPECTED = Array.from({ length: 81 }, (_, i) => ({ x: -4 + i / 10, density: unitNormal(-4 + i / 10) }));

const X_LABEL = 'innovation ÷ predicted σ';

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
  const head = { title: 'Drift growth, horizontal', aside: 'every window, 1σ dashed · m' };
  return (
    <QuietFrame
      {...head}
      save={growth && driftGrowthSave(growth, { ...head, sentence: words })}
      words={words}
      height={height}
    >
      {(width, room) => (growth ? <DriftGrowthChart {...growth} width={width} height={room} /> : null)}
    </QuietFrame>
  );
}

/** Normalised innovations against the unit normal. Every fix counts here: where the curves are thinned, all are fetched. */
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
  const runId = useLive(bench.live, (state) => (state.phase === 'done' ? state.summaryRunId : null));
  const held = useMemo(
    () => (summary ? innovationDistribution(bench.live.data.current, group, summary) : null),
    [summary, bench.live, group],
  );
  const statistics = summary?.groups.find((one) => one.group === group);
  const count = statistics ? statistics.used + statistics.rejected : 0;
  const fetchable = !held && count > 0 && count <= MOST_POINTS;
  const whole = useRunCurves(fetchable ? runId : null, MOST_POINTS);
  const fetched = useMemo(
    () => (whole.data ? innovationDistribution(whole.data, group, summary) : null),
    [whole.data, group, summary],
  );
  const found = held ?? fetched;
  const head = {
    title: `${group === 'position' ? 'Position' : 'Velocity'} innovation ÷ σ`,
    aside: 'unit normal in green',
  };
  return (
    <QuietFrame
      {...head}
      save={
        found &&
        histogramSave(
          { bins: found.bins, expected: EXPECTED, xLabel: X_LABEL },
          { ...head, sentence: foundWords(found) },
        )
      }
      words={found ? foundWords(found) : missingWords(summary !== null, count, fetchable && !whole.isError)}
      height={height}
    >
      {(width, room) =>
        found ? (
          <HistogramChart
            bins={found.bins}
            expected={EXPECTED}
            xLabel={X_LABEL}
            width={width}
            height={room}
          />
        ) : null
      }
    </QuietFrame>
  );
}

/** As many as the server gives in one piece. */
const MOST_POINTS = 10_000;

const foundWords = ({ count, beyond }: Distribution) =>
  `${count} values of accepted fixes, ${beyond} beyond ±4 σ; the curve is the unit normal.`;

function missingWords(done: boolean, count: number, coming: boolean): string {
  if (!done) return 'No figures yet.';
  if (count === 0) return 'This group was not used.';
  return coming
    ? 'Fetching every fix …'
    : `Not shown: ${count} fixes are more than fit in one picture, and their extremes alone say nothing of all.`;
}
