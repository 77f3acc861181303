/** The fixes and the reference trajectory of a recording. */
import type { HealthFinding } from '@/shared/contracts/recordings';
import { ArrowFileWriter, type Columns, type WrittenFile } from '../recordings/arrow-file';
import { GNSS_COLUMNS, REFERENCE_COLUMNS } from '../recordings/files';
import { storeKeys } from '../store/types';
import { columnIndex } from './cells';
import { headerOnly } from './csv';
import { gnssReport, type GnssReport } from './gnss-health';
import { GnssCollector } from './gnss-table';
import { medianStep } from './guess-time';
import { stampShift } from './imu-conversion';
import {
  clockOf,
  eachBatch,
  merged,
  nominalInterval,
  noOverlap,
  noteFindings,
  originOf,
  readerOf,
  sharedOrigin,
  type IntakeContext,
} from './intake-context';
import { columnsOf } from './map-columns';
import { FILE_NAMES, rejection } from './problems';
import { ReferenceDecoder } from './reference-decoder';
import { TrajectoryConversion } from './trajectory-row'; // prettier-ignore

export interface DecodedGnss {
  columns: Columns;
  report: GnssReport;
  findings: HealthFinding[];
}

/** Throws IntakeRejected. */
export async function decodeGnss(context: IntakeContext, imuOriginS: number): Promise<DecodedGnss> {
  const map = context.map.gnss!;
  // Clocks that differ are told of when both logs have been read, and their motion compared; a preview tells at once.
  const origin = context.rowLimit === Infinity ? originOf : sharedOrigin;
  const originS = origin(context, 'gnss', map.time, imuOriginS);
  const conversion = new TrajectoryConversion(map, 'gnss');
  const collector = new GnssCollector(
    readerOf(context, 'gnss', clockOf(context, 'gnss', map.time, originS), map.time, conversion.columns),
    conversion,
    stampShift(map.time.stamp, trackInterval(context, 'gnss')),
    { othersRows: merged(context), heldForS: map.repeats === 'drop' ? 1.5 * changeInterval(context) : null },
  );
  const notes = await eachBatch(context, 'gnss', (batch) => collector.push(batch));
  const { columns, facts } = await collector.finish(map.position.heightDatum === 'sea-level');
  if (facts.epochs === 0 && facts.noFixRows > 1)
    throw rejection(
      'no-fix', { file: 'gnss' },
      `The ${FILE_NAMES.gnss} holds ${facts.noFixRows} rows but not one fix.`,
      'Check the position and quality columns on the mapping screen.',
    ); // prettier-ignore
  if (facts.epochs < 2) throw headerOnly('gnss');
  return { columns, report: gnssReport(columns, facts), findings: noteFindings('gnss', notes) };
}

/** Of an IMU log by itself: it serves to find the sensor's noise. */
export function noGnss(): DecodedGnss {
  const columns = Object.fromEntries(GNSS_COLUMNS.map((name) => [name, new Float64Array()]));
  const facts = { epochs: 0, noFixRows: 0, duplicates: 0, outOfOrder: 0 };
  return { columns, report: gnssReport(columns, facts), findings: [] };
}

const trackInterval = (context: IntakeContext, role: 'gnss' | 'reference') =>
  nominalInterval(context, role, context.map[role]!.time, columnsOf(context.map[role]!));

/** Where fixes are held over many rows: the median time between changes, s. */
function changeInterval(context: IntakeContext): number {
  const { time, position } = context.map.gnss!;
  const head = context.heads.get('gnss')!;
  const clock = clockOf(context, 'gnss', time);
  const at = [position.lat, position.lon].map((name) => columnIndex(head.headers, name));
  const times: number[] = [];
  let before = ',';
  for (const row of head.rows) {
    const place = at.map((i) => row[i]?.trim() ?? '').join();
    const timeS = clock.read(row);
    if (place === before || timeS === undefined || Number.isNaN(timeS)) continue;
    before = place;
    times.push(timeS);
  }
  const step = medianStep(times);
  return Number.isNaN(step) ? 1 : step;
}

/** Null where there is none. Throws IntakeRejected; what was written by then is removed. */
export async function decodeReference(
  context: IntakeContext,
  imuOriginS: number,
  imuSpanS: [number, number],
): Promise<WrittenFile | null> {
  const map = context.map.reference;
  if (!map || !context.files.has('reference')) return null;
  const originS = sharedOrigin(context, 'reference', map.time, imuOriginS);
  const conversion = new TrajectoryConversion(map, 'reference');
  const key = storeKeys.reference(context.recordingId);
  const writer = new ArrowFileWriter(context.store, key, REFERENCE_COLUMNS);
  const clock = clockOf(context, 'reference', map.time, originS);
  const decoder = new ReferenceDecoder(
    readerOf(context, 'reference', clock, map.time, conversion.columns),
    conversion,
    stampShift(map.time.stamp, trackInterval(context, 'reference')),
    map.position.heightDatum === 'sea-level',
    (columns) => writer.write(columns),
  );
  try {
    await eachBatch(context, 'reference', (batch) => decoder.push(batch));
    await decoder.finish();
    if (decoder.rows < 2) throw headerOnly('reference');
    const [from, to] = decoder.spanS;
    if (from > imuSpanS[1] || to < imuSpanS[0]) throw noOverlap('reference', imuSpanS, [from, to]);
    return await writer.finish();
  } catch (error) {
    await writer.abort(error as Error);
    throw error;
  }
}
