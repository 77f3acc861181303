/** Rows of an IMU file to columns in SI and body axes, passed on in large pieces so that memory stays flat. */
import { IMU_COLUMNS } from '../recordings/files';
import type { Columns } from '../recordings/arrow-file';
import type { CsvBatch } from './csv';
import type { ImuConversion } from './imu-conversion';
import type { ImuHealth } from './imu-health';
import { FILE_NAMES, rejection } from './problems';
import type { RowReader } from './row-reader';

/** About 44 min at 100 Hz: such a log is one piece and loads without a copy. */
const PIECE_ROWS = 1 << 18;

export class ImuDecoder {
  private readonly raw = new Float64Array(6);
  private readonly body = new Float64Array(6);
  private readonly previous = new Float64Array(6);
  private piece: Float64Array[] = newPiece();
  private rows = 0;
  private lastS = -Infinity;

  constructor(
    private readonly reader: RowReader,
    private readonly conversion: ImuConversion,
    /** Added to every stamp, s. */
    private readonly shiftS: number,
    private readonly health: ImuHealth,
    private readonly write: (columns: Columns) => void,
  ) {}

  /** Throws IntakeRejected for what is no number and for time that runs backwards. */
  push(batch: CsvBatch): void {
    for (let i = 0; i < batch.rows.length; i += 1) this.pushRow(batch.rows[i]!, batch.lines[i]!);
  }

  /** Passes on what is left. */
  finish(): void {
    if (this.rows > 0) this.passOn();
  }

  private pushRow(row: readonly string[], line: number): void {
    const { raw, body } = this;
    const timeS = this.reader.read(row, line, raw) + this.shiftS;
    // NaN spreads through a sum: one test tells whether anything is missing.
    const sum = timeS + raw[0]! + raw[1]! + raw[2]! + raw[3]! + raw[4]! + raw[5]!;
    if (Number.isNaN(sum)) {
      // A row without any of our values belongs to another device of a merged log.
      if (!Number.isNaN(timeS) || raw.some((value) => !Number.isNaN(value))) this.health.addIncomplete(line);
      return;
    }
    this.convert();
    if (timeS <= this.lastS) return this.repeat(timeS, line);
    const { piece, rows } = this;
    piece[0]![rows] = timeS;
    for (let i = 0; i < 6; i += 1) piece[i + 1]![rows] = body[i]!;
    this.previous.set(body);
    this.lastS = timeS;
    this.rows += 1;
    this.health.add(timeS, body);
    if (this.rows === PIECE_ROWS) this.passOn();
  }

  private convert(): void {
    const { source, factor } = this.conversion;
    for (let i = 0; i < 6; i += 1) this.body[i] = this.raw[source[i]!]! * factor[i]!;
  }

  private repeat(timeS: number, line: number): void {
    if (timeS < this.lastS) {
      throw rejection(
        'time-backwards', { file: 'imu', line },
        `In line ${line} of the ${FILE_NAMES.imu} time runs backwards: ${timeS} s after ${this.lastS} s.`,
        'Sort the log by time, or cut it where the clock was set, and upload it again.',
      ); // prettier-ignore
    }
    if (this.body.every((value, i) => value === this.previous[i])) this.health.addDuplicate();
    else this.health.addRepeatedStamp(line);
  }

  private passOn(): void {
    const { piece, rows } = this;
    const whole = rows === PIECE_ROWS;
    this.write(
      Object.fromEntries(IMU_COLUMNS.map((name, i) => [name, whole ? piece[i]! : piece[i]!.slice(0, rows)])),
    );
    this.piece = newPiece();
    this.rows = 0;
  }
}

function newPiece(): Float64Array[] {
  return IMU_COLUMNS.map(() => new Float64Array(PIECE_ROWS));
}
