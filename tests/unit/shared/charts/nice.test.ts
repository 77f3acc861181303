import { scaleLinear } from 'd3-scale';
import { decimalsOf, niceExtent, niceStep, niceTicks } from '@/shared/charts/model/nice';
import { logScale } from '@/shared/charts/model/scale';

const EXTENTS: [number, number][] = [
  [0, 1], [-10, 10], [0.003, 0.0071], [-0.5, 1234], [12, 13], [-7.3e-5, 2.1e-6], [0, 9.99e6], [359, 361],
]; // prettier-ignore

test.each(EXTENTS)('ticks of [%d, %d] are those of d3-scale', (low, high) => {
  for (const count of [2, 3, 4, 5, 6, 8]) {
    const expected = scaleLinear().domain([low, high]).ticks(count);
    const found = niceTicks(low, high, count);
    expect(found).toHaveLength(expected.length);
    found.forEach((tick, i) => expect(tick).toBeCloseTo(expected[i]!, 9));
  }
});

test.each(EXTENTS)('[%d, %d] is widened as d3-scale widens it', (low, high) => {
  for (const count of [2, 3, 4, 6]) {
    const [from, to] = scaleLinear().domain([low, high]).nice(count).domain();
    const found = niceExtent([low, high], count);
    expect(found[0]).toBeCloseTo(from!, 9);
    expect(found[1]).toBeCloseTo(to!, 9);
  }
});

test('ticks carry no noise of binary fractions, and no minus zero', () => {
  expect(niceTicks(0, 0.5, 5)).toEqual([0, 0.1, 0.2, 0.3, 0.4, 0.5]);
  expect(Object.is(niceTicks(-0.2, 0.2, 4)[2], 0)).toBe(true);
  expect(niceTicks(5, 5, 4)).toEqual([]);
  expect(niceExtent([5, 5])).toEqual([5, 5]);
});

test('a step says how many decimals tell its values apart', () => {
  expect([0.005, 0.1, 1, 20].map(decimalsOf)).toEqual([3, 1, 0, 0]);
  expect(niceStep(1, 4)).toBe(0.2);
});

test('a logarithmic scale has its decades evenly spaced and comes back', () => {
  const x = logScale([0.1, 100], [0, 300]);
  expect([0.1, 1, 10, 100].map((value) => Math.round(x(value) * 1e6) / 1e6)).toEqual([0, 100, 200, 300]);
  expect(x.invert(150)).toBeCloseTo(Math.sqrt(10), 9);
});
