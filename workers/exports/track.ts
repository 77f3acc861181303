/** A run's track in open formats: GeoJSON (RFC 7946), KML 2.2 (OGC 07-147r2), GPX 1.1. */
import type { RunTables } from '../recordings/results';

export interface TrackInfo {
  name: string;
  /** UTC of the axis' zero where known, ISO 8601. */
  utcOrigin: string | null;
}

/** Height of a point above the EGM96 geoid, m, from degrees and its height above the ellipsoid. */
export type AboveSeaLevel = (latDeg: number, lonDeg: number, heightM: number) => number;

interface Point {
  timeS: number;
  latDeg: number;
  lonDeg: number;
  heightM: number;
}

/** Longitude, latitude, height above the ellipsoid; cut at the 180° meridian as section 3.1.9 asks. */
export function* trackGeoJson(tables: RunTables, info: TrackInfo): Generator<string> {
  const lines = cutAtAntimeridian(pointsOf(tables));
  const time = tables.solution.time_s!;
  const properties = { name: info.name, startS: time[0], endS: time.at(-1), utcOrigin: info.utcOrigin };
  const coordinates = lines.map((line) => line.map((p) => [p.lonDeg, p.latDeg, p.heightM]));
  const geometry =
    coordinates.length === 1
      ? { type: 'LineString', coordinates: coordinates[0] }
      : { type: 'MultiLineString', coordinates };
  const feature = { type: 'Feature', properties, geometry };
  yield JSON.stringify({ type: 'FeatureCollection', features: [feature] });
}

/** Altitudes above sea level, as KML counts them. */
export function* trackKml(tables: RunTables, info: TrackInfo, above: AboveSeaLevel): Generator<string> {
  yield '<?xml version="1.0" encoding="UTF-8"?>\n<kml xmlns="http://www.opengis.net/kml/2.2">\n<Document>\n';
  yield `<name>${escaped(info.name)}</name>\n<Placemark>\n<name>${escaped(info.name)}</name>\n`;
  yield '<LineString>\n<altitudeMode>absolute</altitudeMode>\n<coordinates>\n';
  yield* pieces(
    tables,
    (p) => `${p.lonDeg},${p.latDeg},${above(p.latDeg, p.lonDeg, p.heightM).toFixed(3)}\n`,
  );
  yield '</coordinates>\n</LineString>\n</Placemark>\n</Document>\n</kml>\n';
}

/** Elevations above sea level; times where the clock is known. */
export function* trackGpx(tables: RunTables, info: TrackInfo, above: AboveSeaLevel): Generator<string> {
  const zeroMs = info.utcOrigin === null ? null : Date.parse(info.utcOrigin);
  yield '<?xml version="1.0" encoding="UTF-8"?>\n';
  yield '<gpx version="1.1" creator="Driftwright" xmlns="http://www.topografix.com/GPX/1/1">\n';
  yield `<trk>\n<name>${escaped(info.name)}</name>\n<trkseg>\n`;
  yield* pieces(tables, (p) => {
    const elevation = above(p.latDeg, p.lonDeg, p.heightM).toFixed(3);
    const time = zeroMs === null ? '' : `<time>${new Date(zeroMs + p.timeS * 1000).toISOString()}</time>`;
    return `<trkpt lat="${p.latDeg}" lon="${p.lonDeg}"><ele>${elevation}</ele>${time}</trkpt>\n`;
  });
  yield '</trkseg>\n</trk>\n</gpx>\n';
}

const POINTS_A_PIECE = 2000;

function* pieces(tables: RunTables, text: (point: Point) => string): Generator<string> {
  const points = pointsOf(tables);
  for (let at = 0; at < points.length; at += POINTS_A_PIECE)
    yield points
      .slice(at, at + POINTS_A_PIECE)
      .map(text)
      .join('');
}

/** Nine decimals of a degree are a tenth of a millimetre. */
function pointsOf({ solution }: RunTables): Point[] {
  const degrees = (value: number) => Number(value.toFixed(9));
  return Array.from(solution.time_s!, (timeS, i) => ({
    timeS,
    latDeg: degrees(solution.lat_deg![i]!),
    lonDeg: degrees(solution.lon_deg![i]!),
    heightM: Number(solution.height_m![i]!.toFixed(3)),
  }));
}

/** Each line ends and the next begins on the meridian itself. */
function cutAtAntimeridian(points: readonly Point[]): Point[][] {
  const lines: Point[][] = [];
  let line: Point[] = [];
  for (const point of points) {
    const before = line.at(-1);
    if (before && Math.abs(point.lonDeg - before.lonDeg) > 180) {
      const side = Math.sign(before.lonDeg);
      const way = point.lonDeg + side * 360 - before.lonDeg;
      const share = way === 0 ? 0 : (side * 180 - before.lonDeg) / way;
      const between = (a: number, b: number) => a + (b - a) * share;
      const crossing = {
        timeS: between(before.timeS, point.timeS),
        latDeg: between(before.latDeg, point.latDeg),
        heightM: between(before.heightM, point.heightM),
      };
      lines.push([...line, { ...crossing, lonDeg: side * 180 }]);
      line = [{ ...crossing, lonDeg: -side * 180 }];
    }
    line.push(point);
  }
  return [...lines, line];
}

const ENTITIES: Record<string, string> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&apos;',
};
/** Control characters cannot stand in XML 1.0 at all. */
const escaped = (text: string) =>
  text.replace(/[\u0000-\u001f\u007f]/g, ' ').replace(/[&<>"']/g, (sign) => ENTITIES[sign]!);
