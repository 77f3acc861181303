/** Rows of an IMU file to columns in SI and body axes, passed on in large pieces so that memory stays flat. */
import { IMU_COLUMNS } from '../recordings/files';
import type { Columns } from '../recordings/arrow-file';
import type { CsvBatch } from './csv';
import { convertSample, type ImuConversion } from './imu-conversion';
import type { ImuHealth } from './imu-health';
import { FILE_NAMES, rejection } from './problems';
import type { RowReader } from './row-reader';
import type { SensorPartner } from './sensor-partner';

export interface ImuRows {
  /** Gives the accelerometer where the rows hold only the gyro. */
  partner: SensorPartner | null;
  /** Rows with a time but without any value of ours belong to another device. */
  othersRows: boolean;
}

/** Rows at the start that are nothing but zeros: the logger ran before its sensor. */
const MAX_ZERO_ROWS = 100;
/** A row may come this many rows late and is put in its place; later than that the clock was set back. */
const MOST_LATE_ROWS = 16;
/** About 44 min at 100 Hz: such a log is one piece and loads without a copy. */
const PIECE_ROWS = 1 << 18;

export class ImuDecoder {
  /** Values that the rows themselves hold. */
  private readonly own: number;
  private readonly raw = new Float64Array(6);
  private readonly body = new Float64Array(6);
  private readonly piece: Float64Array[] = newPiece();
  private rows = 0;
  private lastS = -Infinity;
  private zeroRows = 0;
  /** Gyro samples without the accelerometer's. */
  unpaired = 0;

  constructor(
    private readonly reader: RowReader,
    private readonly conversion: ImuConversion,
    /** Added to every stamp, s. */
    private readonly shiftS: number,
    private readonly health: ImuHealth,
    private readonly write: (columns: Columns) => void,
    private readonly others: ImuRows,
  ) {
    this.own = others.partner ? 3 : 6;
  }

  /** Throws IntakeRejected for what is no number and for time that runs backwards. */
  push(batch: CsvBatch): void | Promise<void> {
    const { partner } = this.others;
    if (partner) return this.pushPaired(batch, partner);
    for (let i = 0; i < batch.rows.length; i += 1) {
      const timeS = this.reader.read(batch.rows[i]!, batch.lines[i]!, this.raw) + this.shiftS;
      if (this.isWhole(timeS, batch.lines[i]!)) this.add(timeS, batch.lines[i]!);
    }
  }

  /** Waits only where the accelerometer's file has to be read on. */
  private async pushPaired(batch: CsvBatch, partner: SensorPartner): Promise<void> {
    for (let i = 0; i < batch.rows.length; i += 1) {
      const line = batch.lines[i]!;
      this.raw.fill(0);
      const timeS = this.reader.read(batch.rows[i]!, line, this.raw) + this.shiftS;
      if (!this.isWhole(timeS, line)) continue;
      if (!partner.reaches(timeS)) await partner.pull(timeS);
      if (partner.sample(timeS, this.raw, 3)) this.add(timeS, line);
      else this.unpaired += 1;
    }
  }

  /** Passes on what is left. */
  finish(): void {
    if (this.rows > 0) this.passOn();
  }

  /** Whether the row that was read is a sample. */
  private isWhole(timeS: number, line: number): boolean {
    const { raw, own, others } = this;
    // NaN spreads through a sum: one test tells whether anything is missing.
    const sum = timeS + raw[0]! + raw[1]! + raw[2]! + raw[3]! + raw[4]! + raw[5]!;
    if (!Number.isNaN(sum)) return true;
    // A row without any of our values belongs to another device of a merged log.
    const empty = raw.every((value, i) => i >= own || Number.isNaN(value));
    if (!empty || (!Number.isNaN(timeS) && !others.othersRows)) this.health.addIncomplete(line);
    return false;
  }

  private add(timeS: number, line: number): void {
    const { body } = this;
    if (this.lastS === -Infinity && this.isStartingUp(line)) return;
    convertSample(this.conversion, this.raw, body);
    if (timeS === this.lastS) return this.repeat(line, this.rows - 1);
    if (timeS < this.lastS) return this.putBack(timeS, line);
    const { piece, rows } = this;
    piece[0]![rows] = timeS;
    for (let i = 0; i < 6; i += 1) piece[i + 1]![rows] = body[i]!;
    this.lastS = timeS;
    this.rows += 1;
    this.health.add(timeS, body);
    if (this.rows === PIECE_ROWS) this.passOn();
  }

  private isStartingUp(line: number): boolean {
    if (this.zeroRows >= MAX_ZERO_ROWS || this.raw.some((value) => value !== 0)) return false;
    this.zeroRows += 1;
    this.health.addIncomplete(line);
    return true;
  }

  /** The stamp of `row` again. */
  private repeat(line: number, row: number): void {
    const { piece } = this;
    if (this.body.every((value, i) => value === piece[i + 1]![row])) this.health.addDuplicate();
    else this.health.addRepeatedStamp(line);
  }

  /** A row that comes late goes where its time belongs. */
  private putBack(timeS: number, line: number): void {
    const { piece, body } = this;
    const earliest = Math.max(0, this.rows - MOST_LATE_ROWS);
    let at = this.rows;
    while (at > earliest && piece[0]![at - 1]! > timeS) at -= 1;
    if (at === earliest || piece[0]![at - 1] === timeS)
      throw rejection(
        'time-backwards', { file: 'imu', line },
        `In line ${line} of the ${FILE_NAMES.imu} time runs backwards: ${timeS} s after ${this.lastS} s.`,
        'Sort the log by time, or cut it where the clock was set, and upload it again.',
      ); // prettier-ignore
    for (const column of piece) column.copyWithin(at + 1, at, this.rows);
    piece[0]![at] = timeS;
    for (let i = 0; i < 6; i += 1) piece[i + 1]![at] = body[i]!;
    this.health.addLate(timeS, this.lastS);
    this.rows += 1;
    if (this.rows === PIECE_ROWS) this.passOn();
  }

  /** The last rows stay: one that comes late may belong between them. */
  private passOn(): void {
    const { piece } = this;
    const kept = this.rows === PIECE_ROWS ? MOST_LATE_ROWS : 0;
    const passed = this.rows - kept;
    this.write(Object.fromEntries(IMU_COLUMNS.map((name, i) => [name, piece[i]!.slice(0, passed)])));
    for (const column of piece) column.copyWithin(0, passed, this.rows);
    this.rows = kept;
  }
}

const newPiece = (): Float64Array[] => IMU_COLUMNS.map(() => new Float64Array(PIECE_ROWS));
