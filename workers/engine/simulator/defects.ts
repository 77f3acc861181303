/**
 * Defects of real logs, put into a sound recording one at a time: what an intake must find. Each function leaves its
 * input as it is and returns a recording that may break the engine's own rules (times that go back, NaN).
 */
import type { RandomSource } from '../random';
import type { GnssColumns, ImuColumns } from '../types';

type Triple = readonly [Float64Array, Float64Array, Float64Array];
type Axis = 0 | 1 | 2;
/** Seconds, [from, to). */
export type Interval = readonly [number, number];

const mapTriple = (columns: Triple, change: (column: Float64Array, axis: Axis) => Float64Array): Triple => [
  change(columns[0], 0),
  change(columns[1], 1),
  change(columns[2], 2),
];
const pick = (column: Float64Array, rows: readonly number[]) => Float64Array.from(rows, (i) => column[i]!);

/** The IMU rows named, in that order. */
export function pickImu(imu: ImuColumns, rows: readonly number[]): ImuColumns {
  return {
    ...imu,
    timeS: pick(imu.timeS, rows),
    gyro: mapTriple(imu.gyro, (column) => pick(column, rows)),
    accel: mapTriple(imu.accel, (column) => pick(column, rows)),
  };
}

/** The GNSS rows named, in that order. */
export function pickGnss(gnss: GnssColumns, rows: readonly number[]): GnssColumns {
  const each = (columns: Triple) => mapTriple(columns, (column) => pick(column, rows));
  return {
    timeS: pick(gnss.timeS, rows),
    latRad: pick(gnss.latRad, rows),
    lonRad: pick(gnss.lonRad, rows),
    heightM: pick(gnss.heightM, rows),
    velocityNed: each(gnss.velocityNed),
    positionSigma: each(gnss.positionSigma),
    velocitySigma: each(gnss.velocitySigma),
  };
}

const inside = (t: number, [from, to]: Interval) => t >= from && t < to;
const rowsWhere = (timeS: Float64Array, keep: (t: number, i: number) => boolean): number[] =>
  Array.from(timeS, (t, i) => (keep(t, i) ? i : -1)).filter((i) => i >= 0);

/** Drops the samples of an interval. */
export const imuGap = (imu: ImuColumns, interval: Interval) =>
  pickImu(
    imu,
    rowsWhere(imu.timeS, (t) => !inside(t, interval)),
  );

/** Drops the fixes of an interval. */
export const gnssGap = (gnss: GnssColumns, interval: Interval) =>
  pickGnss(
    gnss,
    rowsWhere(gnss.timeS, (t) => !inside(t, interval)),
  );

/** Writes each sample of an interval twice. */
export const imuDuplicates = (imu: ImuColumns, interval: Interval) =>
  pickImu(imu, Array.from(imu.timeS, (t, i) => (inside(t, interval) ? [i, i] : [i])).flat());

/** Swaps neighbouring samples pairwise over an interval: times go back and forth. */
export function imuReorder(imu: ImuColumns, interval: Interval): ImuColumns {
  const rows = Array.from(imu.timeS, (_, i) => i);
  for (let i = 0; i + 1 < rows.length; i += 1) {
    if (!inside(imu.timeS[i]!, interval) || !inside(imu.timeS[i + 1]!, interval)) continue;
    [rows[i], rows[i + 1]] = [i + 1, i];
    i += 1;
  }
  return pickImu(imu, rows);
}

/** A change of the values of one group over an interval; `axis` left out: all three. */
function changeImu(
  imu: ImuColumns,
  group: 'gyro' | 'accel',
  axis: Axis | undefined,
  interval: Interval,
  change: (value: number, t: number, i: number, column: Float64Array) => number,
): ImuColumns {
  const columns = mapTriple(imu[group], (column, k) =>
    axis !== undefined && axis !== k
      ? column
      : column.map((value, i) =>
          inside(imu.timeS[i]!, interval) ? change(value, imu.timeS[i]!, i, column) : value,
        ),
  );
  return { ...imu, [group]: columns };
}

export const ALWAYS: Interval = [-Infinity, Infinity];

/** Puts NaN in place of values. */
export const imuNaN = (imu: ImuColumns, group: 'gyro' | 'accel', axis: Axis, interval: Interval) =>
  changeImu(imu, group, axis, interval, () => Number.NaN);

