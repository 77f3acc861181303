/** Position columns of a file of fixes: their unit by name, else by the range of their values. */
import type { ChannelGuess, GnssMap } from '@/shared/contracts/recordings';
import { degreesIn } from './angles';
import { numberIn } from './cells';
import type { CsvHead } from './csv';
import type { FoundColumn } from './find-columns';
import type { Find } from './guess-gnss';
import { guessed } from './guess';

type PositionMap = GnssMap['position'];

export interface GuessedPosition {
  map: PositionMap | null;
  assumed: string | null;
  guesses: ChannelGuess[];
}

interface AngleUnit {
  unit: PositionMap['unit'];
  confidence: number;
  reason: string;
}

export function guessPosition(head: CsvHead, find: Find): GuessedPosition {
  const [lat, lon] = [find('lat'), find('lon')];
  if (!lat || !lon) return guessEarthFixed(find);
  const [ellipsoid, sea, plain] = [find('heightEllipsoid'), find('heightSea'), find('heightPlain')];
  const height = ellipsoid ?? sea ?? plain;
  const { unit, confidence, reason } = angleUnit(head, lat, lon);
  const map: PositionMap = {
    lat: lat.header,
    lon: lon.header,
    unit,
    heightUnit: height?.unit === 'mm' || height?.unit === 'ft' ? height.unit : 'm',
    heightDatum: height === sea && sea !== null ? 'sea-level' : 'ellipsoid',
  };
  if (height) map.height = height.header;
  // Receivers that count angles in 10⁻⁷ degrees count lengths in mm.
  if (height && unit === '1e-7deg' && height.unit === null && areWhole(head, [height])) map.heightUnit = 'mm';
  const [ns, ew] = [find('latHemisphere'), find('lonHemisphere')];
  if (ns && ew && holdsLetters(head, ns, /^[NS]/i) && holdsLetters(head, ew, /^[EW]/i))
    Object.assign(map, { latHemisphere: ns.header, lonHemisphere: ew.header });
  const guesses = [guessed('position', [lat.header, lon.header], unit, confidence, reason)];
  if (height) guesses.push(heightGuess(height, map, height === plain));
  const assumed =
    height && height === plain
      ? `The column “${plain.header}” does not say above what it counts: taken as height above the ellipsoid.`
      : null;
  return { map, assumed, guesses };
}

function heightGuess(height: FoundColumn, map: PositionMap, isPlain: boolean): ChannelGuess {
  const above = map.heightDatum === 'sea-level' ? 'above sea level' : 'above the ellipsoid';
  return guessed(
    'height',
    [height.header],
    `${map.heightUnit} ${above}`,
    isPlain ? 0.5 : 0.85,
    isPlain
      ? `“${height.header}” does not say above what it counts.`
      : `The header “${height.header}” means height ${above}.`,
  );
}

function guessEarthFixed(find: Find): GuessedPosition {
  const axes = [find('ecefX'), find('ecefY'), find('ecefZ')];
  const [x, y, z] = axes;
  if (!x || !y || !z) return { map: null, assumed: null, guesses: [] };
  return {
    map: {
      lat: x.header,
      lon: y.header,
      height: z.header,
      unit: 'ecef',
      heightUnit: 'm',
      heightDatum: 'ellipsoid',
    },
    assumed: null,
    guesses: [
      guessed(
        'position',
        axes.map((axis) => axis!.header),
        'ecef',
        0.95,
        'The headers name Earth-fixed X, Y and Z.',
      ),
    ],
  };
}

function angleUnit(head: CsvHead, lat: FoundColumn, lon: FoundColumn): AngleUnit {
  const lats = valuesOf(head, lat);
  const lons = valuesOf(head, lon);
  const largest = (values: readonly number[]) => values.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  const [maxLat, maxLon] = [largest(lats), largest(lons)];
  const usual = [...lats].map(Math.abs).sort((a, b) => a - b)[lats.length >> 1] ?? 0;
  if (lat.unit === 'rad')
    return maxLat <= Math.PI / 2
      ? { unit: 'rad', confidence: 0.98, reason: 'The headers say radians, and the values lie within ±π/2.' }
      : { unit: 'rad', confidence: 0.2, reason: `The headers say radians, but a latitude of ${maxLat} is beyond ±π/2.` };
  if (lats.length === 0) return { unit: 'deg', confidence: 0.5, reason: 'No fix lies in the first rows: degrees are only a guess.' };
  if (usual > 1e5 && lats.every(Number.isInteger))
    return { unit: '1e-7deg', confidence: 0.95, reason: 'Whole numbers of this size are 10⁻⁷ degrees.' };
  const swapped = usual <= 180 && maxLon <= 90;
  if (usual > 90 && !swapped && maxLat <= 9000 && maxLon <= 18_000 && [...lats, ...lons].every((value) => Math.abs(value) % 100 < 60))
    return { unit: 'ddmm.mmmm', confidence: 0.95, reason: 'Values beyond 90 whose last two whole digits stay below 60 are degrees and minutes.' };
  if (lat.unit !== 'deg' && maxLat <= Math.PI / 2 && maxLon <= Math.PI && maxLat > 0)
    return { unit: 'rad', confidence: 0.7, reason: 'No unit is named, and all values lie within ±π/2 and ±π, as radians do.' };
  if (maxLat > 90)
    return { unit: 'deg', confidence: 0.2, reason: `A latitude of ${maxLat} is beyond ±90°: perhaps the columns are swapped.` };
  return lat.unit === 'deg'
    ? { unit: 'deg', confidence: 0.98, reason: 'The headers say degrees, and the values lie within ±90° and ±180°.' }
    : { unit: 'deg', confidence: 0.95, reason: 'The values lie within ±90° and ±180°, and beyond what radians could be.' };
} // prettier-ignore

/** Fixes that are none (0, 0) left out. */
function valuesOf(head: CsvHead, { index }: FoundColumn): number[] {
  return head.rows.flatMap((row) => {
    const value = numberIn(row[index], head.decimalComma) ?? degreesIn(row[index], head.decimalComma);
    return value === undefined || Number.isNaN(value) || value === 0 ? [] : [value];
  });
}

/** Whole numbers and at least one of them. */
export function areWhole(head: CsvHead, columns: readonly FoundColumn[]): boolean {
  const values = columns.flatMap((column) => valuesOf(head, column));
  return values.length > 0 && values.every(Number.isInteger);
}

const holdsLetters = (head: CsvHead, { index }: FoundColumn, letter: RegExp) =>
  head.rows.some((row) => letter.test((row[index] ?? '').trim()));
