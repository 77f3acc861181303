/** Parameters that are typed, switched or chosen rather than slid: names of the trade, units, and what they hang on. */
import { defaultUnit, QUANTITIES, type DisplayUnit, type Quantity } from '@/shared/units';

export type FieldGroup =
  'gyro' | 'accel' | 'gnss' | 'gate' | 'initial' | 'mechanisation' | 'clipping' | 'stops' | 'vehicle';

export const FIELD_GROUPS: Record<FieldGroup, string> = {
  gyro: 'Gyro',
  accel: 'Accelerometer',
  gnss: 'GNSS',
  gate: 'Gate',
  initial: 'Start',
  mechanisation: 'Mechanisation',
  clipping: 'Clipping',
  stops: 'Stops',
  vehicle: 'Vehicle constraint',
};

export interface ParameterField {
  path: string;
  group: FieldGroup;
  label: string;
  quantity?: Quantity;
  /** Symbol of the quantity's unit that is shown; left out: its default. Without a quantity: the unit as the contract has it. */
  unit?: string;
  /** Words for the values of a choice. */
  words?: Readonly<Record<string, string>>;
  hint?: string;
  /** What counts while nothing is set. */
  unset?: string;
  /** Bounds on what may be typed where the contract sets none, SI. */
  range?: { low: number; high: number };
  /** Switches of which at least one must be on for this to count. */
  needs?: readonly string[];
}

/** The unit that a field is shown in; null: it has none. */
export function fieldUnit({ quantity, unit }: ParameterField): DisplayUnit | null {
  if (!quantity) return unit ? { symbol: unit, toSi: 1 } : null;
  const units: readonly DisplayUnit[] = QUANTITIES[quantity];
  return units.find((one) => one.symbol === unit) ?? defaultUnit(quantity);
}

/** Fields of a group whose switch, if they hang on one, is on. */
export const fieldsThatCount = (group: FieldGroup, isOn: (path: string) => boolean): ParameterField[] =>
  FIELDS.filter((field) => field.group === group && (field.needs?.some(isOn) ?? true));

const BIAS_MODELS = {
  'random-walk': 'random walk',
  'gauss-markov': 'Gauss–Markov',
  'turn-on-plus-wander': 'turn-on plus wander',
};

const sensorFields: readonly ParameterField[] = [
  { path: 'gyro.biasModel', group: 'gyro', label: 'Bias model', words: BIAS_MODELS },
  { path: 'accel.biasModel', group: 'accel', label: 'Bias model', words: BIAS_MODELS },
];

const gnssFields: readonly ParameterField[] = [
  { path: 'gnss.usePosition', group: 'gnss', label: 'Position used' },
  { path: 'gnss.useVelocity', group: 'gnss', label: 'Velocity used' },
  {
    path: 'gnss.sigmaSource',
    group: 'gnss',
    label: 'Accuracy from',
    words: { receiver: 'the receiver', fixed: 'fixed values' },
  },
  { path: 'gnss.positionFloorM', group: 'gnss', label: 'Least position σ', quantity: 'length' },
  { path: 'gnss.velocityFloorMPerS', group: 'gnss', label: 'Least velocity σ', quantity: 'speed' },
  {
    path: 'gnss.latencyS',
    group: 'gnss',
    label: 'Latency of fixes',
    quantity: 'time',
    hint: 'positive: a fix speaks of an earlier moment than its stamp',
  },
  { path: 'leverArmM', group: 'gnss', label: 'Lever arm: forward, right, down', unit: 'm' },
  { path: 'gate.enabled', group: 'gate', label: 'χ² gate' },
  { path: 'gate.probability', group: 'gate', label: 'Gate probability', quantity: 'percent' },
];

const startFields: readonly ParameterField[] = [
  { path: 'initial.timeS', group: 'initial', label: 'Starts at', quantity: 'time' },
  { path: 'initial.position.latDeg', group: 'initial', label: 'Latitude', unit: '°' },
  { path: 'initial.position.lonDeg', group: 'initial', label: 'Longitude', unit: '°' },
  { path: 'initial.position.heightM', group: 'initial', label: 'Height', unit: 'm' },
  {
    path: 'initial.velocityNedMPerS',
    group: 'initial',
    label: 'Velocity: north, east, down',
    unit: 'm/s',
  },
  { path: 'initial.attitude.rollDeg', group: 'initial', label: 'Roll', unit: '°' },
  { path: 'initial.attitude.pitchDeg', group: 'initial', label: 'Pitch', unit: '°' },
  { path: 'initial.attitude.yawDeg', group: 'initial', label: 'Yaw', unit: '°' },
  {
    path: 'initial.headingDeg',
    group: 'initial',
    label: 'Initial heading',
    unit: '°',
    unset: 'from the course',
    hint: 'left empty: taken from the GNSS course',
    range: { low: -360, high: 360 },
  },
  { path: 'initial.positionSigmaNedM', group: 'initial', label: 'Position σ: north, east, down', unit: 'm' },
  {
    path: 'initial.velocitySigmaNedMPerS',
    group: 'initial',
    label: 'Velocity σ: north, east, down',
    unit: 'm/s',
  },
  { path: 'initial.attitudeSigmaDeg', group: 'initial', label: 'Attitude σ: roll, pitch, yaw', unit: '°' },
  { path: 'initial.gyroBiasRadPerS', group: 'initial', label: 'Gyro bias: x, y, z', quantity: 'gyroBias' },
  {
    path: 'initial.accelBiasMPerS2',
    group: 'initial',
    label: 'Accelerometer bias: x, y, z',
    quantity: 'accelBias',
  },
  {
    path: 'initial.courseSpeedMPerS',
    group: 'initial',
    label: 'Course counts as heading above',
    quantity: 'speed',
  },
  {
    path: 'mechanisation.scheme',
    group: 'mechanisation',
    label: 'Scheme',
    words: {
      'coning-sculling': 'coning and sculling',
      trapezoidal: 'trapezoidal, for study',
      rectangular: 'rectangular, for study',
    },
  },
  {
    path: 'mechanisation.covarianceIntervalS',
    group: 'mechanisation',
    label: 'Covariance every',
    quantity: 'time',
  },
];

