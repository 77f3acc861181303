/** A version as CSV (RFC 4180). Text that a spreadsheet would take for a formula is led by an apostrophe. */
import type { ExportDocument, ExportedValue } from '@/shared/contracts/exports';
import { aboutLines } from './about';

const COLUMNS = ['kind', 'key', 'name', 'value', 'unit', 'shown_value', 'shown_unit'] as const;

type Cell = string | number | readonly number[];

export function asCsv(document: ExportDocument): string {
  const rows: Cell[][] = [
    [...COLUMNS],
    ...aboutLines(document).map(([name, value]) => ['about', '', name, value, '', '', '']),
    ...document.cautions.map((caution) => ['caution', '', '', caution, '', '', '']),
    ...document.values.map((value) => row(value)),
  ];
  return rows.map((cells) => `${cells.map(csvCell).join(',')}\r\n`).join('');
}

const row = ({ path, name, value, unit, shown }: ExportedValue): Cell[] => [
  'parameter',
  path,
  name,
  plain(value),
  unit,
  shown.value,
  shown.unit,
];

function plain(value: ExportedValue['value']): Cell {
  if (typeof value === 'boolean') return value ? 'true' : 'false';
  return value;
}

/** Beginnings that make a spreadsheet compute, in ASCII and in full width. */
const FORMULA = /^[=+\-@\t\r\n＝＋－＠]/;

/** Numbers as they are, vectors with spaces between; text quoted where it must be, and never a formula. */
export function csvCell(cell: Cell): string {
  if (typeof cell === 'number') return String(cell);
  if (typeof cell !== 'string') return cell.join(' ');
  const safe = FORMULA.test(cell) ? `'${cell}` : cell;
  return /[",\r\n]/.test(safe) ? `"${safe.replace(/"/g, '""')}"` : safe;
}
