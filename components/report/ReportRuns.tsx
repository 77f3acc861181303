import { useState } from 'react';
import { View } from 'react-native';
import { DriftGrowthChart } from '@/components/charts/quiet/DriftGrowthChart';
import { Figures } from '@/components/ui/Figures';
import { Text } from '@/components/ui/Text';
import { space } from '@/constants/theme';
import { driftGrowthOf } from '@/shared/charts/drift-growth';
import type { ReportRun } from '@/shared/contracts/report';
import { formatNumber } from '@/shared/format';
import { ReportTable } from './ReportTable';

/** What each run behind the verification says of consistency and drift. */
export function ReportRuns({ runs }: { runs: readonly ReportRun[] }) {
  if (runs.length === 0) return <Text tone="ochre">No run stands behind this version.</Text>;
  return (
    <View style={{ gap: space.xl }}>
      {runs.map((run) => (
        <One key={run.runId} run={run} />
      ))}
    </View>
  );
}

function One({ run }: { run: ReportRun }) {
  return (
    <View style={{ gap: space.s }}>
      <Text strong>{run.recordingName}</Text>
      <Figures tone="soft">{`Outages: ${run.schedule}. Engine ${run.engineVersion}.`}</Figures>
      <ReportTable
        label={`Consistency on ${run.recordingName}`}
        titles={['Measurement', 'Mean NIS', '95 % bounds', 'Used', 'Rejected']}
        rows={run.groups.map(({ group, nisMean, nisBounds, used, rejected }) => [
          { text: group },
          { text: nisMean === null ? '–' : formatNumber(nisMean), number: true },
          {
            text: nisBounds ? `${formatNumber(nisBounds[0])} to ${formatNumber(nisBounds[1])}` : '–',
            number: true,
          },
          { text: String(used), number: true },
          {
            text:
              used + rejected > 0
                ? `${rejected} (${formatNumber((100 * rejected) / (used + rejected), 2)} %)`
                : '–',
            number: true,
          },
        ])}
      />
      {run.drift.length > 0 ? <Drift run={run} /> : null}
    </View>
  );
}

const CHART_PX = 220;

function Drift({ run }: { run: ReportRun }) {
  const [width, setWidth] = useState(0);
  const metres = (value: number) => ({ text: `${formatNumber(value)} m`, number: true });
  return (
    <>
      <ReportTable
        label={`Drift on ${run.recordingName}`}
        titles={[
          'Horizontal drift after',
          'Windows',
          'Median',
          '95th percentile',
          'Maximum',
          'Predicted',
          'Actual ÷ predicted',
        ]}
        rows={run.drift.map(({ afterS, windows, medianM, p95M, maximumM, predictedM, ratio }) => [
          { text: `${afterS} s` },
          { text: String(windows), number: true },
          metres(medianM),
          metres(p95M),
          metres(maximumM),
          metres(predictedM),
          { text: formatNumber(ratio), number: true },
        ])}
      />
      <View onLayout={(event) => setWidth(event.nativeEvent.layout.width)} aria-hidden>
        {width > 0 ? (
          <DriftGrowthChart {...driftGrowthOf(run.windows)} width={width} height={CHART_PX} />
        ) : null}
      </View>
    </>
  );
}
