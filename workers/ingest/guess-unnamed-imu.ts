/** An IMU log of seven columns without a header: time, and two sensors of which gravity tells the accelerometer. */
import type { ImuMap } from '@/shared/contracts/recordings';
import { numberIn } from './cells';
import type { CsvHead } from './csv';
import { guessed, type Guess } from './guess';
import { accelUnitOf, gyroUnitOf } from './guess-imu-units';
import { timeByStep } from './guess-time';
import { typicalSize, type Triple } from './pattern-columns';

/** Null where the file is of another kind, or its values do not tell the sensors apart. */
export function guessUnnamedImu(head: CsvHead): Guess<ImuMap> | null {
  if (head.headerLine !== null || head.format || head.tags || head.headers.length !== 7) return null;
  const [first, second] = [tripleAt(head, 1), tripleAt(head, 4)];
  if (!isGrowing(head) || isGravity(head, first) === isGravity(head, second)) return null;
  const [gyro, accel] = isGravity(head, first) ? [second, first] : [first, second];
  const time = timeByStep(head, 0, 'imu');
  const accelUnit = accelUnitOf(head, accel, false);
  const gyroUnit = gyroUnitOf(head, gyro, accelUnit.unit, false);
  const names = (columns: Triple) => columns.map(({ header }) => header) as [string, string, string];
  const assumed = `The IMU file has no header: columns ${columnsOf(gyro)} are taken for the gyro (${gyroUnit.unit}), ${columnsOf(accel)} for the accelerometer (${accelUnit.unit}) by the size of gravity.`;
  return {
    map: {
      time: time.map,
      gyro: { columns: names(gyro), unit: gyroUnit.unit },
      accel: { columns: names(accel), unit: accelUnit.unit, sign: 'specific-force' },
      sampling: 'mean-rate',
    },
    missing: [],
    assumed: [assumed, ...(time.assumed ? [time.assumed] : [])],
    guesses: [
      { ...time.guess, confidence: 0.6 },
      guessed('gyro', names(gyro), gyroUnit.unit, 0.5, `The columns beside the accelerometer’s. ${gyroUnit.reason}`),
      guessed('accelerometer', names(accel), accelUnit.unit, 0.6, `Their length is about that of gravity. ${accelUnit.reason}`),
    ],
  };
} // prettier-ignore

const tripleAt = ({ headers }: CsvHead, from: number) =>
  [0, 1, 2].map((i) => ({ index: from + i, header: headers[from + i]!, unit: null })) as Triple;

const columnsOf = (columns: Triple) => `${columns[0].index + 1} to ${columns[2].index + 1}`;

function isGravity(head: CsvHead, columns: Triple): boolean {
  const size = typicalSize(head, columns);
  return (size > 7 && size < 13) || (size > 0.8 && size < 1.25) || (size > 800 && size < 1250);
}

function isGrowing(head: CsvHead): boolean {
  const times = head.rows.map((row) => numberIn(row[0], head.decimalComma) ?? NaN);
  return times.length > 2 && times.every((time, i) => i === 0 || time > times[i - 1]!);
}
