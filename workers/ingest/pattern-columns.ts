/**
 * Columns that come in threes: headers alike but for x, y and z. They tell a sensor that the vocabulary has no word for,
 * by the unit they share, by a syllable of their name, by the name of the file, or by their values.
 */
import { numberIn } from './cells';
import type { CsvHead } from './csv';
import type { FoundColumn } from './find-columns';
import { readHeader, unitOf, words } from './header-words';

export type Triple = [FoundColumn, FoundColumn, FoundColumn];
export type Sensor = 'gyro' | 'accel';

export interface SensedTriple {
  columns: Triple;
  /** Why it is that sensor: the end of a sentence. */
  because: string;
  confidence: number;
}

const AXES = ['x', 'y', 'z'];
/** Logs of arrays number their axes. */
const INDEXED = /^([^[({]*?)[[_.(]?([0-2])[\])]?$/;
const SYLLABLES: Record<Sensor, RegExp> = {
  gyro: /gyr|omega|\bang|rate|rot(?!ation (vector|matrix))|\bw\b|spin|turn/,
  accel: /acc|force|\blin|\ba\b|\bf\b/,
};
/** An angular velocity is a rate, any other velocity is none; what tells of errors is no measurement. */
const OTHERS =
  /mag|euler|quat|orient|(?<!ang\w* ?)vel|speed|pos|grav|baro|^m\b|cov|var|bias|std|sigma|noise|offset|temp|clip|integral|rms|status/;

const INCREMENTS = ['rad', 'deg', 'm/s', 'g*s'];
/** Words behind the axis that are no unit. */
const PLAIN_TAILS = ['raw', 'cal', 'calibrated', 'data', 'axis', 'imu', 'sensor'];

/** The three columns of a sensor, without help of the vocabulary; null where nothing tells them. */
export function sensedTriple(head: CsvHead, sensor: Sensor, taken: readonly string[]): SensedTriple | null {
  const groups = groupsOf(head).filter(
    ({ columns }) => !columns.some(({ header }) => taken.includes(header)),
  );
  const quantity = sensor === 'gyro' ? 'rate' : 'accel';
  for (const { columns, pattern } of groups) {
    const unit = commonUnit(head, columns, quantity);
    const strange = OTHERS.test(pattern) || otherSensor(sensor, pattern);
    if (unit && !strange)
      return {
        columns: withUnit(columns, unit),
        because: `three columns share the unit ${unit}`,
        confidence: 0.85,
      };
    if (SYLLABLES[sensor].test(pattern) && !strange && !namesUnit(head, columns))
      return { columns, because: 'their names say so', confidence: 0.8 };
  }
  const bare = groups.find(({ pattern }) => words(pattern).length === 0);
  if (!bare) return null;
  return bySetting(head, sensor, bare.columns);
}

/** Headers x, y, z and no more: the file's name, else the size of gravity. */
function bySetting(head: CsvHead, sensor: Sensor, columns: Triple): SensedTriple | null {
  const name = (head.fileName ?? '').toLowerCase();
  const [isGyro, isAccel] = [/gyr|rate|omega/.test(name), /acc/.test(name)];
  if (isGyro !== isAccel)
    return (sensor === 'gyro') === isGyro
      ? { columns, because: `the file is called “${head.fileName}”`, confidence: 0.8 }
      : null;
  const size = typicalSize(head, columns);
  const felt = (size > 6 && size < 14) || (size > 0.7 && size < 1.4) || (size > 700 && size < 1400);
  if (felt !== (sensor === 'accel')) return null;
  const because = felt ? 'their length is about that of gravity' : 'their length is not that of gravity';
  return { columns, because, confidence: 0.5 };
}

const otherSensor = (sensor: Sensor, pattern: string) =>
  SYLLABLES[sensor === 'gyro' ? 'accel' : 'gyro'].test(pattern) && !SYLLABLES[sensor].test(pattern);

interface Group {
  columns: Triple;
  /** The words of the name without the axis. */
  pattern: string;
}

function groupsOf(head: CsvHead): Group[] {
  const found = new Map<string, (FoundColumn | undefined)[]>();
  head.headers.forEach((header, index) => {
    const named = axisOf(header);
    if (!named) return;
    const group = found.get(named.pattern) ?? [undefined, undefined, undefined];
    group[named.axis] ??= { index, header, unit: null };
    found.set(named.pattern, group);
  });
  return [...found].flatMap(([pattern, columns]) =>
    columns.every((column) => column !== undefined) ? [{ pattern, columns: columns as Triple }] : [],
  );
}

function axisOf(header: string): { axis: number; pattern: string } | null {
  const plain = header.replace(/([a-z])([A-Z])/g, '$1 $2').toLowerCase();
  const tokens = words(plain.replace(/[([{][^0-9].*$/, ''));
  const at = tokens.findLastIndex((token) => AXES.includes(token));
  if (at >= 0)
    return { axis: AXES.indexOf(tokens[at]!), pattern: tokens.filter((_, i) => i !== at).join(' ') };
  const first = tokens[0] ?? '';
  const axis = AXES.indexOf(first.at(-1) ?? '');
  if (axis >= 0) return { axis, pattern: [first.slice(0, -1), ...tokens.slice(1)].join(' ') };
  const indexed = INDEXED.exec(plain.trim());
  return indexed && { axis: Number(indexed[2]), pattern: words(indexed[1]!).join(' ') };
}

/** Whether anything stands where a unit would: one that is not known is not passed over. */
const namesUnit = (head: CsvHead, columns: Triple) =>
  columns.some(({ header, index }) => {
    const tokens = words(header.toLowerCase());
    const tail = tokens.slice(tokens.findLastIndex((token) => AXES.includes(token)) + 1);
    const after = tail.length === tokens.length ? [] : tail.filter((token) => !PLAIN_TAILS.includes(token));
    return after.length > 0 || /[([{][^0-9]/.test(header) || (head.units?.[index] ?? '') !== '';
  });

/** The unit of a rate or an acceleration that all three name; one of increments is more likely cut short. */
function commonUnit(head: CsvHead, columns: Triple, quantity: 'rate' | 'accel'): string | null {
  const units = columns.map(({ header, index }) => {
    const plain = INDEXED.exec(header)?.[1] ?? header;
    const readings = readHeader(plain, head.units?.[index] ?? null);
    return readings.flatMap(({ unit }) => (unit === null ? [] : (unitOf(quantity, unit) ?? [])))[0] ?? null;
  });
  const [unit] = units;
  const alike = unit && units.every((one) => one === unit) && !INCREMENTS.includes(unit);
  return alike ? unit : null;
}

const withUnit = (columns: Triple, unit: string) => columns.map((column) => ({ ...column, unit })) as Triple;

/** Lengths of the vectors in the head of the file, ascending. */
export function magnitudes(head: CsvHead, columns: Triple): number[] {
  const sizes = head.rows.map((row) =>
    Math.hypot(...columns.map(({ index }) => numberIn(row[index], head.decimalComma) ?? NaN)),
  );
  return sizes.filter((size) => Number.isFinite(size)).sort((a, b) => a - b);
}

/** Median length; NaN where there is none. */
export function typicalSize(head: CsvHead, columns: Triple): number {
  const sizes = magnitudes(head, columns);
  return sizes[sizes.length >> 1] ?? NaN;
}
