/** Times written as text: ISO 8601, local dates in any order, times of day, UTC as receivers pack it (hhmmss.ss). */

export interface WrittenTime {
  /** UNIX seconds, or seconds since midnight for a time of day. */
  wholeS: number;
  fractionS: number;
}

export type DateOrder = 'ymd' | 'dmy' | 'mdy';

const DATE = String.raw`(\d{1,4})([-/.\s])(\d{1,2})\2(\d{1,4})`;
const TIME = String.raw`(\d{1,2}):(\d{2})(?::(\d{2})([.,]\d+)?)?\s*([ap]\.?m\.?)?`;
const ZONE = String.raw`(Z|UTC|GMT|[-+]\d{2}(?::?\d{2})?)?`;
const DATE_TIME = new RegExp(String.raw`^${DATE}(?:T|\s|_|,)\s*${TIME}\s*${ZONE}$`, 'i');
const PACKED =
  /^(\d{4})(\d{2})(\d{2})[T _-]?(\d{2}):?(\d{2}):?(\d{2})([.,]\d+)?\s*(Z|UTC|GMT|[-+]\d{2}(?::?\d{2})?)?$/i;
const TIME_OF_DAY = new RegExp(`^${TIME}$`, 'i');
const PACKED_TIME = /^(\d{2})(\d{2})(\d{2})([.,]\d+)?$/;
const DATE_ALONE = new RegExp(`^${DATE}$`);
const PACKED_DATE = /^(\d{2})(\d{2})(\d{2}|\d{4})$/;

/** Date and time of day. Without a zone in the text it is `zoneMin` minutes ahead of UTC. Null for anything else. */
export function parseDateTime(text: string, order: DateOrder = 'ymd', zoneMin = 0): WrittenTime | null {
  const trimmed = text.trim();
  const match = DATE_TIME.exec(trimmed);
  if (match) {
    const dayS = dayOf(match[1]!, match[3]!, match[4]!, order);
    const time = timeOf(match[5]!, match[6]!, match[7], match[8], match[9]);
    return dayS === null || !time ? null : shifted(dayS, time, match[10], zoneMin);
  }
  const packed = PACKED.exec(trimmed);
  if (!packed) return null;
  const dayS = daySeconds(Number(packed[1]), Number(packed[2]), Number(packed[3]));
  const time = timeOf(packed[4]!, packed[5]!, packed[6], packed[7], undefined);
  return dayS === null || !time ? null : shifted(dayS, time, packed[8], zoneMin);
}

/** Seconds since midnight of 10:00:00.25, 10:00 PM, or 100000.25. Null for anything else. */
export function parseTimeOfDay(text: string): WrittenTime | null {
  const trimmed = text.trim();
  const match = TIME_OF_DAY.exec(trimmed);
  if (match) return timeOf(match[1]!, match[2]!, match[3], match[4], match[5]);
  const packed = PACKED_TIME.exec(trimmed);
  return packed && timeOf(packed[1]!, packed[2]!, packed[3], packed[4], undefined);
}

/** UNIX seconds of a date's midnight: 2026-03-01, 1.3.2026, 20260301, 010326 (day first unless `order` says mdy). */
export function parseDate(text: string, order: DateOrder = 'ymd'): number | null {
  const trimmed = text.trim();
  const match = DATE_ALONE.exec(trimmed);
  if (match) return dayOf(match[1]!, match[3]!, match[4]!, order);
  if (/^\d{8}$/.test(trimmed) && order === 'ymd')
    return daySeconds(Number(trimmed.slice(0, 4)), Number(trimmed.slice(4, 6)), Number(trimmed.slice(6)));
  const packed = PACKED_DATE.exec(trimmed);
  return packed && dayOf(packed[1]!, packed[2]!, packed[3]!, order === 'ymd' ? 'dmy' : order);
}

/** Which of day and month comes first in dates written `text`; null where either may. Year first is always told. */
export function dateOrderOf(texts: readonly string[]): DateOrder | null {
  let order: DateOrder | null = null;
  for (const text of texts) {
    const match = new RegExp(`^${DATE}`).exec(text.trim());
    if (!match) continue;
    if (match[1]!.length === 4) return 'ymd';
    if (Number(match[1]) > 12) return 'dmy';
    if (Number(match[3]) > 12) return 'mdy';
    if (match[2] === '.') order = 'dmy';
  }
  return order;
}

function dayOf(a: string, b: string, c: string, order: DateOrder): number | null {
  if (a.length === 4) return daySeconds(Number(a), Number(b), Number(c));
  if (a.length > 2 || c.length === 3) return null;
  const year = c.length === 4 ? Number(c) : 2000 + Number(c);
  return order === 'mdy' ? daySeconds(year, Number(a), Number(b)) : daySeconds(year, Number(b), Number(a));
}

function daySeconds(year: number, month: number, day: number): number | null {
  const ms = Date.UTC(year, month - 1, day);
  return new Date(ms).getUTCMonth() === month - 1 && day > 0 ? ms / 1000 : null;
}

/** A leap second, 23:59:60, is let through: UNIX time counts it as the next midnight. */
function timeOf(hours: string, minutes: string, seconds = '0', fraction = '', half = ''): WrittenTime | null {
  const twelve = half ? (Number(hours) % 12) + (/^p/i.test(half) ? 12 : 0) : Number(hours);
  if (twelve > 24 || Number(minutes) > 59 || Number(seconds) > 60) return null;
  return {
    wholeS: twelve * 3600 + Number(minutes) * 60 + Number(seconds),
    fractionS: fraction ? Number(`0.${fraction.slice(1)}`) : 0,
  };
}

function shifted(dayS: number, time: WrittenTime, zone: string | undefined, zoneMin: number): WrittenTime {
  const ahead = zone === undefined ? zoneMin * 60 : zoneOffsetS(zone);
  return { wholeS: dayS + time.wholeS - ahead, fractionS: time.fractionS };
}

function zoneOffsetS(zone: string): number {
  const match = /^([-+])(\d{2}):?(\d{2})?$/.exec(zone);
  if (!match) return 0;
  return (match[1] === '-' ? -1 : 1) * (Number(match[2]) * 3600 + Number(match[3] ?? 0) * 60);
}
