/** The channel maps of GNSS and reference files, from their headers and, where those leave it open, their values. */
import type { ChannelGuess, GnssMap, ReferenceMap } from '@/shared/contracts/recordings';
import { columnIndex } from './cells';
import { Clock } from './clock';
import type { CsvHead } from './csv';
import { ColumnFinder, type FoundColumn } from './find-columns';
import { guessed, type Guess } from './guess';
import { areWhole, guessPosition, type GuessedPosition } from './guess-position';
import { guessTime, medianStep, type GuessedTime } from './guess-time';
import { guessVelocity, type GuessedVelocity } from './guess-velocity';
import { namesOtherDevice } from './header-words';
import { ATTITUDE_WORDS, GNSS_WORDS, type GnssChannel } from './vocabulary';

export type Find = (channel: GnssChannel) => FoundColumn | null;
type SigmaMap = NonNullable<GnssMap['positionSigma']>;

/** `merged`: the file is the IMU's as well. */
export function guessGnssMap(head: CsvHead, merged = false): Guess<GnssMap> {
  const finder = new ColumnFinder(head);
  const find = finderFor(finder, 'gnss');
  const time = guessTime(head, finder, 'gnss');
  const position = guessPosition(head, find);
  const missing = missingOf(time !== null, position, find);
  if (!time || !position.map) return { map: null, missing, assumed: [], guesses: [] };
  const quality = find('quality');
  const map: GnssMap = { time: time.map, position: position.map };
  const velocity = velocityOf(head, find, time, position.map);
  const positionSigma = guessPositionSigma(find);
  const velocitySigma = guessVelocitySigma(find);
  if (position.map.unit === '1e-7deg')
    takeMillimetres(head, find, velocity.map, positionSigma, velocitySigma);
  if (velocity.map) map.velocity = velocity.map;
  if (positionSigma) map.positionSigma = positionSigma;
  if (velocity.map && velocitySigma) map.velocitySigma = velocitySigma;
  if (quality) map.quality = quality.header;
  const dense = merged || typicalStepS(head, time) <= DENSE_S;
  if (dense && holdsFixes(head, map.position)) map.repeats = 'drop';
  const sigmas = ofSigma('position σ', positionSigma).concat(
    ofSigma('velocity σ', map.velocitySigma ?? null),
  );
  const guesses = [time.guess, ...position.guesses, ...velocity.guesses, ...sigmas];
  return { map, missing: [], assumed: assumedBy(time, position, velocity), guesses };
}

export function guessReferenceMap(head: CsvHead): Guess<ReferenceMap> {
  const finder = new ColumnFinder(head);
  const find = finderFor(finder, 'reference');
  const time = guessTime(head, finder, 'reference');
  const position = guessPosition(head, find);
  const missing = missingOf(time !== null, position, find);
  if (!time || !position.map) return { map: null, missing, assumed: [], guesses: [] };
  const map: ReferenceMap = { time: time.map, position: position.map };
  const velocity = velocityOf(head, find, time, position.map);
  const angles = (['roll', 'pitch', 'yaw'] as const).map((name) => finder.find(ATTITUDE_WORDS[name]));
  if (velocity.map) map.velocity = velocity.map;
  if (angles[0] && angles[1] && angles[2])
    map.attitude = {
      columns: [angles[0].header, angles[1].header, angles[2].header],
      unit: angles[0].unit === 'rad' ? 'rad' : 'deg',
    };
  const guesses = [time.guess, ...position.guesses, ...velocity.guesses];
  return { map, missing: [], assumed: assumedBy(time, position, velocity), guesses };
}

const finderFor =
  (finder: ColumnFinder, role: 'gnss' | 'reference'): Find =>
  (channel) =>
    finder.find(GNSS_WORDS[channel], (header) => !namesOtherDevice(header, role));

const assumedBy = (...parts: (GuessedTime | GuessedPosition | GuessedVelocity)[]) =>
  parts.flatMap((part) => part.assumed ?? []);

const missingOf = (hasTime: boolean, position: GuessedPosition, find: Find) => [
  ...(hasTime ? [] : ['time']),
  ...(position.map || find('lat') ? [] : ['latitude']),
  ...(position.map || find('lon') ? [] : ['longitude']),
];

function velocityOf(head: CsvHead, find: Find, time: GuessedTime, position: GnssMap['position']): GuessedVelocity {
  const clock = clockFor(head, time);
  const place = [find('lat'), find('lon')];
  const inDegrees = position.unit === 'deg' && place[0] && place[1] ? ([place[0], place[1]] as const) : null;
  return guessVelocity(head, find, (row) => clock.read(row) ?? NaN, inDegrees);
} // prettier-ignore

/** Beside angles in 10⁻⁷ degrees whole numbers without a unit are mm and mm/s, as receivers send them. */
function takeMillimetres(
  head: CsvHead,
  find: Find,
  velocity: GnssMap['velocity'],
  positionSigma: SigmaMap | null,
  velocitySigma: SigmaMap | null,
): void {
  const whole = (...channels: GnssChannel[]) => {
    const columns = channels.flatMap((channel) => find(channel) ?? []);
    return columns.every(({ unit }) => unit === null) && areWhole(head, columns);
  };
  if (velocity?.frame === 'ned' && whole('vn', 've', 'vd')) velocity.unit = 'mm/s';
  if (positionSigma && whole('sigmaHorizontal', 'sigmaVertical')) positionSigma.unit = 'mm';
  if (velocitySigma && whole('sigmaSpeed')) velocitySigma.unit = 'mm/s';
}

/** Rows that come faster than receivers give fixes, s. */
const DENSE_S = 0.04;
const STEP_ROWS = 500;

function typicalStepS(head: CsvHead, time: GuessedTime): number {
  const clock = clockFor(head, time);
  return medianStep(head.rows.slice(0, STEP_ROWS).map((row) => clock.read(row) ?? NaN));
}

const clockFor = (head: CsvHead, { map }: GuessedTime) =>
  new Clock(map, map.columns.map((name) => columnIndex(head.headers, name)), head.decimalComma); // prettier-ignore

/** A merged log that writes the last fix beside every IMU sample: far fewer positions than rows with one. */
function holdsFixes(head: CsvHead, position: GnssMap['position']): boolean {
  const at = [position.lat, position.lon].map((name) => columnIndex(head.headers, name));
  const places = head.rows
    .map((row) => at.map((i) => row[i]?.trim() ?? '').join())
    .filter((place) => place !== ',');
  const changes = places.filter((place, i) => i === 0 || place !== places[i - 1]).length;
  return places.length > 20 && places.length > 3 * changes;
}

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

const ofSigma = (channel: string, map: SigmaMap | null): ChannelGuess[] =>
  map
    ? [guessed(channel, map.columns, map.unit, 0.85, 'The headers name accuracies; they are taken as one σ.')]
    : [];