const CLIPPING = ['clipping.enabled'];
const clippingFields: readonly ParameterField[] = [
  {
    path: 'clipping.enabled',
    group: 'clipping',
    label: 'Widen σ over clipped samples',
    hint: 'a sample at the end of the range hides what went beyond it',
  },
  {
    path: 'clipping.gyroRangeRadPerS',
    group: 'clipping',
    label: 'Gyro range ±',
    quantity: 'gyroBias',
    unit: '°/s',
    unset: 'from flat tops',
    needs: CLIPPING,
  },
  {
    path: 'clipping.accelRangeMPerS2',
    group: 'clipping',
    label: 'Accelerometer range ±',
    quantity: 'accelBias',
    unit: 'm/s²',
    unset: 'from flat tops',
    needs: CLIPPING,
  },
  {
    path: 'clipping.overflowShare',
    group: 'clipping',
    label: '1σ beyond the range',
    quantity: 'percent',
    hint: 'what a clipped sample may have missed, as a share of the range',
    needs: CLIPPING,
  },
];

const STOPS = ['aids.zeroVelocity.enabled', 'aids.zeroRotation.enabled'];
const stopFields: readonly ParameterField[] = [
  {
    path: 'aids.zeroVelocity.enabled',
    group: 'stops',
    label: 'Zero-velocity update',
    hint: 'at a detected stop the velocity is measured as zero',
  },
  {
    path: 'aids.zeroVelocity.sigmaMPerS',
    group: 'stops',
    label: 'Zero-velocity σ',
    quantity: 'speed',
    needs: ['aids.zeroVelocity.enabled'],
  },
  {
    path: 'aids.zeroRotation.enabled',
    group: 'stops',
    label: 'Zero-rotation update',
    hint: 'at a detected stop the gyros read their bias',
  },
  {
    path: 'aids.zeroRotation.sigmaRadPerS',
    group: 'stops',
    label: 'Zero-rotation σ',
    quantity: 'gyroBias',
    hint: 'on top of the gyro noise',
    needs: ['aids.zeroRotation.enabled'],
  },
  {
    path: 'aids.stopDetection.windowS',
    group: 'stops',
    label: 'Stop detection window',
    quantity: 'time',
    needs: STOPS,
  },
  {
    path: 'aids.stopDetection.gyroSpreadRadPerS',
    group: 'stops',
    label: 'Gyro spread at a stop below',
    quantity: 'gyroBias',
    unit: '°/s',
    needs: STOPS,
  },
  {
    path: 'aids.stopDetection.accelSpreadMPerS2',
    group: 'stops',
    label: 'Accelerometer spread at a stop below',
    quantity: 'accelBias',
    unit: 'm/s²',
    needs: STOPS,
  },
];

const VEHICLE = ['aids.nonHolonomic.enabled'];
const vehicleFields: readonly ParameterField[] = [
  {
    path: 'aids.nonHolonomic.enabled',
    group: 'vehicle',
    label: 'Non-holonomic constraint',
    hint: 'a wheeled vehicle neither slides sideways nor lifts off',
  },
  {
    path: 'aids.nonHolonomic.lateralSigmaMPerS',
    group: 'vehicle',
    label: 'Sideways velocity σ',
    quantity: 'speed',
    needs: VEHICLE,
  },
  {
    path: 'aids.nonHolonomic.verticalSigmaMPerS',
    group: 'vehicle',
    label: 'Vertical velocity σ, body axis',
    quantity: 'speed',
    needs: VEHICLE,
  },
  {
    path: 'aids.nonHolonomic.intervalS',
    group: 'vehicle',
    label: 'One constraint every',
    quantity: 'time',
    needs: VEHICLE,
  },
  {
    path: 'aids.nonHolonomic.axleArmM',
    group: 'vehicle',
    label: 'IMU ahead of the unsteered axle',
    quantity: 'length',
    needs: VEHICLE,
  },
];

/** In the order of the bench. */
export const FIELDS: readonly ParameterField[] = [
  ...sensorFields,
  ...gnssFields,
  ...startFields,
  ...clippingFields,
  ...stopFields,
  ...vehicleFields,
];

/** The field at `path`. Throws where there is none: the path is then mistyped. */
export function fieldAt(path: string): ParameterField {
  const field = FIELDS.find((one) => one.path === path);
  if (!field) throw new Error(`No field is named for ${path}.`);
  return field;
}
