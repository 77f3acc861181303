import { router, usePathname } from 'expo-router';
import { MasterDetail } from '@/components/layout/MasterDetail';
import { Screen } from '@/components/layout/Screen';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { usePathId } from '@/components/layout/use-path-id';
import { Button } from '@/components/ui/Button';
import { useCan } from '@/hooks/session';
import { useVehicles } from '@/hooks/vehicles';
import { VehicleList } from './VehicleList';
import { VehicleScreen } from './VehicleScreen';

/** The list beside whatever vehicle is open. */
export function VehiclesLayout() {
  const opened = usePathId('vehicles');
  const path = usePathname();
  const first = useVehicles().data?.[0]?.id;
  const current = path === '/vehicles/new' ? undefined : (opened ?? first);
  return (
    <MasterDetail
      title="Vehicles"
      action={<AddButton />}
      list={<VehicleList currentId={current} />}
      showList={first !== undefined}
    />
  );
}

/** The phone's list; on wide screens the list stands beside the first vehicle. */
export function VehiclesScreen() {
  const { wide } = useBreakpoint();
  const first = useVehicles().data?.[0];
  if (wide && first) return <VehicleScreen id={first.id} />;
  return (
    <Screen title="Vehicles" back={wide ? undefined : '/more'} actions={<AddButton />}>
      <VehicleList />
    </Screen>
  );
}

function AddButton() {
  if (!useCan('vehicle:write')) return null;
  return <Button label="Add" icon="plus" kind="primary" onPress={() => router.push('/vehicles/new')} />;
}
