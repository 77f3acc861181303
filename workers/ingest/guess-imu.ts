/** The channel map of an IMU, from the headers of its one or two files and, where they name no unit, from the values. */
import type { ChannelGuess, ImuMap } from '@/shared/contracts/recordings';
import type { CsvHead } from './csv';
import { ColumnFinder } from './find-columns';
import { guessed, type Guess } from './guess';
import { accelUnitOf, gyroUnitOf, type GuessedUnit } from './guess-imu-units';
import { guessUnnamedImu } from './guess-unnamed-imu';
import { guessTime, type GuessedTime } from './guess-time';
import { namesOtherDevice } from './header-words';
import { sensedTriple, type Sensor, type Triple } from './pattern-columns';
import { IMU_WORDS } from './vocabulary';

type ImuRole = 'imu' | 'imu2';

interface FoundSensor {
  role: ImuRole;
  head: CsvHead;
  columns: Triple;
  because: string;
  confidence: number;
}

/** `second`: the head of a second file, where gyro and accelerometer have one each. */
export function guessImuMap(first: CsvHead, second?: CsvHead): Guess<ImuMap> {
  const unnamed = !second && guessUnnamedImu(first);
  if (unnamed) return unnamed;
  const heads: [ImuRole, CsvHead][] = second ? [['imu', first], ['imu2', second]] : [['imu', first]]; // prettier-ignore
  const whole = heads.flatMap(([role, head]) => incrementsOf(role, head) ?? ratesOf(role, head) ?? []);
  const increments = whole[0] ? whole[0].increments : false;
  const gyro = whole[0]?.gyro ?? sensorIn(heads, 'gyro', null);
  const accel = whole[0]?.accel ?? sensorIn(heads, 'accel', gyro);
  const time = gyro && timeOf(gyro);
  const accelTime = gyro && accel && standApart(gyro, accel) ? timeOf(accel, 'acc') : null;
  const missing = missingOf(heads, gyro, accel, time, accelTime);
  if (!time || !gyro || !accel || missing.length > 0) return { map: null, missing, assumed: [], guesses: [] };
  const accelUnit = accelUnitOf(accel.head, accel.columns, increments);
  const gyroUnit = gyroUnitOf(gyro.head, gyro.columns, accelUnit.unit, increments);
  const map: ImuMap = {
    time: time.map,
    gyro: { columns: headersOf(gyro.columns), unit: gyroUnit.unit },
    accel: { columns: headersOf(accel.columns), unit: accelUnit.unit, sign: 'specific-force' },
    sampling: increments ? 'increment' : 'mean-rate',
  };
  if (second) {
    map.gyro.file = gyro.role;
    map.accel.file = accel.role;
  }
  if (accelTime) map.accelTime = accelTime.map;
  return {
    map,
    missing: [],
    assumed: [
      time.assumed ?? '',
      gyroUnit.fromHeader ? '' : `The gyro columns name no unit: taken as ${gyroUnit.unit}.`,
      accelUnit.fromHeader ? '' : `The accelerometer columns name no unit: taken as ${accelUnit.unit}.`,
    ].filter((sentence) => sentence !== ''),
    guesses: [
      time.guess,
      ofSensor('gyro', gyro, gyroUnit),
      ofSensor('accelerometer', accel, accelUnit),
      ...(accelTime ? [{ ...accelTime.guess, channel: 'accelerometer time' }] : []),
    ],
  };
}

function ofSensor(
  channel: string,
  sensor: FoundSensor,
  { unit, confidence, reason }: GuessedUnit,
): ChannelGuess {
  const why = `Taken for the ${channel} because ${sensor.because}. ${reason}`;
  return guessed(channel, headersOf(sensor.columns), unit, Math.min(sensor.confidence, confidence), why);
}

const NAMED = { because: 'the headers name it', confidence: 0.95 };

/** Increments only where both sensors have them. */
function incrementsOf(role: ImuRole, head: CsvHead) {
  const finder = new ColumnFinder(head);
  if (triple(finder, 'gyro', ['rad', 'deg']).found && triple(finder, 'accel', ['m/s', 'g*s']).found)
    return null;
  const angles = triple(finder, 'dtheta', ['rad/s', 'deg/s', 'deg/h']).found;
  const velocities = triple(finder, 'dv', ['m/s^2', 'g', 'mg']).found;
  if (!angles || !velocities) return null;
  const of = (columns: Triple): FoundSensor => ({ role, head, columns, ...NAMED });
  return { gyro: of(angles), accel: of(velocities), increments: true };
}

