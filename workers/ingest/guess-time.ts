/** Which column is the time, and what it counts: from its header where that says so, else from the values. */
import type { ChannelGuess, FileRole, TimeMap } from '@/shared/contracts/recordings';
import { numberIn } from './cells';
import type { CsvHead } from './csv';
import type { ColumnFinder } from './find-columns';
import { guessed } from './guess';
import { namesOtherDevice } from './header-words';
import { dateOrderOf, parseDate, parseDateTime, parseTimeOfDay, type DateOrder } from './written-time';
import {
  DATE_WORDS,
  NANOSECONDS_WORDS,
  SECONDS_WORDS,
  TIME_OF_WEEK_WORDS,
  TIME_WORDS,
  WEEK_WORDS,
} from './vocabulary';

export interface GuessedTime {
  map: TimeMap;
  /** Set where the header did not say what the column counts. */
  assumed: string | null;
  guess: ChannelGuess;
}

type CountBase = 's' | 'ms' | 'us' | 'ns';
const BASES: readonly CountBase[] = ['s', 'ms', 'us', 'ns'];
const SCALE: Record<CountBase, number> = { s: 1, ms: 1e-3, us: 1e-6, ns: 1e-9 };
/** Intervals that a log of each kind can have, s. */
const PLAUSIBLE_S: Record<FileRole, readonly [number, number]> = {
  imu: [2e-4, 0.2],
  imu2: [2e-4, 0.2],
  aids: [2e-3, 12],
  gnss: [0.01, 12],
  reference: [5e-4, 12],
};
const BASE_WORDS: Record<CountBase, string> = {
  s: 'seconds',
  ms: 'milliseconds',
  us: 'microseconds',
  ns: 'nanoseconds',
};

export function guessTime(head: CsvHead, finder: ColumnFinder, role: FileRole): GuessedTime | null {
  return (
    secondsAndNanoseconds(finder, role) ??
    weekAndSeconds(finder) ??
    dateAndTime(head, finder, role) ??
    single(head, finder, role) ??
    byNamePart(head, role) ??
    borrowed(head, finder, role)
  );
}

/** Of a column that no header names. */
export const timeByStep = (head: CsvHead, index: number, role: FileRole): GuessedTime =>
  counted(head, head.headers[index]!, index, role);

function single(head: CsvHead, finder: ColumnFinder, role: FileRole): GuessedTime | null {
  const own = (header: string) => !namesOtherDevice(header, role) && !isEmptyColumn(head, header);
  const found = finder.find(TIME_WORDS, own) ?? finder.find(TIME_OF_WEEK_WORDS, own);
  return found && fromValues(head, found.header, found.index, found.unit, role);
}

/** The time of another device, where every row has it: an IMU that is stamped by its receiver. */
function borrowed(head: CsvHead, finder: ColumnFinder, role: FileRole): GuessedTime | null {
  const filled = (header: string) =>
    textsOf(head, head.headers.indexOf(header)).length >= 0.9 * head.rows.length;
  const found = finder.find(TIME_WORDS, filled);
  return found && fromValues(head, found.header, found.index, found.unit, role);
}

/** A column without any value in the head tells no time, whatever it is called. */
const isEmptyColumn = (head: CsvHead, header: string) =>
  head.rows.length > 0 && textsOf(head, head.headers.indexOf(header)).length === 0;

/** The day in one column, the time of day in another. */
function dateAndTime(head: CsvHead, finder: ColumnFinder, role: FileRole): GuessedTime | null {
  const own = (header: string) => !namesOtherDevice(header, role);
  const date = finder.find(DATE_WORDS, own);
  if (!date) return null;
  const dates = textsOf(head, date.index);
  const order = dateOrderOf(dates) ?? 'dmy';
  if (dates.length === 0 || parseDate(dates[0]!, order) === null || parseDateTime(dates[0]!, order))
    return null;
  const ofDay = head.headers.findIndex((header, i) => {
    const first = textsOf(head, i)[0];
    return (
      i !== date.index &&
      /time|utc|hhmmss|clock/i.test(header) &&
      first !== undefined &&
      parseTimeOfDay(first)
    );
  });
  if (ofDay < 0) return null;
  const columns = [date.header, head.headers[ofDay]!];
  const reason = `“${columns[0]}” holds dates and “${columns[1]}” times of day, taken as UTC.`;
  return withOrder(named(columns, 'date+time', 0.9, reason), order, dates);
}

function weekAndSeconds(finder: ColumnFinder): GuessedTime | null {
  const week = finder.find(WEEK_WORDS);
  const ofWeek = finder.find(TIME_OF_WEEK_WORDS) ?? finder.find(TIME_WORDS);
  if (!week || !ofWeek || (ofWeek.unit !== null && ofWeek.unit !== 's')) return null;
  const columns = [week.header, ofWeek.header];
  return named(columns, 'gps-week+s', 0.95, 'The headers name the GPS week and the seconds in it.');
}

function secondsAndNanoseconds(finder: ColumnFinder, role: FileRole): GuessedTime | null {
  const own = (header: string) => !namesOtherDevice(header, role);
  const seconds = finder.find(SECONDS_WORDS, own);
  const nanoseconds = finder.find(NANOSECONDS_WORDS, own);
  if (!seconds || !nanoseconds) return null;
  const columns = [seconds.header, nanoseconds.header];
  return named(columns, 's+ns', 0.95, 'The headers name whole seconds and nanoseconds.');
}

