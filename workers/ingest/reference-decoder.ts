/** Rows of a reference trajectory to columns, passed on in pieces like those of the IMU. */
import { REFERENCE_COLUMNS } from '../recordings/files';
import type { Columns } from '../recordings/arrow-file';
import type { CsvBatch } from './csv';
import { seaLevelToEllipsoid } from './geoid';
import { FILE_NAMES, rejection } from './problems';
import type { RowReader } from './row-reader';
import { ROW, ROW_LENGTH, type TrajectoryConversion } from './trajectory-row';

const PIECE_ROWS = 1 << 17;
/** Values of a row that the file of the reference holds, in its order. */
const PLACES = [ROW.lat, ROW.lon, ROW.height, 3, 4, 5, ROW.attitude, ROW.attitude + 1, ROW.attitude + 2];

export class ReferenceDecoder {
  private readonly read: Float64Array;
  private readonly values = new Float64Array(ROW_LENGTH);
  private piece: Float64Array[] = [];
  private pieceRows = 0;
  private lastS = -Infinity;
  private startS = NaN;
  rows = 0;

  constructor(
    private readonly reader: RowReader,
    private readonly conversion: TrajectoryConversion,
    private readonly shiftS: number,
    private readonly seaLevel: boolean,
    private readonly write: (columns: Columns) => void,
  ) {
    this.read = new Float64Array(conversion.columns.length);
  }

  get spanS(): [number, number] {
    return [this.startS, this.lastS];
  }

  async push(batch: CsvBatch): Promise<void> {
    for (let i = 0; i < batch.rows.length; i += 1) this.pushRow(batch.rows[i]!, batch.lines[i]!);
    if (this.pieceRows >= PIECE_ROWS) await this.passOn();
  }

  async finish(): Promise<void> {
    if (this.pieceRows > 0) await this.passOn();
  }

  private pushRow(row: readonly string[], line: number): void {
    const timeS = this.reader.read(row, line, this.read) + this.shiftS;
    if (Number.isNaN(timeS + this.read[0]! + this.read[1]!)) return;
    if (timeS < this.lastS) throw backwards(line, timeS, this.lastS);
    if (timeS === this.lastS) return;
    this.conversion.convert(this.read, line, this.values);
    if (this.rows === 0) this.startS = timeS;
    this.lastS = timeS;
    this.rows += 1;
    this.append(timeS);
  }

  private append(timeS: number): void {
    if (this.pieceRows === (this.piece[0]?.length ?? 0)) this.grow();
    this.piece[0]![this.pieceRows] = timeS;
    PLACES.forEach((place, i) => {
      this.piece[i + 1]![this.pieceRows] = this.values[place]!;
    });
    this.pieceRows += 1;
  }

  private grow(): void {
    const size = Math.max(4096, 2 * this.pieceRows);
    this.piece = REFERENCE_COLUMNS.map((_, i) => {
      const larger = new Float64Array(size);
      if (this.piece[i]) larger.set(this.piece[i]);
      return larger;
    });
  }

  private async passOn(): Promise<void> {
    const entries = REFERENCE_COLUMNS.map(
      (name, i) => [name, this.piece[i]!.slice(0, this.pieceRows)] as const,
    );
    const columns: Columns = Object.fromEntries(entries);
    if (this.seaLevel) await seaLevelToEllipsoid(columns.lat_deg!, columns.lon_deg!, columns.height_m!);
    this.write(columns);
    this.piece = [];
    this.pieceRows = 0;
  }
}

const backwards = (line: number, timeS: number, lastS: number) =>
  rejection(
    'time-backwards', { file: 'reference', line },
    `In line ${line} of the ${FILE_NAMES.reference} time runs backwards: ${timeS} s after ${lastS} s.`,
    'Sort the trajectory by time and upload it again.',
  ); // prettier-ignore
