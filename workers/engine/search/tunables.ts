/** What can be tuned: where it lies in the parameters, its name for people, its unit and its limits. */
import {
  accelParametersSchema,
  gnssParametersSchema,
  gyroParametersSchema,
  type Parameters,
} from '@/shared/contracts/parameters';

type Sensor = 'gyro' | 'accel';
type GyroField = keyof typeof gyroParametersSchema.shape;
type AccelField = keyof typeof accelParametersSchema.shape;
type GnssField = keyof typeof gnssParametersSchema.shape;
type Field = GyroField | AccelField | GnssField;

interface Place {
  part: Sensor | 'gnss';
  field: Field;
  label: string;
  unit: string;
}

/** A bias' in-run figure is the one that its model uses. */
function inRunBias(sensor: Sensor, parameters: Parameters): Place {
  const isWalk = parameters[sensor].biasModel === 'random-walk';
  const unit = sensor === 'gyro' ? 'rad/s' : 'm/s²';
  const fields: readonly [GyroField, GyroField] | readonly [AccelField, AccelField] =
    sensor === 'gyro'
      ? ['biasRandomWalkRadPerSPerSqrtS', 'biasInstabilityRadPerS']
      : ['biasRandomWalkMPerS2PerSqrtS', 'biasInstabilityMPerS2'];
  const name = sensor === 'gyro' ? 'gyro' : 'accelerometer';
  return isWalk
    ? { part: sensor, field: fields[0], label: `${name} bias random walk`, unit: `${unit}/√s` }
    : { part: sensor, field: fields[1], label: `${name} in-run bias`, unit };
}

const fixed = (part: Place['part'], field: Field, label: string, unit: string) => (): Place => ({
  part,
  field,
  label,
  unit,
});

const PLACES = {
  gyroWhiteNoise: fixed('gyro', 'whiteNoiseRadPerSqrtS', 'angle random walk', 'rad/√s'),
  accelWhiteNoise: fixed('accel', 'whiteNoiseMPerSPerSqrtS', 'velocity random walk', 'm/s/√s'),
  gyroBias: (parameters: Parameters) => inRunBias('gyro', parameters),
  accelBias: (parameters: Parameters) => inRunBias('accel', parameters),
  gyroTurnOnBias: fixed('gyro', 'turnOnBiasSigmaRadPerS', 'gyro turn-on bias', 'rad/s'),
  accelTurnOnBias: fixed('accel', 'turnOnBiasSigmaMPerS2', 'accelerometer turn-on bias', 'm/s²'),
  positionScale: fixed('gnss', 'positionScale', 'factor on position σ', '1'),
  velocityScale: fixed('gnss', 'velocityScale', 'factor on velocity σ', '1'),
} as const;

export type TunableName = keyof typeof PLACES;
export const TUNABLE_NAMES = Object.keys(PLACES) as TunableName[];

/** Label and unit under these parameters (a bias' depend on its model). */
export function describeTunable(name: TunableName, parameters: Parameters): { label: string; unit: string } {
  const { label, unit } = PLACES[name](parameters);
  return { label, unit };
}

export function readTunable(name: TunableName, parameters: Parameters): number {
  const { part, field } = PLACES[name](parameters);
  return (parameters[part] as Record<string, unknown>)[field] as number;
}

/** Sets the value in place. */
export function writeTunable(name: TunableName, parameters: Parameters, value: number): void {
  const { part, field } = PLACES[name](parameters);
  (parameters[part] as Record<string, unknown>)[field] = value;
}

/** Smallest and largest value that parameters may hold at all. */
export function tunableLimits(name: TunableName, parameters: Parameters): readonly [number, number] {
  const { part, field } = PLACES[name](parameters);
  const shapes = {
    gyro: gyroParametersSchema.shape,
    accel: accelParametersSchema.shape,
    gnss: gnssParametersSchema.shape,
  };
  const schema = (shapes[part] as Record<string, unknown>)[
    field
  ] as typeof gnssParametersSchema.shape.positionScale;
  const { minValue, maxValue } = schema.unwrap();
  return [minValue!, maxValue!];
}
