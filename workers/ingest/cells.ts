/** Cells of a table as numbers. */

const MISSING = /^(nan|[-+]?inf(inity)?|null|none|na|n\/a|-+|nil)?$/i;

/**
 * The number in a cell: NaN where there is none (empty, NaN, infinite, or beyond the end of a short row), undefined where
 * there is something else than a number.
 */
export function numberIn(cell: string | undefined, decimalComma: boolean): number | undefined {
  if (cell === undefined) return NaN;
  const value = Number(decimalComma ? cell.replace(',', '.') : cell);
  // An empty cell would count as 0; hexadecimal and the like are no measurements.
  if (value - value === 0 && value !== 0) return isOtherBase(cell) ? undefined : value;
  // The zeros of a log: nothing to look for in 0.000 or -0.
  if (value === 0 && cell.charCodeAt(0) > 44 && !isOtherBase(cell)) return 0;
  const text = cell.trim();
  if (MISSING.test(text)) return NaN;
  return value === 0 ? 0 : undefined;
}

/** 0x1F, 0b11, 0o17: a letter in the second place that is not the e of an exponent. */
function isOtherBase(cell: string): boolean {
  const second = cell.charCodeAt(1);
  return second > 64 && second !== 69 && second !== 101;
}

/** Number of the column that `name` stands for, or -1. Blanks around it do not matter. */
export const columnIndex = (headers: readonly string[], name: string) => headers.indexOf(name.trim());
