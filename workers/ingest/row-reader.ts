/** Reads the mapped cells of a row as numbers; says with line and column what is not one. */
import type { FileRole } from '@/shared/contracts/recordings';
import type { CellParser } from './angles';
import { columnIndex, numberIn } from './cells';
import type { Clock } from './clock';
import type { CsvLayout } from './csv';
import { FILE_NAMES, quoted, rejection } from './problems';

/** A column by name; with `parse` it is read otherwise than as a plain number. */
export interface ReadColumn {
  name: string;
  parse?: CellParser;
}

export class RowReader {
  private readonly indices: number[];
  private readonly parsers: CellParser[];
  /** Only plain numbers: spares a look-up for each cell of a long log. */
  private readonly isPlain: boolean;

  constructor(
    private readonly layout: CsvLayout,
    private readonly role: FileRole,
    private readonly clock: Clock,
    private readonly timeColumns: readonly string[],
    private readonly columns: readonly ReadColumn[],
  ) {
    this.indices = columns.map(({ name }) => columnIndex(layout.headers, name));
    this.parsers = columns.map(({ parse }) => parse ?? numberIn);
    this.isPlain = columns.every(({ parse }) => parse === undefined);
  }

  /**
   * Fills `values` with the cells of the columns and answers the time, s on the axis; NaN stands for what is missing.
   * Throws IntakeRejected where a cell is no number or the row has more cells than the header.
   */
  read(row: readonly string[], line: number, values: Float64Array): number {
    if (row.length > this.layout.headers.length) this.refuseExtraCells(row, line);
    const { indices, parsers, isPlain } = this;
    const { decimalComma } = this.layout;
    for (let i = 0; i < indices.length; i += 1) {
      const cell = row[indices[i]!];
      const value = isPlain ? numberIn(cell, decimalComma) : parsers[i]!(cell, decimalComma);
      if (value === undefined) throw this.notANumber(line, this.columns[i]!.name, cell!);
      values[i] = value;
    }
    const time = this.clock.read(row);
    if (time === undefined) throw this.notATime(row, line);
    return time;
  }

  private refuseExtraCells(row: readonly string[], line: number): void {
    const { headers } = this.layout;
    if (row.slice(headers.length).every((cell) => cell.trim() === '')) return;
    throw rejection(
      'too-many-cells', { file: this.role, line },
      `Line ${line} of the ${FILE_NAMES[this.role]} has ${row.length} cells where the header names ${headers.length} columns.`,
      'Check that line: text with the delimiter in it must stand in double quotes.',
    ); // prettier-ignore
  }

  private notANumber(line: number, column: string, cell: string) {
    return rejection(
      'not-a-number', { file: this.role, line, column },
      `Line ${line} of the ${FILE_NAMES[this.role]} has ${quoted(cell)} in the column ${quoted(column)}; a number was expected.`,
      'Correct or remove that line and upload the file again. An empty cell counts as missing.',
    ); // prettier-ignore
  }

  private notATime(row: readonly string[], line: number) {
    const column = this.timeColumns[0]!;
    const cell = this.timeColumns.map((name) => row[columnIndex(this.layout.headers, name)] ?? '').join(' ');
    return rejection(
      'not-a-time', { file: this.role, line, column },
      `Line ${line} of the ${FILE_NAMES[this.role]} has ${quoted(cell)} in the column ${quoted(column)}; a time was expected.`,
      'Correct or remove that line, or name the unit of the time column on the mapping screen.',
    ); // prettier-ignore
  }
}
