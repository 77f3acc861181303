/** Whether the map of another recording can be used for these files. */
import type { ChannelMap, FilePreview, FileRole } from '@/shared/contracts/recordings';

/** Every file has its part in the map, and every column that a part names. */
export function fits(map: ChannelMap, previews: readonly FilePreview[]): boolean {
  const headersOf = (roles: readonly FileRole[]) =>
    new Set(previews.filter(({ role }) => roles.includes(role)).flatMap(({ headers }) => headers));
  const hasAll = (columns: readonly string[], roles: readonly FileRole[]) => {
    const headers = headersOf(roles);
    return columns.every((column) => headers.has(column));
  };
  const mapped = (['imu', 'gnss', 'reference'] as const).every((role) => {
    const part = map[role];
    const isThere = previews.some((preview) => preview.role === role);
    if (!isThere) return part === undefined || role === 'reference';
    return part !== undefined && hasAll(columnsIn(part), role === 'imu' ? ['imu', 'imu2'] : [role]);
  });
  return mapped && hasAll(columnsIn(map.aids), ALL);
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
