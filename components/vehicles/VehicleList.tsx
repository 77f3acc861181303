import { router } from 'expo-router';
import { View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { EmptyState } from '@/components/ui/EmptyState';
import { ErrorState } from '@/components/ui/ErrorState';
import { SkeletonList } from '@/components/ui/Skeleton';
import { space } from '@/constants/theme';
import { useCan } from '@/hooks/session';
import { useVehicles } from '@/hooks/vehicles';
import { VehicleCard } from './VehicleCard';

/** All vehicles; `currentId` is the one that is open beside the list. */
export function VehicleList({ currentId }: { currentId?: string }) {
  const vehicles = useVehicles();
  const mayWrite = useCan('vehicle:write');
  if (vehicles.isPending) return <SkeletonList label="vehicles" rows={2} />;
  if (vehicles.isError)
    return (
      <ErrorState
        title="The vehicles could not be loaded"
        error={vehicles.error}
        onRetry={() => void vehicles.refetch()}
      />
    );
  if (vehicles.data.length === 0)
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
      {vehicles.data.map((vehicle) => (
        <VehicleCard key={vehicle.id} vehicle={vehicle} current={vehicle.id === currentId} />
      ))}
    </View>
  );
}
