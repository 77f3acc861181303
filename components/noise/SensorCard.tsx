import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import { StyleSheet, View } from 'react-native';
import { z } from 'zod';
import { FormField } from '@/components/forms/FormField';
import { FormNumber } from '@/components/forms/FormNumber';
import { FormProblem } from '@/components/forms/FormProblem';
import { showProblem } from '@/components/forms/problem';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { Figures } from '@/components/ui/Figures';
import { Quantity } from '@/components/ui/Quantity';
import { Text } from '@/components/ui/Text';
import { useToast } from '@/components/ui/ToastProvider';
import { space } from '@/constants/theme';
import { useDisplayUnits } from '@/hooks/preferences';
import { usePatchVehicle } from '@/hooks/vehicles';
import { sensorFiguresSchema, type SensorModel, type Vehicle } from '@/shared/contracts/vehicles';
import { formatClock } from '@/shared/format';
import { displayUnit, type DisplayUnits } from '@/shared/display-units';
import { fromDisplay } from '@/shared/units';
import { SENSOR_NAMES, SENSORS, shownFigure, type Sensor } from './sensors';

const shown = z.record(
  z.string(),
  z.number({ error: 'Write a number, for instance 0.35.' }).positive('Above zero, or empty.').optional(),
);
const formSchema = z.object({ name: z.string().max(120), gyro: shown, accel: shown });
type SensorForm = z.infer<typeof formSchema>;

/** The IMU's noise as its datasheet gives it, and as it was measured. */
export function SensorCard({ vehicle, readOnly }: { vehicle: Vehicle; readOnly: boolean }) {
  const patch = usePatchVehicle(vehicle.id);
  const toast = useToast();
  const units = useDisplayUnits();
  const { control, handleSubmit, setError, formState, reset } = useForm<SensorForm>({
    resolver: zodResolver(formSchema),
    defaultValues: formOf(vehicle.sensor, units),
  });
  const submit = handleSubmit(async (form) => {
    try {
      const measured = vehicle.sensor?.measured ?? null;
      await patch.mutateAsync({ sensor: { name: form.name, datasheet: figuresOf(form, units), measured } });
      reset(form);
      toast({ message: 'The datasheet’s figures are saved.' });
    } catch (error) {
      showProblem(error, ['name'], setError);
    }
  });
  const measured = vehicle.sensor?.measured ?? null;
  return (
    <Card title="Sensor model">
      <FormField
        control={control}
        name="name"
        label="IMU"
        placeholder="Type and serial number"
        editable={!readOnly}
      />
      {SENSOR_NAMES.map((sensor) => (
        <View key={sensor} style={styles.sensor}>
          <Text variant="label" strong level={3}>
            {`${SENSORS[sensor].title}, datasheet`}
          </Text>
          <View style={styles.fields}>
            {SENSORS[sensor].figures.map((spec) => (
              <View key={spec.field} style={styles.field}>
                <FormNumber
                  control={control}
                  name={`${sensor}.${spec.field}`}
                  label={spec.label}
                  unit={displayUnit(spec.quantity, units).symbol}
                  editable={!readOnly}
                />
              </View>
            ))}
          </View>
        </View>
      ))}
      {measured ? <Measured measured={measured} /> : null}
      <FormProblem title="Not saved" message={formState.errors.root?.message} />
      {readOnly ? null : (
        <View style={styles.end}>
          <Button label="Save the datasheet" busy={formState.isSubmitting} onPress={() => void submit()} />
        </View>
      )}
    </Card>
  );
}

function Measured({ measured }: { measured: NonNullable<SensorModel['measured']> }) {
  const units = useDisplayUnits();
  return (
    <View style={styles.sensor}>
      <Text variant="label" strong level={3}>
        Measured
      </Text>
      <Figures tone="soft">
        {`${measured.recordingName}, ${formatClock(measured.fromS)}–${formatClock(measured.toS)}`}
      </Figures>
      <View style={styles.fields}>
        {SENSOR_NAMES.flatMap((sensor) =>
          SENSORS[sensor].figures.flatMap((spec) => {
            const value = shownFigure(measured, sensor, spec, units);
            if (value === null) return [];
            return [
              <View key={`${sensor}.${spec.field}`} style={styles.field}>
                <Text variant="small" tone="soft">
                  {`${SENSORS[sensor].title}: ${spec.label}`}
                </Text>
                <Quantity value={value} unit={displayUnit(spec.quantity, units).symbol} size="label" />
              </View>,
            ];
          }),
        )}
      </View>
    </View>
  );
}

function formOf(model: SensorModel | null, units: DisplayUnits): SensorForm {
  const fields = (sensor: Sensor) =>
    Object.fromEntries(
      SENSORS[sensor].figures.map((spec) => [
        spec.field,
        round(shownFigure(model?.datasheet ?? null, sensor, spec, units)),
      ]),
    );
  return { name: model?.name ?? '', gyro: fields('gyro'), accel: fields('accel') };
}

/** Null where nothing is filled in. */
function figuresOf(form: SensorForm, units: DisplayUnits): SensorModel['datasheet'] {
  const si = (sensor: Sensor) =>
    Object.fromEntries(
      SENSORS[sensor].figures.map(({ field, quantity }) => {
        const value = form[sensor][field];
        return [field, value === undefined ? null : fromDisplay(value, displayUnit(quantity, units))];
      }),
    );
  const figures = sensorFiguresSchema.parse({ gyro: si('gyro'), accel: si('accel') });
  const known = [...Object.values(figures.gyro), ...Object.values(figures.accel)];
  return known.some((value) => value !== null) ? figures : null;
}

/** What was typed in another unit comes back without the conversion's last digits. */
const round = (value: number | null) => (value === null ? undefined : Number(value.toPrecision(10)));

const styles = StyleSheet.create({
  sensor: { gap: space.s },
  fields: { flexDirection: 'row', flexWrap: 'wrap', gap: space.m },
  field: { flexGrow: 1, flexBasis: 200, minWidth: 0 },
  end: { flexDirection: 'row', justifyContent: 'flex-end' },
});
