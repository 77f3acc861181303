import { Button } from '@/components/ui/Button';
import { EmptyState } from '@/components/ui/EmptyState';

/** A list that its filter has emptied: says so, with the way back. */
export function NoMatch({ what, onClear }: { what: string; onClear: () => void }) {
  return (
    <EmptyState
      icon="search"
      title={`No ${what} match`}
      message="Nothing has all that is asked for in the search and the filter."
      actions={<Button label="Clear search and filter" icon="close" onPress={onClear} />}
    />
  );
}
