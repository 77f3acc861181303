/** A number as people type it: decimal point or comma, a true minus, spaces between thousands. undefined: empty; NaN: no number. */
export function parseNumber(text: string): number | undefined {
  const plain = text
    .trim()
    .replace(/[\s\u2009\u202f]/g, '')
    .replace('−', '-')
    .replace(',', '.');
  if (plain === '') return undefined;
  return /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(plain) ? Number(plain) : Number.NaN;
}
