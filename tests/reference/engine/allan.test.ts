/** Allan deviation, its confidence and its terms against published figures. */
import { deviationInterval, equivalentDegrees } from '@/workers/engine/allan/confidence';
import { logSpacedClusters, overlappingAllan } from '@/workers/engine/allan/deviation';
import { fitTerms } from '@/workers/engine/allan/fit';
import { modelDeviation, unitVariance } from '@/workers/engine/allan/terms';
import data from '../data/allan.json';
import { nbs14Set, nistSet } from '../data/stability-sets';

const relative = (value: number, expected: number) => Math.abs(value / expected - 1);

describe('NIST SP 1065 (Riley 2008), §12.4', () => {
  test('A-04, A-10 nine-point set, overlapping', () => {
    const points = overlappingAllan(nbs14Set(), 1, [1, 2, 3, 4]);
    const expected = [91.22945, 85.95287, 71.13065052735315, 27.6351791200998];
    points.forEach((p, i) => expect(relative(p.deviation, expected[i]!)).toBeLessThan(i < 2 ? 5e-7 : 1e-12));
    expect(points[0]!.deviation.toFixed(5)).toBe('91.22945');
    expect(points[1]!.deviation.toFixed(5)).toBe('85.95287');
  });

  test('A-04 1000-point set, overlapping, to all printed digits', () => {
    const printed = overlappingAllan(nistSet(), 1, [1, 10, 100]).map((p) => p.deviation.toExponential(6));
    expect(printed).toEqual(['2.922319e-1', '9.159953e-2', '3.241343e-2']);
  });

  test.each(data.setB)('A-11 1000-point set, m $m', (row) => {
    const [point] = overlappingAllan(nistSet(), 1, [row.m]);
    expect(relative(point!.deviation, row.oadev)).toBeLessThan(1e-9);
    expect(point!.terms).toBe(row.terms);
  });

  test('A-12 a constant gives nothing, a ramp R τ/√2, offset and scale act as they must', () => {
    const series = nistSet();
    const at = (x: Float64Array) => overlappingAllan(x, 0.5, [1, 7, 50]).map((p) => p.deviation);
    expect(Math.max(...at(series.map(() => 1234.5)))).toBeLessThan(1e-12 * 1234.5);
    at(series.map((_, k) => 3e-4 * 0.5 * k)).forEach((value, i) =>
      expect(relative(value, (3e-4 * 0.5 * [1, 7, 50][i]!) / Math.SQRT2)).toBeLessThan(1e-9),
    );
    const plain = at(series);
    at(series.map((v) => v + 1e4)).forEach((value, i) =>
      expect(relative(value, plain[i]!)).toBeLessThan(1e-9),
    );
    at(series.map((v) => -3 * v)).forEach((value, i) =>
      expect(relative(value, 3 * plain[i]!)).toBeLessThan(1e-12),
    );
  });
});

test('misuse is refused with the reason', () => {
  expect(() => overlappingAllan(nistSet(), 1, [501])).toThrow(/does not fit twice/);
  expect(() => overlappingAllan(nistSet(), 1, [1.5])).toThrow(RangeError);
  expect(() => overlappingAllan(Float64Array.of(1, Number.NaN, 2), 1, [1])).toThrow(/not a finite number/);
});

test('cluster sizes rise evenly in the logarithm, each once', () => {
  const sizes = logSpacedClusters(100_000);
  expect(sizes[0]).toBe(1);
  expect(sizes).toContain(1000);
  expect(new Set(sizes).size).toBe(sizes.length);
  expect(Math.max(...sizes)).toBeLessThanOrEqual(25_000);
  expect(logSpacedClusters(1)).toEqual([]);
});

describe('confidence (NIST SP 1065, table 5 and eq. 45)', () => {
  test.each([
    ['white-rate', [665.779554, 146.176786, 13.002371]],
    ['white-angle', [500.499, 495.944501, 445.395117]],
    ['flicker-rate', [868.809089, 121.484117, 9.627219]],
    ['random-walk-rate', [1000.003008, 97.331898, 7.422259]],
  ] as const)('A-24…A-28 degrees of freedom of %s, N 1001', (kind, expected) => {
    [1, 10, 100].forEach((m, i) =>
      expect(relative(equivalentDegrees(kind, 1001, m), expected[i]!)).toBeLessThan(2e-7),
    );
  });

  test.each([
    [1, 0.6827, 0.284542, 0.300581],
    [10, 0.6827, 0.086681, 0.097463],
    [100, 0.6827, 0.0275693, 0.0412292],
    [1, 0.95, 0.277344, 0.308821],
    [10, 0.95, 0.0821949, 0.103454],
    [100, 0.95, 0.0234988, 0.0522166],
  ])('A-30 interval of the 1000-point set, m %d, %d', (m, level, low, high) => {
    const [point] = overlappingAllan(nistSet(), 1, [m]);
    const interval = deviationInterval(point!.deviation, equivalentDegrees('white-rate', 1001, m), level);
    expect(relative(interval[0], low)).toBeLessThan(1e-5);
    expect(relative(interval[1], high)).toBeLessThan(1e-5);
  });
});

describe('terms (IEEE Std 952-1997, annex C)', () => {
  const values = { quantisation: 1e-6, white: 2e-4, biasInstability: 1e-5, rateRandomWalk: 1e-6, ramp: 1e-9 };

  test('A-13…A-17 each term read where the standard reads it', () => {
    const at = (term: Parameters<typeof unitVariance>[0], tau: number) => Math.sqrt(unitVariance(term, tau));
    expect(at('quantisation', Math.sqrt(3))).toBeCloseTo(1, 14);
    expect(at('white', 1)).toBe(1);
    expect(at('biasInstability', 55)).toBeCloseTo(0.6642824702679601, 14);
    expect(at('rateRandomWalk', 3)).toBeCloseTo(1, 14);
    expect(at('ramp', Math.SQRT2)).toBeCloseTo(1, 14);
  });

  test.each(data.model)('A-22 model curve at $tau_s s', (row) => {
    expect(relative(modelDeviation(values, row.tau_s), row.adev)).toBeLessThan(1e-13);
  });

  test('A-22 the fit gives all five back from the noise-free curve', () => {
    const points = data.model.map((row) => ({
      m: Math.round(row.tau_s / 0.005),
      tauS: row.tau_s,
      deviation: row.adev,
      terms: 1,
    }));
    const fit = fitTerms(points, 6 * 3600 * 200).values;
    for (const [term, value] of Object.entries(values))
      expect(relative(fit[term as keyof typeof fit], value)).toBeLessThan(1e-9);
  });
});
