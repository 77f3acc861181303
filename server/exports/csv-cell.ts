/** One cell of a CSV file (RFC 4180), safe in a spreadsheet. */
export type Cell = string | number | readonly number[];

/** Beginnings that make a spreadsheet compute, in ASCII and in full width. */
const FORMULA = /^[=+\-@\t\r\n＝＋－＠]/;

/** Numbers as they are, vectors with spaces between; text quoted where it must be, and led by an apostrophe where it would be a formula. */
export function csvCell(cell: Cell): string {
  if (typeof cell === 'number') return String(cell);
  if (typeof cell !== 'string') return cell.join(' ');
  const safe = FORMULA.test(cell) ? `'${cell}` : cell;
  return /[",\r\n]/.test(safe) ? `"${safe.replace(/"/g, '""')}"` : safe;
}

export const csvLine = (cells: readonly Cell[]): string => `${cells.map(csvCell).join(',')}\r\n`;
