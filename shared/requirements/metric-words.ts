/** Units and words of a requirement's metric. Pure. */
import type { Comparison, Metric, Schedule } from '../contracts/requirements';
import { formatDuration, formatNumber } from '../format';

const DRIFT_UNITS = { horizontal: 'm', vertical: 'm', velocity: 'm/s', heading: '°' } as const;
const RMSE_UNITS = {
  horizontal: 'm',
  vertical: 'm',
  position: 'm',
  velocity: 'm/s',
  roll: '°',
  pitch: '°',
  yaw: '°',
} as const;

/** Unit of the metric's values and limit; '' for a pure number. Shares are numbers from 0 to 1. */
export function metricUnit(metric: Metric): string {
  switch (metric.kind) {
    case 'drift':
      return DRIFT_UNITS[metric.quantity];
    case 'rmse':
      return RMSE_UNITS[metric.quantity];
    case 'attitude-sigma':
      return '°';
    case 'bias-convergence':
      return 's';
    default:
      return '';
  }
}

/** Metrics whose values are shares, shown in percent. */
export const isShare = ({ kind }: Metric): boolean =>
  kind === 'nis-inside-share' || kind === 'rejected-share';

const STATISTIC_WORDS = { median: 'median', p95: '95th percentile', maximum: 'maximum' } as const;

/** "Horizontal drift after 60 s of coasting, 95th percentile". */
export function metricWords(metric: Metric): string {
  switch (metric.kind) {
    case 'drift':
      return `${capital(metric.quantity)} drift after ${asTyped(metric.afterS)} s of coasting, ${STATISTIC_WORDS[metric.statistic]}`;
    case 'nis-mean':
      return `Mean NIS of ${metric.group}`;
    case 'nis-inside-share':
      return `Share of ${metric.group} NIS inside the 95 % bounds`;
    case 'rejected-share':
      return `Rejected share of ${metric.group} measurements`;
    case 'attitude-sigma':
      return metric.axis === 'largest'
        ? `Largest attitude σ, ${metric.when === 'end' ? 'at the end' : 'mean over the run'}`
        : `${capital(metric.axis)} σ, ${metric.when === 'end' ? 'at the end' : 'mean over the run'}`;
    case 'bias-convergence':
      return `Time until the ${metric.sensor === 'gyro' ? 'gyro' : 'accelerometer'} bias σ stays below ${asTyped(metric.sigma)} ${metric.sensor === 'gyro' ? 'rad/s' : 'm/s²'}`;
    case 'rmse':
      return `${capital(metric.quantity)} RMSE against the reference`;
  }
}

/** "Horizontal drift after 60 s of coasting, 95th percentile: at most 15 m". */
export function requirementSentence(metric: Metric, comparison: Comparison, limit: number | null): string {
  const words = metricWords(metric);
  if (comparison === 'inside-bounds') return `${words}: inside its 95 % bounds`;
  const amount = limit === null ? '…' : limitWords(metric, limit);
  return `${words}: ${comparison === 'at-most' ? 'at most' : 'at least'} ${amount}`;
}

/** A limit as it was typed, with its unit; shares in percent. */
export function limitWords(metric: Metric, limit: number): string {
  if (isShare(metric)) return `${asTyped(limit * 100)}\u00a0%`;
  const unit = metricUnit(metric);
  return unit ? `${asTyped(limit)}\u00a0${unit}` : asTyped(limit);
}

/** A measured value of the metric with its unit; shares in percent. */
export function metricValue(metric: Metric, value: number): string {
  if (isShare(metric)) return `${formatNumber(value * 100)} %`;
  const unit = metricUnit(metric);
  return unit ? `${formatNumber(value)} ${unit}` : formatNumber(value);
}

/** "60 s every 5 min, the first 60 s after the alignment". */
export function scheduleWords(schedule: Schedule): string {
  switch (schedule.kind) {
    case 'none':
      return 'no outages';
    case 'every':
      return `${formatDuration(schedule.forS)} every ${formatDuration(schedule.everyS)}, the first ${formatDuration(schedule.firstAfterS)} after the alignment`;
    case 'windows':
      return `${schedule.windows.length} ${schedule.windows.length === 1 ? 'window' : 'windows'}`;
  }
}

/** Without the zeros that significant digits would add: 15, not 15.0. */
const asTyped = (value: number) => String(Number(value.toPrecision(6)));

const capital = (word: string) => word[0]!.toUpperCase() + word.slice(1);
