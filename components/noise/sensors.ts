/** The two sensors of an IMU as the noise pages show them: units, names of terms, where the figures go. */
import type { NoiseTerm } from '@/shared/contracts/noise';
import type { SensorFigures } from '@/shared/contracts/vehicles';
import { displayUnit, type DisplayUnits } from '@/shared/display-units';
import { toDisplay, type Quantity } from '@/shared/units';

export type Sensor = keyof SensorFigures;

export interface FigureSpec {
  /** Field of the sensor's figures and of the filter's parameters alike. */
  field: string;
  label: string;
  quantity: Quantity;
  /** The term of the Allan curve that it is read from. */
  term: NoiseTerm | null;
}

interface SensorSpec {
  title: string;
  /** What the deviation is drawn as. */
  deviation: Quantity;
  figures: readonly FigureSpec[];
}

export const SENSORS: Record<Sensor, SensorSpec> = {
  gyro: {
    title: 'Gyro',
    deviation: 'gyroBias',
    figures: [
      { field: 'whiteNoiseRadPerSqrtS', label: 'White noise N (ARW)', quantity: 'angleRandomWalk', term: 'white' },
      { field: 'biasInstabilityRadPerS', label: 'Bias instability B', quantity: 'gyroBias', term: 'biasInstability' },
      { field: 'biasCorrelationTimeS', label: 'Bias correlation time', quantity: 'time', term: null },
      { field: 'biasRandomWalkRadPerSPerSqrtS', label: 'Rate random walk K', quantity: 'rateRandomWalk', term: 'rateRandomWalk' },
      { field: 'turnOnBiasSigmaRadPerS', label: 'Turn-on bias, 1σ', quantity: 'gyroBias', term: null },
    ],
  },
  accel: {
    title: 'Accelerometer',
    deviation: 'accelBias',
    figures: [
      { field: 'whiteNoiseMPerSPerSqrtS', label: 'White noise N (VRW)', quantity: 'velocityRandomWalk', term: 'white' },
      { field: 'biasInstabilityMPerS2', label: 'Bias instability B', quantity: 'accelBias', term: 'biasInstability' },
      { field: 'biasCorrelationTimeS', label: 'Bias correlation time', quantity: 'time', term: null },
      { field: 'biasRandomWalkMPerS2PerSqrtS', label: 'Acceleration random walk K', quantity: 'accelRandomWalk', term: 'rateRandomWalk' },
      { field: 'turnOnBiasSigmaMPerS2', label: 'Turn-on bias, 1σ', quantity: 'accelBias', term: null },
    ],
  },
}; // prettier-ignore

export const SENSOR_NAMES = Object.keys(SENSORS) as Sensor[];

/** A figure in its display unit; null where it is not known. */
export function shownFigure(
  figures: SensorFigures | null,
  sensor: Sensor,
  spec: FigureSpec,
  chosen: DisplayUnits = {},
): number | null {
  const si = figureOf(figures, sensor, spec.field);
  return si === null ? null : toDisplay(si, displayUnit(spec.quantity, chosen));
}

/** In SI. */
export function figureOf(figures: SensorFigures | null, sensor: Sensor, field: string): number | null {
  const known = figures?.[sensor] as Record<string, number | null> | undefined;
  return known?.[field] ?? null;
}
