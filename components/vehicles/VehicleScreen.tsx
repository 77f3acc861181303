import { router } from 'expo-router';
import { useState } from 'react';
import { Screen } from '@/components/layout/Screen';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { Button } from '@/components/ui/Button';
import { ConfirmDialog } from '@/components/ui/Dialog';
import { ErrorState, messageOf } from '@/components/ui/ErrorState';
import { NoPermission } from '@/components/ui/NoPermission';
import { Notice } from '@/components/ui/Notice';
import { SkeletonList } from '@/components/ui/Skeleton';
import { useToast } from '@/components/ui/ToastProvider';
import { vehiclePath } from '@/components/layout/paths';
import { useCan } from '@/hooks/session';
import { useCreateVehicle, useDeleteVehicle, usePatchVehicle, useVehicle } from '@/hooks/vehicles';
import type { Vehicle } from '@/shared/contracts/vehicles';
import { SensorCard } from '@/components/noise/SensorCard';
import { ReleasedSetCard } from './ReleasedSetCard';
import { TemplatesCard } from './TemplatesCard';
import { VehicleForm } from './VehicleForm';
import { KINDS } from './vehicle-words';

/** One vehicle, to read or to edit. */
export function VehicleScreen({ id }: { id: string }) {
  const { wide } = useBreakpoint();
  const vehicle = useVehicle(id);
  const back = wide ? undefined : '/vehicles';
  if (vehicle.isPending)
    return (
      <Screen title="Vehicle" back={back} width="text">
        <SkeletonList label="the vehicle" rows={2} height={160} />
      </Screen>
    );
  if (vehicle.isError)
    return (
      <Screen title="Vehicle" back="/vehicles" width="text">
        <ErrorState
          title="This vehicle cannot be shown"
          error={vehicle.error}
          onRetry={() => void vehicle.refetch()}
        />
      </Screen>
    );
  return <Loaded key={id} vehicle={vehicle.data} back={back} />;
}

function Loaded({ vehicle, back }: { vehicle: Vehicle; back: '/vehicles' | undefined }) {
  const mayWrite = useCan('vehicle:write');
  const patch = usePatchVehicle(vehicle.id);
  const toast = useToast();
  const [deleting, setDeleting] = useState(false);
  return (
    <Screen
      title={vehicle.name}
      subtitle={KINDS[vehicle.kind]}
      back={back}
      width="text"
      actions={
        mayWrite ? (
          <Button label="Delete" icon="delete" iconOnly kind="danger" onPress={() => setDeleting(true)} />
        ) : undefined
      }
    >
      {mayWrite ? null : (
        <Notice tone="petrol" title="Yours to read">
          An engineer, approver or admin changes it.
        </Notice>
      )}
      <VehicleForm
        vehicle={vehicle}
        saveLabel="Save"
        readOnly={!mayWrite}
        onSave={async (input) => {
          await patch.mutateAsync(input);
          toast({ message: 'Saved. Later runs use it; new axes decode its recordings again.' });
        }}
      />
      <ReleasedSetCard vehicle={vehicle} />
      <SensorCard vehicle={vehicle} readOnly={!mayWrite} />
      <TemplatesCard vehicle={vehicle} readOnly={!mayWrite} />
      {deleting ? <DeleteVehicle vehicle={vehicle} onClose={() => setDeleting(false)} /> : null}
    </Screen>
  );
}

function DeleteVehicle({ vehicle, onClose }: { vehicle: Vehicle; onClose: () => void }) {
  const remove = useDeleteVehicle();
  const toast = useToast();
  const confirm = async () => {
    try {
      await remove.mutateAsync(vehicle.id);
      router.replace('/vehicles');
      toast({ message: `${vehicle.name} is deleted.` });
    } catch {
      // shown below from the mutation's own state
    }
  };
  return (
    <ConfirmDialog
      open
      danger
      title={`Delete ${vehicle.name}?`}
      message="Its lever arm, IMU mounting, sensor model and mapping templates are lost. A vehicle that recordings or parameter sets use cannot be deleted."
      confirmLabel="Delete the vehicle"
      busy={remove.isPending}
      onConfirm={() => void confirm()}
      onClose={onClose}
    >
      {remove.isError ? (
        <Notice tone="vermilion" urgent title="Not deleted">
          {messageOf(remove.error)}
        </Notice>
      ) : null}
    </ConfirmDialog>
  );
}

/** A new platform. */
export function NewVehicleScreen() {
  const mayWrite = useCan('vehicle:write');
  const create = useCreateVehicle();
  const toast = useToast();
  return (
    <Screen title="Add a vehicle" back="/vehicles" width="text">
      {mayWrite ? (
        <VehicleForm
          saveLabel="Add the vehicle"
          onSave={async (input) => {
            const made = await create.mutateAsync(input);
            router.replace(vehiclePath(made.id));
            toast({ message: `${made.name} is added.` });
          }}
        />
      ) : (
        <NoPermission message="Viewers read; an engineer, approver or admin adds vehicles." />
      )}
    </Screen>
  );
}
