/** One row of a GNSS or reference file in degrees, metres, m/s, north–east–down. NaN where a value is missing. */
import type { FileRole, GnssMap, ReferenceMap } from '@/shared/contracts/recordings';
import { KNOT_M_S, RAD_PER_DEG } from '@/shared/units';
import { FILE_NAMES, rejection } from './problems';

type TrajectoryMap = Pick<GnssMap, 'position' | 'velocity' | 'positionSigma' | 'velocitySigma' | 'quality'> &
  Pick<ReferenceMap, 'attitude'>;

/** Places in a converted row. */
export const ROW = {
  lat: 0,
  lon: 1,
  height: 2,
  velocity: 3,
  sigma: 6,
  velocitySigma: 9,
  attitude: 6,
} as const;
export const ROW_LENGTH = 12;

const SPEED_SI = { 'm/s': 1, 'mm/s': 1e-3, 'km/h': 1 / 3.6, kn: KNOT_M_S } as const;

export class TrajectoryConversion {
  /** What a RowReader reads, in order. */
  readonly columns: string[];
  private readonly at: Record<
    'height' | 'velocity' | 'positionSigma' | 'velocitySigma' | 'attitude' | 'quality',
    number
  >;

  constructor(
    private readonly map: TrajectoryMap,
    private readonly role: Exclude<FileRole, 'imu'>,
  ) {
    const { position, velocity } = map;
    this.columns = [position.lat, position.lon];
    const add = (names: readonly string[]) =>
      names.length === 0 ? -1 : this.columns.push(...names) - names.length;
    this.at = {
      height: add(position.height === undefined ? [] : [position.height]),
      velocity: add(
        !velocity ? [] : 'columns' in velocity ? velocity.columns : [velocity.speed, velocity.course],
      ),
      positionSigma: add(map.positionSigma?.columns ?? []),
      velocitySigma: add(map.velocitySigma?.columns ?? []),
      attitude: add(map.attitude?.columns ?? []),
      quality: add(map.quality === undefined ? [] : [map.quality]),
    };
  }

  /** Whether the receiver itself says that this row is no fix. */
  isNoFix(read: Float64Array): boolean {
    if (this.at.quality >= 0 && read[this.at.quality] === 0) return true;
    return read[0] === 0 && read[1] === 0;
  }

  /** Throws IntakeRejected for positions that are none. */
  convert(read: Float64Array, line: number, out: Float64Array): void {
    out.fill(NaN);
    const { position } = this.map;
    const angle = position.unit === 'rad' ? 1 / RAD_PER_DEG : 1;
    out[ROW.lat] = read[0]! * angle;
    out[ROW.lon] = wrapLongitude(read[1]! * angle);
    this.checkPosition(out[ROW.lat]!, read[1]! * angle, line);
    if (this.at.height >= 0)
      out[ROW.height] = position.heightUnit === 'mm' ? read[this.at.height]! / 1000 : read[this.at.height]!;
    this.convertVelocity(read, out);
    if (this.role === 'gnss') {
      this.convertSigma(read, this.at.positionSigma, this.map.positionSigma, ROW.sigma, out);
      this.convertSigma(read, this.at.velocitySigma, this.map.velocitySigma, ROW.velocitySigma, out);
    } else if (this.map.attitude) {
      const toDegrees = this.map.attitude.unit === 'rad' ? 1 / RAD_PER_DEG : 1;
      for (let i = 0; i < 3; i += 1) out[ROW.attitude + i] = read[this.at.attitude + i]! * toDegrees;
    }
  }

  private convertVelocity(read: Float64Array, out: Float64Array): void {
    const { velocity } = this.map;
    if (!velocity) return;
    const from = this.at.velocity;
    const scale = SPEED_SI[velocity.unit];
    const [a, b, c] = [read[from]! * scale, read[from + 1]! * scale, read[from + 2]! * scale];
    if ('course' in velocity) {
      const course = read[from + 1]! * (velocity.courseUnit === 'deg' ? RAD_PER_DEG : 1);
      // At rest a receiver often gives no course; the speed alone then says that there is no velocity.
      out.set(a === 0 ? [0, 0, NaN] : [a * Math.cos(course), a * Math.sin(course), NaN], ROW.velocity);
    } else if (velocity.frame === 'ned') out.set([a, b, c], ROW.velocity);
    else if (velocity.frame === 'enu') out.set([b, a, -c], ROW.velocity);
    else out.set([a, b, -c], ROW.velocity);
  }

  /** A receiver that gives 0 for its own accuracy does not know it. */
  private convertSigma(
    read: Float64Array,
    from: number,
    map: GnssMap['positionSigma'],
    to: number,
    out: Float64Array,
  ): void {
    if (!map) return;
    const scale = map.unit === 'mm' || map.unit === 'mm/s' ? 1e-3 : 1;
    for (let i = 0; i < 3; i += 1) {
      const value = read[from + (map.columns.length === 2 ? (i === 2 ? 1 : 0) : i)]! * scale;
      out[to + i] = value > 0 ? value : NaN;
    }
  }

  private checkPosition(latDeg: number, lonDeg: number, line: number): void {
    const { position } = this.map;
    const wrongLat = Math.abs(latDeg) > 90;
    if (!wrongLat && !(Math.abs(lonDeg) > 360)) return;
    const column = wrongLat ? position.lat : position.lon;
    const value = wrongLat ? latDeg : lonDeg;
    const name = wrongLat ? 'latitude' : 'longitude';
    const swapped = wrongLat && Math.abs(latDeg) <= 180 && Math.abs(lonDeg) <= 90;
    throw rejection(
      'position-absurd', { file: this.role, line, column },
      `Line ${line} of the ${FILE_NAMES[this.role]} has a ${name} of ${value}°, which lies beyond ±${wrongLat ? 90 : 180}°.`,
      swapped
        ? 'Latitude and longitude look swapped: exchange the two columns on the mapping screen.'
        : 'Check the unit of the position columns on the mapping screen; degrees and radians are read.',
    ); // prettier-ignore
  }
}

/** To (−180, 180]; logs that count from 0 to 360 are welcome. */
const wrapLongitude = (deg: number) => (deg > 180 ? deg - 360 : deg <= -180 ? deg + 360 : deg);
