/** CSV as rows of text: layout found from the head of the file, then rows in batches with their line numbers. */
import Papa from 'papaparse';
import type { FileRole } from '@/shared/contracts/recordings';
import { FILE_NAMES, rejection } from './problems';
import { empty } from './text-source';

export interface CsvLayout {
  delimiter: string;
  /** As the file writes them, trimmed; empty ones at the end (a trailing delimiter) left out. */
  headers: string[];
  /** From a row of units below the header, where there is one. */
  units: string[] | null;
  /** Line of the header, from 1; null where the file has none and columns are numbered. */
  headerLine: number | null;
  /** Line of the first data row, from 1. */
  firstLine: number;
  decimalComma: boolean;
}

export interface CsvHead extends CsvLayout {
  /** Data rows in the head of the file. */
  rows: string[][];
  /** The head holds the whole file. */
  complete: boolean;
}

export interface CsvBatch {
  rows: string[][];
  /** Line of each row, from 1. */
  lines: Int32Array | number[];
}

const HEAD_CHARS = 256 * 1024;
const MAX_LINE_CHARS = 1024 * 1024;
const MAX_COLUMNS = 4000;
const DELIMITERS = [',', ';', '\t', '|'] as const;
const COMMENT = /^\s*[#%]/;

/** Reads the head of a file and closes the source. Throws IntakeRejected. */
export async function readHead(chunks: AsyncGenerator<string>, role: FileRole): Promise<CsvHead> {
  let text = '';
  let complete = true;
  for await (const chunk of chunks) {
    text += chunk;
    if (text.length >= HEAD_CHARS) {
      complete = false;
      break;
    }
  }
  if (!text.trim()) throw empty({ role });
  const cut = complete ? text.length : text.lastIndexOf('\n') + 1;
  if (cut === 0) throw lineTooLong(role, 1);
  return layOut(text.slice(0, cut), complete, role);
}

function layOut(text: string, complete: boolean, role: FileRole): CsvHead {
  const lines = text.split('\n');
  const firstAt = lines.findIndex((line) => line.trim() !== '' && !COMMENT.test(line));
  if (firstAt < 0) throw headerOnly(role);
  const delimiter = delimiterOf(lines.slice(firstAt, firstAt + 20));
  const split = (line: string) => (parseAll(line, delimiter)[0] ?? []).map((cell) => cell.trim());
  const found = findHeader(lines, firstAt, split);
  if (found.headers.length > MAX_COLUMNS) throw tooManyColumns(role, found.headers.length, firstAt + 1);
  const unitsAt = lines.findIndex(
    (line, at) => at >= found.dataAt && line.trim() !== '' && !COMMENT.test(line),
  );
  const units = unitsAt >= 0 ? unitsRow(split(lines[unitsAt]!)) : null;
  const dataAt = units ? unitsAt + 1 : found.dataAt;
  const rows = parseAll(lines.slice(dataAt).join('\n'), delimiter).filter((row) => !isSkipped(row));
  return {
    delimiter,
    headers: found.headers,
    units,
    headerLine: found.headerLine,
    firstLine: dataAt + 1,
    decimalComma: delimiter !== ',' && usesDecimalComma(rows),
    rows,
    complete,
  };
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
    held = text.slice(parsed.cursor);
    if (held.length > MAX_LINE_CHARS) throw lineTooLong(role, line + parsed.rows.length);
    const batch = numbered(parsed.rows, line, text.includes('"'));
    line = batch.nextLine;
    if (batch.rows.length > 0) yield batch;
  }
  if (toSkip === 0 && held.trim()) yield numbered(parseAll(held, layout.delimiter), line, held.includes('"'));
}

/** Blank lines and comments in between. */
const isSkipped = (row: string[]) => (row.length === 1 && row[0]!.trim() === '') || COMMENT.test(row[0]!);

/** Rows with their lines; comments and blank lines drop out but count. */
function numbered(rows: string[][], firstLine: number, hasQuotes: boolean): CsvBatch & { nextLine: number } {
  const kept: string[][] = [];
  const lines: number[] = [];
  let line = firstLine;
  for (const row of rows) {
    if (!isSkipped(row)) {
      kept.push(row);
      lines.push(line);
    }
    line += 1 + (hasQuotes ? row.reduce((count, cell) => count + cell.split('\n').length - 1, 0) : 0);
  }
  return { rows: kept, lines, nextLine: line };
}

interface PapaResult {
  data: string[][];
  meta: { cursor: number };
}

