import { parseNumber } from '@/components/forms/parse-number';

test.each([
  ['0.35', 0.35],
  ['0,35', 0.35],
  ['−1.2', -1.2],
  ['-1.2', -1.2],
  ['1 200', 1200],
  ['2e-3', 0.002],
  ['.5', 0.5],
])('%s is %d', (text, value) => {
  expect(parseNumber(text)).toBe(value);
});

test('an empty field is no number and no fault', () => {
  expect(parseNumber('  ')).toBeUndefined();
});

test.each(['abc', '1.2.3', '--4', '1,2,3', '0x10', 'Infinity'])('%s is a fault', (text) => {
  expect(parseNumber(text)).toBeNaN();
});
