/** Distributions, consistency bounds and radial errors against published tables. */
import {
  averageBounds,
  mahalanobis,
  shareHalfWidth,
  sigmaInterval,
} from '@/workers/engine/statistics/consistency';
import {
  autocorrelation,
  autocorrelationBand,
  ljungBox,
  meanVarianceFactor,
} from '@/workers/engine/statistics/correlation';
import { percentile, rms, standardDeviation, mean } from '@/workers/engine/statistics/descriptive';
import {
  chiSquaredCdf,
  chiSquaredQuantile,
  normalCdf,
  normalQuantile,
} from '@/workers/engine/statistics/distributions';
import * as radial from '@/workers/engine/statistics/radial';
import data from '../data/chi-squared.json';
import { nbs14Set, nistSet } from '../data/stability-sets';

const relative = (value: number, expected: number) => Math.abs(value / expected - 1);
const oneToTen = Array.from({ length: 10 }, (_, i) => i + 1);

describe('χ² and normal (SciPy; NIST/SEMATECH e-Handbook 1.3.6.7.4)', () => {
  test.each(data.quantiles)('S-01 quantiles for $dof degrees of freedom', (row) => {
    for (const [key, expected] of Object.entries(row)) {
      if (key === 'dof') continue;
      const p = Number(key.slice(1));
      const x = chiSquaredQuantile(p, row.dof);
      expect(relative(x, expected)).toBeLessThan(1e-9);
      expect(Math.abs(chiSquaredCdf(x, row.dof) - p)).toBeLessThan(1e-12);
    }
  });

  test('S-01 three-sigma probability', () => {
    const p = 0.9973002039367398;
    const expected: [number, number][] = [
      [1, 9],
      [2, 11.8291580819],
      [3, 14.1564136091],
      [6, 20.0620861675],
    ];
    for (const [dof, x] of expected) expect(relative(chiSquaredQuantile(p, dof), x)).toBeLessThan(1e-9);
  });

  test('S-03 many degrees of freedom: against Wilson–Hilferty, and the quantile inverts the distribution', () => {
    expect(Math.abs(chiSquaredQuantile(0.025, 1000) - 914.257153799)).toBeLessThan(1e-6);
    for (const dof of [0.5, 1, 7.3, 1e3, 54_321, 3e6])
      for (const p of [1e-12, 1e-4, 0.025, 0.5, 0.975, 0.9999999]) {
        const x = chiSquaredQuantile(p, dof);
        expect(Math.abs(chiSquaredCdf(x, dof) - p)).toBeLessThan(2e-12);
      }
  });

  test('S-04 normal quantiles', () => {
    expect(relative(normalQuantile(0.975), 1.959963984540054)).toBeLessThan(1e-13);
    expect(relative(normalQuantile(0.95), 1.6448536269514722)).toBeLessThan(1e-13);
    expect(relative(normalQuantile(0.995), 2.5758293035489004)).toBeLessThan(1e-13);
    expect(normalQuantile(0.5)).toBe(0);
    for (const p of [1e-12, 1e-3, 0.3, 0.9])
      expect(relative(normalCdf(normalQuantile(p)), p)).toBeLessThan(1e-12);
  });

  test('misuse is refused', () => {
    expect(() => chiSquaredQuantile(1, 3)).toThrow(RangeError);
    expect(() => chiSquaredQuantile(0.5, 0)).toThrow(RangeError);
    expect(() => normalQuantile(0)).toThrow(RangeError);
  });
});

describe('consistency (Bar-Shalom, Li & Kirubarajan 2001, §5.4)', () => {
  test.each(data.averageBounds)('S-02 bounds on the average of $N samples of dimension $n', (row) => {
    const [low, high] = averageBounds(row.N, row.n);
    expect(relative(low, row.lo)).toBeLessThan(1e-9);
    expect(relative(high, row.hi)).toBeLessThan(1e-9);
  });

  test('S-19 half-width of a share', () => {
    expect(relative(shareHalfWidth(0.6827, 100), 0.0912)).toBeLessThan(1e-3);
    expect(relative(shareHalfWidth(0.95, 100), 0.0427)).toBeLessThan(1e-3);
  });

  test.each([
    [10, 0.68784, 1.82561],
    [30, 0.79641, 1.34432],
    [100, 0.87801, 1.16168],
    [1000, 0.95801, 1.04587],
  ])('S-20 interval of a σ from %d samples', (n, low, high) => {
    const [a, b] = sigmaInterval(n);
    expect(relative(a, low)).toBeLessThan(1e-5);
    expect(relative(b, high)).toBeLessThan(1e-5);
  });

  test('K-17 vector innovation', () => {
    const { squared, logDet } = mahalanobis([2, -3], [4, 1, 1, 9]);
    expect(squared).toBeCloseTo(2.4, 14);
    expect(relative(logDet, 3.555348061489414)).toBeLessThan(1e-14);
    expect(mahalanobis([1, 1], [1, 2, 2, 1]).squared).toBeNaN();
  });
});

