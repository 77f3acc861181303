/** Barometer, heading and odometer among the columns of any file: by name, and by the size of their values. */
import type { AidsMap, ChannelGuess, ChannelMap, FileRole } from '@/shared/contracts/recordings';
import { numberIn } from './cells';
import type { CsvHead } from './csv';
import { ColumnFinder, type FoundColumn } from './find-columns';
import { guessed } from './guess';
import { AID_WORDS } from './vocabulary';

export interface GuessedAids {
  map: AidsMap;
  guesses: { role: FileRole; guess: ChannelGuess }[];
}

type BarometerUnit = NonNullable<AidsMap['barometer']>['unit'];
const PRESSURES: readonly (readonly [BarometerUnit, number, number])[] = [
  ['hPa', 300, 1100],
  ['Pa', 30_000, 110_000],
  ['kPa', 30, 110],
];
/** Their own file first: there a plain “height” or “speed” is theirs too. */
const ORDER: readonly FileRole[] = ['aids', 'imu', 'gnss'];

/** `used`: what the files are mapped to otherwise; a column is not taken twice. */
export function guessAids(heads: ReadonlyMap<FileRole, CsvHead>, used: ChannelMap): GuessedAids {
  const result: GuessedAids = { map: {}, guesses: [] };
  const taken = JSON.stringify(used);
  for (const role of ORDER) {
    const head = heads.get(role);
    if (!head || (role === 'gnss' && head === heads.get('imu'))) continue;
    const finder = new ColumnFinder(head);
    const free = (header: string) => !taken.includes(JSON.stringify(header)) || role === 'aids';
    const find = (words: (typeof AID_WORDS)[keyof typeof AID_WORDS]) => finder.find(words, free);
    if (!result.map.barometer) addBarometer(result, role, head, find);
    if (!result.map.heading) addHeading(result, role, head, find);
    if (!result.map.odometer) addOdometer(result, role, head, find);
  }
  return result;
}

type Find = (words: (typeof AID_WORDS)[keyof typeof AID_WORDS]) => FoundColumn | null;

function addBarometer(result: GuessedAids, role: FileRole, head: CsvHead, find: Find): void {
  const height = find(AID_WORDS.barometricHeight) ?? (role === 'aids' ? find(AID_WORDS.plainHeight) : null);
  const pressure = find(AID_WORDS.pressure);
  const column = height ?? pressure;
  if (!column || !holdsValues(head, column)) return;
  const size = typical(head, column);
  const bySize = PRESSURES.find(([, from, to]) => size >= from && size <= to)?.[0];
  const unit = (column === height ? (height.unit ?? 'm') : (column.unit ?? bySize)) as BarometerUnit | undefined;
  if (!unit) return;
  const reason = column.unit ? `The header “${column.header}” says ${unit}.` : `“${column.header}” names no unit; values of about ${size} are ${unit}.`;
  result.map.barometer = { column: column.header, file: role, unit };
  result.guesses.push({ role, guess: guessed('barometer', [column.header], unit, column.unit ? 0.9 : 0.7, reason) });
} // prettier-ignore

function addHeading(result: GuessedAids, role: FileRole, head: CsvHead, find: Find): void {
  const column = find(AID_WORDS.heading);
  if (!column || !holdsValues(head, column)) return;
  const values = valuesOf(head, column).map(Math.abs);
  const unit = column.unit === 'rad' || (column.unit === null && Math.max(...values) <= 2 * Math.PI) ? 'rad' : 'deg';
  const magnetic = /mag|compass/i.test(column.header);
  const reason = `The header “${column.header}” means heading${magnetic ? ', by the magnetic field: give the declination' : ''}; taken in ${unit}.`;
  result.map.heading = { column: column.header, file: role, unit };
  result.guesses.push({ role, guess: guessed('heading', [column.header], unit, magnetic ? 0.6 : column.unit ? 0.85 : 0.6, reason) });
} // prettier-ignore

function addOdometer(result: GuessedAids, role: FileRole, head: CsvHead, find: Find): void {
  const speed = find(AID_WORDS.wheelSpeed) ?? (role === 'aids' ? find(AID_WORDS.plainSpeed) : null);
  const distance = find(AID_WORDS.distance);
  const column = speed ?? distance;
  if (!column || !holdsValues(head, column)) return;
  const unit = column === speed ? ((speed.unit ?? 'm/s') as 'm/s') : 'm';
  const reason = `The header “${column.header}” means ${column === speed ? 'speed of the wheels' : 'distance driven'}; taken in ${unit}.`;
  result.map.odometer = { column: column.header, file: role, unit };
  result.guesses.push({ role, guess: guessed('odometer', [column.header], unit, column.unit ? 0.85 : 0.6, reason) });
} // prettier-ignore

const holdsValues = (head: CsvHead, column: FoundColumn) => valuesOf(head, column).length > 0;

function valuesOf(head: CsvHead, { index }: FoundColumn): number[] {
  const values = head.rows.map((row) => numberIn(row[index], head.decimalComma) ?? NaN);
  return values.filter((value) => !Number.isNaN(value));
}

function typical(head: CsvHead, column: FoundColumn): number {
  const values = valuesOf(head, column).sort((a, b) => a - b);
  return values[values.length >> 1] ?? NaN;
}
