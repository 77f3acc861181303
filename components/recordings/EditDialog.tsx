import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import { z } from 'zod';
import { FormChoice } from '@/components/forms/FormChoice';
import { FormField } from '@/components/forms/FormField';
import { FormProblem } from '@/components/forms/FormProblem';
import { showProblem } from '@/components/forms/problem';
import { Button } from '@/components/ui/Button';
import { Dialog } from '@/components/ui/Dialog';
import { useToast } from '@/components/ui/ToastProvider';
import { usePatchRecording } from '@/hooks/recordings';
import { useVehicles } from '@/hooks/vehicles';
import { nameSchema } from '@/shared/contracts/common';
import type { Recording } from '@/shared/contracts/recordings';

const editSchema = z.object({ name: nameSchema, vehicleId: z.string() });
type EditForm = z.infer<typeof editSchema>;

/** Name and vehicle of a recording. */
export function EditDialog({ recording, onClose }: { recording: Recording; onClose: () => void }) {
  const patch = usePatchRecording(recording.id);
  const vehicles = useVehicles();
  const toast = useToast();
  const before: EditForm = { name: recording.name, vehicleId: recording.vehicleId ?? '' };
  const form = useForm<EditForm>({ resolver: zodResolver(editSchema), defaultValues: before });
  const toPatch = (value: EditForm) => ({ name: value.name, vehicleId: value.vehicleId || null });
  const submit = form.handleSubmit(async (value) => {
    try {
      await patch.mutateAsync(toPatch(value));
      onClose();
      toast({ message: 'Saved.', undo: () => patch.mutate(toPatch(before)) });
    } catch (error) {
      showProblem(error, ['name', 'vehicleId'], form.setError);
    }
  });
  return (
    <Dialog
      open
      title="Name and vehicle"
      onClose={onClose}
      footer={
        <>
          <Button label="Cancel" onPress={onClose} />
          <Button
            label="Save"
            kind="primary"
            busy={form.formState.isSubmitting}
            onPress={() => void submit()}
          />
        </>
      }
    >
      <FormProblem title="Not saved" message={form.formState.errors.root?.message} />
      <FormField
        control={form.control}
        name="name"
        label="Name"
        required
        onSubmitEditing={() => void submit()}
      />
      <FormChoice
        control={form.control}
        name="vehicleId"
        label="Vehicle"
        placeholder="No vehicle"
        options={(vehicles.data ?? []).map((vehicle) => ({ value: vehicle.id, label: vehicle.name }))}
        hint="Another vehicle changes lever arm and IMU axes of later runs."
      />
    </Dialog>
  );
}