describe('correlation (Ljung & Box, Biometrika 65, 1978)', () => {
  test('S-05 band', () => {
    expect(relative(autocorrelationBand(50), 0.277181)).toBeLessThan(2e-6);
    expect(relative(autocorrelationBand(1000), 0.0619795)).toBeLessThan(2e-6);
  });

  test('S-06, S-07 the series 1…10', () => {
    const r = autocorrelation(oneToTen, 3);
    expect(relative(r[0]!, 0.7)).toBeLessThan(1e-12);
    expect(relative(r[1]!, 0.412121212)).toBeLessThan(1e-8);
    expect(relative(r[2]!, 0.148484848)).toBeLessThan(1e-8);
    const { statistic, p } = ljungBox(oneToTen, 3);
    expect(relative(statistic, 9.458953168044076)).toBeLessThan(1e-12);
    expect(relative(p, 0.023772063)).toBeLessThan(1e-7);
  });

  test.each([
    [1, 0.71279032, 0.398519],
    [5, 4.5121925345, 0.478254],
    [10, 10.0107438353, 0.439551],
    [20, 21.3407449038, 0.377326],
  ])('S-08 the 1000-point set of NIST SP 1065, %d lags', (lags, statistic, p) => {
    const result = ljungBox(nistSet(), lags);
    expect(relative(result.statistic, statistic)).toBeLessThan(1e-8);
    expect(relative(result.p, p)).toBeLessThan(3e-6);
  });

  test('S-09 the nine-point set of NBS Monograph 140', () => {
    const result = ljungBox(nbs14Set(), 3);
    expect(relative(result.statistic, 3.4072712131)).toBeLessThan(1e-8);
    expect(relative(result.p, 0.332989363)).toBeLessThan(1e-8);
  });

  test('S-22 variance of the mean of correlated samples', () => {
    expect(meanVarianceFactor(0.5)).toBeCloseTo(3, 12);
    expect(meanVarianceFactor(0.9)).toBeCloseTo(19, 10);
    expect(meanVarianceFactor(Math.exp(-1 / 60))).toBeCloseTo(120, 2);
  });
});

describe('samples', () => {
  test('S-21 percentiles (definition 7 of Hyndman & Fan 1996) and RMS of 1…10', () => {
    const shuffled = [3, 10, 1, 7, 5, 2, 9, 4, 8, 6];
    const expected: [number, number][] = [
      [0.05, 1.45],
      [0.5, 5.5],
      [0.75, 7.75],
      [0.95, 9.55],
    ];
    for (const [share, value] of expected) expect(percentile(shuffled, share)).toBeCloseTo(value, 12);
    expect(relative(rms(shuffled), 6.204836823)).toBeLessThan(1e-9);
    expect(percentile([], 0.5)).toBeNaN();
    expect(percentile([4], 0.95)).toBe(4);
  });

  test('A-01 mean and standard deviation of the published sets', () => {
    expect(relative(mean(nbs14Set()), 788.8889)).toBeLessThan(1e-6);
    expect(relative(standardDeviation(nbs14Set()), 100.977)).toBeLessThan(1e-6);
    expect(relative(mean(nistSet()), 0.48977446285950693)).toBeLessThan(1e-13);
    expect(relative(standardDeviation(nistSet()), 0.2884663647130005)).toBeLessThan(1e-13);
  });
});

describe('radial errors (Rayleigh, χ²)', () => {
  test('S-11…S-14 circular', () => {
    expect(relative(radial.circularRadius(1, 0.5), 1.1774100225)).toBeLessThan(1e-10);
    expect(relative(radial.circularRadius(1, 0.95), 2.4477468307)).toBeLessThan(1e-10);
    expect(relative(radial.circularRadius(1, 0.99), 3.0348542588)).toBeLessThan(1e-10);
    expect(relative(radial.circularShare(1, Math.SQRT2), 1 - Math.exp(-1))).toBeLessThan(1e-12);
    expect(relative(radial.circularShare(2, 2), 0.39346934)).toBeLessThan(1e-7);
  });

  test('S-15 spherical', () => {
    expect(relative(radial.sphericalRadius(1, 0.5), 1.5381722545)).toBeLessThan(1e-9);
    expect(relative(radial.sphericalRadius(1, 0.95), 2.7954834829)).toBeLessThan(1e-9);
    expect(relative(radial.sphericalRadius(1, 0.99), 3.3682141752)).toBeLessThan(1e-9);
    expect(radial.sphericalShare(1, Math.sqrt(3))).toBeCloseTo(0.60837, 4);
  });

  test.each([
    [0.8, 1.0576926, 2.2302873, 0.636536, 0.979941],
    [0.5, 0.8704174, 2.0358587, 0.662975, 0.969843],
    [0.3, 0.7499351, 1.9841962, 0.680099, 0.961085],
    [0.1, 0.6819851, 1.9625296, 0.682665, 0.9553],
    [0, 0.6744898, 1.959964, 0.682689, 0.9545],
  ])('S-16, S-17 elliptical, ratio %d', (ratio, cep, r95, insideDrms, inside2Drms) => {
    expect(relative(radial.ellipticalRadius(1, ratio, 0.5), cep)).toBeLessThan(1e-6);
    expect(relative(radial.ellipticalRadius(ratio, 1, 0.95), r95)).toBeLessThan(1e-6);
    const drms = Math.hypot(1, ratio);
    expect(Math.abs(radial.ellipticalShare(1, ratio, drms) - insideDrms)).toBeLessThan(1e-6);
    expect(Math.abs(radial.ellipticalShare(1, ratio, 2 * drms) - inside2Drms)).toBeLessThan(1e-6);
  });

  test('elliptical equals circular where both axes are alike', () => {
    expect(radial.ellipticalShare(3, 3, 4)).toBeCloseTo(radial.circularShare(3, 4), 9);
  });
});