/** papaparse's parser on one piece of text; with `ignoreLast` the row that the next piece may continue is left over. */
function parsePart(
  text: string,
  delimiter: string,
  ignoreLast: boolean,
): { rows: string[][]; cursor: number } {
  const parser = new Papa.Parser({ delimiter, newline: '\n' });
  const result = parser.parse(text, 0, ignoreLast) as PapaResult;
  return { rows: result.data, cursor: result.meta.cursor };
}

const parseAll = (text: string, delimiter: string) => parsePart(text, delimiter, false).rows;

/** The delimiter that splits the first lines into the most columns, alike in header and rows. */
function delimiterOf(lines: readonly string[]): string {
  const filled = lines.filter((line) => line.trim() !== '' && !COMMENT.test(line));
  const scores = DELIMITERS.map((delimiter) => {
    const counts = filled.map((line) => parseAll(line, delimiter)[0]?.length ?? 0);
    const header = counts[0] ?? 0;
    const alike = counts.filter((count) => Math.abs(count - header) <= 1).length / counts.length;
    return header > 1 ? header * alike : 0;
  });
  return DELIMITERS[scores.indexOf(Math.max(...scores))] ?? ',';
}

interface FoundHeader {
  headers: string[];
  headerLine: number | null;
  /** Index of the line after the header. */
  dataAt: number;
}

/** The first line, unless it is numbers: then the comment above it where that has as many names, else numbered columns. */
function findHeader(
  lines: readonly string[],
  firstAt: number,
  split: (line: string) => string[],
): FoundHeader {
  const first = split(lines[firstAt]!);
  if (!first.every((cell) => cell === '' || isNumeric(cell)))
    return { headers: withoutTail(first), headerLine: firstAt + 1, dataAt: firstAt + 1 };
  const above = firstAt > 0 ? split(lines[firstAt - 1]!.replace(/^\s*[#%]+\s*/, '')) : [];
  if (COMMENT.test(lines[firstAt - 1] ?? '') && above.length > 1 && above.length === first.length)
    return { headers: withoutTail(above), headerLine: firstAt, dataAt: firstAt };
  return { headers: first.map((_, i) => `column ${i + 1}`), headerLine: null, dataAt: firstAt };
}

const withoutTail = (cells: readonly string[]) => {
  const last = cells.findLastIndex((cell) => cell !== '');
  return cells.slice(0, last + 1);
};

const isNumeric = (cell: string) =>
  /^[-+]?(\d+([.,]\d*)?|[.,]\d+)(e[-+]?\d+)?$/i.test(cell) || /^nan$/i.test(cell);

/** A row of units under the header: short words, no number, at least one that only a unit can be. */
function unitsRow(cells: readonly string[]): string[] | null {
  const filled = cells.filter((cell) => cell !== '');
  const short = filled.every((cell) => cell.length <= 12 && !/\d{2}/.test(cell) && !isNumeric(cell));
  const known = filled.some((cell) =>
    /^[[(]?(s|ms|us|µs|ns|deg|°|rad|m|g|mg|m\/s.*|deg\/s|°\/s|rad\/s|dps)[\])]?$/i.test(cell),
  );
  return filled.length > 0 && short && known ? [...cells] : null;
}

const usesDecimalComma = (rows: readonly string[][]) => {
  const cells = rows.slice(0, 50).flat();
  return (
    cells.some((cell) => /^\s*[-+]?\d*,\d+\s*$/.test(cell)) &&
    !cells.some((cell) => /^\s*[-+]?\d+\.\d+\s*$/.test(cell))
  );
};

export const headerOnly = (role: FileRole) =>
  rejection(
    'no-rows', { file: role },
    `The ${FILE_NAMES[role]} holds fewer than two rows of data.`,
    'Check that the log was copied completely, then upload it again.',
  ); // prettier-ignore

const lineTooLong = (role: FileRole, line: number) =>
  rejection(
    'line-too-long', { file: role, line },
    `Line ${line} of the ${FILE_NAMES[role]} is longer than ${MAX_LINE_CHARS / 1024} kB, so this is not a table of text.`,
    'Export the log as CSV with one sample a line.',
  ); // prettier-ignore

const tooManyColumns = (role: FileRole, count: number, line: number) =>
  rejection(
    'too-many-columns', { file: role, line },
    `The header of the ${FILE_NAMES[role]} names ${count} columns; at most ${MAX_COLUMNS} are read.`,
    'Export the log with one sample a line and only the channels that are needed.',
  ); // prettier-ignore
