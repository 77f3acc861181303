import { get, useFormState, useWatch } from 'react-hook-form';
import { View } from 'react-native';
import { FormNumber } from '@/components/forms/FormNumber';
import { Fold } from '@/components/ui/Fold';
import type { SensorExtras } from './map-draft';
import { fields, Pick, type PartProps } from './parts';

const SENSES = [
  { value: 'kept', label: 'as it is' },
  { value: 'turned', label: 'turned round' },
] as const;
const FILES = [
  { value: '', label: 'the first that has them' },
  { value: 'imu', label: 'the IMU file' },
  { value: 'imu2', label: 'the second IMU file' },
] as const;
const AXES = ['x', 'y', 'z'] as const;

export interface SensorMoreProps {
  control: PartProps['control'];
  sensor: 'gyro' | 'accel';
  /** "Gyro" */
  title: string;
  /** There is a second IMU file to choose. */
  twoFiles: boolean;
}

/** Signs, scale and file of one sensor's columns. */
export function SensorMore({ control, sensor, title, twoFiles }: SensorMoreProps) {
  const name = `imu.${sensor}More` as const;
  const now = useWatch({ control, name }) as SensorExtras;
  const { errors } = useFormState({ control });
  const unusual = now.signs.includes('turned') || now.scale !== undefined;
  return (
    <Fold
      title={`${title}: signs and scale${twoFiles ? ', file' : ''}`}
      open={unusual}
      fault={Boolean(get(errors, `${name}.scale`))}
    >
      <View style={fields.row}>
        {AXES.map((axis, i) => (
          <Pick
            key={axis}
            control={control}
            name={`${name}.signs.${i}` as `${typeof name}.signs.0`}
            label={`Sign of ${title.toLowerCase()} ${axis}`}
            options={SENSES}
          />
        ))}
      </View>
      <View style={fields.row}>
        <View style={fields.cell}>
          <FormNumber
            control={control}
            name={`${name}.scale`}
            label={`${title}: units a count`}
            unit="in the unit above"
            hint="For raw counts of a sensor; left empty: 1."
          />
        </View>
        {twoFiles ? (
          <Pick control={control} name={`${name}.file`} label={`${title} columns are in`} options={FILES} />
        ) : null}
      </View>
    </Fold>
  );
}
