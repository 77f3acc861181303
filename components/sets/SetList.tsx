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
import { useParameterSets } from '@/hooks/parameter-sets';
import { itemsOf } from '@/hooks/recordings';
import { useCan } from '@/hooks/session';
import { useDebounced } from '@/hooks/use-debounced';
import { SetCard } from './SetCard';

/** Search and cards; `currentId` is the set that is open beside the list. */
export function SetList({ currentId }: { currentId?: string }) {
  const [search, setSearch] = useState('');
  const settled = useDebounced(search.trim());
  const sets = useParameterSets(settled);
  const items = itemsOf(sets.data);
  if (sets.isPending && settled === '') return <SkeletonList label="parameter sets" rows={3} />;
  if (sets.isError)
    return (
      <ErrorState
        title="The parameter sets could not be loaded"
        error={sets.error}
        onRetry={() => void sets.refetch()}
      />
    );
  if (items.length === 0 && settled === '' && sets.isSuccess) return <NoSets />;
  return (
    <View style={{ gap: space.m }}>
      <Field
        label="Search parameter sets"
        labelHidden
        icon="search"
        placeholder="Search name or vehicle"
        value={search}
        onChangeText={setSearch}
        inputMode="search"
      />
      {items.length === 0 && sets.isSuccess ? (
        <Text tone="soft" role="status">{`Nothing called “${settled}”.`}</Text>
      ) : null}
      {items.map((set) => (
        <SetCard key={set.id} set={set} current={set.id === currentId} />
      ))}
      {sets.hasNextPage ? (
        <Button label="Show more" busy={sets.isFetchingNextPage} onPress={() => void sets.fetchNextPage()} />
      ) : null}
    </View>
  );
}

function NoSets() {
  const mayDraft = useCan('set:draft');
  return (
    <EmptyState
      icon="sets"
      title="No parameter sets yet"
      message={
        mayDraft
          ? 'Open a recording on the bench, slide until the innovations are consistent, and save it as the first version.'
          : 'An engineer tunes on the bench and saves a version; it then appears here.'
      }
      actions={
        mayDraft ? (
          <Button label="To the recordings" icon="recordings" onPress={() => router.push('/recordings')} />
        ) : undefined
      }
    />
  );
}
