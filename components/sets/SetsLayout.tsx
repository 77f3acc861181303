import { MasterDetail } from '@/components/layout/MasterDetail';
import { Screen } from '@/components/layout/Screen';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { usePathId } from '@/components/layout/use-path-id';
import { useParameterSets } from '@/hooks/parameter-sets';
import { itemsOf } from '@/hooks/recordings';
import { SetList } from './SetList';
import { SetScreen } from './SetScreen';

/** The list beside whatever set is open. */
export function SetsLayout() {
  const opened = usePathId('sets');
  const first = itemsOf(useParameterSets().data)[0]?.id;
  return (
    <MasterDetail
      title="Parameter sets"
      list={<SetList currentId={opened ?? first} />}
      showList={first !== undefined}
    />
  );
}

/** The phone's list; on wide screens the list stands beside the newest set. */
export function SetsScreen() {
  const { wide } = useBreakpoint();
  const newest = itemsOf(useParameterSets().data)[0];
  if (wide && newest) return <SetScreen id={newest.id} />;
  return (
    <Screen title="Parameter sets">
      <SetList />
    </Screen>
  );
}
