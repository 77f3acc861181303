/** Whether a map that was made for other files can be used for these. Pure. */
import type { ChannelMap, FilePreview, FileRole } from '@/shared/contracts/recordings';
import { FILE_TITLES } from './file-titles';

export type MapPart = keyof ChannelMap;

/** Why one part of a map cannot be used. */
export interface Misfit {
  part: MapPart;
  fault: 'no-file' | 'not-mapped' | 'no-columns';
  /** Columns that the part names and the file does not have. */
  columns: string[];
}

/** Every file has its part in the map, and every column that a part names is there; what fails is listed. */
export function misfits(map: ChannelMap, previews: readonly FilePreview[]): Misfit[] {
  const found = (['imu', 'gnss', 'reference'] as const).flatMap((part): Misfit[] => {
    const isThere = previews.some((preview) => preview.role === part);
    // A reference is optional: a map that knows one serves without it.
    if (!isThere) return !map[part] || part === 'reference' ? [] : [{ part, fault: 'no-file', columns: [] }];
    if (!map[part]) return [{ part, fault: 'not-mapped', columns: [] }];
    return lacking(part, map, previews, part === 'imu' ? ['imu', 'imu2'] : [part]);
  });
  return [...found, ...lacking('aids', map, previews, ALL)];
}

export const fits = (map: ChannelMap, previews: readonly FilePreview[]): boolean =>
  misfits(map, previews).length === 0;

/** The parts that can be used as they stand. */
export function fittingParts(map: ChannelMap, previews: readonly FilePreview[]): ChannelMap {
  const bad = new Set(misfits(map, previews).map(({ part }) => part));
  const usable = (Object.keys(map) as MapPart[]).filter(
    (part) => !bad.has(part) && (part === 'aids' || previews.some(({ role }) => role === part)),
  );
  return Object.fromEntries(usable.map((part) => [part, map[part]]));
}

/** A misfit in words: "the IMU file lacks gx and gy". */
export function misfitWords({ part, fault, columns }: Misfit): string {
  const file = part === 'aids' ? 'files' : FILE_TITLES[part];
  if (fault === 'no-file') return `there is no ${file}`;
  if (fault === 'not-mapped') return `it says nothing of the ${file}`;
  return `the ${file} lack${part === 'aids' ? '' : 's'} ${columns.map((name) => `“${name}”`).join(', ')}`;
}

function lacking(
  part: MapPart,
  map: ChannelMap,
  previews: readonly FilePreview[],
  roles: readonly FileRole[],
): Misfit[] {
  const headers = new Set(
    previews.filter(({ role }) => roles.includes(role)).flatMap((preview) => preview.headers),
  );
  const columns = [...new Set(columnsIn(map[part]))].filter((name) => !headers.has(name));
  return columns.length > 0 ? [{ part, fault: 'no-columns', columns }] : [];
}

const ALL: readonly FileRole[] = ['imu', 'gnss', 'reference', 'imu2', 'aids'];
const COLUMN_KEYS: ReadonlySet<string> = new Set([
  'columns', 'column', 'lat', 'lon', 'height', 'latHemisphere', 'lonHemisphere',
  'speed', 'course', 'climb', 'quality', 'sigma',
]); // prettier-ignore

/** The names under every key that holds columns. */
function columnsIn(part: unknown): string[] {
  if (typeof part !== 'object' || part === null) return [];
  return Object.entries(part).flatMap(([key, value]: [string, unknown]) =>
    COLUMN_KEYS.has(key) ? [value].flat().filter((name) => typeof name === 'string') : columnsIn(value),
  );
}
