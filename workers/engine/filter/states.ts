import type { Parameters } from '@/shared/contracts/parameters';

/**
 * Error states, computed minus true: position (m, north–east–down), velocity (m/s), attitude φ (rad, in n, with
 * Ĉ = (I − [φ×])C), gyro bias (rad/s), accelerometer bias (m/s²).
 */
export const POSITION = 0;
export const VELOCITY = 3;
export const ATTITUDE = 6;
export const GYRO_BIAS = 9;
export const ACCEL_BIAS = 12;
export const STATES = 15;

/**
 * States that a run may carry behind the fifteen: index of the first of each kind, −1 where it is off. Scale factors
 * of gyros and accelerometers (1, per axis), GNSS lever arm (m, forward, right, down), barometer bias (m).
 */
export interface StateLayout {
  size: number;
  gyroScale: number;
  accelScale: number;
  leverArm: number;
  barometerBias: number;
}

/** The fifteen alone. */
export const PLAIN_LAYOUT: StateLayout = {
  size: STATES,
  gyroScale: -1,
  accelScale: -1,
  leverArm: -1,
  barometerBias: -1,
};

/** What the parameters switch on, in a fixed order. */
export function layoutOf({ states }: Pick<Parameters, 'states'>): StateLayout {
  const layout = { ...PLAIN_LAYOUT };
  const place = (enabled: boolean, count: number) => {
    if (!enabled) return -1;
    layout.size += count;
    return layout.size - count;
  };
  layout.gyroScale = place(states.gyroScale.enabled, 3);
  layout.accelScale = place(states.accelScale.enabled, 3);
  layout.leverArm = place(states.leverArm.enabled, 3);
  layout.barometerBias = place(states.barometerBias.enabled, 1);
  return layout;
}

/** Number of states of a covariance that is stored row by row. */
export const sizeOf = (p: Float64Array): number => Math.round(Math.sqrt(p.length));
