import { useWatch } from 'react-hook-form';
import { View } from 'react-native';
import { FormNumber } from '@/components/forms/FormNumber';
import { timeMapSchema } from '@/shared/contracts/recordings';
import { TWO_COLUMN_BASES } from './map-draft';
import { Column, fields, Group, Pick, plain, type PartProps } from './parts';

const BASES = plain(timeMapSchema.shape.base.options, {
  s: 'seconds',
  ms: 'milliseconds',
  us: 'microseconds',
  ns: 'nanoseconds',
  's+ns': 'seconds and nanoseconds, two columns',
  'gps-week+s': 'GPS week and seconds, two columns',
  iso8601: 'date and time as text',
  'gps-s': 'seconds of GPS time since 1980',
  'date+time': 'date and time of day, two columns',
  'time-of-day': 'time of day, without a date',
  counter: 'counter at a stated rate',
});
const STAMPS = plain(timeMapSchema.shape.stamp.unwrap().options, {
  end: 'end of its interval',
  middle: 'middle of its interval',
  start: 'start of its interval',
});

/** How a file tells time. */
export function TimePart({ control, headers, role }: PartProps & { role: 'imu' | 'gnss' | 'reference' }) {
  const base = useWatch({ control, name: `${role}.time.base` });
  const two = TWO_COLUMN_BASES.includes(base ?? 's');
  return (
    <Group title="Time">
      <View style={fields.row}>
        <Column
          control={control}
          headers={headers}
          name={`${role}.time.column`}
          label={two ? 'First time column' : 'Time column'}
        />
        <Pick control={control} name={`${role}.time.base`} label="Counts in" options={BASES} />
        {two ? (
          <Column
            control={control}
            headers={headers}
            name={`${role}.time.second`}
            label="Second time column"
          />
        ) : null}
      </View>
      <View style={fields.row}>
        <View style={fields.cell}>
          <FormNumber
            control={control}
            name={`${role}.time.offsetS`}
            label="Added to every stamp"
            unit="s"
            hint={role === 'imu' ? undefined : 'Brings this file onto the IMU file’s clock.'}
          />
        </View>
        {role === 'imu' ? (
          <Pick control={control} name="imu.time.stamp" label="A sample is stamped at the" options={STAMPS} />
        ) : null}
      </View>
    </Group>
  );
}
