/** The plan view's points as a table: one row a point, named by its track. */
import type { PlanePoints } from '../model/track';
import type { TrackContent } from '../model/track-drawing';
import type { CsvTable } from './csv';

/** All points, and where the time is zoomed those of the solution in view. */
export function trackTables(
  content: TrackContent,
  view: readonly [number, number],
  zoomed: boolean,
): CsvTable[] {
  const whole: CsvTable = { part: '', label: 'All points, CSV', columns: columnsOf(content, null) };
  return zoomed
    ? [
        { part: 'in-view', label: 'Solution in view, CSV', columns: columnsOf(content, view) },
        { ...whole, part: 'all' },
      ]
    : [whole];
}

type Row = [track: string, timeS: number | null, northM: number, eastM: number, ...sigma: (number | null)[]];
const NAMES = ['track', 'time_s', 'north_m', 'east_m', 'sigma_n_m', 'sigma_e_m', 'cov_ne_m2'];

function columnsOf(content: TrackContent, view: readonly [number, number] | null) {
  const solution = content.solution();
  const rows: Row[] = [];
  for (let i = 0; i < solution.length; i++) {
    const timeS = solution.timeAt(i);
    if (view && (timeS < view[0] || timeS > view[1])) continue;
    const point = content.pointAt(timeS);
    rows.push([
      content.isCoasting(timeS) ? 'coasting' : 'aided',
      timeS,
      solution.north(i),
      solution.east(i),
      ...(point ? [point.sigmaN, point.sigmaE, point.covNE] : [null, null, null]),
    ]);
  }
  if (!view)
    for (const name of ['smoothed', 'reference', 'fixes', 'gnssOnly', 'ghost'] as const)
      rows.push(...pointRows(WORDS[name], content[name]()));
  return NAMES.map((name, column) => ({ name, values: rows.map((row) => row[column] ?? null) }));
}

const WORDS = {
  smoothed: 'smoothed', reference: 'reference', fixes: 'gnss_fix', gnssOnly: 'gnss_alone', ghost: 'baseline',
} as const; // prettier-ignore

function pointRows(name: string, points: PlanePoints): Row[] {
  return Array.from({ length: points.length }, (_, i): Row => [
    name,
    null,
    points.north(i),
    points.east(i),
    null,
    null,
    null,
  ]).filter(([, , north, east]) => Number.isFinite(north) && Number.isFinite(east));
}
