/**
 * A file's own clock brought onto the recording's axis. Clocks in plain seconds since some start keep their zero; an
 * absolute one (UNIX, GPS week, text) is counted from a whole second, so that no digit of it is lost.
 */
import type { TimeMap, TimeOrigin } from '@/shared/contracts/recordings';
import { numberIn } from './cells';
import { gpsToUnixS, parseIsoTime, SECONDS_OF_WEEK, unixToGps, unixToIso } from './utc';

/** Seconds since the clock's start from which on it can only be an absolute one. */
const ABSOLUTE_FROM_S = 1e8;
/** UNIX seconds that can be a date of a log: 1985 to 2100. */
const DATED_S: readonly [number, number] = [4.7e8, 4.1e9];

const DECIMALS: Record<'s' | 'ms' | 'us' | 'ns', number> = { s: 0, ms: 3, us: 6, ns: 9 };

/** A source time in two parts, so that large ones keep their digits. NaN: missing. */
interface SplitTime {
  wholeS: number;
  fractionS: number;
}

export class Clock {
  /** What is subtracted, on the UNIX scale where the clock is absolute; 0 for a plain one. */
  private originS = 0;
  private readonly split: SplitTime = { wholeS: NaN, fractionS: NaN };

  constructor(
    private readonly map: TimeMap,
    /** Numbers of the map's columns in a row. */
    private readonly indices: readonly number[],
    private readonly decimalComma: boolean,
  ) {}

  /** The zero that this clock proposes after a first row; 0 where it keeps its own. Undefined: no time in the row. */
  proposedOriginS(row: readonly string[]): number | undefined {
    if (!this.parse(row) || Number.isNaN(this.split.wholeS)) return undefined;
    const { wholeS, fractionS } = this.split;
    return Math.abs(wholeS) > ABSOLUTE_FROM_S ? Math.floor(wholeS + fractionS) : 0;
  }

  useOrigin(originS: number): void {
    this.originS = originS;
  }

  /** Seconds on the axis: NaN where the row has none, undefined where it is not a time. */
  read(row: readonly string[]): number | undefined {
    if (!this.parse(row)) return undefined;
    return this.split.wholeS - this.originS + this.split.fractionS + this.map.offsetS;
  }

  /** What the recording says of its zero, for the clock of the IMU file. */
  timeOrigin(): TimeOrigin {
    const zeroS = this.originS - this.map.offsetS;
    const dated = zeroS >= DATED_S[0] && zeroS <= DATED_S[1] && this.originS !== 0;
    if (!dated) return { sourceS: zeroS, utc: null, gpsWeek: null, gpsTowS: null };
    const gps = unixToGps(zeroS);
    const sourceS = this.map.base === 'gps-week+s' ? gps.week * SECONDS_OF_WEEK + gps.towS : zeroS;
    return { sourceS, utc: unixToIso(zeroS), gpsWeek: gps.week, gpsTowS: gps.towS };
  }

  /** False where a cell holds something that is not a time. */
  private parse(row: readonly string[]): boolean {
    const first = row[this.indices[0]!];
    const { base } = this.map;
    if (base === 'iso8601') return this.parseText(first);
    if (base === 's+ns') return this.parseSecondsAndNanoseconds(first, row[this.indices[1]!]);
    if (base === 'gps-week+s') return this.parseWeek(first, row[this.indices[1]!]);
    return this.parseCount(first, DECIMALS[base]);
  }

  private set(wholeS: number, fractionS: number): true {
    this.split.wholeS = wholeS;
    this.split.fractionS = fractionS;
    return true;
  }

  private parseCount(cell: string | undefined, decimals: number): boolean {
    const value = numberIn(cell, this.decimalComma);
    if (value === undefined) return false;
    const seconds = value / 10 ** decimals;
    if (!(Math.abs(seconds) > ABSOLUTE_FROM_S)) return this.set(seconds, 0);
    const text = cell!.trim().replace(',', '.');
    const digits = /^(\d+)(?:\.(\d*))?$/.exec(text);
    if (!digits) return this.set(seconds, 0);
    const whole = digits[1]!;
    const cut = whole.length - decimals;
    const fraction = whole.slice(cut) + (digits[2] ?? '');
    return this.set(Number(whole.slice(0, cut)), fraction ? Number(`0.${fraction}`) : 0);
  }

  private parseSecondsAndNanoseconds(first: string | undefined, second: string | undefined): boolean {
    const seconds = numberIn(first, this.decimalComma);
    const nanoseconds = numberIn(second, this.decimalComma);
    if (seconds === undefined || nanoseconds === undefined) return false;
    return this.set(seconds, nanoseconds / 1e9);
  }

  private parseWeek(week: string | undefined, secondsOfWeek: string | undefined): boolean {
    const weeks = numberIn(week, this.decimalComma);
    const seconds = numberIn(secondsOfWeek, this.decimalComma);
    if (weeks === undefined || seconds === undefined) return false;
    const whole = Math.floor(seconds);
    return this.set(gpsToUnixS(weeks, whole), seconds - whole);
  }

  private parseText(cell: string | undefined): boolean {
    if (cell === undefined || cell.trim() === '') return this.set(NaN, NaN);
    const time = parseIsoTime(cell);
    return time !== null && this.set(time.wholeS, time.fractionS);
  }
}
