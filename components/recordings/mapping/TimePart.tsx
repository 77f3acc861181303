import { get, useFormState, useWatch } from 'react-hook-form';
import { View } from 'react-native';
import { FormField } from '@/components/forms/FormField';
import { FormNumber } from '@/components/forms/FormNumber';
import { timeMapSchema } from '@/shared/contracts/recordings';
import { Fold } from '@/components/ui/Fold';
import { TWO_COLUMN_BASES, type TimeDraft } from './map-draft';
import { timeExtrasOf } from './map-from-draft';
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
const SCALES = [
  { value: '', label: 'UTC, unless the base says GPS' },
  { value: 'utc', label: 'UTC' },
  { value: 'gps', label: 'GPS time, ahead of UTC by the leap seconds' },
] as const;
const DATE_ORDERS = [
  { value: '', label: 'year, month, day, as usual' },
  { value: 'ymd', label: 'year, month, day' },
  { value: 'dmy', label: 'day, month, year' },
  { value: 'mdy', label: 'month, day, year' },
] as const;

export interface TimePartProps extends PartProps {
  /** Where the clock lies in the form. */
  name:
    | 'imu.time'
    | 'imu.accelTime'
    | 'gnss.time'
    | 'reference.time'
    | `aids.${'barometer' | 'heading' | 'odometer'}.time`;
  /** Before the labels, where a file has more than one clock: "Accelerometer" */
  of?: string;
}

/** How a file or a sensor tells time. */
export function TimePart({ control, headers, name, of }: TimePartProps) {
  const base = useWatch({ control, name: `${name}.base` }) ?? 's';
  const two = TWO_COLUMN_BASES.includes(base);
  const takes = timeExtrasOf(base);
  const label = (text: string) => (of ? `${of}: ${text.charAt(0).toLowerCase()}${text.slice(1)}` : text);
  return (
    <Group title={of ? `${of}: time` : 'Time'}>
      <View style={fields.row}>
        <Column
          control={control}
          headers={headers}
          name={`${name}.column`}
          label={label(two ? 'First time column' : 'Time column')}
        />
        <Pick control={control} name={`${name}.base`} label={label('Counts in')} options={BASES} />
        {two ? (
          <Column
            control={control}
            headers={headers}
            name={`${name}.second`}
            label={label('Second time column')}
          />
        ) : null}
        {takes.rateHz ? (
          <View style={fields.cell}>
            <FormNumber
              control={control}
              name={`${name}.rateHz`}
              label={label('Counts a second')}
              unit="Hz"
              hint="For instance 32768 of a watch crystal, or the sample rate."
            />
          </View>
        ) : null}
        {takes.date ? (
          <View style={fields.cell}>
            <FormField
              control={control}
              name={`${name}.date`}
              label={label('Day it starts on')}
              placeholder="2026-11-03"
              hint="Left empty: the recording has no date."
            />
          </View>
        ) : null}
      </View>
      <TimeMore control={control} name={name} label={label} takes={takes} />
    </Group>
  );
}

interface TimeMoreProps extends Omit<TimePartProps, 'headers' | 'of'> {
  label: (text: string) => string;
  takes: ReturnType<typeof timeExtrasOf>;
}

/** What few clocks need. */
function TimeMore({ control, name, label, takes }: TimeMoreProps) {
  const time = useWatch({ control, name }) as TimeDraft;
  const { errors } = useFormState({ control });
  const title = label(takes.zoneMin ? 'Time zone, offset, stamp' : 'Offset, stamp, wrap');
  return (
    <Fold
      title={title}
      open={isUnusual(time)}
      fault={['offsetS', 'zoneMin', 'wrap'].some((field) => Boolean(get(errors, `${name}.${field}`)))}
    >
      <View style={fields.row}>
        <View style={fields.cell}>
          <FormNumber
            control={control}
            name={`${name}.offsetS`}
            label={label('Added to every stamp')}
            unit="s"
            hint={name === 'imu.time' ? undefined : 'Brings it onto the IMU file’s clock.'}
          />
        </View>
        <Pick
          control={control}
          name={`${name}.stamp`}
          label={label('A sample is stamped at the')}
          options={STAMPS}
        />
      </View>
      <View style={fields.row}>
        {takes.scale ? (
          <Pick control={control} name={`${name}.scale`} label={label('Counts on')} options={SCALES} roomy />
        ) : null}
        {takes.dateOrder ? (
          <Pick
            control={control}
            name={`${name}.dateOrder`}
            label={label('Dates read')}
            options={DATE_ORDERS}
          />
        ) : null}
        {takes.zoneMin ? (
          <View style={fields.cell}>
            <FormNumber
              control={control}
              name={`${name}.zoneMin`}
              label={label('Ahead of UTC by')}
              unit="min"
              hint="60 for one hour east; left empty: 0."
            />
          </View>
        ) : null}
        {takes.wrap ? (
          <View style={fields.cell}>
            <FormNumber
              control={control}
              name={`${name}.wrap`}
              label={label('Starts again from 0 at')}
              unit="counts"
              hint="4294967296 for 32 bits; left empty: seen from the file."
            />
          </View>
        ) : null}
      </View>
    </Fold>
  );
}

const isUnusual = ({ offsetS, stamp, scale, zoneMin, dateOrder, wrap }: TimeDraft) =>
  offsetS !== 0 ||
  stamp !== 'end' ||
  scale !== '' ||
  Boolean(zoneMin) ||
  dateOrder !== '' ||
  wrap !== undefined;
