import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import { z } from 'zod';
import { FormChoice } from '@/components/forms/FormChoice';
import { FormField } from '@/components/forms/FormField';
import { FormProblem } from '@/components/forms/FormProblem';
import { showProblem } from '@/components/forms/problem';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { Button } from '@/components/ui/Button';
import { Dialog } from '@/components/ui/Dialog';
import { Sheet } from '@/components/ui/Sheet';
import { Text } from '@/components/ui/Text';
import { TextLink } from '@/components/ui/TextLink';
import { useToast } from '@/components/ui/ToastProvider';
import { useCreateMapTemplate } from '@/hooks/map-templates';
import { useVehicles } from '@/hooks/vehicles';
import { idSchema, nameSchema } from '@/shared/contracts/common';
import type { ChannelMap, Recording } from '@/shared/contracts/recordings';

const formSchema = z.object({
  name: nameSchema,
  vehicleId: idSchema.or(z.literal('')).refine((id) => id !== '', { message: 'Choose a vehicle.' }),
});
type Form = z.infer<typeof formSchema>;

export interface SaveTemplateDialogProps {
  recording: Pick<Recording, 'vehicleId' | 'vehicleName'>;
  channelMap: ChannelMap;
  onClose: () => void;
}

/** Keeps a map under a name with the recording's vehicle, or with one that is chosen where it has none. */
export function SaveTemplateDialog({ recording, channelMap, onClose }: SaveTemplateDialogProps) {
  const { wide } = useBreakpoint();
  const toast = useToast();
  const create = useCreateMapTemplate();
  const { control, handleSubmit, setError, formState } = useForm<Form>({
    resolver: zodResolver(formSchema),
    defaultValues: { name: '', vehicleId: recording.vehicleId ?? '' },
  });
  const save = handleSubmit(async ({ name, vehicleId }) => {
    try {
      await create.mutateAsync({ name, vehicleId, channelMap });
      toast({ message: `Template “${name}” is saved.` });
      onClose();
    } catch (error) {
      showProblem<Form>(error, ['name', 'vehicleId'], setError);
    }
  });
  const Frame = wide ? Dialog : Sheet;
  return (
    <Frame
      open
      title="Save as template"
      onClose={onClose}
      footer={
        <>
          <Button label="Cancel" onPress={onClose} />
          <Button
            label="Save template"
            kind="primary"
            busy={formState.isSubmitting}
            onPress={() => void save()}
          />
        </>
      }
    >
      <Text variant="label" tone="soft">
        {recording.vehicleId
          ? `Kept with ${recording.vehicleName ?? 'the vehicle'}, and offered for its later recordings.`
          : 'A template belongs to a vehicle, and this recording has none yet. Choose whose logger writes these columns.'}
      </Text>
      <FormProblem title="The template was not saved" message={formState.errors.root?.message} />
      <FormField control={control} name="name" label="Name" placeholder="Autumn logger" required />
      {recording.vehicleId ? null : <VehicleField control={control} />}
    </Frame>
  );
}

function VehicleField({ control }: { control: ReturnType<typeof useForm<Form>>['control'] }) {
  const vehicles = useVehicles();
  if (vehicles.data?.length === 0)
    return (
      <Text>
        {'There is no vehicle yet. '}
        <TextLink href="/vehicles/new" label="Add a vehicle" />
      </Text>
    );
  return (
    <FormChoice
      control={control}
      name="vehicleId"
      label="Vehicle"
      placeholder="Choose a vehicle"
      options={(vehicles.data ?? []).map(({ id, name }) => ({ value: id, label: name }))}
    />
  );
}
