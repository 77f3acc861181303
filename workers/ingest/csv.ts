/** CSV as rows of text: layout found from the head of the file, then rows in batches with their line numbers. */
import type { FileRole } from '@/shared/contracts/recordings';
import type { NmeaSettings } from './nmea';
import { isComment, layOut, type CsvLayout } from './csv-layout';
import { parseAll, parsePart } from './csv-parse';
import { findTags, untagged } from './csv-tags';
import { FILE_NAMES, rejection } from './problems';
import { empty } from './text-source';

export type { CsvLayout } from './csv-layout';

export interface CsvHead extends CsvLayout {
  /** Data rows in the head of the file. */
  rows: string[][];
  /** The head holds the whole file. */
  complete: boolean;
  /** As the uploader's machine called it. */
  fileName?: string;
  /** Left out: CSV. */
  format?: 'nmea' | 'gpx';
  nmea?: NmeaSettings;
  /** GPX: heights are above the ellipsoid. */
  geoid?: boolean;
}

export interface CsvBatch {
  rows: string[][];
  /** Line of each row, from 1. */
  lines: Int32Array | number[];
  /** The last line of a file that ends without a line end: it may have been cut off. */
  unfinished?: boolean;
}

const HEAD_CHARS = 256 * 1024;
const MAX_LINE_CHARS = 1024 * 1024;
const MAX_COLUMNS = 4000;

/** The first text of a file, whole lines and more; `complete` where that is all. */
export async function headText(chunks: AsyncGenerator<string>): Promise<{ text: string; complete: boolean }> {
  let text = '';
  for await (const chunk of chunks) {
    text += chunk;
    if (text.length >= HEAD_CHARS) return { text, complete: false };
  }
  return { text, complete: true };
}

/** Throws IntakeRejected. */
export function csvHead(text: string, complete: boolean, role: FileRole): CsvHead {
  if (!text.trim()) throw empty({ role });
  const cut = complete ? text.length : text.lastIndexOf('\n') + 1;
  if (cut === 0) throw endlessLine(text, role);
  const lines = text.slice(0, cut).split('\n');
  checkWidth(lines, role);
  const layout = layOut(lines);
  if (!layout) throw headerOnly(role);
  if (layout.headers.length > MAX_COLUMNS)
    throw tooManyColumns(role, String(layout.headers.length), layout.headerLine ?? layout.firstLine);
  const { dataAt, ...rest } = layout;
  const rows = parseAll(lines.slice(dataAt).join('\n'), layout.delimiter);
  const kept = rows.filter((row) => !isSkipped(row) && !isHeaderAgain(row, layout));
  const tags = findTags(layout, kept);
  if (!tags) return { ...rest, rows: kept, complete };
  return { ...rest, headers: tags.headers, units: null, rows: untagged(kept, tags), tags, complete };
}

/** Data rows of the whole file. Throws IntakeRejected for lines without end. */
export async function* readRows(
  chunks: AsyncGenerator<string>,
  layout: CsvLayout,
  role: FileRole,
): AsyncGenerator<CsvBatch> {
  let toSkip = layout.firstLine - 1;
  let line = layout.firstLine;
  let held = '';
  for await (const chunk of chunks) {
    let text = held + chunk;
    while (toSkip > 0) {
      const end = text.indexOf('\n');
      if (end < 0) break;
      text = text.slice(end + 1);
      toSkip -= 1;
    }
    held = text;
    if (toSkip > 0) continue;
    const parsed = parsePart(text, layout.delimiter, true);
    held = parsed.rest;
    if (held.length > MAX_LINE_CHARS) throw lineTooLong(role, line + parsed.rows.length);
    const batch = numbered(parsed.rows, line, text.includes('"'), layout);
    line = batch.nextLine;
    if (batch.rows.length > 0) yield batch;
  }
  if (toSkip === 0 && held.trim())
    yield {
      ...numbered(parseAll(held, layout.delimiter), line, held.includes('"'), layout),
      unfinished: !held.endsWith('\n'),
    };
}

/** Blank lines and comments in between. */
const isSkipped = (row: string[]) => (row.length === 1 && row[0]!.trim() === '') || isComment(row[0]!);

/** Logs put one behind the other bring their header, and its units, again. */
function isHeaderAgain(row: readonly string[], layout: CsvLayout): boolean {
  const { repeatedHeader, units } = layout;
  return [repeatedHeader, units].some(
    (again) => again && row[0]!.trim() === again[0] && again.every((cell, i) => row[i]?.trim() === cell),
  );
}

/** Rows with their lines; comments, blank lines and repeated headers drop out but count. */
function numbered(
  rows: string[][],
  firstLine: number,
  hasQuotes: boolean,
  layout: CsvLayout,
): CsvBatch & { nextLine: number } {
  const kept: string[][] = [];
  const lines: number[] = [];
  let line = firstLine;
  for (const row of rows) {
    if (startsNumber(row[0]!) || !(isSkipped(row) || isHeaderAgain(row, layout))) {
      kept.push(row);
      lines.push(line);
    }
    line += 1 + (hasQuotes ? row.reduce((count, cell) => count + cell.split('\n').length - 1, 0) : 0);
  }
  return { rows: layout.tags ? untagged(kept, layout.tags) : kept, lines, nextLine: line };
}

/** A digit, sign or point: cheap to see, and such rows need no closer look. */
function startsNumber(cell: string): boolean {
  const code = cell.charCodeAt(0);
  return (code > 47 && code < 58) || code === 43 || code === 45 || code === 46;
}

/** A header beyond all measure is told before it is split. */
function checkWidth(lines: readonly string[], role: FileRole): void {
  for (const [i, line] of lines.entries()) {
    if (line.length < 2 * MAX_COLUMNS) continue;
    if (delimitersIn(line) > 4 * MAX_COLUMNS) throw tooManyColumns(role, `${delimitersIn(line) + 1}`, i + 1);
    return;
  }
}

const delimitersIn = (text: string) => {
  let count = 0;
  for (let i = 0; i < text.length; i += 1) {
    const code = text.charCodeAt(i);
    if (code === 44 || code === 59 || code === 9 || code === 124) count += 1;
  }
  return count;
};

const endlessLine = (text: string, role: FileRole) =>
  delimitersIn(text) > MAX_COLUMNS
    ? tooManyColumns(role, `more than ${delimitersIn(text)}`, 1)
    : lineTooLong(role, 1);

export const headerOnly = (role: FileRole) =>
  rejection(
    'no-rows', { file: role },
    `The ${FILE_NAMES[role]} holds fewer than two rows of data.`,
    'Check that the log was copied completely, then upload it again.',
  ); // prettier-ignore

const lineTooLong = (role: FileRole, line: number) =>
  rejection(
    'line-too-long', { file: role, line },
    `Line ${line} of the ${FILE_NAMES[role]} is longer than ${HEAD_CHARS / 1024} kB, so this is not a table of text.`,
    'Export the log as CSV with one sample a line.',
  ); // prettier-ignore

const tooManyColumns = (role: FileRole, count: string, line: number) =>
  rejection(
    'too-many-columns', { file: role, line },
    `The header of the ${FILE_NAMES[role]} names ${count} columns; at most ${MAX_COLUMNS} are read.`,
    'Export the log with one sample a line and only the channels that are needed.',
  ); // prettier-ignore
