/** Clocks of the world: UTC and GPS time, and times written as text. */

/** Seconds from 1970-01-01 to the GPS epoch, 1980-01-06, both UTC. */
const GPS_EPOCH_UNIX_S = 315_964_800;
export const SECONDS_OF_WEEK = 604_800;

/** UNIX second from which GPS − UTC has the value beside it, s (IERS Bulletin C). */
const LEAP_SECONDS: readonly (readonly [number, number])[] = [
  [362793600, 1], [394329600, 2], [425865600, 3], [489024000, 4], [567993600, 5], [631152000, 6], [662688000, 7],
  [709948800, 8], [741484800, 9], [773020800, 10], [820454400, 11], [867715200, 12], [915148800, 13],
  [1136073600, 14], [1230768000, 15], [1341100800, 16], [1435708800, 17], [1483228800, 18],
]; // prettier-ignore

/** GPS − UTC at a UNIX time, s. */
export function leapSecondsAt(unixS: number): number {
  let leap = 0;
  for (const [from, seconds] of LEAP_SECONDS) if (unixS >= from) leap = seconds;
  return leap;
}

/** UNIX (UTC) seconds of a GPS week and whole second of week. */
export function gpsToUnixS(week: number, secondOfWeek: number): number {
  const asIfUtc = GPS_EPOCH_UNIX_S + week * SECONDS_OF_WEEK + secondOfWeek;
  return asIfUtc - leapSecondsAt(asIfUtc - leapSecondsAt(asIfUtc));
}

export function unixToGps(unixS: number): { week: number; towS: number } {
  const sinceEpoch = unixS - GPS_EPOCH_UNIX_S + leapSecondsAt(unixS);
  const week = Math.floor(sinceEpoch / SECONDS_OF_WEEK);
  return { week, towS: sinceEpoch - week * SECONDS_OF_WEEK };
}

export const unixToIso = (unixS: number) => new Date(unixS * 1000).toISOString();

const ISO_TIME =
  /^(\d{4})[-/.](\d{1,2})[-/.](\d{1,2})[T ]\s*(\d{1,2}):(\d{2})(?::(\d{2})([.,]\d+)?)?\s*(Z|UTC|[-+]\d{2}:?\d{2})?$/i;

/** A time written as 2026-03-01T10:00:00.25Z or alike; without a zone it is UTC. Null for anything else. */
export function parseIsoTime(text: string): { wholeS: number; fractionS: number } | null {
  const match = ISO_TIME.exec(text.trim());
  if (!match) return null;
  const [, year, month, day, hour, minute, second = '0', fraction = '', zone = 'Z'] = match;
  const ms = Date.UTC(
    Number(year),
    Number(month) - 1,
    Number(day),
    Number(hour),
    Number(minute),
    Number(second),
  );
  const valid = Number(month) <= 12 && Number(day) <= 31 && Number(hour) <= 24 && Number(minute) < 60;
  if (!valid || !Number.isFinite(ms)) return null;
  return {
    wholeS: ms / 1000 - zoneOffsetS(zone),
    fractionS: fraction ? Number(`0.${fraction.slice(1)}`) : 0,
  };
}

function zoneOffsetS(zone: string): number {
  const match = /^([-+])(\d{2}):?(\d{2})$/.exec(zone);
  if (!match) return 0;
  return (match[1] === '-' ? -1 : 1) * (Number(match[2]) * 3600 + Number(match[3]) * 60);
}
