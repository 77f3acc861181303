import { Controller, get, useFormState, useWatch } from 'react-hook-form';
import { View } from 'react-native';
import { FormNumber } from '@/components/forms/FormNumber';
import { AxisPicker } from '@/components/vehicles/AxisPicker';
import { Fold } from '@/components/ui/Fold';
import { fields, Group, Pick, type PartProps } from './parts';

const AXES_FROM = [
  { value: 'vehicle', label: 'as the vehicle says' },
  { value: 'own', label: 'different in this file' },
] as const;
const MOUNTED = [
  { value: 'along', label: 'along the axes above' },
  { value: 'turned', label: 'turned by measured angles' },
] as const;
const ANGLES = ['roll', 'pitch', 'yaw'] as const;

/** How the sensor sits in the vehicle. */
export function MountingPart({ control }: { control: PartProps['control'] }) {
  const [axesFrom, mounted] = useWatch({ control, name: ['imu.axesFrom', 'imu.mounted'] });
  const { errors } = useFormState({ control });
  const axesError = errors.imu?.axes?.message ?? errors.imu?.axes?.root?.message;
  return (
    <Group title="Sensor axes">
      <View style={fields.row}>
        <Pick control={control} name="imu.axesFrom" label="The sensor is mounted" options={AXES_FROM} />
      </View>
      {axesFrom === 'own' ? (
        <Controller
          control={control}
          name="imu.axes"
          render={({ field }) =>
            field.value ? (
              <AxisPicker value={field.value} onChange={field.onChange} error={axesError} />
            ) : (
              <></>
            )
          }
        />
      ) : null}
      <Fold
        title="Measured mounting angles"
        open={mounted === 'turned'}
        fault={Boolean(get(errors, 'imu.mounting'))}
      >
        <View style={fields.row}>
          <Pick control={control} name="imu.mounted" label="The sensor sits" options={MOUNTED} />
        </View>
        {mounted === 'turned' ? (
          <View style={fields.row}>
            {ANGLES.map((angle) => (
              <View key={angle} style={fields.cell}>
                <FormNumber
                  control={control}
                  name={`imu.mounting.${angle}Deg`}
                  label={`Mounting ${angle}`}
                  unit="°"
                />
              </View>
            ))}
          </View>
        ) : null}
      </Fold>
    </Group>
  );
}
