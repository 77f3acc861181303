/** Fields of the sensors, GNSS, the gate, the start and the mechanisation. */
import type { ParameterField } from './parameter-field';

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
  {
    path: 'gnss.positionInflation',
    group: 'gnss',
    label: 'Position R inflated by',
    quantity: 'factor',
    hint: 'for errors that stay alike from fix to fix',
    needs: ['gnss.usePosition'],
  },
  {
    path: 'gnss.velocityInflation',
    group: 'gnss',
    label: 'Velocity R inflated by',
    quantity: 'factor',
    hint: 'for errors that stay alike from fix to fix',
    needs: ['gnss.useVelocity'],
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
  { path: 'leverArmM', group: 'gnss', label: 'Lever arm: forward, right, down', quantity: 'length' },
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

/** In the order of the bench. */
export const FILTER_FIELDS: readonly ParameterField[] = [...sensorFields, ...gnssFields, ...startFields];