/** Holds the value that the channel had when the interval began. */
export function imuStuck(
  imu: ImuColumns,
  group: 'gyro' | 'accel',
  axis: Axis,
  interval: Interval,
): ImuColumns {
  const first = imu.timeS.findIndex((t) => inside(t, interval));
  return changeImu(imu, group, axis, interval, (_value, _t, _i, column) => column[first]!);
}

/** Cuts values off at ±limit (rad/s or m/s²). */
export const imuClip = (
  imu: ImuColumns,
  group: 'gyro' | 'accel',
  limit: number,
  interval: Interval = ALWAYS,
) => changeImu(imu, group, undefined, interval, (value) => Math.min(Math.max(value, -limit), limit));

/** Adds a blow to one accelerometer axis: a half sine of `peak` m/s² over the interval. */
export const imuShock = (imu: ImuColumns, axis: Axis, peak: number, interval: Interval) =>
  changeImu(
    imu,
    'accel',
    axis,
    interval,
    (value, t) => value + peak * Math.sin((Math.PI * (t - interval[0])) / (interval[1] - interval[0])),
  );

/** Multiplies a group by a factor: wrong units (57.3, 1/9.80665 …) or, with −1, the wrong sign. */
export const imuScale = (imu: ImuColumns, group: 'gyro' | 'accel', factor: number, axis?: Axis) =>
  changeImu(imu, group, axis, ALWAYS, (value) => factor * value);

/** Exchanges two axes of both groups: a sensor mounted otherwise than stated. */
export function imuSwapAxes(imu: ImuColumns, a: Axis, b: Axis): ImuColumns {
  const swap = (columns: Triple) => {
    const list = [...columns];
    [list[a], list[b]] = [list[b]!, list[a]!];
    return list as unknown as Triple;
  };
  return { ...imu, gyro: swap(imu.gyro), accel: swap(imu.accel) };
}

/** Shifts the IMU's time stamps by seeded jitter of σ seconds, kept in order. */
export function imuJitter(imu: ImuColumns, sigmaS: number, random: RandomSource): ImuColumns {
  let last = -Infinity;
  const timeS = imu.timeS.map((t) => (last = Math.max(t + sigmaS * random.normal(), last + 1e-6)));
  return { ...imu, timeS };
}

/** Stamps the fixes `offsetS` later than they were taken: two clocks that disagree. */
export const gnssClockOffset = (gnss: GnssColumns, offsetS: number): GnssColumns => ({
  ...gnss,
  timeS: gnss.timeS.map((t) => t + offsetS),
});

/** Reports velocity `lagS` late (interpolated), position on time. */
export function gnssVelocityLag(gnss: GnssColumns, lagS: number): GnssColumns {
  const velocityNed = mapTriple(gnss.velocityNed, (column) =>
    gnss.timeS.map((t) => interpolate(gnss.timeS, column, t - lagS)),
  );
  return { ...gnss, velocityNed };
}

/** Moves the positions of an interval by metres north and east. */
export function gnssJump(gnss: GnssColumns, interval: Interval, northM: number, eastM: number): GnssColumns {
  const hit = (i: number) => inside(gnss.timeS[i]!, interval);
  const latRad = gnss.latRad.map((lat, i) => (hit(i) ? lat + northM / 6.371e6 : lat));
  const lonRad = gnss.lonRad.map((lon, i) =>
    hit(i) ? lon + eastM / (6.371e6 * Math.cos(gnss.latRad[i]!)) : lon,
  );
  return { ...gnss, latRad, lonRad };
}

/** Repeats the first fix of an interval throughout it, as a receiver does that has lost its sky. */
export function gnssFrozen(gnss: GnssColumns, interval: Interval): GnssColumns {
  const first = gnss.timeS.findIndex((t) => inside(t, interval));
  const rows = Array.from(gnss.timeS, (t, i) => (inside(t, interval) ? first : i));
  return { ...pickGnss(gnss, rows), timeS: gnss.timeS };
}

function interpolate(x: Float64Array, y: Float64Array, at: number): number {
  if (at <= x[0]!) return y[0]!;
  let low = 0;
  let high = x.length - 1;
  if (at >= x[high]!) return y[high]!;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (x[middle]! <= at) low = middle;
    else high = middle;
  }
  return y[low]! + ((at - x[low]!) / (x[high]! - x[low]!)) * (y[high]! - y[low]!);
}
