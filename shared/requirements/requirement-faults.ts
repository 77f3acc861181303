/** What does not hold together in a requirement, field by field. Pure. */
import type { FieldError } from '../contracts/common';
import { DRIFT_TIMES_S, type Comparison, type Metric, type Schedule } from '../contracts/requirements';
import { isShare } from './metric-words';

interface Whole {
  metric: Metric;
  comparison: Comparison;
  limit: number | null;
  schedule: Schedule;
}

/** None: the requirement can be judged. Lengths are compared to within this, s. */
const SAME_S = 1e-6;

/** One entry a fault, its path as in the contract. */
export function requirementFaults({ metric, comparison, limit, schedule }: Whole): FieldError[] {
  const faults: FieldError[] = [];
  const fault = (path: string, message: string) => faults.push({ path, message });
  const bounded = comparison === 'inside-bounds';
  if (bounded && metric.kind !== 'nis-mean')
    fault('comparison', 'Only the mean NIS has bounds of its own: choose at most or at least, and a limit.');
  if (bounded && limit !== null) fault('limit', 'Inside its bounds there is no further limit: leave it out.');
  if (!bounded && limit === null) fault('limit', 'Give the limit.');
  if (limit !== null && isShare(metric) && (limit < 0 || limit > 1))
    fault('limit', 'A share lies between 0 and 1 (0 % and 100 %).');
  if (limit !== null && !isShare(metric) && limit < 0) fault('limit', 'The values are never negative.');
  if (metric.kind !== 'drift') return faults;
  if (schedule.kind === 'none')
    fault('schedule', 'Drift is seen in outages only: give windows, or a repeating schedule.');
  else if (!isReported(metric.afterS, schedule))
    fault(
      'metric.afterS',
      `Drift is reported after ${DRIFT_TIMES_S.join(', ')} s and at the end of a window: choose one of these, within the windows.`,
    );
  return faults;
}

function isReported(afterS: number, schedule: Exclude<Schedule, { kind: 'none' }>): boolean {
  const lengths =
    schedule.kind === 'every' ? [schedule.forS] : schedule.windows.map(({ startS, endS }) => endS - startS);
  const isUsual = DRIFT_TIMES_S.some((timeS) => timeS === afterS);
  return isUsual
    ? lengths.some((length) => length >= afterS - SAME_S)
    : lengths.every((length) => Math.abs(length - afterS) < SAME_S);
}
