/** A version as CSV (RFC 4180). Text that a spreadsheet would take for a formula is led by an apostrophe. */
import type { ExportDocument, ExportedValue } from '@/shared/contracts/exports';
import { aboutLines } from './about';
import { type Cell, csvLine } from './csv-cell';

const COLUMNS = ['kind', 'key', 'name', 'value', 'unit', 'shown_value', 'shown_unit'] as const;

export function asCsv(document: ExportDocument): string {
  const rows: Cell[][] = [
    [...COLUMNS],
    ...aboutLines(document).map(([name, value]) => ['about', '', name, value, '', '', '']),
    ...document.cautions.map((caution) => ['caution', '', '', caution, '', '', '']),
    ...document.values.map((value) => row(value)),
  ];
  return rows.map(csvLine).join('');
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
