/**
 * One NMEA 0183 sentence as numbers. Empty fields stay missing (NaN), which the general parsers at hand turn into zeros,
 * and a checksum that does not fit refuses the sentence.
 */
import { hemisphereIn, minutesIn } from './angles';
import { parseDate, parseTimeOfDay } from './written-time';

/** What a sentence says of the epoch; NaN where it says nothing. */
export interface NmeaFacts {
  kind: string;
  /** Since midnight UTC, s. */
  timeOfDayS: number;
  /** UNIX seconds of the day's midnight. */
  dayS: number;
  latDeg: number;
  lonDeg: number;
  /** Above mean sea level, and of that above the ellipsoid, m. */
  heightM: number;
  separationM: number;
  speedMPerS: number;
  courseDeg: number;
  sigmaM: readonly [number, number, number];
  /** 0: no fix. */
  quality: number;
  /** GSA: 1 none, 2 in the plane, 3 in space. */
  fixMode: number;
}

const NOTHING: Omit<NmeaFacts, 'kind'> = {
  timeOfDayS: NaN, dayS: NaN, latDeg: NaN, lonDeg: NaN, heightM: NaN, separationM: NaN, speedMPerS: NaN, courseDeg: NaN,
  sigmaM: [NaN, NaN, NaN], quality: NaN, fixMode: NaN,
}; // prettier-ignore
const SENTENCE = /^\$([A-Z]{2}|P)([A-Z]{3}),([^*]*)(?:\*([0-9A-F]{2}))?\s*$/i;
const KNOT_M_S = 1852 / 3600;

export type NmeaOutcome = NmeaFacts | 'unknown' | 'damaged';

/** `text` begins with '$'. A sentence without a checksum is taken; whoever calls may know better. */
export function parseSentence(text: string): NmeaOutcome {
  const match = SENTENCE.exec(text.trim());
  if (!match) return 'damaged';
  if (match[4] !== undefined && checksum(text) !== parseInt(match[4], 16)) return 'damaged';
  const fields = match[3]!.split(',');
  const read = READERS[match[2]!.toUpperCase()];
  return read ? { ...NOTHING, ...read(fields), kind: match[2]!.toUpperCase() } : 'unknown';
}

export const hasChecksum = (text: string) => /\*[0-9A-F]{2}\s*$/i.test(text);

/** Exclusive or over what stands between '$' and '*'. */
function checksum(text: string): number {
  let sum = 0;
  for (let i = 1; i < text.length && text[i] !== '*'; i += 1) sum ^= text.charCodeAt(i);
  return sum;
}

const READERS: Record<string, (f: readonly string[]) => Partial<NmeaFacts>> = {
  GGA: (f) => ({
    timeOfDayS: timeOfDay(f[0]),
    ...position(f[1], f[2], f[3], f[4]),
    quality: number(f[5]),
    heightM: number(f[8]),
    separationM: number(f[10]),
  }),
  RMC: (f) => ({
    timeOfDayS: timeOfDay(f[0]),
    quality: f[1]?.toUpperCase() === 'V' ? 0 : NaN,
    ...position(f[2], f[3], f[4], f[5]),
    speedMPerS: number(f[6]) * KNOT_M_S,
    courseDeg: number(f[7]),
    dayS: f[8] ? (parseDate(f[8], 'dmy') ?? NaN) : NaN,
  }),
  VTG: (f) => ({
    courseDeg: number(f[0]),
    speedMPerS: Number.isNaN(number(f[4])) ? number(f[6]) / 3.6 : number(f[4]) * KNOT_M_S,
  }),
  GST: (f) => ({ timeOfDayS: timeOfDay(f[0]), sigmaM: [number(f[5]), number(f[6]), number(f[7])] }),
  GSA: (f) => ({ fixMode: number(f[1]) }),
  ZDA: (f) => ({
    timeOfDayS: timeOfDay(f[0]),
    dayS: f[1] && f[2] && f[3] ? (parseDate(`${f[1]}.${f[2]}.${f[3]}`, 'dmy') ?? NaN) : NaN,
  }),
};

const number = (field: string | undefined) =>
  field === undefined || field.trim() === '' ? NaN : Number(field);

function timeOfDay(field: string | undefined): number {
  const time = field ? parseTimeOfDay(field) : null;
  return time ? time.wholeS + time.fractionS : NaN;
}

function position(lat = '', ns = '', lon = '', ew = ''): Pick<NmeaFacts, 'latDeg' | 'lonDeg'> {
  const signed = (cell: string, letter: string) =>
    (minutesIn(cell, false) ?? NaN) * (hemisphereIn(letter, false) ?? NaN);
  return { latDeg: signed(lat, ns), lonDeg: signed(lon, ew) };
}
