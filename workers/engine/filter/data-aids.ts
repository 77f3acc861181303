/** Sensors besides IMU and GNSS, row by row in the order of their measurement times. */
import type { Parameters } from '@/shared/contracts/parameters';
import type { AidColumns } from '../types';
import { barometricHeight, forwardSpeed, fullAttitude, heading } from './data-aid-models';
import type { CorrectedState } from './corrected-state';
import type { AidName } from './filter-types';
import type { MeasurementUpdate } from './measurement-update';

/** One sensor: its measurement times, and what a row measures; false where the row says nothing. */
interface Sensor {
  name: AidName;
  timeS: Float64Array;
  setUp(row: number, filter: CorrectedState, update: MeasurementUpdate): boolean;
}

export class DataAids {
  /** Time of the next row of any sensor, s; Infinity after the last. */
  nextS = Infinity;
  private readonly next: number[];

  /** Null where no sensor is both logged and switched on: nothing is spent then. */
  static of(columns: AidColumns | null | undefined, parameters: Parameters['aids']): DataAids | null {
    const sensors = columns ? sensorsOf(columns, parameters) : [];
    return sensors.length > 0 ? new DataAids(sensors) : null;
  }

  private constructor(private readonly sensors: readonly Sensor[]) {
    this.next = sensors.map(() => 0);
    this.findNext();
  }

  /** Rows up to `timeS` are past, headings up to `headingS`: the start was found with them. */
  start(timeS: number, headingS: number): void {
    this.sensors.forEach((sensor, i) => {
      const past = sensor.name === 'heading' ? Math.max(timeS, headingS) : timeS;
      let row = 0;
      while (row < sensor.timeS.length && !(sensor.timeS[row]! > past)) row += 1;
      this.next[i] = row;
    });
    this.findNext();
  }

  private findNext(): void {
    this.nextS = Infinity;
    this.sensors.forEach(({ timeS }, i) => {
      const time = timeS[this.next[i]!];
      if (time !== undefined && time < this.nextS) this.nextS = time;
    });
  }

  /** The next row; the filter has moved to its time. */
  apply(filter: CorrectedState): void {
    const time = this.nextS;
    const i = this.sensors.findIndex(({ timeS }, s) => timeS[this.next[s]!] === time);
    const sensor = this.sensors[i]!;
    const row = this.next[i]!;
    this.next[i] = row + 1;
    filter.aid(sensor.name, (update) => sensor.setUp(row, filter, update), time);
    this.findNext();
  }

  save(): readonly number[] {
    return this.next.slice();
  }
  restore(saved: readonly number[]): void {
    saved.forEach((row, i) => (this.next[i] = row));
    this.findNext();
  }
}

/** 1σ of a row: the log's own where it is wanted and there, else the fixed one; times the scale, squared. */
function varianceOf(
  { sigmaSource, sigmaScale }: Parameters['aids']['barometer' | 'heading' | 'odometer' | 'attitude'],
  fixed: number,
  own: Float64Array | null,
  row: number,
): number {
  const logged = sigmaSource === 'log' && own !== null ? own[row]! : NaN;
  return ((logged > 0 && Number.isFinite(logged) ? logged : fixed) * sigmaScale) ** 2;
}

/** Times less the latency; a time that is not finite counts as long past. */
const measuredAt = (timeS: Float64Array, latencyS: number) =>
  timeS.map((t) => (Number.isFinite(t) ? t - latencyS : -Infinity));

function sensorsOf(
  { barometer, heading: compass, odometer, attitude }: AidColumns,
  p: Parameters['aids'],
): Sensor[] {
  const sensors: Sensor[] = [];
  const add = (
    name: 'barometer' | 'heading' | 'odometer' | 'attitude',
    timeS: Float64Array,
    setUp: Sensor['setUp'],
  ) => {
    if (p[name].enabled) sensors.push({ name, timeS: measuredAt(timeS, p[name].latencyS), setUp });
  };
  if (barometer)
    add('barometer', barometer.timeS, (row, { strapdown, optional, layout }, update) => {
      const height = barometer.heightM[row]!;
      const variance = varianceOf(p.barometer, p.barometer.sigmaM, barometer.sigmaM, row);
      barometricHeight(
        strapdown,
        optional?.barometerBias ?? 0,
        layout.barometerBias,
        height,
        variance,
        update,
      );
      return Number.isFinite(height);
    });
  if (compass)
    add('heading', compass.timeS, (row, { strapdown }, update) => {
      const reading = compass.headingRad[row]! + p.heading.offsetRad;
      const variance = varianceOf(p.heading, p.heading.sigmaRad, compass.sigmaRad, row);
      return Number.isFinite(reading) && heading(strapdown, reading, variance, update);
    });
  if (odometer)
    add('odometer', odometer.timeS, (row, { strapdown }, update) => {
      const speed = odometer.speedMPerS[row]!;
      forwardSpeed(
        strapdown,
        speed,
        varianceOf(p.odometer, p.odometer.sigmaMPerS, odometer.sigmaMPerS, row),
        update,
      );
      return Number.isFinite(speed);
    });
  if (attitude)
    add('attitude', attitude.timeS, (row, { strapdown }, update) => {
      const [roll, pitch, yaw] = attitude.attitude.map((column) => column[row]!) as [number, number, number];
      const variance = (axis: 0 | 1 | 2) =>
        varianceOf(p.attitude, p.attitude.sigmaRad, attitude.sigmaRad?.[axis] ?? null, row);
      fullAttitude(strapdown, roll, pitch, yaw, [variance(0), variance(1), variance(2)], update);
      return Number.isFinite(roll + pitch + yaw);
    });
  return sensors;
}
