/** What all decoders of one intake share: files, heads, map; clocks on one axis; rows with progress and cancel. */
import type { ChannelMap, FileRole, HealthFinding, MapFix, TimeMap } from '@/shared/contracts/recordings';
import type { AxisMap } from '@/shared/contracts/vehicles';
import type { Store } from '../store/types';
import { columnIndex } from './cells';
import { isMerged } from './channel-maps';
import { Clock } from './clock';
import type { CsvBatch, CsvHead } from './csv';
import { medianStep } from './guess-time';
import { FILE_NAMES, IntakeRejected, rejection } from './problems';
import { RowReader, type ReadColumn } from './row-reader';
import type { TableNotes } from './table-notes';
import { openTable } from './tables';
import type { RawFile } from './text-source';

export interface IntakeContext {
  store: Store;
  recordingId: string;
  files: ReadonlyMap<FileRole, RawFile>;
  heads: ReadonlyMap<FileRole, CsvHead>;
  map: ChannelMap;
  vehicleAxes: AxisMap;
  assumed: readonly string[];
  /** Rows of each file after which reading stops: for a preview; Infinity: all. */
  rowLimit: number;
  /** Share of all bytes that has been read, 0…1. */
  progress(share: number): void;
  breathe(): Promise<void>;
}

/** Rows of the head that the nominal interval is taken from. */
const PROBE_ROWS = 2000;
/** As the files are gone through; the IMU's second file is read along with its first. */
const FILE_ORDER: FileRole[] = ['gnss', 'imu', 'reference'];
/** What a row may be refused for when the log broke off in it. */
const CUT_CODES = ['not-a-number', 'not-a-time', 'too-many-cells'];

/** Streams the rows of a file through `take`, reports progress and lets cancel in; answers what was passed over. */
export async function eachBatch(
  context: IntakeContext,
  role: FileRole,
  take: (batch: CsvBatch) => void | Promise<void>,
): Promise<TableNotes> {
  const notes: TableNotes = {};
  const order = FILE_ORDER.filter((one) => context.files.has(one));
  const table = await openTable(context.store, context.files.get(role)!, context.heads.get(role)!, notes);
  let rows = 0;
  for await (const batch of table.batches) {
    try {
      await take(batch);
    } catch (error) {
      if (!batch.unfinished || !isCut(error)) throw error;
      notes.cutLine = batch.lines[0];
    }
    if (order.includes(role)) context.progress((order.indexOf(role) + table.readShare()) / order.length);
    await context.breathe();
    rows += batch.rows.length;
    if (rows >= context.rowLimit) break;
  }
  return notes;
}

export const isCut = (error: unknown) =>
  error instanceof IntakeRejected && error.problems.every(({ code }) => CUT_CODES.includes(code));

/** What was passed over in a file, as findings. */
export function noteFindings(role: FileRole, notes: TableNotes): HealthFinding[] {
  const found: HealthFinding[] = [];
  const add = (code: string, sentence: string, value: number, unit: string, remedy: string) =>
    found.push({ code, severity: 'warn', sentence, figure: { value, unit }, intervalsS: [], remedy });
  if (notes.damagedSentences)
    add(
      'damaged-sentences',
      `${notes.damagedSentences === 1 ? 'One sentence' : `${notes.damagedSentences} sentences`} of the ${FILE_NAMES[role]} had a wrong checksum or broke off, and dropped out (first in line ${notes.firstDamagedLine}).`,
      notes.damagedSentences, 'sentences',
      'Check the speed of the serial line and its buffer.',
    ); // prettier-ignore
  if (notes.cutLine !== undefined)
    add(
      'cut-off',
      `The ${FILE_NAMES[role]} breaks off in line ${notes.cutLine}, which was left out.`,
      notes.cutLine, 'line',
      'The log was probably cut when power went; what comes before is whole.',
    ); // prettier-ignore
  return found;
}

/** A fresh clock: those that count turns remember where they are. */
export function clockOf(context: IntakeContext, role: FileRole, time: TimeMap, originS = 0): Clock {
  const head = context.heads.get(role)!;
  const indices = time.columns.map((name) => columnIndex(head.headers, name));
  const clock = new Clock(time, indices, head.decimalComma);
  clock.useOrigin(originS);
  return clock;
}

