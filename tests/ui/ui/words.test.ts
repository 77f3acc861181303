import { alignDecimal } from '@/components/ui/AlignedNumber';
import { splitFigures } from '@/components/ui/Figures';
import { formatDay } from '@/components/ui/format-day';

const figures = (line: string) =>
  splitFigures(line)
    .filter((part) => part.figure)
    .map((part) => part.text);

test.each([
  ['Crawler 2 · today 09:12 · 20 min 40 s', []],
  ['run done in 0.28 s', ['0.28']],
  ['60 001 samples at 100 Hz', ['100']],
  ['off by −0.35 s', ['−0.35']],
  ['version 3 of 12', []],
])('only what has a unit is a measured number: %s', (line, expected) => {
  expect(figures(line)).toEqual(expected);
  expect(
    splitFigures(line)
      .map((part) => part.text)
      .join(''),
  ).toBe(line);
});

test('decimal points stand under each other', () => {
  const points = ['0.598', '9.90', '722', '−12.4'].map((text) => (alignDecimal(text) + '.').indexOf('.'));
  expect(new Set(points).size).toBe(1);
});

test.each([
  ['2026-11-20T09:05:00', 'today 09:05'],
  ['2026-11-19T23:50:00', 'yesterday 23:50'],
  ['2026-11-16T08:00:00', 'Monday'],
  ['2026-11-03T08:00:00', '3 Nov'],
  ['2025-11-03T08:00:00', '3 Nov 2025'],
])('%s is told as "%s"', (iso, expected) => {
  expect(formatDay(iso, new Date('2026-11-20T12:00:00'))).toBe(expected);
});
