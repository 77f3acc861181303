/** The channel map of an IMU file, from its headers and, where they name no unit, from the values. */
import type { AccelUnit, GyroUnit, ImuMap } from '@/shared/contracts/recordings';
import { numberIn } from './cells';
import type { CsvHead } from './csv';
import { ColumnFinder, type FoundColumn } from './find-columns';
import { namesOtherDevice } from './header-words';
import { guessTime } from './guess-time';
import { IMU_WORDS } from './vocabulary';

export interface Guess<M> {
  /** Null where `missing` is not empty. */
  map: M | null;
  /** Channels that no column was found for, in plain words. */
  missing: string[];
  /** What was taken for granted, in whole sentences. */
  assumed: string[];
}

type Triple = [FoundColumn, FoundColumn, FoundColumn];
/** Faster than this in rad/s hardly any vehicle turns: the numbers are degrees. */
const MAX_LIKELY_RATE = 6;

export function guessImuMap(head: CsvHead): Guess<ImuMap> {
  const finder = new ColumnFinder(head);
  const time = guessTime(head, finder, 'imu');
  const rates = triple(finder, 'gyro', ['rad', 'deg']);
  const angles = rates.found ? null : triple(finder, 'dtheta', ['rad/s', 'deg/s', 'deg/h']).found;
  const forces = triple(finder, 'accel', ['m/s', 'g*s']);
  const velocities = forces.found ? null : triple(finder, 'dv', ['m/s^2', 'g', 'mg']).found;
  const increments = angles !== null && velocities !== null;
  const gyro = increments ? angles : rates.found;
  const accel = increments ? velocities : forces.found;
  const missing = [
    ...(time ? [] : ['time']),
    ...(gyro ? [] : rates.missing.map((axis) => `gyro ${axis}`)),
    ...(accel ? [] : forces.missing.map((axis) => `accelerometer ${axis}`)),
  ];
  if (!time || !gyro || !accel) return { map: null, missing, assumed: [] };
  const accelUnit = unitOfAll(accel) ?? (increments ? 'm/s' : likelyAccelUnit(head, accel));
  const gyroUnit = unitOfAll(gyro) ?? (increments ? 'rad' : likelyGyroUnit(head, gyro, accelUnit));
  const assumed = [time.assumed ?? ''];
  if (!unitOfAll(gyro)) assumed.push(`The gyro columns name no unit: taken as ${gyroUnit}.`);
  if (!unitOfAll(accel)) assumed.push(`The accelerometer columns name no unit: taken as ${accelUnit}.`);
  return {
    map: {
      time: time.map,
      gyro: { columns: headersOf(gyro), unit: gyroUnit as GyroUnit },
      accel: { columns: headersOf(accel), unit: accelUnit as AccelUnit, sign: 'specific-force' },
      sampling: increments ? 'increment' : 'mean-rate',
    },
    missing: [],
    assumed: assumed.filter((sentence) => sentence !== ''),
  };
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

/** The unit that the headers agree on. */
const unitOfAll = (columns: Triple) =>
  columns.every((column) => column.unit === columns[0].unit) ? columns[0].unit : null;

/** A vehicle on average feels gravity: its size tells the unit. */
function likelyAccelUnit(head: CsvHead, columns: Triple): AccelUnit {
  const sizes = magnitudes(head, columns);
  const typical = sizes.length === 0 ? NaN : sizes[sizes.length >> 1]!;
  if (typical > 0.5 && typical < 2) return 'g';
  if (typical > 500 && typical < 2000) return 'mg';
  return 'm/s^2';
}

function likelyGyroUnit(head: CsvHead, columns: Triple, accelUnit: string): GyroUnit {
  const largest = magnitudes(head, columns).at(-1) ?? 0;
  return largest > MAX_LIKELY_RATE || accelUnit === 'g' || accelUnit === 'mg' ? 'deg/s' : 'rad/s';
}

/** Lengths of the vectors in the head of the file, ascending. */
function magnitudes(head: CsvHead, columns: Triple): number[] {
  const sizes = head.rows.map((row) =>
    Math.hypot(...columns.map(({ index }) => numberIn(row[index], head.decimalComma) ?? NaN)),
  );
  return sizes.filter((size) => Number.isFinite(size)).sort((a, b) => a - b);
}
