import { useWatch } from 'react-hook-form';
import { View } from 'react-native';
import { accelUnitSchema, gyroUnitSchema, imuMapSchema } from '@/shared/contracts/recordings';
import { Fold } from '@/components/ui/Fold';
import { MountingPart } from './MountingPart';
import { Column, fields, Group, Pick, plain, type PartProps } from './parts';
import { SensorMore } from './SensorMore';
import { TimePart } from './TimePart';

const GYRO_UNITS = plain(gyroUnitSchema.options, {
  'deg/s': '°/s',
  'deg/h': '°/h',
  rad: 'rad, an angle a sample',
  deg: '°, an angle a sample',
});
const ACCEL_UNITS = plain(accelUnitSchema.options, {
  'm/s^2': 'm/s²',
  'm/s': 'm/s, a velocity a sample',
  'g*s': 'g·s, a velocity a sample',
});
const SIGNS = plain(imuMapSchema.shape.accel.shape.sign.unwrap().options, {
  'specific-force': 'specific force: lying still, z down reads −9.8 m/s²',
  opposite: 'opposite: lying still, z down reads +9.8 m/s²',
});
const SAMPLING = plain(imuMapSchema.shape.sampling.unwrap().options, {
  'mean-rate': 'mean rates over each interval',
  instantaneous: 'rates at the instant of the stamp',
  increment: 'increments over each interval',
});
const ACCEL_TIME = [
  { value: 'shared', label: 'the gyro’s rows and times' },
  { value: 'own', label: 'rows and times of its own' },
] as const;
const AXES = ['x', 'y', 'z'] as const;

/** Gyro and accelerometer columns, their units, and how the sensor sits. */
export function ImuPart({ control, headers, twoFiles = false }: PartProps & { twoFiles?: boolean }) {
  const accelTimeFrom = useWatch({ control, name: 'imu.accelTimeFrom' });
  return (
    <>
      <TimePart control={control} headers={headers} name="imu.time" />
      <Group title="Gyro">
        <View style={fields.row}>
          {AXES.map((axis, i) => (
            <Column
              key={axis}
              control={control}
              headers={headers}
              name={`imu.gyro.${i}` as 'imu.gyro.0'}
              label={`Gyro ${axis}`}
            />
          ))}
          <Pick control={control} name="imu.gyroUnit" label="Gyro unit" options={GYRO_UNITS} />
        </View>
        <SensorMore control={control} sensor="gyro" title="Gyro" twoFiles={twoFiles} />
      </Group>
      <Group title="Accelerometer">
        <View style={fields.row}>
          {AXES.map((axis, i) => (
            <Column
              key={axis}
              control={control}
              headers={headers}
              name={`imu.accel.${i}` as 'imu.accel.0'}
              label={`Accelerometer ${axis}`}
            />
          ))}
          <Pick control={control} name="imu.accelUnit" label="Accelerometer unit" options={ACCEL_UNITS} />
        </View>
        <View style={fields.row}>
          <Pick control={control} name="imu.accelSign" label="Sign" options={SIGNS} roomy />
          <Pick control={control} name="imu.sampling" label="The values are" options={SAMPLING} roomy />
        </View>
        <SensorMore control={control} sensor="accel" title="Accelerometer" twoFiles={twoFiles} />
        <Fold title="Accelerometer apart from the gyro" open={accelTimeFrom === 'own' || twoFiles}>
          <View style={fields.row}>
            <Pick
              control={control}
              name="imu.accelTimeFrom"
              label="The accelerometer has"
              options={ACCEL_TIME}
            />
          </View>
          {accelTimeFrom === 'own' ? (
            <TimePart control={control} headers={headers} name="imu.accelTime" of="Accelerometer" />
          ) : null}
        </Fold>
      </Group>
      <MountingPart control={control} />
    </>
  );
}
