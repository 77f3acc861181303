import { zodResolver } from '@hookform/resolvers/zod';
import { Controller, useForm } from 'react-hook-form';
import { StyleSheet, View } from 'react-native';
import { z } from 'zod';
import { FormChoice } from '@/components/forms/FormChoice';
import { FormField } from '@/components/forms/FormField';
import { FormNumber } from '@/components/forms/FormNumber';
import { FormProblem } from '@/components/forms/FormProblem';
import { showProblem } from '@/components/forms/problem';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { Text } from '@/components/ui/Text';
import { space } from '@/constants/theme';
import { useDisplayUnits } from '@/hooks/preferences';
import { nameSchema, type Vector3 } from '@/shared/contracts/common';
import {
  axisMapSchema,
  IDENTITY_AXES,
  vehicleSchema,
  type Vehicle,
  type VehicleInput,
} from '@/shared/contracts/vehicles';
import { displayUnit } from '@/shared/display-units';
import { fromDisplay, toDisplay } from '@/shared/units';
import { AxisPicker } from './AxisPicker';
import { KINDS } from './vehicle-words';

const distance = z.number({ error: 'Write a number, for instance −1.2.' });
const formSchema = z.object({
  name: nameSchema,
  kind: vehicleSchema.shape.kind,
  /** In the person's unit of length. */
  leverArm: z.tuple([distance, distance, distance]),
  axes: axisMapSchema,
  notes: z.string().max(2000, 'At most 2000 characters.'),
});
type VehicleFormValue = z.infer<typeof formSchema>;

export interface VehicleFormProps {
  vehicle?: Vehicle;
  saveLabel: string;
  /** Saves; a refusal is thrown. */
  onSave: (input: VehicleInput) => Promise<unknown>;
  /** Everything is shown, nothing can be changed. */
  readOnly?: boolean;
}

/** Name, lever arm and axes of a platform. */
export function VehicleForm({ vehicle, saveLabel, onSave, readOnly }: VehicleFormProps) {
  const length = displayUnit('length', useDisplayUnits());
  const { control, handleSubmit, setError, formState, reset } = useForm<VehicleFormValue>({
    resolver: zodResolver(formSchema),
    defaultValues: {
      name: vehicle?.name ?? '',
      kind: vehicle?.kind ?? 'other',
      leverArm: mapped(vehicle?.leverArmM ?? [0, 0, 0], (metres) => tidy(toDisplay(metres, length))),
      axes: vehicle?.axes ?? IDENTITY_AXES,
      notes: vehicle?.notes ?? '',
    },
  });
  const submit = handleSubmit(async (value) => {
    try {
      const { leverArm, ...rest } = value;
      await onSave({ ...rest, leverArmM: mapped(leverArm, (shown) => tidy(fromDisplay(shown, length))) });
      reset(value);
    } catch (error) {
      showProblem(error, ['name', 'kind', 'notes'], setError);
    }
  });
  const editable = !readOnly;
  return (
    <View style={{ gap: space.l }}>
      <Card title="What it is">
        <FormField
          control={control}
          name="name"
          label="Name"
          placeholder="Crawler 1"
          editable={editable}
          required
        />
        <FormChoice
          control={control}
          name="kind"
          label="Kind"
          options={vehicleSchema.shape.kind.options.map((kind) => ({ value: kind, label: KINDS[kind] }))}
          disabled={readOnly}
        />
      </Card>
      <Card title="GNSS antenna">
        <Text variant="label" tone="soft">
          Where the antenna’s phase centre is, seen from the IMU. An antenna above the IMU has a negative
          “down”.
        </Text>
        <View style={styles.row}>
          {(['Forward', 'Right', 'Down'] as const).map((side, i) => (
            <View key={side} style={styles.cell}>
              <FormNumber
                control={control}
                name={`leverArm.${i as 0 | 1 | 2}`}
                label={side}
                unit={length.symbol}
                editable={editable}
              />
            </View>
          ))}
        </View>
      </Card>
      <Card title="How the IMU is mounted">
        <Controller
          control={control}
          name="axes"
          render={({ field, fieldState }) => (
            <AxisPicker
              value={field.value}
              onChange={field.onChange}
              error={fieldState.error?.message}
              disabled={readOnly}
            />
          )}
        />
      </Card>
      <Card title="Notes">
        <FormField control={control} name="notes" label="Notes" labelHidden multiline editable={editable} />
      </Card>
      <FormProblem title="Not saved" message={formState.errors.root?.message} />
      {readOnly ? null : (
        <View style={{ flexDirection: 'row', justifyContent: 'flex-end' }}>
          <Button
            label={saveLabel}
            kind="primary"
            busy={formState.isSubmitting}
            onPress={() => void submit()}
          />
        </View>
      )}
    </View>
  );
}

const mapped = ([a, b, c]: Vector3, by: (value: number) => number): Vector3 => [by(a), by(b), by(c)];
/** Without the conversion's last digits. */
const tidy = (value: number) => Number(value.toPrecision(10));

const styles = StyleSheet.create({
  row: { flexDirection: 'row', flexWrap: 'wrap', gap: space.m },
  cell: { flexGrow: 1, flexShrink: 1, flexBasis: 96, minWidth: 0 },
});
