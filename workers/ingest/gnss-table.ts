/** The fixes of a GNSS file, gathered in memory (a receiver gives few), put in order, one row an epoch. */
import { GNSS_COLUMNS } from '../recordings/files';
import type { Columns } from '../recordings/arrow-file';
import type { CsvBatch } from './csv';
import { seaLevelToEllipsoid } from './geoid';
import type { RowReader } from './row-reader';
import { ROW, ROW_LENGTH, type TrajectoryConversion } from './trajectory-row';

export interface GnssFacts {
  epochs: number;
  /** Rows without time or without any measurement, or that the receiver calls no fix. */
  noFixRows: number;
  /** Rows that gave a second position for one stamp. */
  duplicates: number;
  outOfOrder: number;
}

export interface GnssRows {
  /** Rows with a time but without a place belong to another device. */
  othersRows: boolean;
  /** Rows that repeat the fix before are left out; a fix that stays the same for longer than this counts again, s. */
  heldForS: number | null;
}

interface Fix {
  timeS: number;
  /** Values after the time, as GNSS_COLUMNS has them. */
  values: Float64Array;
}

export class GnssCollector {
  private readonly read: Float64Array;
  private readonly before: Float64Array;
  private takenS = -Infinity;
  private readonly fixes: Fix[] = [];
  private noFixRows = 0;
  private outOfOrder = 0;
  private duplicates = 0;

  constructor(
    private readonly reader: RowReader,
    private readonly conversion: TrajectoryConversion,
    private readonly shiftS: number,
    private readonly others: GnssRows,
  ) {
    this.read = new Float64Array(conversion.columns.length);
    this.before = new Float64Array(conversion.columns.length).fill(NaN);
  }

  push(batch: CsvBatch): void {
    for (let i = 0; i < batch.rows.length; i += 1) this.pushRow(batch.rows[i]!, batch.lines[i]!);
  }

  async finish(seaLevel: boolean): Promise<{ columns: Columns; facts: GnssFacts }> {
    const fixes = this.ordered();
    const columns: Columns = {};
    GNSS_COLUMNS.forEach((name, i) => {
      columns[name] = Float64Array.from(fixes, (fix) => (i === 0 ? fix.timeS : fix.values[i - 1]!));
    });
    if (seaLevel) await seaLevelToEllipsoid(columns.lat_deg!, columns.lon_deg!, columns.height_m!);
    const { noFixRows, duplicates, outOfOrder } = this;
    return { columns, facts: { epochs: fixes.length, noFixRows, duplicates, outOfOrder } };
  }

  private pushRow(row: readonly string[], line: number): void {
    const timeS = this.reader.read(row, line, this.read) + this.shiftS;
    // Neither time nor place: a row of another device in a merged log.
    const placeless = Number.isNaN(this.read[0]!) && Number.isNaN(this.read[1]!);
    if (placeless && (Number.isNaN(timeS) || (this.others.othersRows && this.read.every(Number.isNaN))))
      return;
    if (this.isHeld(timeS)) return;
    const values = new Float64Array(ROW_LENGTH);
    const hasFix = !Number.isNaN(timeS) && !this.conversion.isNoFix(this.read);
    if (hasFix) this.conversion.convert(this.read, line, values);
    if (!hasFix || !holdsMeasurement(values)) {
      this.noFixRows += 1;
      return;
    }
    if (timeS < (this.fixes.at(-1)?.timeS ?? -Infinity)) this.outOfOrder += 1;
    this.fixes.push({ timeS, values });
  }

  /** Whether the row only holds the fix before. */
  private isHeld(timeS: number): boolean {
    const { heldForS } = this.others;
    if (heldForS === null) return false;
    const same = this.read.every((value, i) => Object.is(value, this.before[i]));
    if (same && timeS - this.takenS < heldForS) return true;
    this.before.set(this.read);
    this.takenS = timeS;
    return false;
  }

  /** By time; rows of one epoch become one, the first value of each column standing. */
  private ordered(): Fix[] {
    if (this.outOfOrder > 0) this.fixes.sort((a, b) => a.timeS - b.timeS);
    const kept: Fix[] = [];
    for (const fix of this.fixes) {
      const last = kept.at(-1);
      if (last?.timeS !== fix.timeS) {
        kept.push(fix);
        continue;
      }
      // Receivers often give position and velocity of one epoch on two rows; two positions are one too many.
      const twice = !Number.isNaN(last.values[ROW.lat]! + fix.values[ROW.lat]!);
      const repeated =
        this.others.othersRows && fix.values.every((value, i) => Object.is(value, last.values[i]));
      if (twice && !repeated) this.duplicates += 1;
      fix.values.forEach((value, i) => {
        if (Number.isNaN(last.values[i]!)) last.values[i] = value;
      });
    }
    return kept;
  }
}

/** A position in the plane, or a horizontal velocity. */
const holdsMeasurement = (values: Float64Array) =>
  !Number.isNaN(values[ROW.lat]! + values[ROW.lon]!) ||
  !Number.isNaN(values[ROW.velocity]! + values[ROW.velocity + 1]!);
