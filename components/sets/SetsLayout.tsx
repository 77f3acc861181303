import { usePathname } from 'expo-router';
import { useAddressFilter } from '@/components/lists/use-address-filter';
import { MasterDetail } from '@/components/layout/MasterDetail';
import { Screen } from '@/components/layout/Screen';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { usePathId } from '@/components/layout/use-path-id';
import { useParameterSets } from '@/hooks/parameter-sets';
import { itemsOf } from '@/hooks/recordings';
import { SET_KEYS, setQuery } from './set-filter';
import { SetList } from './SetList';
import { SetScreen } from '@/components/layout/fetched-screens';

/** The list beside whatever set is open. */
export function SetsLayout() {
  const opened = usePathId('sets');
  const first = useFirstSet();
  const whole = /\/(verification|report)$/.test(usePathname());
  return (
    <MasterDetail
      title="Parameter sets"
      list={<SetList currentId={opened ?? first} />}
      showList={!whole && first !== undefined}
    />
  );
}

/** The phone's list; on wide screens the list stands beside the newest set. */
export function SetsScreen() {
  const { wide } = useBreakpoint();
  const first = useFirstSet();
  if (wide && first) return <SetScreen id={first} />;
  return (
    <Screen title="Parameter sets">
      <SetList />
    </Screen>
  );
}

/** Of the list as it is narrowed down, else of all. */
function useFirstSet(): string | undefined {
  const filter = useAddressFilter(SET_KEYS);
  const listed = itemsOf(useParameterSets(setQuery(filter.values)).data)[0];
  const newest = itemsOf(useParameterSets().data)[0];
  return (listed ?? newest)?.id;
}
