/** The channel maps of GNSS and reference files, from their headers. */
import type { GnssMap, ReferenceMap } from '@/shared/contracts/recordings';
import type { CsvHead } from './csv';
import { ColumnFinder, type FoundColumn } from './find-columns';
import type { Guess } from './guess-imu';
import { guessTime } from './guess-time';
import { namesOtherDevice } from './header-words';
import { ATTITUDE_WORDS, GNSS_WORDS, type GnssChannel } from './vocabulary';

type Find = (channel: GnssChannel) => FoundColumn | null;
type PositionMap = GnssMap['position'];
type VelocityMap = NonNullable<GnssMap['velocity']>;
type SigmaMap = NonNullable<GnssMap['positionSigma']>;

export function guessGnssMap(head: CsvHead): Guess<GnssMap> {
  const finder = new ColumnFinder(head);
  const find = finderFor(finder, 'gnss');
  const time = guessTime(head, finder, 'gnss');
  const position = guessPosition(find);
  const missing = missingOf(time !== null, find);
  if (!time || !position.map) return { map: null, missing, assumed: [] };
  const quality = find('quality');
  const map: GnssMap = { time: time.map, position: position.map };
  const velocity = guessVelocity(find);
  const positionSigma = guessPositionSigma(find);
  const velocitySigma = guessVelocitySigma(find);
  if (velocity) map.velocity = velocity;
  if (positionSigma) map.positionSigma = positionSigma;
  if (velocity && velocitySigma) map.velocitySigma = velocitySigma;
  if (quality) map.quality = quality.header;
  return { map, missing: [], assumed: [time.assumed, position.assumed].flatMap((text) => text ?? []) };
}

export function guessReferenceMap(head: CsvHead): Guess<ReferenceMap> {
  const finder = new ColumnFinder(head);
  const find = finderFor(finder, 'reference');
  const time = guessTime(head, finder, 'reference');
  const position = guessPosition(find);
  if (!time || !position.map) return { map: null, missing: missingOf(time !== null, find), assumed: [] };
  const map: ReferenceMap = { time: time.map, position: position.map };
  const velocity = guessVelocity(find);
  const angles = (['roll', 'pitch', 'yaw'] as const).map((name) => finder.find(ATTITUDE_WORDS[name]));
  if (velocity) map.velocity = velocity;
  if (angles[0] && angles[1] && angles[2])
    map.attitude = {
      columns: [angles[0].header, angles[1].header, angles[2].header],
      unit: angles[0].unit === 'rad' ? 'rad' : 'deg',
    };
  return { map, missing: [], assumed: [time.assumed, position.assumed].flatMap((text) => text ?? []) };
}

const finderFor =
  (finder: ColumnFinder, role: 'gnss' | 'reference'): Find =>
  (channel) =>
    finder.find(GNSS_WORDS[channel], (header) => !namesOtherDevice(header, role));

const missingOf = (hasTime: boolean, find: Find) => [
  ...(hasTime ? [] : ['time']),
  ...(find('lat') ? [] : ['latitude']),
  ...(find('lon') ? [] : ['longitude']),
];

function guessPosition(find: Find): { map: PositionMap | null; assumed: string | null } {
  const [lat, lon] = [find('lat'), find('lon')];
  if (!lat || !lon) return { map: null, assumed: null };
  const [ellipsoid, sea, plain] = [find('heightEllipsoid'), find('heightSea'), find('heightPlain')];
  const height = ellipsoid ?? sea ?? plain;
  const map: PositionMap = {
    lat: lat.header,
    lon: lon.header,
    unit: lat.unit === 'rad' ? 'rad' : 'deg',
    heightUnit: height?.unit === 'mm' ? 'mm' : 'm',
    heightDatum: height === sea && sea !== null ? 'sea-level' : 'ellipsoid',
  };
  if (height) map.height = height.header;
  const assumed =
    height && height === plain
      ? `The column “${plain.header}” does not say above what it counts: taken as height above the ellipsoid.`
      : null;
  return { map, assumed };
}

function guessVelocity(find: Find): VelocityMap | null {
  const [north, east, down, up] = [find('vn'), find('ve'), find('vd'), find('vu')];
  if (north && east && down)
    return {
      frame: 'ned',
      columns: [north.header, east.header, down.header],
      unit: speedUnit(north),
    };
  if (north && east && up)
    return { frame: 'enu', columns: [east.header, north.header, up.header], unit: speedUnit(north) };
  const [speed, course] = [find('speed'), find('course')];
  if (!speed || !course) return null;
  return {
    frame: 'speed-course',
    speed: speed.header,
    course: course.header,
    unit: speedUnit(speed),
    courseUnit: course.unit === 'rad' ? 'rad' : 'deg',
  };
}

const speedUnit = (column: FoundColumn): VelocityMap['unit'] =>
  column.unit === 'km/h' || column.unit === 'kn' || column.unit === 'mm/s' ? column.unit : 'm/s';

function guessPositionSigma(find: Find): SigmaMap | null {
  const axes = [find('sigmaN'), find('sigmaE'), find('sigmaD')];
  const pair = [find('sigmaHorizontal'), find('sigmaVertical')];
  return sigmaMap(axes, 'mm', 'm') ?? sigmaMap(pair, 'mm', 'm');
}

function guessVelocitySigma(find: Find): SigmaMap | null {
  const axes = [find('sigmaVn'), find('sigmaVe'), find('sigmaVd')];
  const speed = find('sigmaSpeed');
  return sigmaMap(axes, 'mm/s', 'm/s') ?? sigmaMap([speed, speed], 'mm/s', 'm/s');
}

function sigmaMap<U extends SigmaMap['unit']>(
  columns: readonly (FoundColumn | null)[],
  small: U,
  usual: U,
): SigmaMap | null {
  const headers = columns.map((column) => column?.header ?? '');
  if (headers.includes('')) return null;
  return {
    columns: headers as SigmaMap['columns'],
    unit: columns[0]!.unit === small ? small : usual,
  };
}
