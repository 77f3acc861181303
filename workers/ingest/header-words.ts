/** Headers taken apart: a plain name and a unit, whatever the case, the brackets, the separators. */
import type { FileRole } from '@/shared/contracts/recordings';

export type UnitQuantity = 'time' | 'rate' | 'accel' | 'angle' | 'length' | 'speed' | 'pressure';

/** Spellings of units, without case, separators and exponent signs, and what they are called in a channel map. */
export const UNIT_WORDS: Record<UnitQuantity, Record<string, string>> = {
  time: {
    s: 's', sec: 's', secs: 's', second: 's', seconds: 's',
    ms: 'ms', msec: 'ms', msecs: 'ms', millis: 'ms', millisec: 'ms', millisecond: 'ms', milliseconds: 'ms',
    us: 'us', usec: 'us', usecs: 'us', micros: 'us', microsec: 'us', microsecond: 'us', microseconds: 'us',
    ns: 'ns', nsec: 'ns', nsecs: 'ns', nanos: 'ns', nanosec: 'ns', nanosecond: 'ns', nanoseconds: 'ns',
    utc: 'iso8601', iso: 'iso8601', iso8601: 'iso8601',
  },
  rate: {
    rads: 'rad/s', radps: 'rad/s', radsec: 'rad/s', radpersec: 'rad/s', radianss: 'rad/s', radians1: 'rad/s', rads1: 'rad/s',
    degs: 'deg/s', degps: 'deg/s', dps: 'deg/s', degsec: 'deg/s', degpersec: 'deg/s', degreess: 'deg/s', degs1: 'deg/s', degreessec: 'deg/s',
    degh: 'deg/h', degph: 'deg/h', deghr: 'deg/h', dph: 'deg/h', degreesh: 'deg/h',
    rad: 'rad', deg: 'deg',
  },
  accel: {
    ms2: 'm/s^2', mps2: 'm/s^2', mss: 'm/s^2', msec2: 'm/s^2', mpss: 'm/s^2', meterss2: 'm/s^2', metress2: 'm/s^2',
    g: 'g', gs: 'g', gee: 'g', mg: 'mg', millig: 'mg',
    ms: 'm/s', mps: 'm/s', gsec: 'g*s',
  },
  angle: { deg: 'deg', degs: 'deg', degree: 'deg', degrees: 'deg', rad: 'rad', rads: 'rad', radian: 'rad', radians: 'rad' },
  length: { m: 'm', meter: 'm', meters: 'm', metre: 'm', metres: 'm', mm: 'mm', millimeters: 'mm', millimetres: 'mm', ft: 'ft', feet: 'ft', foot: 'ft' },
  pressure: {
    pa: 'Pa', pascal: 'Pa', hpa: 'hPa', mbar: 'hPa', millibar: 'hPa', kpa: 'kPa',
  },
  speed: {
    ms: 'm/s', mps: 'm/s', msec: 'm/s', meterss: 'm/s', metress: 'm/s', metersec: 'm/s', ms1: 'm/s',
    mms: 'mm/s', mmps: 'mm/s',
    kmh: 'km/h', kph: 'km/h', kmph: 'km/h', kmhr: 'km/h',
    kn: 'kn', kt: 'kn', kts: 'kn', knot: 'kn', knots: 'kn',
  },
}; // prettier-ignore

/** One way to read a header: its plain name, and the text that would then be its unit. */
export interface HeaderReading {
  name: string;
  unit: string | null;
}

/** Words that say which device a column belongs to and nothing else. */
const IMU_WORDS = [
  'imu',
  'ins',
  'sensor',
  'body',
  'raw',
  'cal',
  'calibrated',
  'data',
  'field',
  'msg',
  'header',
  'value',
];
const GNSS_WORDS = ['gnss', 'gps', 'rtk', 'receiver', 'antenna', 'nav', 'pvt', 'raw', 'data'];
/** Units in three parts at most: `m_s_2`. */
const MAX_UNIT_TOKENS = 3;

/**
 * All readings of a header, the most telling first: unit in brackets, unit as the last words, no unit.
 * `unitBelow` is what a row of units says of the column.
 */
export function readHeader(header: string, unitBelow: string | null = null): HeaderReading[] {
  const plain = simplified(header);
  const bracket = /[([{]([^)\]}]*)[)\]}]?\s*$/.exec(plain);
  const bare = bracket ? plain.slice(0, bracket.index) : plain;
  const unit = unitBelow ? compact(simplified(unitBelow)) : bracket ? compact(bracket[1]!) : null;
  const tokens = words(bare);
  const readings: HeaderReading[] = [];
  for (const some of withoutDeviceWords(tokens)) {
    const name = some.join('');
    if (unit) readings.push({ name, unit });
    for (let n = Math.min(MAX_UNIT_TOKENS, some.length - 1); n >= 1; n -= 1)
      readings.push({ name: some.slice(0, -n).join(''), unit: some.slice(-n).join('') });
    readings.push({ name, unit: null });
  }
  return readings;
}

/** Whether a header names the device of another kind of file: an IMU stamp in a merged log is no GNSS time. */
export function namesOtherDevice(header: string, role: FileRole): boolean {
  const tokens = words(simplified(header));
  const has = (list: string[]) => tokens.some((token) => list.includes(token));
  return role === 'imu' || role === 'imu2'
    ? has(['gnss', 'gps', 'rtk'])
    : role === 'gnss' && has(['imu', 'ins']);
}

/** The unit that `text` means for a quantity; null where it means none. */
export const unitOf = (quantity: UnitQuantity, text: string) => UNIT_WORDS[quantity][text] ?? null;

/** Lower case, signs of units in letters. A broken byte is nearly always a degree sign in an older encoding. */
function simplified(text: string): string {
  return text
    .replace(/([a-z])([A-Z])/g, '$1 $2')
    .toLowerCase()
    .replace(/[°º\uFFFD]/g, ' deg')
    .replace(/[µμ]/g, 'u')
    .replace(/²/g, '2')
    .replace(/σ/g, ' sigma ')
    .replace(/\bper\b/g, '/');
}

export const words = (text: string) => text.split(/[^a-z0-9]+/).filter((word) => word !== '');
const compact = (text: string) => words(text).join('');

function withoutDeviceWords(tokens: readonly string[]): string[][] {
  const known = [...IMU_WORDS, ...GNSS_WORDS];
  const fewer = tokens.filter((token) => !known.includes(token));
  return fewer.length > 0 && fewer.length < tokens.length ? [[...tokens], fewer] : [[...tokens]];
}
