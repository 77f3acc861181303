/**
 * Raw uploads to a decoded recording: heads are read and mapped first, then each file streams once through its decoder
 * into the store. A fault anywhere throws IntakeRejected; whoever calls clears what was written by then.
 */
import type {
  ChannelMap,
  FileRole,
  HealthReport,
  Strip,
  TimeMap,
  TimeOrigin,
} from '@/shared/contracts/recordings';
import { IDENTITY_AXES, type AxisMap } from '@/shared/contracts/vehicles';
import { ArrowFileWriter, writeTable, type Columns, type WrittenFile } from '../recordings/arrow-file';
import { IMU_COLUMNS, REFERENCE_COLUMNS, SAMPLING_KEY } from '../recordings/files';
import { storeKeys, type Store } from '../store/types';
import { columnIndex } from './cells';
import { columnsOf } from './channel-maps';
import { Clock } from './clock';
import { headerOnly, readRows, type CsvBatch, type CsvHead } from './csv';
import { gnssReport, type GnssReport } from './gnss-health';
import { GnssCollector } from './gnss-table';
import { medianStep } from './guess-time';
import { healthReport } from './health-report';
import { imuConversion, samplingFault, stampShift } from './imu-conversion';
import { ImuDecoder } from './imu-decoder';
import { ImuHealth, type ImuFacts } from './imu-health';
import { FILE_NAMES, rejection } from './problems';
import { ReferenceDecoder } from './reference-decoder';
import { RowReader } from './row-reader';
import { stripOf } from './strip';
import { openText, type RawFile } from './text-source';
import { TrajectoryConversion } from './trajectory-row';

export interface IntakeContext {
  store: Store;
  recordingId: string;
  files: ReadonlyMap<FileRole, RawFile>;
  heads: ReadonlyMap<FileRole, CsvHead>;
  map: ChannelMap;
  vehicleAxes: AxisMap;
  assumed: readonly string[];
  /** Share of all bytes that has been read, 0…1. */
  progress(share: number): void;
  breathe(): Promise<void>;
}

export interface DecodedFiles {
  startS: number;
  endS: number;
  timeOrigin: TimeOrigin;
  health: HealthReport;
  strip: Strip;
  gnss: Columns;
  written: Record<'imu' | 'gnss', WrittenFile> & { reference: WrittenFile | null };
}

/** Rows of the head that the nominal interval is taken from. */
const PROBE_ROWS = 2000;

export async function decodeFiles(context: IntakeContext): Promise<DecodedFiles> {
  const imuClock = clockOf(context, 'imu');
  const originS = proposedOrigin(context, imuClock);
  imuClock.useOrigin(originS);
  const gnss = await decodeGnss(context, originS);
  const { facts: imu, written: imuFile } = await decodeImu(context, imuClock, gnss.report);
  const reference = await decodeReference(context, originS, [imu.startS, imu.endS]);
  const gnssFile = await writeTable(context.store, storeKeys.gnss(context.recordingId), gnss.columns);
  return {
    startS: imu.startS,
    endS: imu.endS,
    timeOrigin: imuClock.timeOrigin(),
    health: healthReport(imu, gnss.report, context.assumed),
    strip: stripOf(imu, gnss.columns),
    gnss: gnss.columns,
    written: { imu: imuFile, gnss: gnssFile, reference },
  };
}

async function decodeImu(context: IntakeContext, clock: Clock, gnss: GnssReport) {
  const map = context.map.imu!;
  const fault = samplingFault(map);
  if (fault)
    throw rejection(
      'sampling',
      { file: 'imu' },
      fault,
      'Correct the units or the sampling on the mapping screen.',
    );
  const nominalS = nominalInterval(context, 'imu', clock);
  const health = new ImuHealth(nominalS, map.sampling);
  const metadata = new Map([[SAMPLING_KEY, map.sampling]]);
  const writer = new ArrowFileWriter(
    context.store,
    storeKeys.imu(context.recordingId),
    IMU_COLUMNS,
    metadata,
  );
  const decoder = new ImuDecoder(
    readerOf(context, 'imu', clock, [...map.gyro.columns, ...map.accel.columns]),
    imuConversion(map, map.axes ?? context.vehicleAxes ?? IDENTITY_AXES),
    stampShift(map.time.stamp, nominalS),
    health,
    (columns) => writer.write(columns),
  );
  try {
    await eachBatch(context, 'imu', (batch) => decoder.push(batch));
    decoder.finish();
    const facts = health.finish();
    if (facts.samples < 2) throw headerOnly('imu');
    checkOverlap(facts, gnss);
    return { facts, written: await writer.finish() };
  } catch (error) {
    await writer.abort(error as Error);
    throw error;
  }
}

async function decodeGnss(context: IntakeContext, originS: number) {
  const map = context.map.gnss!;
  const clock = clockOf(context, 'gnss');
  shareOrigin(context, 'gnss', clock, originS);
  const conversion = new TrajectoryConversion(map, 'gnss');
  const collector = new GnssCollector(
    readerOf(context, 'gnss', clock, conversion.columns),
    conversion,
    stampShift(map.time.stamp, nominalInterval(context, 'gnss', clock)),
  );
  await eachBatch(context, 'gnss', (batch) => collector.push(batch));
  const { columns, facts } = await collector.finish(map.position.heightDatum === 'sea-level');
  if (facts.epochs === 0 && facts.noFixRows > 1)
    throw rejection(
      'no-fix', { file: 'gnss' },
      `The ${FILE_NAMES.gnss} holds ${facts.noFixRows} rows but not one fix.`,
      'Check the position and quality columns on the mapping screen.',
    ); // prettier-ignore
  if (facts.epochs < 2) throw headerOnly('gnss');
  return { columns, report: gnssReport(columns, facts) };
}

