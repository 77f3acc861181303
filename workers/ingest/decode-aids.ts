/** Barometer, heading and odometer out of whichever file holds them, thinned to what a filter can use, into the store. */
import type { FileRole, HealthFinding } from '@/shared/contracts/recordings';
import { AID_FILE_COLUMNS, AID_KINDS, type AidKind } from '../recordings/aids';
import { ArrowFileWriter, type WrittenFile } from '../recordings/arrow-file';
import { storeKeys } from '../store/types';
import { aidConverter, type AidConverter } from './aid-conversion';
import { aidPlace, type AidPlace } from './aid-place';
import type { CellParser } from './angles';
import { numberIn } from './cells';
import type { CsvBatch } from './csv';
import { finding } from './finding';
import { clockOf, eachBatch, readerOf, sharedOrigin, type IntakeContext } from './intake-context';
import { sensorRoles } from './map-columns';
import type { RowReader } from './row-reader';

export interface DecodedAids {
  written: Partial<Record<AidKind, WrittenFile>>;
  findings: HealthFinding[];
}

/** A log may repeat a reading beside every IMU sample: nothing comes oftener than this, s. */
const SPACING_S = 0.045;
/** A reading that stays the same counts again after this, s. */
const HELD_S = 0.5;
const PIECE_ROWS = 1 << 14;

const NAMES: Record<AidKind, string> = {
  barometer: 'barometer',
  heading: 'heading sensor',
  odometer: 'odometer',
};

/** Throws IntakeRejected for clocks that do not go together; what is no number counts as missing. */
export async function decodeAids(context: IntakeContext, imuOriginS: number): Promise<DecodedAids> {
  const sinks = AID_KINDS.flatMap((kind) => {
    const place = aidPlace(kind, context.map, context.heads);
    return place ? [sinkOf(context, kind, place, imuOriginS)] : [];
  });
  const decoded: DecodedAids = { written: {}, findings: [] };
  try {
    for (const role of new Set(sinks.map((sink) => sink.role))) await readFile(context, role, sinks);
    for (const sink of sinks) {
      sink.readings.finish();
      decoded.findings.push(findingOf(sink));
      if (sink.readings.count > 0) decoded.written[sink.kind] = await sink.writer.finish();
      else await sink.writer.abort(new Error('No reading.'));
    }
    return decoded;
  } catch (error) {
    for (const { writer } of sinks) await writer.abort(error as Error);
    throw error;
  }
}

interface Sink {
  kind: AidKind;
  role: FileRole;
  readings: ThinnedReadings;
  writer: ArrowFileWriter;
}

/** One pass over a file for all sensors in it. */
async function readFile(context: IntakeContext, role: FileRole, sinks: readonly Sink[]): Promise<void> {
  const own = sinks.filter((sink) => sink.role === role);
  await eachBatch(context, role, (batch) => {
    for (const { readings } of own) readings.push(batch);
  });
}

function sinkOf(context: IntakeContext, kind: AidKind, place: AidPlace, imuOriginS: number): Sink {
  const { role, time } = place;
  const { column, sigma } = context.map.aids![kind]!;
  const isImu = role === sensorRoles(context.map.imu!, context.heads).gyro;
  const originS = isImu ? imuOriginS : sharedOrigin(context, role, time, imuOriginS);
  const columns = [column, ...(sigma ? [sigma] : [])].map((name) => ({ name, parse: lenient }));
  const reader = readerOf(context, role, clockOf(context, role, time, originS), time, columns);
  const names = AID_FILE_COLUMNS[kind];
  const writer = new ArrowFileWriter(context.store, storeKeys.aid(context.recordingId, kind), names);
  const readings = new ThinnedReadings(reader, aidConverter(kind, context.map.aids!), (piece) =>
    writer.write(Object.fromEntries(names.map((name, i) => [name, piece[i]!]))),
  );
  return { kind, role, readings, writer };
}

const findingOf = ({ kind, readings: { count } }: Sink): HealthFinding =>
  count > 0
    ? finding('aid', 'info', `The ${NAMES[kind]} gives ${count} readings.`, {
        figure: { value: count, unit: 'readings' },
      })
    : finding('aid-empty', 'warn', `The column of the ${NAMES[kind]} holds no reading.`, {
        remedy: 'Choose another column on the mapping screen, or none.',
      });

/** Text where a reading should be is a reading that is missing: a log is not refused for a sensor beside. */
const lenient: CellParser = (cell, decimalComma) => numberIn(cell, decimalComma) ?? NaN;

class ThinnedReadings {
  private readonly read = new Float64Array(2).fill(NaN);
  private piece: number[][] = [[], [], []];
  private takenS = -Infinity;
  private taken = NaN;
  private lastS = -Infinity;
  count = 0;

  constructor(
    private readonly reader: RowReader,
    private readonly convert: AidConverter,
    private readonly write: (piece: Float64Array[]) => void,
  ) {}

  push(batch: CsvBatch): void {
    for (let i = 0; i < batch.rows.length; i += 1) {
      const timeS = this.reader.read(batch.rows[i]!, batch.lines[i]!, this.read);
      const value = this.read[0]!;
      const sinceS = timeS - this.takenS;
      if (Number.isNaN(timeS + value) || !(sinceS >= SPACING_S)) continue;
      if (value === this.taken && sinceS < HELD_S) continue;
      this.takenS = timeS;
      this.taken = value;
      const reading = this.convert(timeS, value, this.read[1]!);
      if (reading && reading.timeS > this.lastS) this.add(reading.timeS, reading.value, reading.sigma);
    }
    if (this.piece[0]!.length >= PIECE_ROWS) this.passOn();
  }

  finish(): void {
    if (this.piece[0]!.length > 0) this.passOn();
  }

  private add(timeS: number, value: number, sigma: number): void {
    this.lastS = timeS;
    this.count += 1;
    [timeS, value, sigma].forEach((one, i) => this.piece[i]!.push(one));
  }

  private passOn(): void {
    this.write(this.piece.map((column) => Float64Array.from(column)));
    this.piece = [[], [], []];
  }
}
