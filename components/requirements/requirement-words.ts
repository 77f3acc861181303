/** Words of the choices in a requirement's form. */
import type { RequirementForm } from './requirement-form';

type Options<K extends keyof RequirementForm> = readonly {
  value: RequirementForm[K] & string;
  label: string;
}[];

export const KINDS: Options<'kind'> = [
  { value: 'drift', label: 'Drift without GNSS' },
  { value: 'nis-mean', label: 'Mean NIS' },
  { value: 'nis-inside-share', label: 'Share of NIS inside their bounds' },
  { value: 'rejected-share', label: 'Rejected share of measurements' },
  { value: 'attitude-sigma', label: 'Attitude σ' },
  { value: 'bias-convergence', label: 'Time until a bias has settled' },
  { value: 'rmse', label: 'Error against the reference, RMS' },
];
export const DRIFT_QUANTITIES: Options<'driftQuantity'> = [
  { value: 'horizontal', label: 'horizontal, m' },
  { value: 'vertical', label: 'vertical, m' },
  { value: 'velocity', label: 'velocity, m/s' },
  { value: 'heading', label: 'heading, °' },
];
export const STATISTICS: Options<'statistic'> = [
  { value: 'median', label: 'median' },
  { value: 'p95', label: '95th percentile' },
  { value: 'maximum', label: 'maximum' },
];
export const GROUPS: Options<'group'> = [
  { value: 'position', label: 'position' },
  { value: 'velocity', label: 'velocity' },
];
export const AXES: Options<'axis'> = [
  { value: 'roll', label: 'roll' },
  { value: 'pitch', label: 'pitch' },
  { value: 'yaw', label: 'yaw' },
  { value: 'largest', label: 'the largest of the three' },
];
export const WHENS: Options<'when'> = [
  { value: 'end', label: 'at the end of the run' },
  { value: 'mean', label: 'mean over the run' },
];
export const SENSORS: Options<'sensor'> = [
  { value: 'gyro', label: 'gyro' },
  { value: 'accel', label: 'accelerometer' },
];
export const RMSE_QUANTITIES: Options<'rmseQuantity'> = [
  { value: 'horizontal', label: 'horizontal position, m' },
  { value: 'vertical', label: 'vertical position, m' },
  { value: 'position', label: 'position, m' },
  { value: 'velocity', label: 'velocity, m/s' },
  { value: 'roll', label: 'roll, °' },
  { value: 'pitch', label: 'pitch, °' },
  { value: 'yaw', label: 'yaw, °' },
];
export const COMPARISONS: Options<'comparison'> = [
  { value: 'at-most', label: 'at most' },
  { value: 'at-least', label: 'at least' },
  { value: 'inside-bounds', label: 'inside its 95 % bounds' },
];
export const SCHEDULES: Options<'schedule'> = [
  { value: 'none', label: 'never' },
  { value: 'every', label: 'again and again' },
  { value: 'windows', label: 'in windows' },
];
