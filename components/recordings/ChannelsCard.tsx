import { lazy, Suspense } from 'react';
import { View } from 'react-native';
import { Card } from '@/components/ui/Card';
import { Skeleton } from '@/components/ui/Skeleton';
import type { ChannelChartsProps } from './ChannelCharts';

// The charts come in a piece of their own: a list of recordings does without them.
const ChannelCharts = lazy(async () => ({ default: (await import('@/components/lab')).ChannelCharts }));

/** Plots of the decoded channels. */
export function ChannelsCard(props: ChannelChartsProps) {
  return (
    <Card title="Channels">
      <Suspense
        fallback={
          <View role="status" aria-label="Loading the channels">
            <Skeleton height={156} />
          </View>
        }
      >
        <ChannelCharts {...props} />
      </Suspense>
    </Card>
  );
}
