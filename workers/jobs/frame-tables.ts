/** Chosen rows of the engine's tables as the columns of a frame (shared/contracts/frames.ts). */
import { FRAME_TABLES, type TableColumns } from '@/shared/contracts/frames';
import { RAD_PER_DEG } from '@/shared/units';
import { nedOffset } from '../engine/geodesy';
import type { CoastingTable, InnovationTable, SolutionTable } from '../engine/types';

interface Origin {
  latDeg: number;
  lonDeg: number;
  heightM: number;
}

const LOCAL_COLUMNS = new Set(['north_m', 'east_m', 'down_m']);

/** The state with its position north, east, down of `origin`, m. */
export const stateColumns = (table: SolutionTable, rows: readonly number[], origin: Origin) =>
  localColumns('state', table, rows, origin);

/** The smoothed track, as the state. */
export const smoothedColumns = (table: SolutionTable, rows: readonly number[], origin: Origin) =>
  localColumns('smoothed', table, rows, origin);

function localColumns<T extends 'state' | 'smoothed'>(
  name: T,
  table: SolutionTable,
  rows: readonly number[],
  origin: Origin,
): TableColumns<T> {
  const names = FRAME_TABLES[name].filter((column) => !LOCAL_COLUMNS.has(column));
  const columns: Record<string, Float64Array | Float32Array> = pick(table, names, rows);
  const north = new Float32Array(rows.length);
  const east = new Float32Array(rows.length);
  const down = new Float32Array(rows.length);
  const [lat, lon, height] = [table.lat_deg!, table.lon_deg!, table.height_m!];
  const [lat0, lon0] = [origin.latDeg * RAD_PER_DEG, origin.lonDeg * RAD_PER_DEG];
  const offset = new Float64Array(3);
  rows.forEach((row, i) => {
    nedOffset(
      lat0,
      lon0,
      origin.heightM,
      lat[row]! * RAD_PER_DEG,
      lon[row]! * RAD_PER_DEG,
      height[row]!,
      offset,
    );
    north[i] = offset[0]!;
    east[i] = offset[1]!;
    down[i] = offset[2]!;
  });
  return { ...columns, north_m: north, east_m: east, down_m: down } as TableColumns<T>;
}

export function innovationColumns<T extends 'position' | 'velocity'>(
  name: T,
  table: InnovationTable,
  rows: readonly number[],
): TableColumns<T> {
  const sources = [table.timeS, ...table.innovation, ...table.sigma, table.nis, table.accepted];
  const columns = FRAME_TABLES[name].map((column, i) => [column, gather(sources[i]!, rows, column)]);
  return Object.fromEntries(columns) as TableColumns<T>;
}

export const coastingColumns = (table: CoastingTable, rows: readonly number[]) =>
  pick(table, FRAME_TABLES.coasting, rows) as TableColumns<'coasting'>;

const pick = (table: Record<string, Float64Array>, names: readonly string[], rows: readonly number[]) =>
  Object.fromEntries(names.map((name) => [name, gather(table[name]!, rows, name)]));

function gather(
  source: ArrayLike<number>,
  rows: readonly number[],
  name: string,
): Float64Array | Float32Array {
  const target = name === 'time_s' ? new Float64Array(rows.length) : new Float32Array(rows.length);
  for (let i = 0; i < rows.length; i += 1) target[i] = source[rows[i]!]!;
  return target;
}
