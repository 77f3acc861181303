/** How a table is laid out, found from its first lines: delimiter, preamble, header, units, decimal sign. */
import { parseAll } from './csv-parse';
import type { TagLayout } from './csv-tags';

export interface CsvLayout {
  delimiter: string;
  /** As the file writes them, trimmed; empty ones at the end (a trailing delimiter) left out; twins are numbered. */
  headers: string[];
  /** From a row of units below the header, where there is one. */
  units: string[] | null;
  /** Line of the header, from 1; null where the file has none and columns are numbered. */
  headerLine: number | null;
  /** Line of the first data row, from 1. */
  firstLine: number;
  decimalComma: boolean;
  /** Rows that repeat the header (logs put together) start with this; undefined where there is no header. */
  repeatedHeader?: string[];
  /** Rows name their sensor and share columns; the headers are those of the arranged rows. */
  tags?: TagLayout;
}

const DELIMITERS = [';', '\t', '|', ','] as const;
/** Comments; and sentences of a receiver that share the log with the table. */
const COMMENT = /^\s*(?:[#%]|\/\/|\$[A-Z]{2}[A-Z]{3}$|\$[A-Z]{2}[A-Z]{3},)/;
/** A spreadsheet's own line, in front of everything. */
const SEPARATOR_LINE = /^\s*"?sep=(.)"?\s*$/i;
/** Lines that the layout is judged by, and how long a preamble may be. */
const JUDGED_LINES = 60;
const MAX_PREAMBLE = 200;

export const isComment = (line: string) => COMMENT.test(line);
const isFilled = (line: string) => line.trim() !== '' && !isComment(line);

/** Null where there is no line of data at all. */
export function layOut(lines: readonly string[]): (CsvLayout & { dataAt: number }) | null {
  let firstAt = lines.findIndex(isFilled);
  if (firstAt < 0) return null;
  const stated = SEPARATOR_LINE.exec(lines[firstAt]!)?.[1];
  if (stated !== undefined) firstAt = lines.findIndex((line, at) => at > firstAt && isFilled(line));
  if (firstAt < 0) return null;
  const judged = lines.slice(firstAt, firstAt + MAX_PREAMBLE + JUDGED_LINES).filter(isFilled);
  const delimiter = stated ?? delimiterOf(judged.slice(-JUDGED_LINES));
  const split = (line: string) => (parseAll(line, delimiter)[0] ?? []).map((cell) => cell.trim());
  firstAt = pastPreamble(lines, firstAt, usualWidth(judged.slice(-JUDGED_LINES), delimiter).width, split);
  const found = findHeader(lines, firstAt, split);
  const unitsAt = lines.findIndex((line, at) => at >= found.dataAt && isFilled(line));
  const units = unitsAt >= 0 ? unitsRow(split(lines[unitsAt]!)) : null;
  const dataAt = units ? unitsAt + 1 : found.dataAt;
  return {
    delimiter,
    headers: distinct(found.headers),
    units,
    headerLine: found.headerLine,
    firstLine: dataAt + 1,
    dataAt,
    decimalComma: usesDecimalComma(
      lines
        .slice(dataAt, dataAt + JUDGED_LINES)
        .filter(isFilled)
        .map(split),
    ),
    ...(found.headerLine === null ? {} : { repeatedHeader: found.headers }),
  };
}

/**
 * A semicolon, tab or bar that splits the lines evenly into numbers stands before the comma, which may be a decimal sign
 * there; blanks are the last resort.
 */
function delimiterOf(lines: readonly string[]): string {
  const numbers = (line: string, delimiter: string) => {
    const cells = parseAll(line, delimiter)[0] ?? [];
    return cells.filter((cell) => cell.trim() === '' || isNumeric(cell.trim())).length >= cells.length / 2;
  };
  for (const delimiter of DELIMITERS) {
    const { width, share } = usualWidth(lines, delimiter);
    const ofNumbers = lines.filter((line) => numbers(line, delimiter)).length / lines.length;
    if (width > 1 && share >= 0.8 && (delimiter === ',' || ofNumbers >= 0.5 || lines.length < 3))
      return delimiter;
  }
  const blanks = usualWidth(lines, ' ');
  if (blanks.width > 2 && blanks.share >= 0.8) return ' ';
  return [...DELIMITERS].reverse().find((delimiter) => usualWidth(lines, delimiter).width > 1) ?? ',';
}

/** The commonest number of cells, and the share of lines that have it, give or take one. */
function usualWidth(lines: readonly string[], delimiter: string): { width: number; share: number } {
  const widths = lines.map((line) => parseAll(line, delimiter)[0]?.length ?? 0);
  const counts = new Map<number, number>();
  for (const width of widths) counts.set(width, (counts.get(width) ?? 0) + 1);
  const width = [...counts].reduce((best, one) => (one[1] > best[1] ? one : best), [0, 0])[0];
  return { width, share: widths.filter((one) => Math.abs(one - width) <= 1).length / widths.length };
}

/** Loggers write lines of prose before their table: those are far narrower than it. */
function pastPreamble(
  lines: readonly string[],
  firstAt: number,
  width: number,
  split: (line: string) => string[],
): number {
  if (width < 3) return firstAt;
  for (let at = firstAt; at < Math.min(lines.length, firstAt + MAX_PREAMBLE); at += 1)
    if (isFilled(lines[at]!) && split(lines[at]!).length > width / 2) return at;
  return firstAt;
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
  if (!isData(first) && !isTagged(first, lines.slice(firstAt + 1, firstAt + JUDGED_LINES), split))
    return { headers: withoutTail(first), headerLine: firstAt + 1, dataAt: firstAt + 1 };
  const above = firstAt > 0 ? split(lines[firstAt - 1]!.replace(/^\s*(?:[#%]+|\/\/)\s*/, '')) : [];
  const fits = Math.abs(above.length - first.length) <= 1;
  if (isComment(lines[firstAt - 1] ?? '') && above.length > 1 && fits)
    return { headers: withoutTail(above), headerLine: firstAt, dataAt: firstAt };
  return { headers: first.map((_, i) => `column ${i + 1}`), headerLine: null, dataAt: firstAt };
}

/** Numbers behind one word that comes again below: the first row of a log without header whose rows name their sensor. */
function isTagged(
  cells: readonly string[],
  below: readonly string[],
  split: (line: string) => string[],
): boolean {
  const at = cells.findIndex((cell) => cell !== '' && !isNumeric(cell) && !isTimeText(cell));
  const rest = cells.filter((_, i) => i !== at);
  return rest.length > 2 && isData(rest) && below.some((line) => split(line)[at] === cells[at]);
}

const isData = (cells: readonly string[]) =>
  cells.every((cell) => cell === '' || isNumeric(cell) || isTimeText(cell));
const isTimeText = (cell: string) => /^\d{1,4}([-/.:]\d{1,2}){1,2}([T ]\d{1,2}:|[:.]\d|$)/.test(cell);

const withoutTail = (cells: readonly string[]) => {
  const last = cells.findLastIndex((cell) => cell !== '');
  return cells.slice(0, last + 1);
};

/** Columns without a name get their number, twins the number of their turn, so that a map can mean each. */
function distinct(headers: readonly string[]): string[] {
  const seen = new Map<string, number>();
  return headers.map((header, i) => {
    const name = header === '' ? `column ${i + 1}` : header;
    const turn = (seen.get(name) ?? 0) + 1;
    seen.set(name, turn);
    return turn === 1 ? name : `${name} (${turn})`;
  });
}

const isNumeric = (cell: string) =>
  /^[-+]?(\d+([.,]\d*)?|[.,]\d+)(e[-+]?\d+)?$/i.test(cell) || /^nan$/i.test(cell);

/** A row of units under the header: short words, no number, at least one that only a unit can be. */
function unitsRow(cells: readonly string[]): string[] | null {
  const filled = cells.filter((cell) => cell !== '');
  const short = filled.every((cell) => cell.length <= 14 && !/\d{2}/.test(cell) && !isNumeric(cell));
  const known = filled.some((cell) =>
    /^[[(]?(s|sec|ms|us|µs|ns|deg|°|rad|m|g|mg|m\/s.*|deg\/s|°\/s|rad\/s|dps)[\])]?$/i.test(cell),
  );
  return filled.length > 0 && short && known ? [...cells] : null;
}

/** Commas in numbers and never a point; with the comma as delimiter they stand in quotes. */
const usesDecimalComma = (rows: readonly string[][]) => {
  const cells = rows.flat();
  return (
    cells.some((cell) => /^[-+]?\d*,\d+(e[-+]?\d+)?$/i.test(cell)) &&
    !cells.some((cell) => /^[-+]?\d+\.\d+(e[-+]?\d+)?$/i.test(cell))
  );
};
