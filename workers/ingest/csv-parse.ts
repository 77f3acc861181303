/** Text to rows of cells through papaparse; blanks as delimiter are gathered first. */
import Papa from 'papaparse';

interface PapaResult {
  data: string[][];
  meta: { cursor: number };
}

export interface ParsedPart {
  rows: string[][];
  /** What was not parsed: the start of a row that the next piece may continue. */
  rest: string;
}

/** With `ignoreLast` the last row is left over unless its line has ended. */
export function parsePart(text: string, delimiter: string, ignoreLast: boolean): ParsedPart {
  const even = delimiter === ' ' ? gathered(text) : text;
  const parser = new Papa.Parser({ delimiter, newline: '\n' });
  const result = parser.parse(even, 0, ignoreLast) as PapaResult;
  return { rows: result.data, rest: ignoreLast ? even.slice(result.meta.cursor) : '' };
}

export const parseAll = (text: string, delimiter: string) => parsePart(text, delimiter, false).rows;

/** Runs of blanks (and tabs among them) as one, none at the ends of lines. */
const gathered = (text: string) =>
  text
    .replace(/[ \t]+/g, ' ')
    .replace(/^ /gm, '')
    .replace(/ \n/g, '\n');
