/**
 * The accelerometer where it has a file or rows of its own: streamed beside the gyro, its samples brought onto the gyro's
 * stamps by straight lines between neighbours. Holds no more than what lies between two pieces of its file.
 */
import type { FileRole } from '@/shared/contracts/recordings';
import type { CsvBatch } from './csv';
import { gapLimit } from './imu-health';
import { isCut, type IntakeContext } from './intake-context';
import { FILE_NAMES, rejection } from './problems';
import type { RowReader } from './row-reader';
import { openTable } from './tables';

export interface PartnerSettings {
  role: FileRole;
  /** Reads x, y, z. */
  reader: RowReader;
  /** Added to every stamp, s. */
  shiftS: number;
  nominalS: number;
  /** Increments cannot be drawn out: only samples of the same stamp go together. */
  exact: boolean;
}

/** Of an interval: stamps this close are the same. */
const SAME_STAMP = 0.25;

export class SensorPartner {
  private times: number[] = [];
  private values: Float64Array[] = [];
  /** The sample at or before the last stamp asked for. */
  private at = 0;
  private ended = false;
  private readonly read = new Float64Array(3);
  private readonly limitS: number;

  private constructor(
    private readonly batches: AsyncGenerator<CsvBatch>,
    private readonly settings: PartnerSettings,
  ) {
    this.limitS = gapLimit(settings.nominalS);
  }

  static async open(context: IntakeContext, settings: PartnerSettings): Promise<SensorPartner> {
    const { role } = settings;
    const table = await openTable(context.store, context.files.get(role)!, context.heads.get(role)!, {});
    return new SensorPartner(table.batches, settings);
  }

  async close(): Promise<void> {
    await this.batches.return(undefined);
  }

  /** Whether samples up to `timeS` are at hand; if not, `pull` brings more. */
  reaches(timeS: number): boolean {
    return this.ended || (this.times.at(-1) ?? -Infinity) >= timeS;
  }

  /** Throws IntakeRejected. */
  async pull(timeS: number): Promise<void> {
    this.forget();
    while (!this.reaches(timeS)) {
      const next = await this.batches.next();
      if (next.done) this.ended = true;
      else this.take(next.value);
    }
  }

  /** The vector at a stamp, into `out` from `place` on; false where there is none. Stamps must not fall. */
  sample(timeS: number, out: Float64Array, place: number): boolean {
    const { times, values } = this;
    while (this.at + 1 < times.length && times[this.at + 1]! <= timeS) this.at += 1;
    const { at } = this;
    const [before, after] = [times[at], times[at + 1]];
    if (before === undefined) return false;
    const near = SAME_STAMP * this.settings.nominalS;
    if (Math.abs(timeS - before) <= (this.settings.exact ? near : 1e-9)) return this.copy(at, out, place);
    if (after !== undefined && this.settings.exact && Math.abs(after - timeS) <= near)
      return this.copy(at + 1, out, place);
    if (this.settings.exact || after === undefined || timeS < before || after - before > this.limitS)
      return false;
    const share = (timeS - before) / (after - before);
    for (let i = 0; i < 3; i += 1)
      out[place + i] = values[at]![i]! + share * (values[at + 1]![i]! - values[at]![i]!);
    return true;
  }

  private copy(index: number, out: Float64Array, place: number): true {
    out.set(this.values[index]!, place);
    return true;
  }

  private take(batch: CsvBatch): void {
    try {
      batch.rows.forEach((row, i) => this.add(row, batch.lines[i]!));
    } catch (error) {
      if (!batch.unfinished || !isCut(error)) throw error;
    }
  }

  private add(row: readonly string[], line: number): void {
    const { reader, role, shiftS } = this.settings;
    const timeS = reader.read(row, line, this.read) + shiftS;
    if (Number.isNaN(timeS + this.read[0]! + this.read[1]! + this.read[2]!)) return;
    const last = this.times.at(-1) ?? -Infinity;
    if (timeS < last)
      throw rejection(
        'time-backwards', { file: role, line },
        `In line ${line} of the ${FILE_NAMES[role]} time runs backwards: ${timeS} s after ${last} s.`,
        'Sort the log by time, or cut it where the clock was set, and upload it again.',
      ); // prettier-ignore
    if (timeS === last) return;
    this.times.push(timeS);
    this.values.push(Float64Array.from(this.read));
  }

  private forget(): void {
    this.times = this.times.slice(this.at);
    this.values = this.values.slice(this.at);
    this.at = 0;
  }
}
