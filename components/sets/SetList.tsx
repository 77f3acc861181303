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
import { useParameterSets } from '@/hooks/parameter-sets';
import { itemsOf } from '@/hooks/recordings';
import { useCan } from '@/hooks/session';
import { useVehicles } from '@/hooks/vehicles';
import { SetCard } from './SetCard';
import { SET_KEYS, setChoices, setQuery } from './set-filter';

/** Search and cards; `currentId` is the set that is open beside the list. */
export function SetList({ currentId }: { currentId?: string }) {
  const filter = useAddressFilter(SET_KEYS);
  const sets = useParameterSets(setQuery(filter.values));
  const vehicles = useVehicles();
  const items = itemsOf(sets.data);
  const narrowed = filter.count > 0;
  if (sets.isPending && !narrowed) return <SkeletonList label="parameter sets" rows={3} />;
  if (sets.isError)
    return (
      <ErrorState
        title="The parameter sets could not be loaded"
        error={sets.error}
        onRetry={() => void sets.refetch()}
      />
    );
  if (items.length === 0 && !narrowed && sets.isSuccess) return <NoSets />;
  return (
    <View style={{ gap: space.m }}>
      <FirstHint hint="sets" />
      <ListFilter
        label="Search parameter sets"
        placeholder="Search name or vehicle"
        searchKey="q"
        choices={setChoices(vehicles.data ?? [])}
        filter={filter}
      />
      {sets.isPending ? <SkeletonList label="parameter sets" rows={3} /> : null}
      {items.length === 0 && sets.isSuccess ? <NoMatch what="parameter sets" onClear={filter.clear} /> : null}
      {items.map((set) => (
        <SetCard key={set.id} set={set} query={filter.values} current={set.id === currentId} />
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
