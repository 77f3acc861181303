/** Clocks of the world: UTC and GPS time. */

/** Seconds from 1970-01-01 to the GPS epoch, 1980-01-06, both UTC. */
const GPS_EPOCH_UNIX_S = 315_964_800;
export const SECONDS_OF_WEEK = 604_800;
const WEEKS_OF_TURN = 1024;

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

/**
 * UNIX (UTC) seconds of a GPS week and whole second of week. Receivers that send ten bits of the week number start again
 * from 0 every 1024 weeks; such numbers are taken as of the turn of April 2019.
 */
export function gpsToUnixS(week: number, secondOfWeek: number): number {
  const full = week >= 0 && week < WEEKS_OF_TURN ? week + 2 * WEEKS_OF_TURN : week;
  return gpsSecondsToUnixS(full * SECONDS_OF_WEEK + secondOfWeek);
}

/** UNIX (UTC) seconds of whole seconds since the GPS epoch. */
export const gpsSecondsToUnixS = (sinceEpoch: number) => withoutLeapS(GPS_EPOCH_UNIX_S + sinceEpoch);

/** UTC of a date and time that are written on the GPS scale, both as UNIX seconds. */
export const withoutLeapS = (gpsUnixS: number) =>
  gpsUnixS - leapSecondsAt(gpsUnixS - leapSecondsAt(gpsUnixS));

export function unixToGps(unixS: number): { week: number; towS: number } {
  const sinceEpoch = unixS - GPS_EPOCH_UNIX_S + leapSecondsAt(unixS);
  const week = Math.floor(sinceEpoch / SECONDS_OF_WEEK);
  return { week, towS: sinceEpoch - week * SECONDS_OF_WEEK };
}

export const unixToIso = (unixS: number) => new Date(unixS * 1000).toISOString();
