/** Fields of the sensors besides IMU and GNSS: barometer, heading, odometer, attitude. */
import type { ParameterField } from './parameter-field';

interface SensorSpec {
  /** Under `aids`. */
  key: string;
  title: string;
  hint: string;
  /** What depends on the sensor alone: its fixed σ, an offset. */
  own: readonly Pick<ParameterField, 'path' | 'label' | 'quantity' | 'unit' | 'hint'>[];
}

const SENSORS: readonly SensorSpec[] = [
  {
    key: 'barometer',
    title: 'Barometer',
    hint: 'its offset is a state of its own, under further states',
    own: [{ path: 'sigmaM', label: 'fixed σ of height', quantity: 'length' }],
  },
  {
    key: 'heading',
    title: 'Heading sensor',
    hint: 'compass or two antennas; also gives the first heading',
    own: [
      { path: 'sigmaRad', label: 'fixed σ', quantity: 'angle' },
      {
        path: 'offsetRad',
        label: 'offset added',
        quantity: 'angle',
        hint: 'declination of a compass, mounting angle of two antennas',
      },
    ],
  },
  {
    key: 'odometer',
    title: 'Odometer',
    hint: 'speed along the vehicle at its unsteered axle',
    own: [{ path: 'sigmaMPerS', label: 'fixed σ of speed', quantity: 'speed' }],
  },
  {
    key: 'attitude',
    title: 'Attitude sensor',
    hint: 'roll, pitch and yaw as a whole: a star or horizon tracker',
    own: [{ path: 'sigmaRad', label: 'fixed σ about each axis', quantity: 'angle' }],
  },
];

/** A switch for each sensor, and what counts while it is on. */
export const SENSOR_FIELDS: readonly ParameterField[] = SENSORS.flatMap(({ key, title, hint, own }) => {
  const at = (name: string) => `aids.${key}.${name}`;
  const rest = { group: 'sensors', needs: [at('enabled')] } as const;
  return [
    { path: at('enabled'), group: 'sensors', label: title, hint },
    {
      ...rest,
      path: at('sigmaSource'),
      label: `${title}, accuracy from`,
      words: { log: 'the log', fixed: 'the fixed value' },
    },
    { ...rest, path: at('sigmaScale'), label: `${title}, σ × scale`, quantity: 'factor' },
    ...own.map((field) => ({
      ...rest,
      ...field,
      path: at(field.path),
      label: `${title}, ${field.label}`,
    })),
    { ...rest, path: at('latencyS'), label: `${title}, latency`, quantity: 'time' },
  ] satisfies ParameterField[];
});