async function decodeReference(context: IntakeContext, originS: number, imuSpanS: [number, number]) {
  const map = context.map.reference;
  if (!map || !context.files.has('reference')) return null;
  const clock = clockOf(context, 'reference');
  shareOrigin(context, 'reference', clock, originS);
  const conversion = new TrajectoryConversion(map, 'reference');
  const key = storeKeys.reference(context.recordingId);
  const writer = new ArrowFileWriter(context.store, key, REFERENCE_COLUMNS);
  const decoder = new ReferenceDecoder(
    readerOf(context, 'reference', clock, conversion.columns),
    conversion,
    stampShift(map.time.stamp, nominalInterval(context, 'reference', clock)),
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

/** Streams the rows of a file through `take`, reports progress and lets cancel in. */
async function eachBatch(
  context: IntakeContext,
  role: FileRole,
  take: (batch: CsvBatch) => void | Promise<void>,
): Promise<void> {
  const source = await openText(context.store, context.files.get(role)!);
  const order = [...context.files.keys()].sort((a, b) => FILE_ORDER.indexOf(a) - FILE_ORDER.indexOf(b));
  for await (const batch of readRows(source.chunks, context.heads.get(role)!, role)) {
    await take(batch);
    context.progress((order.indexOf(role) + source.readShare()) / order.length);
    await context.breathe();
  }
}
/** As the files are gone through. */
const FILE_ORDER: FileRole[] = ['gnss', 'imu', 'reference'];

const timeMapOf = (context: IntakeContext, role: FileRole): TimeMap => context.map[role]!.time;

function clockOf(context: IntakeContext, role: FileRole): Clock {
  const head = context.heads.get(role)!;
  const time = timeMapOf(context, role);
  const indices = time.columns.map((name) => columnIndex(head.headers, name));
  return new Clock(time, indices, head.decimalComma);
}

const readerOf = (context: IntakeContext, role: FileRole, clock: Clock, columns: readonly string[]) =>
  new RowReader(context.heads.get(role)!, role, clock, timeMapOf(context, role).columns, columns);

/** The zero of the first row that has a time; rows that cannot be read are told of later, with their line. */
function proposedOrigin(context: IntakeContext, clock: Clock, role: FileRole = 'imu'): number {
  for (const row of context.heads.get(role)!.rows) {
    const proposed = clock.proposedOriginS(row);
    if (proposed !== undefined) return proposed;
  }
  return 0;
}

/** Files tell the same time only when both clocks are absolute or both are plain, unless the map says how they differ. */
function shareOrigin(
  context: IntakeContext,
  role: 'gnss' | 'reference',
  clock: Clock,
  originS: number,
): void {
  const isAbsolute = proposedOrigin(context, clock, role) !== 0;
  if (isAbsolute !== (originS !== 0) && timeMapOf(context, role).offsetS === 0)
    throw rejection(
      'clocks-differ', { file: role, column: timeMapOf(context, role).columns[0]! },
      `The ${FILE_NAMES[role]} tells ${isAbsolute ? 'an absolute time' : 'seconds since some start'}, the IMU file ${isAbsolute ? 'seconds since some start' : 'an absolute time'}.`,
      `Give the seconds that bring the ${FILE_NAMES[role]} onto the IMU’s axis as its offset on the mapping screen.`,
    ); // prettier-ignore
  clock.useOrigin(isAbsolute ? originS : 0);
}

function nominalInterval(context: IntakeContext, role: FileRole, clock: Clock): number {
  const used = new Set(
    columnsOf(context.map[role]!).map((name) => columnIndex(context.heads.get(role)!.headers, name)),
  );
  const times = context.heads
    .get(role)!
    .rows.filter((row) => [...used].some((i) => (row[i] ?? '').trim() !== ''))
    .slice(0, PROBE_ROWS)
    .flatMap((row) => clock.read(row) ?? [])
    .filter((time) => !Number.isNaN(time));
  const step = medianStep(times);
  return Number.isNaN(step) ? 0.01 : step;
}

function checkOverlap(imu: ImuFacts, gnss: GnssReport): void {
  if (gnss.startS < imu.endS && gnss.endS > imu.startS) return;
  throw noOverlap('gnss', [imu.startS, imu.endS], [gnss.startS, gnss.endS]);
}

function noOverlap(role: 'gnss' | 'reference', imu: [number, number], other: [number, number]) {
  const span = ([from, to]: [number, number]) => `${seconds(from)} to ${seconds(to)}`;
  return rejection(
    'no-overlap', { file: role },
    `The ${FILE_NAMES[role]} and the IMU file do not overlap in time: the IMU runs from ${span(imu)}, the ${FILE_NAMES[role]} from ${span(other)} on the same axis.`,
    'Check that both belong to the same drive; where their clocks differ, give the offset on the mapping screen.',
  ); // prettier-ignore
}

const seconds = (value: number) => `${Number(value.toPrecision(12))} s`;
