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
