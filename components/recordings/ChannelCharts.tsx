import { useEffect, useMemo } from 'react';
import { View } from 'react-native';
import { ChartOrigin, originOf } from '@/components/charts/chart-origin';
import { ChartGroup } from '@/components/charts/chart-group';
import { useDetailState, useSettledView } from '@/components/charts/use-detail';
import { TimeChart } from '@/components/charts/TimeChart';
import { ErrorState } from '@/components/ui/ErrorState';
import { Text } from '@/components/ui/Text';
import { space } from '@/constants/theme';
import { splicedSeries } from '@/hooks/finer/splice';
import { useTiles } from '@/hooks/finer/use-tiles';
import { recordingTiles, useRecording, useRecordingSeries } from '@/hooks/recordings';
import { ALL_CHANNELS, CHANNEL_CHARTS, channelContent, withGaps } from './channel-content';

export interface ChannelChartsProps {
  recordingId: string;
  extentS: readonly [number, number];
  hasVelocity: boolean;
  /** A stretch to look at: set by a finding's times. */
  focus: readonly [number, number] | null;
}

const POINTS = 1500;

/** All channels over time; what is zoomed into is fetched again in finer steps. */
export function ChannelCharts({ recordingId, extentS, hasVelocity, focus }: ChannelChartsProps) {
  const [from, to] = extentS;
  const group = useMemo(() => new ChartGroup([from, to]), [from, to]);
  const view = useSettledView(group);
  const name = useRecording(recordingId).data?.name ?? 'recording';
  const origin = useMemo(() => originOf(name), [name]);
  const series = useRecordingSeries(recordingId, { channels: ALL_CHANNELS, points: POINTS });
  const source = useMemo(() => recordingTiles(recordingId, ALL_CHANNELS), [recordingId]);
  const { pieces, fetching, error } = useTiles(source, view, extentS);
  useDetailState(group, { fetching, failed: error !== null });
  const shown = useMemo(() => {
    const finer = pieces.map(({ span, data }) => ({ span, data: withGaps(data) }));
    return series.data && splicedSeries(withGaps(series.data), finer);
  }, [series.data, pieces]);
  const charts = useMemo(
    () =>
      CHANNEL_CHARTS.filter((chart) => hasVelocity || chart.id !== 'velocity').map((chart) =>
        channelContent(chart, shown),
      ),
    [shown, hasVelocity],
  );
  useEffect(() => {
    if (!focus) return;
    const room = Math.max(2, (focus[1] - focus[0]) / 2);
    group.viewport.show([focus[0] - room, focus[1] + room]);
  }, [focus, group]);
  if (series.isError && !series.data)
    return (
      <ErrorState
        title="The channels could not be loaded"
        error={series.error}
        onRetry={() => void series.refetch()}
      />
    );
  return (
    <ChartOrigin.Provider value={origin}>
      <View style={{ gap: space.s }}>
        {charts.map((content, at) => (
          <TimeChart
            key={content.id}
            content={content}
            group={group}
            height={at === charts.length - 1 ? 176 : 156}
            timeAxis={at === charts.length - 1}
          />
        ))}
        <Text variant="small" tone="soft">
          Drag, pinch or turn the wheel to look closer; double tap shows the whole recording.
        </Text>
      </View>
    </ChartOrigin.Provider>
  );
}
