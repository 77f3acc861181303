import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Dialog } from '@/components/ui/Dialog';
import { messageOf } from '@/components/ui/ErrorState';
import { Notice } from '@/components/ui/Notice';
import { Text } from '@/components/ui/Text';
import { TextLink } from '@/components/ui/TextLink';
import { useVehicles } from '@/hooks/vehicles';
import { usePatchSet } from '@/hooks/versions';
import type { ParameterSetDetail } from '@/shared/contracts/parameter-sets';

/** The vehicle that a set is for; fixed once a version of it is in review. */
export function ChooseVehicle({ set, onClose }: { set: ParameterSetDetail; onClose: () => void }) {
  const [vehicleId, setVehicleId] = useState(set.vehicleId ?? '');
  const vehicles = useVehicles();
  const patch = usePatchSet(set.id);
  const submit = async () => {
    try {
      await patch.mutateAsync({ vehicleId });
      onClose();
    } catch {
      // shown below from the mutation's own state
    }
  };
  const options = (vehicles.data ?? []).map(({ id, name }) => ({ value: id, label: name }));
  return (
    <Dialog
      open
      title={`${set.name}: for which vehicle?`}
      onClose={onClose}
      footer={
        <>
          <Button label="Cancel" onPress={onClose} />
          <Button
            label="Save"
            kind="primary"
            disabled={vehicleId === ''}
            busy={patch.isPending}
            onPress={() => void submit()}
          />
        </>
      }
    >
      <Text tone="soft">
        A vehicle has one released set at a time. Once a version is in review the vehicle stays.
      </Text>
      {patch.isError ? (
        <Notice tone="vermilion" urgent title="Not saved">
          {messageOf(patch.error)}
        </Notice>
      ) : null}
      {vehicles.isSuccess && options.length === 0 ? (
        <TextLink href="/vehicles/new" label="There is no vehicle yet: add one" />
      ) : (
        <Choice
          label="Vehicle"
          shape="select"
          placeholder="Choose"
          value={vehicleId}
          options={options}
          onChange={setVehicleId}
        />
      )}
    </Dialog>
  );
}
