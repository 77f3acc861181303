import { Redirect } from 'expo-router';
import { View } from 'react-native';
import { Screen } from '@/components/layout/Screen';
import { CardLink } from '@/components/ui/CardLink';
import { EmptyState } from '@/components/ui/EmptyState';
import { ErrorState } from '@/components/ui/ErrorState';
import { Figures } from '@/components/ui/Figures';
import { SkeletonList } from '@/components/ui/Skeleton';
import { Text } from '@/components/ui/Text';
import { TextLink } from '@/components/ui/TextLink';
import { StripBox } from '@/components/recordings/StripBox';
import { space } from '@/constants/theme';
import { useParameterSet } from '@/hooks/parameter-sets';
import { itemsOf, useRecordings } from '@/hooks/recordings';
import { useSession } from '@/hooks/session';
import { formatDuration } from '@/shared/format';
import { benchHref } from './bench-link';
import { lastBench } from './last-bench';

/** The Bench tab: the last bench, or a choice of recordings. With a set, its version's own recording is taken. */
export function BenchPicker({ setId, version, pick }: { setId?: string; version?: number; pick?: boolean }) {
  const { id: workspaceId } = useSession().workspace;
  const set = useParameterSet(setId ?? '');
  const recordings = useRecordings();
  const last = setId || pick ? null : lastBench(workspaceId);
  if (last) return <Redirect href={last} />;

  const number = version ?? set.data?.latest.number;
  const wanted = set.data?.versions.find((one) => one.number === number);
  if (wanted?.recordingId)
    return <Redirect href={benchHref({ recordingId: wanted.recordingId, setId, version: number })} />;

  const ready = itemsOf(recordings.data).filter(
    (recording) => recording.status === 'ready' && recording.strip,
  );
  return (
    <Screen
      title="Bench"
      subtitle={
        set.data
          ? `Which recording shall ${set.data.name} be tried on?`
          : 'Which recording shall be tuned on?'
      }
    >
      {recordings.isError ? (
        <ErrorState
          title="The recordings could not be loaded"
          error={recordings.error}
          onRetry={() => void recordings.refetch()}
        />
      ) : recordings.isPending || (setId && set.isPending) ? (
        <SkeletonList label="recordings" />
      ) : ready.length === 0 ? (
        <EmptyState
          title="No recording is ready yet"
          message="The bench tunes the filter on a decoded recording. Upload an IMU log and a GNSS log first."
          icon="recordings"
          actions={<TextLink href="/recordings/upload" label="Upload a recording" />}
        />
      ) : (
        <View style={{ gap: space.m }}>
          {ready.map((recording) => (
            <CardLink
              key={recording.id}
              href={benchHref({ recordingId: recording.id, setId, version: number })}
              label={`Open the bench on ${recording.name}`}
            >
              <View>
                <Text strong>{recording.name}</Text>
                <Figures variant="label" tone="soft">
                  {[
                    recording.vehicleName,
                    recording.durationS === null ? null : formatDuration(recording.durationS),
                  ]
                    .filter(Boolean)
                    .join(' · ')}
                </Figures>
              </View>
              {recording.strip ? <StripBox strip={recording.strip} height={48} compact /> : null}
            </CardLink>
          ))}
        </View>
      )}
    </Screen>
  );
}
