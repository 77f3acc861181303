import { useWatch } from 'react-hook-form';
import { View } from 'react-native';
import { FormNumber } from '@/components/forms/FormNumber';
import {
  angleUnitSchema,
  barometerUnitSchema,
  odometerUnitSchema,
  type FilePreview,
  type FileRole,
} from '@/shared/contracts/recordings';
import { Column, fields, Group, Pick, plain, type PartProps } from './parts';
import { TimePart } from './TimePart';

export type AidKind = 'barometer' | 'heading' | 'odometer';

const GIVEN = [
  { value: 'no', label: 'not there' },
  { value: 'yes', label: 'there' },
] as const;
const TIME_FROM = [
  { value: 'shared', label: 'as its file tells it' },
  { value: 'own', label: 'by a column of its own' },
] as const;
const UNITS: Record<AidKind, readonly { value: string; label: string }[]> = {
  barometer: plain(barometerUnitSchema.options, { m: 'height, m', mm: 'height, mm', ft: 'height, ft' }),
  heading: plain(angleUnitSchema.options, { deg: '°', rad: 'rad' }),
  odometer: plain(odometerUnitSchema.options, { m: 'm, distance so far', count: 'pulses so far' }),
};
const TITLES: Record<AidKind, string> = {
  barometer: 'Barometer',
  heading: 'Heading',
  odometer: 'Odometer',
};

export interface AidsPartProps {
  control: PartProps['control'];
  previews: readonly FilePreview[];
  /** How the files are called. */
  titles: Record<FileRole, string>;
}

/** Barometer, heading and odometer, each in any of the files. */
export function AidsPart(props: AidsPartProps) {
  return (
    <>
      {(Object.keys(TITLES) as AidKind[]).map((kind) => (
        <AidPart key={kind} kind={kind} {...props} />
      ))}
    </>
  );
}

function AidPart({ control, previews, titles, kind }: AidsPartProps & { kind: AidKind }) {
  const title = TITLES[kind];
  const path = `aids.${kind}` as const;
  const [given, file, timeFrom] = useWatch({
    control,
    name: [`${path}.given`, `${path}.file`, `${path}.timeFrom`],
  });
  const has = (role: FileRole) => previews.some((preview) => preview.role === role);
  const role = file || (has('aids') ? 'aids' : 'imu');
  const headers = previews.find((preview) => preview.role === role)?.headers ?? [];
  const files = [
    { value: '', label: has('aids') ? 'the file of other sensors' : 'the IMU file' },
    ...previews.map((preview) => ({ value: preview.role, label: `the ${titles[preview.role]}` })),
  ];
  return (
    <Group title={title}>
      <View style={fields.row}>
        <Pick control={control} name={`${path}.given`} label={title} options={GIVEN} />
        {given === 'yes' ? (
          <>
            <Pick control={control} name={`${path}.file`} label={`${title} is in`} options={files} />
            <Column control={control} headers={headers} name={`${path}.column`} label={`${title} column`} />
            <Pick control={control} name={`${path}.unit`} label={`${title} unit`} options={UNITS[kind]} />
          </>
        ) : null}
      </View>
      {given === 'yes' ? (
        <>
          <View style={fields.row}>
            <Column
              control={control}
              headers={headers}
              name={`${path}.sigma`}
              label={`${title} accuracy, 1σ`}
              optional
            />
            <Extra control={control} kind={kind} />
            <Pick
              control={control}
              name={`${path}.timeFrom`}
              label={`${title} is timed`}
              options={TIME_FROM}
            />
          </View>
          {timeFrom === 'own' ? (
            <TimePart control={control} headers={headers} name={`${path}.time`} of={title} />
          ) : null}
        </>
      ) : null}
    </Group>
  );
}

/** What only a heading or only an odometer may need. */
function Extra({ control, kind }: { control: PartProps['control']; kind: AidKind }) {
  if (kind === 'heading')
    return (
      <View style={fields.cell}>
        <FormNumber
          control={control}
          name="aids.heading.offsetDeg"
          label="Added to the heading"
          unit="°"
          hint="The declination where it is magnetic."
        />
      </View>
    );
  if (kind === 'odometer')
    return (
      <View style={fields.cell}>
        <FormNumber
          control={control}
          name="aids.odometer.scale"
          label="Odometer scale"
          unit="m a pulse, or ×"
          hint="Left empty: 1."
        />
      </View>
    );
  return null;
}
