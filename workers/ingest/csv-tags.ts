/**
 * Logs whose rows say in one column which sensor they are of, and share the other columns among sensors: each sensor gets
 * columns of its own, named after it, so that the rest of the intake sees a plain table.
 */
import type { CsvLayout } from './csv-layout';

export interface TagLayout {
  /** Place of the tag in a row of the file. */
  column: number;
  /** Places that stay as they are for every sensor: its time. */
  shared: readonly number[];
  /** For each tag, from which places to which. */
  moves: Readonly<Record<string, readonly (readonly [number, number])[]>>;
  headers: string[];
}

/** Kinds of sensors; a column of tags names at least two of them. */
const KINDS = [
  /imu|\bins\b/i,
  /acc/i,
  /gyr/i,
  /gnss|gps|pos|fix|loc/i,
  /baro|press/i,
  /mag|compass/i,
  /odo|wheel/i,
  /heading/i,
];
const TIME = /^(t|ts|time|timestamp|stamp|seconds?|sec|ms|us|ns|millis|micros|utc|date)\b|time|stamp/i;
const MAX_TAGS = 12;
/** Rows that are looked at. */
const PROBE_ROWS = 2000;

/** Null where there is no such column, or where each sensor has columns of its own already. */
export function findTags(layout: CsvLayout, rows: readonly string[][]): TagLayout | null {
  const probe = rows.slice(0, PROBE_ROWS);
  const width = Math.max(layout.headers.length, ...probe.map((row) => row.length));
  for (let column = 0; column < Math.min(width, 4); column += 1) {
    const tags = tagsIn(probe, column);
    if (tags) return arranged(layout, probe, column, tags, width);
  }
  return null;
}

/** Rows as the arranged headers want them; rows of unknown tags become empty. */
export function untagged(rows: readonly string[][], { column, shared, moves, headers }: TagLayout): string[][] {
  return rows.map((row) => {
    const wide = new Array<string>(headers.length).fill('');
    const own = moves[(row[column] ?? '').trim()];
    if (!own) return wide;
    shared.forEach((from, to) => (wide[to] = row[from] ?? ''));
    for (const [from, to] of own) wide[to] = row[from] ?? '';
    return wide;
  });
} // prettier-ignore

/** Few words that come again and again, and mean more than one kind of sensor. */
function tagsIn(rows: readonly string[][], column: number): string[] | null {
  const counts = new Map<string, number>();
  for (const row of rows) {
    const cell = (row[column] ?? '').trim();
    if (!/^[$A-Za-z][\w $-]{0,30}$/.test(cell)) return null;
    counts.set(cell, (counts.get(cell) ?? 0) + 1);
    if (counts.size > MAX_TAGS) return null;
  }
  const tags = [...counts].filter(([, count]) => count > 1).map(([tag]) => tag);
  const kinds = KINDS.filter((kind) => tags.some((tag) => kind.test(tag)));
  return kinds.length > 1 ? tags : null;
}

function arranged(
  layout: CsvLayout,
  rows: readonly string[][],
  column: number,
  tags: readonly string[],
  width: number,
): TagLayout | null {
  const filled = (tag: string) => {
    const own = rows.filter((row) => row[column]?.trim() === tag);
    return Array.from({ length: width }, (_, i) => i !== column && own.some((row) => (row[i] ?? '').trim() !== ''));
  };
  const use = tags.map(filled);
  const nameOf = (i: number) => layout.headers[i] ?? `column ${i + 1}`;
  const isTime = (i: number) =>
    layout.headerLine === null ? i === (column === 0 ? 1 : 0) : TIME.test(nameOf(i));
  const shared = Array.from({ length: width }, (_, i) => i).filter((i) => isTime(i) && use.every((of) => of[i]));
  const isContested = (_: unknown, i: number) => !shared.includes(i) && use.filter((of) => of[i]).length > 1;
  if (!Array.from({ length: width }).some(isContested)) return null;
  const headers = shared.map(nameOf);
  const moves: Record<string, [number, number][]> = {};
  tags.forEach((tag, k) => {
    moves[tag] = use[k]!.flatMap((isUsed, i): [number, number][] =>
      isUsed && !shared.includes(i) ? [[i, headers.push(`${tag} ${nameOf(i)}`) - 1]] : [],
    );
  });
  return { column, shared, moves, headers };
} // prettier-ignore
