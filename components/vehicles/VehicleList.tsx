import { router } from 'expo-router';
import { View } from 'react-native';
import { ListFilter } from '@/components/lists/ListFilter';
import { NoMatch } from '@/components/lists/NoMatch';
import { useAddressFilter } from '@/components/lists/use-address-filter';
import { Button } from '@/components/ui/Button';
import { EmptyState } from '@/components/ui/EmptyState';
import { ErrorState } from '@/components/ui/ErrorState';
import { SkeletonList } from '@/components/ui/Skeleton';
import { space } from '@/constants/theme';
import { useCan } from '@/hooks/session';
import { useVehicles } from '@/hooks/vehicles';
import { VehicleCard } from './VehicleCard';
import { VEHICLE_CHOICES, VEHICLE_KEYS, vehicleQuery } from './vehicle-filter';

/** So few are seen at a glance. */
const MANY = 6;

/** All vehicles; `currentId` is the one that is open beside the list. */
export function VehicleList({ currentId }: { currentId?: string }) {
  const filter = useAddressFilter(VEHICLE_KEYS);
  const vehicles = useVehicles(vehicleQuery(filter.values));
  const mayWrite = useCan('vehicle:write');
  const narrowed = filter.count > 0;
  if (vehicles.isPending && !narrowed) return <SkeletonList label="vehicles" rows={2} />;
  if (vehicles.isError)
    return (
      <ErrorState
        title="The vehicles could not be loaded"
        error={vehicles.error}
        onRetry={() => void vehicles.refetch()}
      />
    );
  const found = vehicles.data ?? [];
  if (found.length === 0 && !narrowed)
    return (
      <EmptyState
        icon="vehicle"
        title="No vehicles yet"
        message={
          mayWrite
            ? 'Add the platform: how its IMU is mounted and where the GNSS antenna sits. Recordings then take it from there.'
            : 'An engineer adds the platform with its IMU mounting and antenna lever arm.'
        }
        actions={
          mayWrite ? (
            <Button
              label="Add a vehicle"
              icon="plus"
              kind="primary"
              onPress={() => router.push('/vehicles/new')}
            />
          ) : undefined
        }
      />
    );
  return (
    <View style={{ gap: space.m }}>
      {narrowed || found.length >= MANY ? (
        <ListFilter
          label="Search vehicles"
          placeholder="Search name"
          searchKey="q"
          choices={VEHICLE_CHOICES}
          filter={filter}
        />
      ) : null}
      {vehicles.isPending ? <SkeletonList label="vehicles" rows={2} /> : null}
      {vehicles.isSuccess && found.length === 0 ? <NoMatch what="vehicles" onClear={filter.clear} /> : null}
      {found.map((vehicle) => (
        <VehicleCard
          key={vehicle.id}
          vehicle={vehicle}
          query={filter.values}
          current={vehicle.id === currentId}
        />
      ))}
    </View>
  );
}
