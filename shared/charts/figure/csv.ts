/** A chart's figures as CSV (RFC 4180): a header with units in the names, numbers in full, nothing where a value is missing. */

export interface CsvColumn {
  /** In the manner of the other files: lower case, unit last: "sigma_n_m". */
  name: string;
  values: readonly (number | string | null)[];
}
export interface CsvTable {
  /** Part of the file's name: "in-view"; '' for the only one. */
  part: string;
  /** In the menu: "Data in view, CSV". */
  label: string;
  columns: readonly CsvColumn[];
}

/** `columns` as a file; they are equally long. */
export function csvText(columns: readonly CsvColumn[]): string {
  const rows = columns[0]?.values.length ?? 0;
  const lines = [columns.map(({ name }) => textCell(name)).join(',')];
  for (let row = 0; row < rows; row++)
    lines.push(columns.map(({ values }) => cell(values[row] ?? null)).join(','));
  return `${lines.join('\r\n')}\r\n`;
}

/** Rows of the table, its header not counted. */
export const rowCount = ({ columns }: Pick<CsvTable, 'columns'>): number => columns[0]?.values.length ?? 0;

/** "σ N", "m/s²" → "sigma_n_m_s2" */
export const columnName = (...parts: readonly string[]): string =>
  parts
    .map((part) =>
      Object.entries(LETTERS)
        .reduce((text, [sign, word]) => text.replaceAll(sign, word), part)
        .toLowerCase()
        .replace(/[^a-z0-9]+/g, '_')
        .replace(/^_+|_+$/g, ''),
    )
    .filter(Boolean)
    .join('_');

const LETTERS: Record<string, string> = {
  '°': 'deg', '²': '2', '³': '3', '√': 'sqrt_', 'σ': '_sigma_', 'χ': 'chi', 'τ': 'tau', 'µ': 'u', '%': 'percent', '±': '',
}; // prettier-ignore

function cell(value: number | string | null): string {
  if (typeof value === 'string') return textCell(value);
  if (value === null || !Number.isFinite(value)) return '';
  // Curves are kept in single precision: seven digits are all that they have; times need more.
  return String(Math.fround(value) === value ? Number(value.toPrecision(7)) : Number(value.toPrecision(12)));
}

/** A text that a spreadsheet would take for a formula gets an apostrophe before it. */
function textCell(text: string): string {
  const harmless = /^[=+\-@\t\r]/.test(text) ? `'${text}` : text;
  return /[",\r\n]/.test(harmless) ? `"${harmless.replaceAll('"', '""')}"` : harmless;
}