export const readerOf = (
  context: IntakeContext,
  role: FileRole,
  clock: Clock,
  time: TimeMap,
  columns: readonly ReadColumn[],
) => new RowReader(context.heads.get(role)!, role, clock, time.columns, columns);

/** The zero of the first row that has a time; rows that cannot be read are told of later, with their line. */
export function proposedOrigin(context: IntakeContext, role: FileRole, time: TimeMap): number {
  const clock = clockOf(context, role, time);
  for (const row of context.heads.get(role)!.rows) {
    const proposed = clock.proposedOriginS(row);
    if (proposed !== undefined) return proposed;
  }
  return 0;
}

/** The zero for another file. Throws IntakeRejected where its clock and the IMU's have nothing in common. */
export function sharedOrigin(context: IntakeContext, role: FileRole, time: TimeMap, originS: number): number {
  if (clocksDiffer(context, role, time, originS)) throw unlikeClocks(context, role, time);
  return originOf(context, role, time, originS);
}

/** Two files tell the same time only when both clocks are absolute or both are plain, unless the map says how they differ. */
export const clocksDiffer = (
  context: IntakeContext,
  role: FileRole,
  time: TimeMap,
  originS: number,
): boolean => isAbsolute(context, role, time) !== (originS !== 0) && time.offsetS === 0;

/** The zero for another file, whether or not its clock is of the IMU's kind. */
export const originOf = (context: IntakeContext, role: FileRole, time: TimeMap, originS: number): number =>
  isAbsolute(context, role, time) ? originS : 0;

/** `fix`: how they are brought together, where the motion tells. */
export function unlikeClocks(context: IntakeContext, role: FileRole, time: TimeMap, fix?: MapFix) {
  const [own, imu] = isAbsolute(context, role, time) ? KINDS : [...KINDS].reverse();
  return rejection(
    'clocks-differ', { file: role, column: time.columns[0]! },
    `The ${FILE_NAMES[role]} tells ${own}, the IMU file ${imu}.`,
    fix ? BY_MOTION : `Give the seconds that bring the ${FILE_NAMES[role]} onto the IMU’s axis as its offset on the mapping screen.`,
    fix,
  ); // prettier-ignore
}
const KINDS = ['an absolute time', 'seconds since some start'] as const;
const BY_MOTION =
  'Both logs show the same motion: accept the shift that lays them over one another, or give another one on the mapping screen.';

const isAbsolute = (context: IntakeContext, role: FileRole, time: TimeMap) =>
  proposedOrigin(context, role, time) !== 0;

/** Median interval of the rows that hold any of `columns`, s. */
export function nominalInterval(
  context: IntakeContext,
  role: FileRole,
  time: TimeMap,
  columns: readonly string[],
): number {
  const head = context.heads.get(role)!;
  const used = columns.map((name) => columnIndex(head.headers, name));
  const clock = clockOf(context, role, time);
  const times = head.rows
    .filter((row) => used.some((i) => (row[i] ?? '').trim() !== ''))
    .slice(0, PROBE_ROWS)
    .flatMap((row) => clock.read(row) ?? [])
    .filter((at) => !Number.isNaN(at));
  const step = medianStep(times);
  return Number.isNaN(step) ? 0.01 : step;
}

export const merged = (context: IntakeContext) => isMerged(context.heads);

export function noOverlap(
  role: 'gnss' | 'reference',
  imu: [number, number],
  other: [number, number],
  fix?: MapFix,
) {
  const span = ([from, to]: [number, number]) => `${seconds(from)} to ${seconds(to)}`;
  return rejection(
    'no-overlap', { file: role },
    `The ${FILE_NAMES[role]} and the IMU file do not overlap in time: the IMU runs from ${span(imu)}, the ${FILE_NAMES[role]} from ${span(other)} on the same axis.`,
    fix ? BY_MOTION : `Check that both belong to the same drive; where their clocks differ, give the offset on the mapping screen: ${seconds(imu[0] - other[0])} on the times of the ${FILE_NAMES[role]} would make both begin together.`,
    fix,
  ); // prettier-ignore
}

const seconds = (value: number) => `${Number(value.toFixed(6))} s`;