/** Both sensors by name in one file. */
function ratesOf(role: ImuRole, head: CsvHead) {
  const [gyro, accel] = [named(role, head, 'gyro'), named(role, head, 'accel')];
  return gyro && accel ? { gyro, accel, increments: false } : null;
}

function named(role: ImuRole, head: CsvHead, sensor: Sensor): FoundSensor | null {
  const refused = sensor === 'gyro' ? ['rad', 'deg'] : ['m/s', 'g*s'];
  const { found } = triple(new ColumnFinder(head), sensor, refused);
  return found && { role, head, columns: found, ...NAMED };
}

/** In any of the files, by name before by likeness; not the columns of the other sensor. */
function sensorIn(
  heads: readonly [ImuRole, CsvHead][],
  sensor: Sensor,
  other: FoundSensor | null,
): FoundSensor | null {
  for (const [role, head] of heads) {
    const found = named(role, head, sensor);
    if (found) return found;
  }
  for (const [role, head] of heads) {
    const taken = other?.role === role ? headersOf(other.columns) : [];
    const sensed = sensedTriple(head, sensor, taken);
    if (sensed) return { role, head, ...sensed };
  }
  return null;
}

/** Files of their own, or rows of their own: where one has values the other has none. */
function standApart(gyro: FoundSensor, accel: FoundSensor): boolean {
  if (gyro.role !== accel.role) return true;
  const has = (row: readonly string[], { columns }: FoundSensor) =>
    (row[columns[0].index] ?? '').trim() !== '';
  const { rows } = gyro.head;
  const both = rows.filter((row) => has(row, gyro) && has(row, accel)).length;
  const either = rows.filter((row) => has(row, gyro) !== has(row, accel)).length;
  return (
    either > 4 && both === 0 && rows.some((row) => has(row, gyro)) && rows.some((row) => has(row, accel))
  );
}

function timeOf({ head }: FoundSensor, preferred?: string): GuessedTime | null {
  const own = preferred && head.headers.find((h) => new RegExp(`${preferred}.*(time|stamp)`, 'i').test(h));
  const finder = new ColumnFinder(head);
  return (own ? guessTime(onlyTime(head, own), finder, 'imu') : null) ?? guessTime(head, finder, 'imu');
}

/** The head with nothing to find but one column. */
const onlyTime = (head: CsvHead, header: string): CsvHead => ({
  ...head,
  headers: head.headers.map((one, i) => (one === header ? one : `column ${i + 1}`)),
});

function missingOf(
  heads: readonly [ImuRole, CsvHead][],
  gyro: FoundSensor | null,
  accel: FoundSensor | null,
  time: GuessedTime | null,
  accelTime: GuessedTime | null,
): string[] {
  const finder = new ColumnFinder(heads[0]![1]);
  const anyTime = time ?? guessTime(heads[0]![1], finder, 'imu');
  const axes = (sensor: Sensor) => triple(finder, sensor, []).missing;
  const apart = gyro && accel && standApart(gyro, accel) && !accelTime;
  return [
    ...(anyTime ? [] : ['time']),
    ...(gyro ? [] : axes('gyro').map((axis) => `gyro ${axis}`)),
    ...(accel ? [] : axes('accel').map((axis) => `accelerometer ${axis}`)),
    ...(apart ? ['time of the accelerometer'] : []),
  ];
}

/** Columns x, y, z whose unit is none of `refused`. */
function triple(finder: ColumnFinder, stem: 'gyro' | 'dtheta' | 'accel' | 'dv', refused: readonly string[]) {
  const axes = ['x', 'y', 'z'] as const;
  const columns = axes.map((axis) => {
    const column = finder.find(IMU_WORDS[`${stem}_${axis}`], (h) => !namesOtherDevice(h, 'imu'));
    return column && refused.includes(column.unit ?? '') ? null : column;
  });
  const missing = axes.filter((_, i) => columns[i] === null);
  return { found: missing.length === 0 ? (columns as Triple) : null, missing };
}

const headersOf = (columns: Triple): [string, string, string] => [
  columns[0].header,
  columns[1].header,
  columns[2].header,
];
