import { zodResolver } from '@hookform/resolvers/zod';
import { router } from 'expo-router';
import { useCallback, useEffect } from 'react';
import { useForm, useWatch, type UseFormReturn } from 'react-hook-form';
import { View } from 'react-native';
import { z } from 'zod';
import { FormChoice } from '@/components/forms/FormChoice';
import { FormField } from '@/components/forms/FormField';
import { showProblem } from '@/components/forms/problem';
import { recordingPath } from '@/components/layout/paths';
import { Screen } from '@/components/layout/Screen';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { messageOf } from '@/components/ui/ErrorState';
import { NoPermission } from '@/components/ui/NoPermission';
import { Notice } from '@/components/ui/Notice';
import { Text } from '@/components/ui/Text';
import { space } from '@/constants/theme';
import { useMapTemplates } from '@/hooks/map-templates';
import { useRecordingsOfVehicle } from '@/hooks/recordings';
import { useCan } from '@/hooks/session';
import { useUpload, type UploadState } from '@/hooks/use-upload';
import { useVehicles } from '@/hooks/vehicles';
import { nameSchema } from '@/shared/contracts/common';
import type { MapTemplate } from '@/shared/contracts/map-templates';
import { fileRoleSchema, type Recording } from '@/shared/contracts/recordings';
import { UploadFiles } from './UploadFiles';
import { UploadProgress } from './UploadProgress';

const file = (what: string) => z.custom<File>((value) => Boolean(value), `Choose the ${what}.`);
const uploadSchema = z.object({
  name: nameSchema,
  vehicleId: z.string(),
  templateId: z.string(),
  imu: file('IMU log'),
  gnss: file('GNSS log').optional(),
  imu2: file('second IMU log').optional(),
  reference: file('reference trajectory').optional(),
  aids: file('log of other sensors').optional(),
});
export type UploadForm = z.infer<typeof uploadSchema>;

/** Pick the logs of one drive, name it, send it; then the recording's own page watches it decode. */
export function UploadScreen() {
  const mayUpload = useCan('recording:write');
  const form = useForm<UploadForm>({
    resolver: zodResolver(uploadSchema),
    defaultValues: { name: '', vehicleId: '', templateId: '' },
  });
  const done = useCallback((recording: Recording) => router.replace(recordingPath(recording.id)), []);
  const upload = useUpload(done);
  const sending = upload.state.phase === 'sending';
  const { setError } = form;
  useEffect(() => {
    if (upload.state.phase === 'failed')
      showProblem(upload.state.error, ['name', 'vehicleId', ...fileRoleSchema.options], setError);
  }, [upload.state, setError]);
  const vehicleId = useWatch({ control: form.control, name: 'vehicleId' });
  const templates = useMapTemplates(vehicleId).data ?? [];
  const submit = form.handleSubmit(async ({ templateId, name, vehicleId: of, ...files }) => {
    const channelMap = templates.find(({ id }) => id === templateId)?.channelMap;
    await upload.start({ meta: { name, vehicleId: of || undefined, channelMap }, ...files });
  });
  if (!mayUpload)
    return (
      <Screen title="Upload a recording" back="/recordings" width="text">
        <NoPermission message="Viewers read; an engineer, approver or admin uploads recordings." />
      </Screen>
    );
  return (
    <Screen
      title="Upload a recording"
      subtitle="The logs of one drive or flight. Nothing is kept of an upload that does not arrive whole."
      back="/recordings"
      width="text"
    >
      <Card title="Files">
        <UploadFiles form={form} disabled={sending} onFirst={(chosen) => suggestName(form, chosen)} />
      </Card>
      <Card title="What it is">
        <About form={form} templates={templates} disabled={sending} />
      </Card>
      <Outcome state={upload.state} />
      {upload.state.phase === 'sending' ? (
        <UploadProgress state={upload.state} onCancel={upload.cancel} />
      ) : (
        <View style={{ flexDirection: 'row', justifyContent: 'flex-end' }}>
          <Button label="Upload" icon="upload" kind="primary" onPress={() => void submit()} />
        </View>
      )}
    </Screen>
  );
}

/** The IMU log's name serves until somebody writes a better one. */
function suggestName(form: UseFormReturn<UploadForm>, chosen: File) {
  if (form.getValues('name') === '')
    form.setValue('name', nameFromFile(chosen.name), { shouldValidate: form.formState.isSubmitted });
}

interface AboutProps {
  form: UseFormReturn<UploadForm>;
  /** Of the vehicle that is chosen. */
  templates: readonly MapTemplate[];
  disabled: boolean;
}

function About({ form, templates, disabled }: AboutProps) {
  const vehicles = useVehicles();
  const earlier = useRecordingsOfVehicle(form.watch('vehicleId'));
  const mapped = (earlier.data ?? []).some(({ channelMap }) => channelMap);
  return (
    <View style={{ gap: space.l }}>
      <FormField
        control={form.control}
        name="name"
        label="Name"
        placeholder="Breakwater loop 3"
        editable={!disabled}
        required
      />
      <FormChoice
        control={form.control}
        name="vehicleId"
        label="Vehicle"
        placeholder="No vehicle yet"
        options={(vehicles.data ?? []).map((vehicle) => ({ value: vehicle.id, label: vehicle.name }))}
        hint="It gives the antenna’s lever arm and how the IMU is mounted; it can be set later."
        disabled={disabled}
      />
      {templates.length > 0 ? (
        <FormChoice
          control={form.control}
          name="templateId"
          label="Use a mapping template"
          placeholder="None: let the columns be recognised"
          options={templates.map(({ id, name }) => ({ value: id, label: name }))}
          hint="If the logs lack one of its columns, the recording says which and waits for you to map them."
          disabled={disabled}
        />
      ) : mapped ? (
        <Text variant="label" tone="soft" aria-live="polite">
          Should columns need mapping, the mapping of an earlier recording of this vehicle will be offered.
        </Text>
      ) : null}
    </View>
  );
}

function Outcome({ state }: { state: UploadState }) {
  if (state.phase === 'failed')
    return (
      <Notice tone="vermilion" urgent title="The upload did not arrive">
        {`${messageOf(state.error)} The files are still chosen.`}
      </Notice>
    );
  if (state.phase === 'cancelled')
    return (
      <Notice tone="ochre" urgent title="Cancelled">
        Nothing of it was kept. The files are still chosen.
      </Notice>
    );
  return null;
}

/** "breakwater_loop-3_imu.csv.gz" → "Breakwater loop 3" */
export function nameFromFile(name: string): string {
  const plain = name
    .replace(/\.gz$/i, '')
    .replace(/\.[a-z0-9]+$/i, '')
    .replace(/[_-]+/g, ' ')
    .replace(/\b(imu|log|data)\b/gi, '')
    .replace(/\s+/g, ' ')
    .trim();
  return plain.charAt(0).toUpperCase() + plain.slice(1);
}
