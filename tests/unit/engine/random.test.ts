import { createRandom } from '@/workers/engine/random';
import { autocorrelation, autocorrelationBand } from '@/workers/engine/statistics/correlation';
import { mean, standardDeviation } from '@/workers/engine/statistics/descriptive';
import { chiSquaredQuantile, normalQuantile } from '@/workers/engine/statistics/distributions';

const take = (n: number, next: () => number) => Float64Array.from({ length: n }, next);

test('the same seed gives the same series, another seed another', () => {
  const a = createRandom(42);
  const b = createRandom(42);
  const c = createRandom(43);
  const first = take(100, a.normal);
  expect(take(100, b.normal)).toEqual(first);
  expect(take(100, c.normal)).not.toEqual(first);
});

test('a split stream depends on seed and label alone, and leaves its parent unmoved', () => {
  const a = createRandom(1);
  const b = createRandom(1);
  a.uniform();
  expect(take(5, a.split('gnss').uniform)).toEqual(take(5, b.split('gnss').uniform));
  expect(take(5, b.split('gnss').uniform)).not.toEqual(take(5, b.split('imu').uniform));
  expect(take(5, b.split('x').split('y').uniform)).not.toEqual(take(5, b.split('y').split('x').uniform));
  const fresh = createRandom(1);
  fresh.uniform();
  expect(a.uniform()).toBe(fresh.uniform());
});

test('uniform numbers fill [0, 1) evenly (χ² over 100 cells)', () => {
  const random = createRandom(5);
  const cells = new Float64Array(100);
  const n = 200_000;
  for (let i = 0; i < n; i += 1) {
    const u = random.uniform();
    cells[Math.floor(100 * u)]! += 1; // outside [0, 1) the sum would turn NaN
  }
  const statistic = cells.reduce((sum, count) => sum + (count - n / 100) ** 2 / (n / 100), 0);
  expect(statistic).toBeLessThan(chiSquaredQuantile(0.9999, 99));
});

test('normal numbers: moments, tails, no correlation', () => {
  const x = take(200_000, createRandom(6).normal);
  expect(Math.abs(mean(x))).toBeLessThan(4 / Math.sqrt(x.length));
  expect(Math.abs(standardDeviation(x) - 1)).toBeLessThan(4 / Math.sqrt(2 * x.length));
  const limit = normalQuantile(0.9995);
  const beyond = x.filter((v) => Math.abs(v) > limit).length;
  expect(Math.abs(beyond - 200)).toBeLessThan(4 * Math.sqrt(200));
  for (const r of autocorrelation(x, 5))
    expect(Math.abs(r)).toBeLessThan(2.5 * autocorrelationBand(x.length));
});

test('streams of neighbouring seeds are uncorrelated', () => {
  const a = take(50_000, createRandom(100).normal);
  const b = take(50_000, createRandom(101).normal);
  const product = a.map((v, i) => v * b[i]!);
  expect(Math.abs(mean(product))).toBeLessThan(4 / Math.sqrt(a.length));
});
