import { Controller, useForm, useWatch, type Control } from 'react-hook-form';
import { StyleSheet, View } from 'react-native';
import { FormChoice } from '@/components/forms/FormChoice';
import { FormField } from '@/components/forms/FormField';
import { FormNumber } from '@/components/forms/FormNumber';
import { FormProblem } from '@/components/forms/FormProblem';
import { messageOf } from '@/components/ui/ErrorState';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { Figures } from '@/components/ui/Figures';
import { space } from '@/constants/theme';
import { ApiProblem } from '@/hooks/api';
import { useVehicles } from '@/hooks/vehicles';
import type { RequirementInput } from '@/shared/contracts/requirements';
import { isShare, metricUnit, requirementSentence } from '@/shared/requirements/metric-words';
import { MetricFields } from './MetricFields';
import { RecordingChoice } from './RecordingChoice';
import { ScheduleFields } from './ScheduleFields';
import {
  ANY_VEHICLE,
  comparisonOf,
  fieldOf,
  limitOf,
  metricOf,
  toInput,
  type RequirementForm as FormValue,
} from './requirement-form';
import { COMPARISONS } from './requirement-words';

export interface RequirementFormProps {
  initial: FormValue;
  saveLabel: string;
  /** Saves; a refusal is thrown. */
  onSave: (input: RequirementInput) => Promise<unknown>;
}

/** What is required, of which vehicle, judged on which recordings and in which outages. */
export function RequirementForm({ initial, saveLabel, onSave }: RequirementFormProps) {
  const { control, handleSubmit, setError, formState } = useForm<FormValue>({ defaultValues: initial });
  const vehicles = useVehicles();
  const submit = handleSubmit(async (value) => {
    const made = toInput(value);
    if ('faults' in made) {
      for (const { field, message } of made.faults) setError(field ?? 'root', { message });
      return;
    }
    try {
      await onSave(made.input);
    } catch (error) {
      const named = error instanceof ApiProblem ? error.errors : [];
      if (named.length === 0) setError('root', { message: messageOf(error) });
      for (const { path, message } of named) setError(fieldOf(path) ?? 'root', { message });
    }
  });
  return (
    <View style={styles.form}>
      <Card title="What is required">
        <FormField control={control} name="name" label="Name" placeholder="Drift after a minute" required />
        <FormChoice
          control={control}
          name="vehicleId"
          label="Of which vehicle"
          shape="select"
          options={[
            { value: ANY_VEHICLE, label: 'every vehicle of the workspace' },
            ...(vehicles.data ?? []).map(({ id, name }) => ({ value: id, label: name })),
          ]}
        />
        <MetricFields control={control} />
        <Limit control={control} />
        <Sentence control={control} />
      </Card>
      <Card title="Judged on">
        <Controller
          control={control}
          name="recordingIds"
          render={({ field, fieldState }) => (
            <RecordingChoice
              value={field.value}
              onChange={field.onChange}
              error={fieldState.error?.message}
            />
          )}
        />
      </Card>
      <Card title="GNSS is withheld">
        <ScheduleFields control={control} />
      </Card>
      <FormProblem title="Not saved" message={formState.errors.root?.message} />
      <View style={styles.buttons}>
        <Button
          label={saveLabel}
          kind="primary"
          busy={formState.isSubmitting}
          onPress={() => void submit()}
        />
      </View>
    </View>
  );
}

function Limit({ control }: { control: Control<FormValue> }) {
  const form = useWatch({ control }) as FormValue;
  const metric = metricOf(form);
  const options = COMPARISONS.filter(({ value }) => value !== 'inside-bounds' || form.kind === 'nis-mean');
  return (
    <View style={styles.pair}>
      <View style={styles.half}>
        <FormChoice control={control} name="comparison" label="It must be" shape="select" options={options} />
      </View>
      {comparisonOf(form) === 'inside-bounds' ? null : (
        <View style={styles.half}>
          <FormNumber
            control={control}
            name="limit"
            label="Limit"
            unit={isShare(metric) ? '%' : metricUnit(metric) || 'no unit'}
            required
          />
        </View>
      )}
    </View>
  );
}

function Sentence({ control }: { control: Control<FormValue> }) {
  const form = useWatch({ control }) as FormValue;
  return (
    <Figures variant="body" tone="petrol">
      {requirementSentence(metricOf(form), comparisonOf(form), limitOf(form))}
    </Figures>
  );
}

const styles = StyleSheet.create({
  form: { gap: space.l },
  pair: { flexDirection: 'row', flexWrap: 'wrap', gap: space.m },
  half: { flexGrow: 1, flexBasis: 160, minWidth: 0 },
  buttons: { flexDirection: 'row' },
});
