/** Outages on a schedule: every N s for T s between two times. Pure. */
import { formatNumber } from '@/shared/format';
import type { Outage } from '@/shared/contracts/runs';
import { LEAST_WINDOW_S, sortWindows, type WindowLimits } from './window-model';

export interface Schedule {
  everyS: number;
  lengthS: number;
  fromS: number;
  toS: number;
  withhold: Outage['withhold'];
  /** Beside the windows that are there, or in their place. */
  adds: boolean;
}
export type ScheduleField = 'everyS' | 'lengthS' | 'fromS' | 'toS';

export interface SchedulePlan {
  /** All windows to have. */
  windows: Outage[];
  /** Of these made by the schedule. */
  made: number;
  /** Left out because a window that stays is in their way. */
  leftOut: number;
}
export interface ScheduleProblem {
  field: ScheduleField;
  message: string;
}

/** A run takes no more. */
export const MOST_WINDOWS = 200;

/** What the schedule makes of `windows`, or what has to be changed first. */
export function planSchedule(
  schedule: Schedule,
  windows: readonly Outage[],
  limits: WindowLimits,
): SchedulePlan | ScheduleProblem {
  const problem = timesProblem(schedule, limits);
  if (problem) return problem;
  const { everyS, lengthS, fromS, toS, withhold, adds } = schedule;
  const kept = adds ? windows : [];
  const count = Math.floor((toS - lengthS - fromS) / everyS + 1e-9) + 1;
  if (count > MOST_WINDOWS) return tooMany(count);
  const asked = Array.from({ length: count }, (_, i): Outage => {
    const startS = round(fromS + i * everyS);
    return { startS, endS: round(startS + lengthS), withhold };
  });
  const free = asked.filter((one) => !kept.some((other) => overlap(one, other)));
  if (kept.length + free.length > MOST_WINDOWS) return tooMany(kept.length + free.length);
  return {
    windows: sortWindows([...kept, ...free]),
    made: free.length,
    leftOut: asked.length - free.length,
  };
}

export const isProblem = (plan: SchedulePlan | ScheduleProblem): plan is ScheduleProblem => 'field' in plan;

/** "12 windows of 30 s, the first at 1:00. 2 are left out: a window that stays is in their way." */
export function planWords({ made, leftOut }: SchedulePlan): string {
  const windows = made === 1 ? 'One window' : `${made} windows`;
  const rest =
    leftOut === 0
      ? ''
      : ` ${leftOut === 1 ? 'One more is' : `${leftOut} more are`} left out: a window that stays is in the way.`;
  return `${windows} will be drawn.${rest}`;
}

function timesProblem(schedule: Schedule, limits: WindowLimits): ScheduleProblem | null {
  const { everyS, lengthS, fromS, toS } = schedule;
  const shown = (seconds: number) => `${formatNumber(seconds, 6)} s`;
  if (!Number.isFinite(lengthS) || lengthS < LEAST_WINDOW_S)
    return { field: 'lengthS', message: `A window lasts at least ${LEAST_WINDOW_S} s.` };
  if (!Number.isFinite(everyS) || everyS < lengthS)
    return { field: 'everyS', message: `At least ${shown(lengthS)}: windows must not overlap.` };
  if (!Number.isFinite(fromS) || fromS < limits.startS || fromS > limits.endS - lengthS)
    return {
      field: 'fromS',
      message: `From ${shown(limits.startS)} to ${shown(limits.endS - lengthS)}: the recording lies there.`,
    };
  if (!Number.isFinite(toS) || toS > limits.endS + 1e-9 || toS < fromS + lengthS - 1e-9)
    return {
      field: 'toS',
      message: `From ${shown(fromS + lengthS)}, so that one window fits, to ${shown(limits.endS)}, the end of the recording.`,
    };
  return null;
}

const tooMany = (count: number): ScheduleProblem => ({
  field: 'everyS',
  message: `That makes ${count} windows, a run takes ${MOST_WINDOWS} at most. Put them further apart, or over less time.`,
});

/** Each window is [start, end): one may begin where another ends. */
const overlap = (a: WindowLimits, b: WindowLimits) => a.startS < b.endS && b.startS < a.endS;
const round = (value: number) => Math.round(value * 1000) / 1000;
