/**
 * The navigation state, Float64Array(NAV_SIZE): latitude and longitude (rad), height above the ellipsoid (m),
 * velocity north, east, down (m/s), quaternion n←b (Hamilton, scalar first), gyro bias (rad/s) and accelerometer
 * bias (m/s²) about forward, right, down. A bias is what the sensor adds: measured = true + bias + noise.
 */
export const LAT = 0;
export const LON = 1;
export const HEIGHT = 2;
export const VN = 3;
export const VE = 4;
export const VD = 5;
export const QUAT = 6;
export const NAV_GYRO_BIAS = 10;
export const NAV_ACCEL_BIAS = 13;
export const NAV_SIZE = 16;
