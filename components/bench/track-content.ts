/** What the plan view shows of a bench: tracks, fixes, ellipses, gathered from the run and the recording. */
import type { BaselineTrack, Series } from '@/shared/contracts/recordings';
import type { Outage } from '@/shared/contracts/runs';
import { planeOf, type PlanePoints } from '@/shared/charts/model/track';
import type { RunData } from '@/hooks/live/run-data';

/** Positions of the filter, north and east of the run's origin. */
export function stateTrack(data: RunData | null): PlanePoints & { timeAt: (index: number) => number } {
  if (!data) return { length: 0, north: () => NaN, east: () => NaN, timeAt: () => NaN };
  const [north, east, time] = [
    data.column('state', 'north_m'),
    data.column('state', 'east_m'),
    data.column('state', 'time_s'),
  ];
  return {
    length: data.table('state').length,
    north: (i) => north[i]!,
    east: (i) => east[i]!,
    timeAt: (i) => time[i]!,
  };
}

/** The fixed-interval smoother's track; none where the run has none. */
export function smoothedTrack(data: RunData | null): PlanePoints {
  if (!data) return NO_POINTS;
  const [north, east] = [data.column('smoothed', 'north_m'), data.column('smoothed', 'east_m')];
  return { length: data.table('smoothed').length, north: (i) => north[i]!, east: (i) => east[i]! };
}

/** Where the vehicle really was while coasting: the solution less its error, row by row of the coasting table. */
export function referenceTrack(data: RunData | null): PlanePoints & { outage: (index: number) => number } {
  if (!data) return { length: 0, north: () => NaN, east: () => NaN, outage: () => -1 };
  const state = stateTrack(data);
  const { length } = data.table('coasting');
  const [time, outage] = [data.column('coasting', 'time_s'), data.column('coasting', 'outage')];
  const [errorN, errorE] = [data.column('coasting', 'north_m'), data.column('coasting', 'east_m')];
  const at = (value: (row: number) => number, error: ArrayLike<number>) => (i: number) =>
    interpolated(state, value, time[i]!) - error[i]!;
  return { length, north: at(state.north, errorN), east: at(state.east, errorE), outage: (i) => outage[i]! };
}

/** GNSS fixes: the series counts from the recording's first fix, which is where the GNSS-only track begins. */
export function fixTrack(
  series: Series | undefined,
  track: BaselineTrack | undefined,
  data: RunData | null,
): PlanePoints {
  const north = series?.channels.find((channel) => channel.name === 'gnss_north');
  const east = series?.channels.find((channel) => channel.name === 'gnss_east');
  if (!north || !east || !track || !data || track.latDeg.length === 0) return NO_POINTS;
  const first = planeOf(data.origin, track.latDeg[0]!, track.lonDeg[0]!);
  // Each channel keeps its own extremes: only epochs that both hold are fixes.
  const eastAt = new Map(east.timeS.map((time, i) => [time, east.values[i] ?? NaN]));
  const both = north.timeS.flatMap((time, i) => {
    const e = eastAt.get(time);
    const n = north.values[i] ?? NaN;
    return e === undefined ? [] : [{ north: first.north + n, east: first.east + e }];
  });
  return { length: both.length, north: (i) => both[i]!.north, east: (i) => both[i]!.east };
}

/** The GNSS-only baseline: what the team has without an IMU. */
export function gnssOnlyTrack(track: BaselineTrack | undefined, data: RunData | null): PlanePoints {
  if (!track || !data) return NO_POINTS;
  const points = track.latDeg.map((lat, i) => planeOf(data.origin, lat, track.lonDeg[i]!));
  return { length: points.length, north: (i) => points[i]!.north, east: (i) => points[i]!.east };
}

/** Whether the time lies in one of the windows. */
export const isCoasting = (windows: readonly Outage[], timeS: number): boolean =>
  windows.some((window) => timeS >= window.startS && timeS < window.endS);

const NO_POINTS: PlanePoints = { length: 0, north: () => NaN, east: () => NaN };

function interpolated(
  state: ReturnType<typeof stateTrack>,
  value: (row: number) => number,
  timeS: number,
): number {
  let [low, high] = [0, state.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (state.timeAt(middle) < timeS) low = middle + 1;
    else high = middle;
  }
  if (low === 0) return value(0);
  if (low === state.length) return value(state.length - 1);
  const [t0, t1] = [state.timeAt(low - 1), state.timeAt(low)];
  const share = t1 > t0 ? (timeS - t0) / (t1 - t0) : 0;
  return value(low - 1) * (1 - share) + value(low) * share;
}
