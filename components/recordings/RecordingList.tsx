import { router } from 'expo-router';
import { View } from 'react-native';
import { FirstHint } from '@/components/layout/FirstHint';
import { ListFilter } from '@/components/lists/ListFilter';
import { NoMatch } from '@/components/lists/NoMatch';
import { useAddressFilter } from '@/components/lists/use-address-filter';
import { Button } from '@/components/ui/Button';
import { EmptyState } from '@/components/ui/EmptyState';
import { ErrorState } from '@/components/ui/ErrorState';
import { SkeletonList } from '@/components/ui/Skeleton';
import { space } from '@/constants/theme';
import { itemsOf, useRecordings } from '@/hooks/recordings';
import { useCan } from '@/hooks/session';
import { useVehicles } from '@/hooks/vehicles';
import { RecordingCard } from './RecordingCard';
import { RECORDING_KEYS, recordingChoices, recordingQuery } from './recording-filter';

/** Search and cards; `currentId` is the one that is open beside the list. */
export function RecordingList({ currentId }: { currentId?: string }) {
  const filter = useAddressFilter(RECORDING_KEYS);
  const recordings = useRecordings(recordingQuery(filter.values));
  const vehicles = useVehicles();
  const items = itemsOf(recordings.data);
  const narrowed = filter.count > 0;
  if (recordings.isPending && !narrowed) return <SkeletonList label="recordings" />;
  if (recordings.isError)
    return (
      <ErrorState
        title="The recordings could not be loaded"
        error={recordings.error}
        onRetry={() => void recordings.refetch()}
      />
    );
  if (items.length === 0 && !narrowed && recordings.isSuccess) return <NoRecordings />;
  return (
    <View style={{ gap: space.m }}>
      <FirstHint hint="recordings" />
      <ListFilter
        label="Search recordings"
        placeholder="Search name or vehicle"
        searchKey="q"
        choices={recordingChoices(vehicles.data ?? [])}
        filter={filter}
      />
      {recordings.isPending ? <SkeletonList label="recordings" rows={3} /> : null}
      {items.length === 0 && recordings.isSuccess ? (
        <NoMatch what="recordings" onClear={filter.clear} />
      ) : null}
      {items.map((recording) => (
        <RecordingCard
          key={recording.id}
          recording={recording}
          query={filter.values}
          current={recording.id === currentId}
        />
      ))}
      {recordings.hasNextPage ? (
        <Button
          label="Show more recordings"
          busy={recordings.isFetchingNextPage}
          onPress={() => void recordings.fetchNextPage()}
        />
      ) : null}
    </View>
  );
}

function NoRecordings() {
  const mayUpload = useCan('recording:write');
  return (
    <EmptyState
      icon="recordings"
      title="No recordings yet"
      message={
        mayUpload
          ? 'Upload the IMU log and the GNSS log of one drive. You see within a minute whether they are usable.'
          : 'An engineer uploads the logs of a drive; they then appear here.'
      }
      actions={
        mayUpload ? (
          <Button
            label="Upload a recording"
            icon="upload"
            kind="primary"
            onPress={() => router.push('/recordings/upload')}
          />
        ) : undefined
      }
    />
  );
}
