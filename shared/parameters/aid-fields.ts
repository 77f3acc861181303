/** Fields of what helps the filter besides GNSS: clipping, stops, the vehicle's nature, states beyond the fifteen. */
import type { ParameterField } from './parameter-field';
import { SENSOR_FIELDS } from './sensor-fields';

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
    hint: 'too high: a smooth drive at steady speed passes for a stop',
    needs: STOPS,
  },
  {
    path: 'aids.stopDetection.speedMPerS',
    group: 'stops',
    label: 'Speed at a stop below',
    quantity: 'speed',
    hint: 'or 3σ of it; GNSS and the braking seen must agree',
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

const STATES = {
  gyro: ['states.gyroScale.enabled'],
  accel: ['states.accelScale.enabled'],
  leverArm: ['states.leverArm.enabled'],
  barometer: ['states.barometerBias.enabled'],
} as const;
const stateFields: readonly ParameterField[] = [
  {
    path: 'states.gyroScale.enabled',
    group: 'states',
    label: 'Gyro scale factors',
    hint: 'seen only where the vehicle turns a lot',
  },
  {
    path: 'states.gyroScale.initialSigmaPpm',
    group: 'states',
    label: 'Gyro scale factor σ at the start',
    unit: 'ppm',
    needs: STATES.gyro,
  },
  {
    path: 'states.gyroScale.randomWalkPpmPerSqrtS',
    group: 'states',
    label: 'Gyro scale factor random walk',
    unit: 'ppm/√s',
    needs: STATES.gyro,
  },
  {
    path: 'states.accelScale.enabled',
    group: 'states',
    label: 'Accelerometer scale factors',
    hint: 'seen only where the vehicle speeds up and brakes a lot',
  },
  {
    path: 'states.accelScale.initialSigmaPpm',
    group: 'states',
    label: 'Accelerometer scale factor σ at the start',
    unit: 'ppm',
    needs: STATES.accel,
  },
  {
    path: 'states.accelScale.randomWalkPpmPerSqrtS',
    group: 'states',
    label: 'Accelerometer scale factor random walk',
    unit: 'ppm/√s',
    needs: STATES.accel,
  },
  {
    path: 'states.leverArm.enabled',
    group: 'states',
    label: 'GNSS lever arm',
    hint: 'starts at the given one; seen only in turns',
  },
  {
    path: 'states.leverArm.initialSigmaM',
    group: 'states',
    label: 'Lever arm σ at the start',
    quantity: 'length',
    needs: STATES.leverArm,
  },
  {
    path: 'states.barometerBias.enabled',
    group: 'states',
    label: 'Barometer offset',
    hint: 'barometric height less height above the ellipsoid',
  },
  {
    path: 'states.barometerBias.initialSigmaM',
    group: 'states',
    label: 'Barometer offset σ at the start',
    quantity: 'length',
    needs: STATES.barometer,
  },
  {
    path: 'states.barometerBias.randomWalkMPerSqrtS',
    group: 'states',
    label: 'Barometer offset random walk',
    unit: 'm/√s',
    needs: STATES.barometer,
  },
];

/** In the order of the bench. */
export const AID_FIELDS: readonly ParameterField[] = [
  ...clippingFields,
  ...stopFields,
  ...vehicleFields,
  ...SENSOR_FIELDS,
  ...stateFields,
];
