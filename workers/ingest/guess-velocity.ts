/** Velocity columns of a file of fixes. Columns called x, y, z tell their axes only by what the positions do meanwhile. */
import type { ChannelGuess, GnssMap } from '@/shared/contracts/recordings';
import { RAD_PER_DEG } from '@/shared/units';
import { numberIn } from './cells';
import type { CsvHead } from './csv';
import type { FoundColumn } from './find-columns';
import { guessed } from './guess';
import type { Find } from './guess-gnss';

type VelocityMap = NonNullable<GnssMap['velocity']>;
type AxesFrame = Exclude<VelocityMap['frame'], 'speed-course'>;

export interface GuessedVelocity {
  map: VelocityMap | undefined;
  assumed: string | null;
  guesses: ChannelGuess[];
}

const METRES_PER_DEGREE = 111_320;
/** Between compared positions there lies at least this, s. */
const BASE_S = 1;

/** `timeOf`: seconds of a row, NaN where it has none; `position`: the guessed map in degrees. */
export function guessVelocity(
  head: CsvHead,
  find: Find,
  timeOf: (row: readonly string[]) => number,
  place: readonly [FoundColumn, FoundColumn] | null,
): GuessedVelocity {
  const [north, east, down, up] = [find('vn'), find('ve'), find('vd'), find('vu')];
  if (north && east && down) return byName('ned', [north, east, down]);
  if (north && east && up) return byName('enu', [east, north, up]);
  const ecef = [find('ecefVx'), find('ecefVy'), find('ecefVz')];
  if (ecef[0] && ecef[1] && ecef[2]) return byName('ecef', [ecef[0], ecef[1], ecef[2]]);
  const axes = [find('vx'), find('vy'), find('vz')];
  const asAxes =
    axes[0] && axes[1] && axes[2] && place
      ? byMotion(head, [axes[0], axes[1], axes[2]], timeOf, place)
      : null;
  if (asAxes?.map) return asAxes;
  const speedAndCourse = byCourse(find);
  return speedAndCourse.map || !asAxes ? speedAndCourse : asAxes;
}

function byName(frame: AxesFrame, columns: [FoundColumn, FoundColumn, FoundColumn]): GuessedVelocity {
  const headers = columns.map(({ header }) => header) as [string, string, string];
  const reason = `The headers name ${frame === 'ned' ? 'north, east and down' : frame === 'enu' ? 'east, north and up' : 'Earth-fixed axes'}.`;
  const map: VelocityMap = { frame, columns: headers, unit: speedUnit(columns[0]) };
  return {
    map,
    assumed: null,
    guesses: [guessed('velocity', headers, `${frame}, ${map.unit}`, 0.95, reason)],
  };
}

function byCourse(find: Find): GuessedVelocity {
  const [speed, course, climb] = [find('speed'), find('course'), find('climb')];
  if (!speed || !course) return { map: undefined, assumed: null, guesses: [] };
  const map: VelocityMap = {
    frame: 'speed-course',
    speed: speed.header,
    course: course.header,
    unit: speedUnit(speed),
    courseUnit: course.unit === 'rad' ? 'rad' : 'deg',
  };
  if (climb && speedUnit(climb) === map.unit) map.climb = climb.header;
  const columns = [speed.header, course.header];
  return {
    map,
    assumed: null,
    guesses: [
      guessed('velocity', columns, `speed-course, ${map.unit}`, 0.9, 'The headers name speed and course.'),
    ],
  };
}

/** Tries x, y, z as north–east–down, east–north–up and north–east–up against the slope of the positions. */
function byMotion(
  head: CsvHead,
  columns: [FoundColumn, FoundColumn, FoundColumn],
  timeOf: (row: readonly string[]) => number,
  place: readonly [FoundColumn, FoundColumn],
): GuessedVelocity {
  const headers = columns.map(({ header }) => header) as [string, string, string];
  const slopes = slopesOf(head, columns, timeOf, place);
  const misfit = (north: 'x' | 'y', east: 'x' | 'y') =>
    slopes.reduce((sum, s) => sum + (s[north] - s.north) ** 2 + (s[east] - s.east) ** 2, 0);
  const motion = slopes.reduce((sum, { north, east }) => sum + north ** 2 + east ** 2, 0);
  const [xNorth, xEast] = [misfit('x', 'y'), misfit('y', 'x')];
  const best = Math.min(xNorth, xEast);
  if (slopes.length < 3 || motion / slopes.length < 0.25 || best > 0.2 * motion || best > 0.5 * Math.max(xNorth, xEast))
    return {
      map: undefined,
      assumed: `The columns ${headers.map((header) => `“${header}”`).join(', ')} look like a velocity, but whose axes they are could not be told: they are not used.`,
      guesses: [],
    };
  const frame: AxesFrame = best === xNorth ? 'ned' : 'enu';
  const reason = `Against the slope of the positions x turns out to be ${frame === 'ned' ? 'north and y east; z is taken as down' : 'east and y north; z is taken as up'}.`;
  const map: VelocityMap = { frame, columns: headers, unit: speedUnit(columns[0]) };
  return {
    map,
    assumed: `The velocity columns name no axes: by the positions x is ${frame === 'ned' ? 'north, y east; z is taken as down' : 'east, y north; z is taken as up'}.`,
    guesses: [guessed('velocity', headers, `${frame}, ${map.unit}`, 0.75, reason)],
  };
} // prettier-ignore

interface Slope {
  north: number;
  east: number;
  x: number;
  y: number;
}

function slopesOf(
  head: CsvHead,
  columns: readonly FoundColumn[],
  timeOf: (row: readonly string[]) => number,
  [lat, lon]: readonly [FoundColumn, FoundColumn],
): Slope[] {
  const at = (row: readonly string[], { index }: FoundColumn) =>
    numberIn(row[index], head.decimalComma) ?? NaN;
  const slopes: Slope[] = [];
  let from: { t: number; lat: number; lon: number } | null = null;
  let sum = { x: 0, y: 0, n: 0 };
  for (const row of head.rows) {
    const now = { t: timeOf(row), lat: at(row, lat), lon: at(row, lon) };
    const [x, y] = [at(row, columns[0]!), at(row, columns[1]!)];
    if (Number.isNaN(now.t + now.lat + now.lon + x + y)) continue;
    sum = { x: sum.x + x, y: sum.y + y, n: sum.n + 1 };
    from ??= now;
    const dt = now.t - from.t;
    if (dt < BASE_S) continue;
    slopes.push({
      north: ((now.lat - from.lat) * METRES_PER_DEGREE) / dt,
      east: ((now.lon - from.lon) * METRES_PER_DEGREE * Math.cos(now.lat * RAD_PER_DEG)) / dt,
      x: sum.x / sum.n,
      y: sum.y / sum.n,
    });
    from = now;
    sum = { x: 0, y: 0, n: 0 };
  }
  return slopes;
}

const speedUnit = (column: FoundColumn): VelocityMap['unit'] =>
  column.unit === 'km/h' || column.unit === 'kn' || column.unit === 'mm/s' ? column.unit : 'm/s';
