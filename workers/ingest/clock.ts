/**
 * A file's own clock brought onto the recording's axis. Clocks in plain seconds since some start keep their zero; an
 * absolute one (UNIX, GPS week, text) is counted from a whole second, so that no digit of it is lost.
 */
import type { TimeMap, TimeOrigin } from '@/shared/contracts/recordings';
import { numberIn } from './cells';
import { gpsSecondsToUnixS, gpsToUnixS, SECONDS_OF_WEEK, unixToGps, unixToIso, withoutLeapS } from './utc';
import { parseDate, parseDateTime, parseTimeOfDay, type WrittenTime } from './written-time';

/** Seconds since the clock's start from which on it can only be an absolute one. */
const ABSOLUTE_FROM_S = 1e8;
/** UNIX seconds that can be a date of a log: 1985 to 2100. */
const DATED_S: readonly [number, number] = [4.7e8, 4.1e9];

const DECIMALS: Record<'s' | 'ms' | 'us' | 'ns', number> = { s: 0, ms: 3, us: 6, ns: 9 };
const DAY_S = 86_400;
/** Counters of 16, 24 and 32 bits, and the time of the GPS week in s and ms. */
const USUAL_RANGES = [2 ** 16, 2 ** 24, 2 ** 32, SECONDS_OF_WEEK, SECONDS_OF_WEEK * 1000];

/** A source time in two parts, so that large ones keep their digits. NaN: missing. */
interface SplitTime {
  wholeS: number;
  fractionS: number;
}

export class Clock {
  /** Turns of a counter, or midnights of a time of day, so far; and the value before. */
  private turns = 0;
  private lastCount = NaN;
  private noticedRange: number | undefined;
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
    const onGps = this.map.base === 'gps-week+s' || this.map.base === 'gps-s';
    const sourceS = onGps ? gps.week * SECONDS_OF_WEEK + gps.towS : zeroS;
    return { sourceS, utc: unixToIso(zeroS), gpsWeek: gps.week, gpsTowS: gps.towS };
  }

  /** False where a cell holds something that is not a time. */
  private parse(row: readonly string[]): boolean {
    if (!this.parseParts(row)) return false;
    const { split } = this;
    if (this.map.scale === 'gps' && split.wholeS > ABSOLUTE_FROM_S) {
      const floor = Math.floor(split.wholeS);
      this.set(withoutLeapS(floor), split.wholeS - floor + split.fractionS);
    }
    return true;
  }

  private parseParts(row: readonly string[]): boolean {
    const first = row[this.indices[0]!];
    switch (this.map.base) {
      case 'iso8601':
        return this.parseText(first);
      case 'date+time':
        return this.parseDateAndTime(first, row[this.indices[1]!]);
      case 'time-of-day':
        return this.parseTimeOfDay(first);
      case 's+ns':
        return this.parseSecondsAndNanoseconds(first, row[this.indices[1]!]);
      case 'gps-week+s':
        return this.parseWeek(first, row[this.indices[1]!]);
      case 'gps-s':
        return this.parseGpsSeconds(first);
      case 'counter':
        return this.parseCounter(first);
      default:
        return this.parseCount(first, DECIMALS[this.map.base]);
    }
  }

  private set(wholeS: number, fractionS: number): true {
    this.split.wholeS = wholeS;
    this.split.fractionS = fractionS;
    return true;
  }

  private parseCount(cell: string | undefined, decimals: number): boolean {
    const value = numberIn(cell, this.decimalComma);
    if (value === undefined) return false;
    const range = this.rangeAfter(value);
    if (range !== undefined) return this.set(this.unwrapped(value, range) / 10 ** decimals, 0);
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

  private parseCounter(cell: string | undefined): boolean {
    const value = numberIn(cell, this.decimalComma);
    if (value === undefined) return false;
    const range = this.rangeAfter(value);
    return this.set((range === undefined ? value : this.unwrapped(value, range)) / (this.map.rateHz ?? 1), 0);
  }

  /** Where the count starts again: as the map says, or as is plain from a fall from the very end of a usual range. */
  private rangeAfter(value: number): number | undefined {
    const stated = this.map.wrap ?? this.noticedRange;
    if (stated !== undefined) return stated;
    if (value < this.lastCount)
      this.noticedRange = USUAL_RANGES.find(
        (range) => this.lastCount > 0.99 * range && this.lastCount < range && value < 0.01 * range,
      );
    if (this.noticedRange === undefined && !Number.isNaN(value)) this.lastCount = value;
    return this.noticedRange;
  }

  /** A fall by more than half the range is a turn; a rise by as much goes back behind it, for rows out of order. */
  private unwrapped(value: number, range: number): number {
    if (Number.isNaN(value)) return NaN;
    if (value < this.lastCount - range / 2) this.turns += 1;
    else if (value > this.lastCount + range / 2) this.turns -= 1;
    this.lastCount = value;
    return value + this.turns * range;
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

  private parseGpsSeconds(cell: string | undefined): boolean {
    const seconds = numberIn(cell, this.decimalComma);
    if (seconds === undefined) return false;
    const whole = Math.floor(seconds);
    return this.set(gpsSecondsToUnixS(whole), seconds - whole);
  }

  private parseText(cell: string | undefined): boolean {
    if (isBlank(cell)) return this.set(NaN, NaN);
    return this.setTime(parseDateTime(cell!, this.map.dateOrder, this.map.zoneMin));
  }

  private parseDateAndTime(date: string | undefined, time: string | undefined): boolean {
    if (isBlank(date) || isBlank(time)) return this.set(NaN, NaN);
    const dayS = parseDate(date!, this.map.dateOrder);
    const ofDay = parseTimeOfDay(time!);
    if (dayS === null || !ofDay) return false;
    return this.set(dayS + ofDay.wholeS - 60 * (this.map.zoneMin ?? 0), ofDay.fractionS);
  }

  /** Counts on over midnight; on the UNIX scale where the map says the day. */
  private parseTimeOfDay(cell: string | undefined): boolean {
    if (isBlank(cell)) return this.set(NaN, NaN);
    const ofDay = parseTimeOfDay(cell!);
    if (!ofDay) return false;
    const sinceS = this.unwrapped(ofDay.wholeS, DAY_S);
    const { date, zoneMin = 0 } = this.map;
    const dayS = date === undefined ? 0 : (parseDate(date) ?? 0) - 60 * zoneMin;
    return this.set(dayS + sinceS, ofDay.fractionS);
  }

  private setTime(time: WrittenTime | null): boolean {
    return time !== null && this.set(time.wholeS, time.fractionS);
  }
}

const isBlank = (cell: string | undefined) => cell === undefined || cell.trim() === '';
