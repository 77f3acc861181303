/** Which column is the time, and what it counts: from its header where that says so, else from the values. */
import type { FileRole, TimeMap } from '@/shared/contracts/recordings';
import { numberIn } from './cells';
import type { CsvHead } from './csv';
import type { ColumnFinder } from './find-columns';
import { namesOtherDevice } from './header-words';
import { parseIsoTime } from './utc';
import { NANOSECONDS_WORDS, SECONDS_WORDS, TIME_OF_WEEK_WORDS, TIME_WORDS, WEEK_WORDS } from './vocabulary';

export interface GuessedTime {
  map: TimeMap;
  /** Set where the header did not say what the column counts. */
  assumed: string | null;
}

type CountBase = 's' | 'ms' | 'us' | 'ns';
const BASES: readonly CountBase[] = ['s', 'ms', 'us', 'ns'];
const SCALE: Record<CountBase, number> = { s: 1, ms: 1e-3, us: 1e-6, ns: 1e-9 };
/** Intervals that a log of each kind can have, s. */
const PLAUSIBLE_S: Record<FileRole, readonly [number, number]> = {
  imu: [2e-4, 0.2],
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
    single(head, finder, role) ??
    byNamePart(head, role)
  );
}

function single(head: CsvHead, finder: ColumnFinder, role: FileRole): GuessedTime | null {
  const own = (header: string) => !namesOtherDevice(header, role);
  const found = finder.find(TIME_WORDS, own) ?? finder.find(TIME_OF_WEEK_WORDS, own);
  return found && fromValues(head, found.header, found.index, found.unit, role);
}

function weekAndSeconds(finder: ColumnFinder): GuessedTime | null {
  const week = finder.find(WEEK_WORDS);
  const ofWeek = finder.find(TIME_OF_WEEK_WORDS) ?? finder.find(TIME_WORDS);
  if (!week || !ofWeek || (ofWeek.unit !== null && ofWeek.unit !== 's')) return null;
  return named([week.header, ofWeek.header], 'gps-week+s');
}

function secondsAndNanoseconds(finder: ColumnFinder, role: FileRole): GuessedTime | null {
  const own = (header: string) => !namesOtherDevice(header, role);
  const seconds = finder.find(SECONDS_WORDS, own);
  const nanoseconds = finder.find(NANOSECONDS_WORDS, own);
  return seconds && nanoseconds ? named([seconds.header, nanoseconds.header], 's+ns') : null;
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
  const first = head.rows.map((row) => row[index]?.trim() ?? '').find((cell) => cell !== '');
  if (first !== undefined && parseIsoTime(first)) return named([header], 'iso8601');
  const values = valuesOf(head, index);
  // Text in the first row is told later, with its line; only a column without any number is no time.
  if (values.length === 0 && head.rows.length > 0) return null;
  if (unit !== null && unit !== 'iso8601') return named([header], unit as CountBase);
  const base = baseOf(values, PLAUSIBLE_S[role]);
  const assumed = `The time column “${header}” names no unit: taken as ${BASE_WORDS[base]}.`;
  return { ...named([header], base), assumed };
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

const named = (columns: string[], base: TimeMap['base']): GuessedTime => ({
  map: { columns, base, offsetS: 0, stamp: 'end' },
  assumed: null,
});
