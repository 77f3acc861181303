import { useWatch } from 'react-hook-form';
import { View } from 'react-native';
import {
  angleUnitSchema,
  positionMapSchema,
  positionUnitSchema,
  speedUnitSchema,
} from '@/shared/contracts/recordings';
import { Fold } from '@/components/ui/Fold';
import { SIGMA_AXES, VELOCITY_AXES } from './column-parts';
import { Column, fields, Group, Pick, plain, type PartProps } from './parts';

export const ANGLE_UNITS = plain(angleUnitSchema.options, { deg: 'degrees', rad: 'radians' });
const POSITION_UNITS = plain(positionUnitSchema.options, {
  deg: 'degrees',
  rad: 'radians',
  'ddmm.mmmm': 'degrees and minutes run together, ddmm.mmmm',
  '1e-7deg': 'whole numbers of 10⁻⁷ degrees',
  ecef: 'Earth-fixed X, Y, Z in m (X, Y in place of the angles, Z of the height)',
});
const HEIGHT_UNITS = plain(positionMapSchema.shape.heightUnit.unwrap().options);
const DATUMS = plain(positionMapSchema.shape.heightDatum.unwrap().options, {
  ellipsoid: 'the WGS 84 ellipsoid',
  'sea-level': 'mean sea level',
});
const SPEED_UNITS = plain(speedUnitSchema.options);
const FRAMES = [
  { value: 'none', label: 'no velocity' },
  { value: 'ned', label: 'north, east, down' },
  { value: 'enu', label: 'east, north, up' },
  { value: 'neu', label: 'north, east, up' },
  { value: 'ecef', label: 'Earth-fixed X, Y, Z' },
  { value: 'speed-course', label: 'speed and course' },
] as const;
const SIGMA_SHAPES = [
  { value: 'none', label: 'none given' },
  { value: 'two', label: 'horizontal and vertical' },
  { value: 'three', label: 'one an axis: north, east, down' },
] as const;

type Track = PartProps & { role: 'gnss' | 'reference' };

/** Latitude, longitude, height. */
export function PositionPart({ control, headers, role }: Track) {
  return (
    <Group title="Position">
      <View style={fields.row}>
        <Column control={control} headers={headers} name={`${role}.position.lat`} label="Latitude" />
        <Column control={control} headers={headers} name={`${role}.position.lon`} label="Longitude" />
        <Pick control={control} name={`${role}.position.unit`} label="Angles in" options={POSITION_UNITS} />
      </View>
      <View style={fields.row}>
        <Column
          control={control}
          headers={headers}
          name={`${role}.position.height`}
          label="Height"
          optional
        />
        <Pick
          control={control}
          name={`${role}.position.heightUnit`}
          label="Height in"
          options={HEIGHT_UNITS}
        />
        <Pick control={control} name={`${role}.position.heightDatum`} label="Height above" options={DATUMS} />
      </View>
      <Hemispheres control={control} headers={headers} role={role} />
    </Group>
  );
}

/** Letters beside angles that have no sign. */
function Hemispheres({ control, headers, role }: Track) {
  const [lat, lon] = useWatch({
    control,
    name: [`${role}.position.latHemisphere`, `${role}.position.lonHemisphere`],
  });
  return (
    <Fold title="Columns that say N or S, E or W" open={Boolean(lat || lon)}>
      <View style={fields.row}>
        <Column
          control={control}
          headers={headers}
          name={`${role}.position.latHemisphere`}
          label="North or south"
          optional
        />
        <Column
          control={control}
          headers={headers}
          name={`${role}.position.lonHemisphere`}
          label="East or west"
          optional
        />
      </View>
    </Fold>
  );
}

/** Velocity along axes, or speed and course. */
export function VelocityPart({ control, headers, role }: Track) {
  const frame = useWatch({ control, name: `${role}.velocity.frame` }) ?? 'none';
  return (
    <Group title="Velocity">
      <View style={fields.row}>
        <Pick control={control} name={`${role}.velocity.frame`} label="Given as" options={FRAMES} />
        {frame === 'none' ? null : (
          <Pick control={control} name={`${role}.velocity.unit`} label="Speed unit" options={SPEED_UNITS} />
        )}
      </View>
      {frame === 'none' ? null : (
        <View style={fields.row}>
          {frame === 'speed-course' ? (
            <>
              <Column control={control} headers={headers} name={`${role}.velocity.speed`} label="Speed" />
              <Column control={control} headers={headers} name={`${role}.velocity.course`} label="Course" />
              <Pick
                control={control}
                name={`${role}.velocity.courseUnit`}
                label="Course in"
                options={ANGLE_UNITS}
              />
              <Column
                control={control}
                headers={headers}
                name={`${role}.velocity.climb`}
                label="Climb, upwards"
                optional
              />
            </>
          ) : (
            VELOCITY_AXES[frame].map((axis, i) => (
              <Column
                key={axis}
                control={control}
                headers={headers}
                name={`${role}.velocity.columns.${i}` as `${typeof role}.velocity.columns.0`}
                label={`Velocity ${axis}`}
              />
            ))
          )}
        </View>
      )}
    </Group>
  );
}

/** The receiver's own accuracies, 1σ. */
export function SigmaPart({ control, headers, of }: PartProps & { of: 'positionSigma' | 'velocitySigma' }) {
  const shape = useWatch({ control, name: `gnss.${of}.shape` }) ?? 'none';
  const [title, units] =
    of === 'positionSigma'
      ? ['Position accuracy, 1σ', plain(['m', 'mm'])]
      : ['Velocity accuracy, 1σ', plain(['m/s', 'mm/s'])];
  return (
    <Group title={title}>
      <View style={fields.row}>
        <Pick control={control} name={`gnss.${of}.shape`} label="Given as" options={SIGMA_SHAPES} roomy />
        {shape === 'none' ? null : (
          <Pick control={control} name={`gnss.${of}.unit`} label="Accuracy unit" options={units} />
        )}
      </View>
      {shape === 'none' ? null : (
        <View style={fields.row}>
          {SIGMA_AXES[shape].map((axis, i) => (
            <Column
              key={axis}
              control={control}
              headers={headers}
              name={`gnss.${of}.columns.${i}` as `gnss.${typeof of}.columns.0`}
              label={`Accuracy ${axis}`}
            />
          ))}
        </View>
      )}
    </Group>
  );
}
