/** Angles of positions as loggers write them: decimal degrees, degrees and minutes run together, sexagesimal text. */
import { numberIn } from './cells';

export type CellParser = (cell: string | undefined, decimalComma: boolean) => number | undefined;

const HEMISPHERE = /^([NSEW])?\s*(.*?)\s*([NSEW])?$/i;
const SEXAGESIMAL =
  /^([-+])?(\d{1,3})(?:\s*[°ºd]\s*|\s+)(\d{1,2}(?:[.,]\d+)?)(?:\s*['′m]\s*|\s+)?(?:(\d{1,2}(?:[.,]\d+)?)\s*(?:"|″|''|s)?)?$/i;

/** Degrees: 47.21, 47.21 N, S47.21, 47°12'36.0"N. NaN where nothing is there, undefined for anything else. */
export const degreesIn: CellParser = (cell, decimalComma) => {
  const plain = numberIn(cell, decimalComma);
  if (plain !== undefined) return plain;
  const parts = splitHemisphere(cell!);
  if (!parts) return undefined;
  const value = numberIn(parts.text, decimalComma) ?? sexagesimal(parts.text);
  return value === undefined ? undefined : parts.sign * value;
};

/** Degrees of ddmm.mmmm as receivers run them together, 4712.6 or 4712.6N. */
export const minutesIn: CellParser = (cell, decimalComma) => {
  const plain = numberIn(cell, decimalComma);
  if (plain !== undefined) return fromMinutes(plain);
  const parts = splitHemisphere(cell!);
  const value = parts && numberIn(parts.text, decimalComma);
  return value === undefined || value === null ? undefined : parts!.sign * fromMinutes(value);
};

/** +1 for N and E, −1 for S and W, NaN where nothing is there. */
export const hemisphereIn: CellParser = (cell) => {
  const letter = cell?.trim().toUpperCase() ?? '';
  if (letter === '') return NaN;
  if (/^(N|NORTH|E|EAST)$/.test(letter)) return 1;
  return /^(S|SOUTH|W|WEST)$/.test(letter) ? -1 : undefined;
};

/** NaN where the minutes reach 60: that is no such number. */
function fromMinutes(value: number): number {
  const degrees = Math.trunc(value / 100);
  const minutes = value - degrees * 100;
  return Math.abs(minutes) < 60 ? degrees + minutes / 60 : NaN;
}

function splitHemisphere(cell: string): { text: string; sign: number } | null {
  const match = HEMISPHERE.exec(cell.trim());
  const letter = match && (match[1] ?? match[3]);
  if (!match || (match[1] && match[3])) return null;
  return { text: match[2]!, sign: letter && /[SW]/i.test(letter) ? -1 : 1 };
}

function sexagesimal(text: string): number | undefined {
  const match = SEXAGESIMAL.exec(text);
  if (!match) return undefined;
  const part = (piece: string | undefined) => Number((piece ?? '0').replace(',', '.'));
  const [minutes, seconds] = [part(match[3]), part(match[4])];
  if (minutes >= 60 || seconds >= 60) return undefined;
  return (match[1] === '-' ? -1 : 1) * (Number(match[2]) + minutes / 60 + seconds / 3600);
}
