import { router } from 'expo-router';
import { useState } from 'react';
import { View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { EmptyState } from '@/components/ui/EmptyState';
import { ErrorState } from '@/components/ui/ErrorState';
import { Field } from '@/components/ui/Field';
import { SkeletonList } from '@/components/ui/Skeleton';
import { Text } from '@/components/ui/Text';
import { space } from '@/constants/theme';
import { itemsOf, useRecordings } from '@/hooks/recordings';
import { useCan } from '@/hooks/session';
import { useDebounced } from '@/hooks/use-debounced';
import { RecordingCard } from './RecordingCard';

/** Search and cards; `currentId` is the one that is open beside the list. */
export function RecordingList({ currentId }: { currentId?: string }) {
  const [search, setSearch] = useState('');
  const settled = useDebounced(search.trim());
  const recordings = useRecordings(settled);
  const items = itemsOf(recordings.data);
  if (recordings.isPending && settled === '') return <SkeletonList label="recordings" />;
  if (recordings.isError)
    return (
      <ErrorState
        title="The recordings could not be loaded"
        error={recordings.error}
        onRetry={() => void recordings.refetch()}
      />
    );
  if (items.length === 0 && settled === '' && recordings.isSuccess) return <NoRecordings />;
  return (
    <View style={{ gap: space.m }}>
      <Field
        label="Search recordings"
        labelHidden
        icon="search"
        placeholder="Search name or vehicle"
        value={search}
        onChangeText={setSearch}
        inputMode="search"
      />
      {items.length === 0 && recordings.isSuccess ? (
        <Text tone="soft" role="status">{`Nothing called “${settled}”.`}</Text>
      ) : null}
      {items.map((recording) => (
        <RecordingCard key={recording.id} recording={recording} current={recording.id === currentId} />
      ))}
      {recordings.hasNextPage ? (
        <Button
          label="Show older recordings"
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