/** Any other column whose name speaks of time and whose values only grow. */
function byNamePart(head: CsvHead, role: FileRole): GuessedTime | null {
  for (const [index, header] of head.headers.entries()) {
    if (!/time|stamp|clock/i.test(header) || namesOtherDevice(header, role)) continue;
    const values = valuesOf(head, index);
    const growing = values.every((value, i) => i === 0 || value >= values[i - 1]!);
    if (values.length >= 2 && growing && values.at(-1)! > values[0]!)
      return fromValues(head, header, index, null, role);
  }
  return null;
}

function fromValues(
  head: CsvHead,
  header: string,
  index: number,
  unit: string | null,
  role: FileRole,
): GuessedTime | null {
  const written = fromText(head, header, index);
  if (written) return written;
  const values = valuesOf(head, index);
  // Text in the first row is told later, with its line; only a column without any number is no time.
  if (values.length === 0 && head.rows.length > 0) return null;
  const step = medianStep(values);
  if (/gps/i.test(header) && (values[0] ?? 0) > 2e8 && unit !== 'ms')
    return named([header], 'gps-s', 0.8, `“${header}” counts seconds of GPS time since 1980.`);
  if (unit !== null && unit !== 'iso8601') {
    const base = unit as CountBase;
    const [shortest, longest] = PLAUSIBLE_S[role];
    const fits =
      Number.isNaN(step) || (step * SCALE[base] >= shortest / 4 && step * SCALE[base] <= longest * 4);
    const reason = fits
      ? `The header “${header}” says ${BASE_WORDS[base]}.`
      : `The header “${header}” says ${BASE_WORDS[base]}, but the values step by ${step}, which is unusual for that.`;
    return named([header], base, fits ? 0.98 : 0.4, reason);
  }
  return counted(head, header, index, role);
}

/** A count whose unit only its step tells. */
function counted(head: CsvHead, header: string, index: number, role: FileRole): GuessedTime {
  const values = valuesOf(head, index);
  const step = medianStep(values);
  const base = baseOf(values, PLAUSIBLE_S[role]);
  const assumed = `The time column “${header}” names no unit: taken as ${BASE_WORDS[base]}.`;
  const reason = `“${header}” names no unit; its values step by ${step}, a usual interval in ${BASE_WORDS[base]}.`;
  return { ...named([header], base, Number.isNaN(step) ? 0.5 : 0.85, reason), assumed };
}

/** Dates with times, or times of day. */
function fromText(head: CsvHead, header: string, index: number): GuessedTime | null {
  const texts = textsOf(head, index);
  const first = texts[0];
  if (first === undefined || !/\D/.test(first.replace(/[.,]/g, ''))) return null;
  const order = dateOrderOf(texts) ?? 'mdy';
  if (parseDateTime(first, order)) {
    const reason = `“${header}” holds dates with times${/[zZ]|UTC|[-+]\d{2}:?\d{2}$/.test(first) ? '' : ' without a zone, taken as UTC'}.`;
    return withOrder(named([header], 'iso8601', 0.95, reason), order, texts);
  }
  if (/:/.test(first) && parseTimeOfDay(first))
    return named([header], 'time-of-day', 0.9, `“${header}” holds times of day without a date.`);
  return null;
}

/** Day and month may be told apart by no value: then that is said. */
function withOrder(time: GuessedTime, order: DateOrder, texts: readonly string[]): GuessedTime {
  if (order === 'ymd') return time;
  const map = { ...time.map, dateOrder: order };
  if (dateOrderOf(texts) !== null) return { ...time, map };
  const assumed = `The dates in “${map.columns[0]}” may be read in two ways: taken as ${order === 'dmy' ? 'day, month' : 'month, day'}, year.`;
  return { map, assumed, guess: { ...time.guess, confidence: 0.5 } };
}

/** The first base that makes the step of the values a usual one; without such a step, from the size of an absolute clock. */
function baseOf(values: readonly number[], [shortest, longest]: readonly [number, number]): CountBase {
  const step = medianStep(values);
  const fitting = BASES.find((base) => step * SCALE[base] >= shortest && step * SCALE[base] <= longest);
  if (fitting) return fitting;
  const size = Math.abs(values[0] ?? 0);
  return size > 1e17 ? 'ns' : size > 1e14 ? 'us' : size > 1e11 ? 'ms' : 's';
}

/** Median of the positive differences; NaN where there are none. */
export function medianStep(values: readonly number[]): number {
  const steps: number[] = [];
  for (let i = 1; i < values.length; i += 1)
    if (values[i]! > values[i - 1]!) steps.push(values[i]! - values[i - 1]!);
  steps.sort((a, b) => a - b);
  return steps.length === 0 ? NaN : steps[steps.length >> 1]!;
}

function valuesOf(head: CsvHead, index: number): number[] {
  return head.rows.flatMap((row) => {
    const value = numberIn(row[index], head.decimalComma);
    return value === undefined || Number.isNaN(value) ? [] : [value];
  });
}

const textsOf = (head: CsvHead, index: number) =>
  head.rows.map((row) => row[index]?.trim() ?? '').filter((cell) => cell !== '');

const named = (
  columns: string[],
  base: TimeMap['base'],
  confidence: number,
  reason: string,
): GuessedTime => ({
  map: { columns, base, offsetS: 0, stamp: 'end' },
  assumed: null,
  guess: guessed('time', columns, base, confidence, reason),
});
