/** GPX 1.0 and 1.1 as rows of a table: each track point is cut out of the stream and parsed by itself, so memory stays flat. */
import { XMLParser } from 'fast-xml-parser';
import type { FileRole } from '@/shared/contracts/recordings';
import type { CsvBatch, CsvHead } from './csv';
import { FILE_NAMES, rejection } from './problems';

const OPEN = /<(?:[\w-]+:)?trkpt[\s>/]/i;
const CLOSE = /<\/(?:[\w-]+:)?trkpt\s*>/i;
/** No point of a track is longer. */
const MAX_POINT_CHARS = 256 * 1024;

const parser = new XMLParser({
  ignoreAttributes: false,
  attributeNamePrefix: '@',
  parseTagValue: false,
  parseAttributeValue: false,
  removeNSPrefix: true,
  processEntities: false,
});

export const looksLikeXml = (text: string) => /^\s*<(\?xml|!--|[a-z]+[\s>:])/i.test(text.slice(0, 200));

/** Throws IntakeRejected for other XML, and for a track without points or without times. */
export function gpxHead(text: string, complete: boolean, role: FileRole): CsvHead {
  if (!/<(?:[\w-]+:)?gpx[\s>]/i.test(text.slice(0, 8192)))
    throw rejection(
      'xml-unknown', { file: role, line: 1 },
      `The ${FILE_NAMES[role]} is XML, but not GPX.`,
      'Export the track as GPX 1.1 or as CSV and upload that.',
    ); // prettier-ignore
  const cutter = new PointCutter(role);
  const points = cutter.take(text).map(({ xml }) => pointOf(xml));
  const geoid = points.some((point) => point.geoidheight !== '');
  if (points.length === 0 || points.every((point) => point.time === ''))
    throw rejection(
      'gpx-no-time', { file: role },
      points.length === 0
        ? `The ${FILE_NAMES[role]} is GPX without a track: no track point was found${complete ? '' : ' at its start'}.`
        : `The track points of the ${FILE_NAMES[role]} tell no time.`,
      'Export the recorded track (not a route or a plan), with the time of each point.',
    ); // prettier-ignore
  return {
    delimiter: ',',
    headers: ['utc', 'latitude_deg', 'longitude_deg', geoid ? 'height_ellipsoid_m' : 'elevation_m', 'speed_m_s', 'course_deg', 'fix'],
    units: null,
    headerLine: null,
    firstLine: 1,
    decimalComma: false,
    rows: points.map((point) => rowOf(point, geoid)),
    complete,
    format: 'gpx',
    geoid,
  }; // prettier-ignore
}

/** Throws IntakeRejected for a point that never ends. */
export async function* gpxRows(
  chunks: AsyncGenerator<string>,
  geoid: boolean,
  role: FileRole,
): AsyncGenerator<CsvBatch> {
  const cutter = new PointCutter(role);
  for await (const chunk of chunks) {
    const points = cutter.take(chunk);
    if (points.length > 0)
      yield {
        rows: points.map(({ xml }) => rowOf(pointOf(xml), geoid)),
        lines: points.map(({ line }) => line),
      };
  }
}

interface Point {
  lat: string;
  lon: string;
  ele: string;
  time: string;
  speed: string;
  course: string;
  geoidheight: string;
  fix: string;
}

function pointOf(xml: string): Point {
  const parsed = parser.parse(xml) as Record<string, unknown>;
  const found: Record<string, string> = {};
  gather(Object.values(parsed)[0], found);
  const get = (name: string) => found[name] ?? '';
  return {
    lat: get('@lat'), lon: get('@lon'), ele: get('ele'), time: get('time'), speed: get('speed'), course: get('course'),
    geoidheight: get('geoidheight'), fix: get('fix'),
  }; // prettier-ignore
}

/** Extensions carry speed and course one or two levels down; the outermost of a name stands. */
function gather(node: unknown, into: Record<string, string>): void {
  if (typeof node !== 'object' || node === null) return;
  const entries = Object.entries(node);
  for (const [name, value] of entries)
    if (typeof value === 'string') into[name.toLowerCase()] ??= value.trim();
  for (const [, value] of entries) gather(value, into);
}

function rowOf(point: Point, geoid: boolean): string[] {
  const height = !geoid ? point.ele : point.ele && point.geoidheight ? String(Number(point.ele) + Number(point.geoidheight)) : '';
  const fix = point.fix === '' ? '1' : point.fix.toLowerCase() === 'none' ? '0' : '1';
  return [point.time, point.lat, point.lon, height, point.speed, point.course, fix];
} // prettier-ignore

class PointCutter {
  private held = '';
  private line = 1;

  constructor(private readonly role: FileRole) {}

  /** Whole points so far, each with the line that it begins in. */
  take(chunk: string): { xml: string; line: number }[] {
    const points: { xml: string; line: number }[] = [];
    let text = this.held + chunk;
    for (;;) {
      const start = text.search(OPEN);
      if (start < 0) {
        text = this.skip(text, Math.max(0, text.length - 40));
        break;
      }
      text = this.skip(text, start);
      const end = endOf(text);
      if (end < 0) break;
      points.push({ xml: text.slice(0, end), line: this.line });
      text = this.skip(text, end);
    }
    this.held = text;
    if (text.length > MAX_POINT_CHARS)
      throw rejection(
        'gpx-damaged', { file: this.role, line: this.line },
        `The track point in line ${this.line} of the ${FILE_NAMES[this.role]} does not end.`,
        'Check that the file was copied completely, then upload it again.',
      ); // prettier-ignore
    return points;
  }

  private skip(text: string, to: number): string {
    for (let i = 0; i < to; i += 1) if (text.charCodeAt(i) === 10) this.line += 1;
    return text.slice(to);
  }
}

/** A point ends with its closing tag, or at once: <trkpt … />. */
function endOf(text: string): number {
  const tag = text.indexOf('>');
  if (tag < 0) return -1;
  if (text[tag - 1] === '/') return tag + 1;
  const close = CLOSE.exec(text);
  return close ? close.index + close[0].length : -1;
}
