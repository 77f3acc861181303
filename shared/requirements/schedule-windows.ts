/** The windows that a schedule means on one recording. Pure. */
import type { Schedule } from '../contracts/requirements';
import type { Outage } from '../contracts/runs';

/** As many as a run takes. */
const MOST_WINDOWS = 200;

/**
 * Windows on the recording's axis, s, given where the run begins (its alignment) and ends. Of a repeating schedule only
 * windows that lie wholly inside are laid, at most 200: a window that is cut short would be judged as a whole one.
 */
export function scheduleWindows(schedule: Schedule, [startS, endS]: readonly [number, number]): Outage[] {
  if (schedule.kind === 'none') return [];
  if (schedule.kind === 'windows') return schedule.windows.filter(({ startS: from }) => from < endS);
  const { everyS, forS, firstAfterS, withhold } = schedule;
  const windows: Outage[] = [];
  for (let i = 0; i < MOST_WINDOWS; i += 1) {
    const from = startS + firstAfterS + i * everyS;
    if (from + forS > endS) break;
    windows.push({ startS: from, endS: from + forS, withhold });
  }
  return windows;
}
