/** One row of a GNSS or reference file in degrees, metres, m/s, north–east–down. NaN where a value is missing. */
import type { GnssMap, ReferenceMap } from '@/shared/contracts/recordings';
import { KNOT_M_S, RAD_PER_DEG } from '@/shared/units';
import { degreesIn, hemisphereIn, minutesIn, type CellParser } from './angles';
import { numberIn } from './cells';
import { earthFixedToGeodetic, earthFixedToNed } from './earth-fixed';
import { FILE_NAMES, rejection } from './problems';
import type { ReadColumn } from './row-reader';

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

const HEIGHT_SI = { m: 1, mm: 1e-3, ft: 0.3048 } as const;
/** Distance from the Earth's centre that a vehicle can have, m. */
const EARTH_M = [6.2e6, 7e6] as const;
const SPEED_SI = { 'm/s': 1, 'mm/s': 1e-3, 'km/h': 1 / 3.6, kn: KNOT_M_S } as const;

type Part =
  | 'height'
  | 'hemispheres'
  | 'velocity'
  | 'climb'
  | 'positionSigma'
  | 'velocitySigma'
  | 'attitude'
  | 'quality';

export class TrajectoryConversion {
  /** What a RowReader reads, in order. */
  readonly columns: ReadColumn[];
  private readonly at: Record<Part, number>;

  constructor(
    private readonly map: TrajectoryMap,
    private readonly role: 'gnss' | 'reference',
  ) {
    const { position, velocity } = map;
    const angle = {
      deg: degreesIn,
      'ddmm.mmmm': minutesIn,
      rad: undefined,
      '1e-7deg': undefined,
      ecef: undefined,
    };
    this.columns = [position.lat, position.lon].map((name) => ({ name, parse: angle[position.unit] }));
    const add = (names: readonly (string | undefined)[], parse?: CellParser) => {
      const given = names.flatMap((name) => (name === undefined ? [] : [{ name, parse }]));
      return given.length === 0 ? -1 : this.columns.push(...given) - given.length;
    };
    const { latHemisphere, lonHemisphere } = position;
    const both = latHemisphere !== undefined && lonHemisphere !== undefined;
    this.at = {
      height: add([position.height]),
      hemispheres: add(both ? [latHemisphere, lonHemisphere] : [], hemisphereIn),
      velocity: add(
        !velocity ? [] : 'columns' in velocity ? velocity.columns : [velocity.speed, velocity.course],
      ),
      climb: add(velocity && 'climb' in velocity ? [velocity.climb] : []),
      positionSigma: add(map.positionSigma?.columns ?? []),
      velocitySigma: add(map.velocitySigma?.columns ?? []),
      attitude: add(map.attitude?.columns ?? []),
      quality: add([map.quality], qualityIn),
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
    this.convertPosition(read, line, out);
    this.convertVelocity(read, out);
    if (this.role === 'gnss') {
      this.convertSigma(read, this.at.positionSigma, this.map.positionSigma, ROW.sigma, out);
      this.convertSigma(read, this.at.velocitySigma, this.map.velocitySigma, ROW.velocitySigma, out);
    } else if (this.map.attitude) {
      const toDegrees = this.map.attitude.unit === 'rad' ? 1 / RAD_PER_DEG : 1;
      for (let i = 0; i < 3; i += 1) out[ROW.attitude + i] = read[this.at.attitude + i]! * toDegrees;
    }
  }

  private convertPosition(read: Float64Array, line: number, out: Float64Array): void {
    const { position } = this.map;
    if (position.unit === 'ecef') return this.convertEarthFixed(read, line, out);
    const scale = { deg: 1, 'ddmm.mmmm': 1, rad: 1 / RAD_PER_DEG, '1e-7deg': 1e-7 }[position.unit];
    const { hemispheres, height } = this.at;
    const lat = read[0]! * scale * (hemispheres < 0 ? 1 : read[hemispheres]!);
    const lon = read[1]! * scale * (hemispheres < 0 ? 1 : read[hemispheres + 1]!);
    this.checkPosition(lat, lon, line);
    out[ROW.lat] = lat;
    out[ROW.lon] = wrapLongitude(lon);
    if (height >= 0) out[ROW.height] = read[height]! * HEIGHT_SI[position.heightUnit];
  }

  private convertEarthFixed(read: Float64Array, line: number, out: Float64Array): void {
    const [x, y, z] = [read[0]!, read[1]!, read[this.at.height] ?? NaN];
    const radius = Math.hypot(x, y, z);
    if (radius < EARTH_M[0] || radius > EARTH_M[1])
      throw rejection(
        'position-absurd', { file: this.role, line, column: this.map.position.lat },
        `Line ${line} of the ${FILE_NAMES[this.role]} gives X, Y and Z that lie ${Math.round(radius / 1000)} km from the Earth’s centre.`,
        'Earth-fixed positions are read in metres: check the columns and their unit on the mapping screen.',
      ); // prettier-ignore
    const place = earthFixedToGeodetic(x, y, z);
    out[ROW.lat] = place.latDeg;
    out[ROW.lon] = place.lonDeg;
    out[ROW.height] = place.heightM;
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
      const down = this.at.climb < 0 ? NaN : -read[this.at.climb]! * scale;
      out.set(a === 0 ? [0, 0, down] : [a * Math.cos(course), a * Math.sin(course), down], ROW.velocity);
    } else if (velocity.frame === 'ecef')
      out.set(earthFixedToNed(a, b, c, out[ROW.lat]!, out[ROW.lon]!), ROW.velocity);
    else if (velocity.frame === 'ned') out.set([a, b, c], ROW.velocity);
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
        : 'Check the unit of the position columns on the mapping screen: degrees, degrees and minutes, radians or whole 10⁻⁷ degrees.',
    ); // prettier-ignore
  }
}

/** To (−180, 180]; logs that count from 0 to 360 are welcome. */
const wrapLongitude = (deg: number) => (deg > 180 ? deg - 360 : deg <= -180 ? deg + 360 : deg);

/** Receivers write the kind of fix as a number, loggers as a word as well: only that there is none matters. */
const qualityIn: CellParser = (cell, decimalComma) => {
  const value = numberIn(cell, decimalComma);
  if (value !== undefined) return value;
  return /^(no[ _-]?fix|invalid|void|v|false|nofix)$/i.test(cell!.trim()) ? 0 : 1;
};
