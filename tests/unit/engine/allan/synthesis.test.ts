import { overlappingAllan } from '@/workers/engine/allan/deviation';
import { unitSeries } from '@/workers/engine/allan/synthesis';
import { TERM_NAMES, unitVariance } from '@/workers/engine/allan/terms';
import { GaussMarkov } from '@/workers/engine/simulator/gauss-markov';
import { createRandom } from '@/workers/engine/random';
import { noiseSeries } from '@/tests/support/noise-series';

test.each(TERM_NAMES)('A-13…A-17 a unit series of %s has the Allan variance of its law', (term) => {
  const clusters = [1, 2, 4, 16, 64];
  const sums = clusters.map(() => 0);
  const runs = 24;
  for (let seed = 0; seed < runs; seed += 1)
    overlappingAllan(unitSeries(term, 4096, createRandom(seed)), 1, clusters).forEach((point, i) => {
      sums[i]! += point.deviation ** 2 / runs;
    });
  clusters.forEach((m, i) => {
    // Flicker noise below four samples lacks what is quicker than a sample; the rest scatters with few long clusters.
    const tolerance = term === 'biasInstability' && m < 4 ? 0.06 : 0.02 + 0.06 * Math.sqrt(m / 64);
    expect(Math.abs(sums[i]! / unitVariance(term, m) - 1)).toBeLessThan(tolerance);
  });
});

test('the interval scales each term as its unit says', () => {
  const terms = { quantisation: 1e-6, white: 2e-4, biasInstability: 1e-5, rateRandomWalk: 1e-6, ramp: 1e-9 };
  for (const name of TERM_NAMES) {
    const variance = (intervalS: number, m: number) => {
      let sum = 0;
      for (let seed = 0; seed < 12; seed += 1) {
        const series = noiseSeries({ [name]: terms[name] }, 4096, intervalS, seed);
        sum += overlappingAllan(series, intervalS, [m])[0]!.deviation ** 2 / 12;
      }
      return sum / (terms[name] ** 2 * unitVariance(name, m * intervalS));
    };
    expect(Math.abs(variance(0.01, 8) - 1)).toBeLessThan(0.06);
    expect(Math.abs(variance(5, 8) - 1)).toBeLessThan(0.06);
  }
});

test('A-18 a Gauss–Markov bias: the peak of the curve', () => {
  const tau = 20;
  const clusters = [Math.round(1.8926178 * tau)];
  let sum = 0;
  for (let seed = 0; seed < 12; seed += 1) {
    const process = new GaussMarkov(1, tau, createRandom(seed));
    const series = Float64Array.from({ length: 8000 }, () => process.step(1));
    sum += overlappingAllan(series, 1, clusters)[0]!.deviation ** 2 / 12;
  }
  expect(Math.abs(Math.sqrt(sum) / 0.6173643 - 1)).toBeLessThan(0.05);
});
