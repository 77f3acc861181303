/** Kalman recursions with known answers, through the filter's own update kernel on some of its states. */
import { MeasurementUpdate } from '@/workers/engine/filter/measurement-update';
import { STATES } from '@/workers/engine/filter/states';
import { halfBiasNoise } from '@/workers/engine/filter/bias-models';

/** State 0 (and 1) of the kernel with H = [1 0]; the others are left with unit variance. */
class Small {
  readonly p = new Float64Array(STATES * STATES);
  readonly update = new MeasurementUpdate();

  constructor(variance: readonly number[]) {
    for (let i = 0; i < STATES; i += 1) this.p[i * (STATES + 1)] = variance[i] ?? 1;
  }

  at(i: number, j: number): number {
    return this.p[i * STATES + j]!;
  }

  measure(r: number, innovation = 0): { gain: number[]; correction: number[]; s: number; nis: number } {
    const { update, p } = this;
    update.begin(1, [0]);
    update.h[0] = 1;
    update.r[0] = r;
    update.innovation[0] = innovation;
    update.prepare(p);
    const s = update.s[0]!;
    update.apply(p);
    const gain = [update.gain[0]!, update.gain[3]!];
    return { gain, correction: [update.correction[0]!, update.correction[1]!], s, nis: update.nis };
  }

  add(i: number, j: number, q: number): void {
    this.p[i * STATES + j] = this.at(i, j) + q;
  }

  /** Φ = [[1, T], [0, 1]]. */
  shift(t: number): void {
    const [a, b, d] = [this.at(0, 0), this.at(0, 1), this.at(1, 1)];
    this.p[0] = a + 2 * t * b + t * t * d;
    this.p[1] = b + t * d;
    this.p[STATES] = this.p[1]!;
  }
}

test.each([
  { id: 'K-02', q: 1, r: 1, prior: 1.618033988749895, gain: 0.618033988749895, posterior: 0.618033988749895 },
  {
    id: 'K-03',
    q: 1,
    r: 0.1,
    prior: 1.0916079783099617,
    gain: 0.916079783099616,
    posterior: 0.0916079783099616,
  },
  { id: 'K-04', q: 0.04, r: 1, prior: 0.2209975124, gain: 0.1809975124, posterior: 0.1809975124 },
  { id: 'K-04', q: 0.01, r: 4, prior: 0.2050624902, gain: 0.0487656226, posterior: 0.1950624902 },
  { id: 'K-04', q: 2.5, r: 0.5, prior: 2.9270509831, gain: 0.8541019662, posterior: 0.4270509831 },
])('$id steady state of a random walk, q $q, r $r', ({ q, r, prior, gain, posterior }) => {
  const filter = new Small([1]);
  let before = 0;
  let k = 0;
  for (let n = 0; n < 500; n += 1) {
    filter.add(0, 0, q);
    before = filter.at(0, 0);
    k = filter.measure(r).gain[0]!;
  }
  expect(before).toBeCloseTo(prior, 9);
  expect(k).toBeCloseTo(gain, 9);
  expect(filter.at(0, 0)).toBeCloseTo(posterior, 9);
});

test('K-06 Wiener process, first gains (Brown & Hwang)', () => {
  const filter = new Small([0]);
  const gains = Array.from({ length: 5 }, () => {
    filter.add(0, 0, 1);
    return filter.measure(0.1).gain[0]!;
  });
  [10 / 11, 0.916030534, 0.916079436, 0.916079781, 0.916079783].forEach((k, i) =>
    expect(gains[i]).toBeCloseTo(k, 9),
  );
});

test('K-07 Gauss–Markov process (Brown & Hwang)', () => {
  const filter = new Small([1]);
  const dt = 0.02;
  const half = halfBiasNoise(2, 1, dt);
  const seen: [number, number][] = [];
  for (let n = 0; n < 300; n += 1) {
    const prior = filter.at(0, 0);
    seen.push([prior, filter.measure(1).gain[0]!]);
    // The engine's trapezoid: half before, decay, half after.
    filter.add(0, 0, half);
    filter.p[0] = filter.p[0]! * Math.exp(-2 * dt);
    filter.add(0, 0, half);
  }
  const close = (n: number, p: number, k: number) => {
    expect(seen[n]![0]).toBeCloseTo(p, 8);
    expect(seen[n]![1]).toBeCloseTo(k, 8);
  };
  close(0, 1, 0.5);
  close(1, 0.51960528, 0.341934374);
  close(2, 0.367737496, 0.268865552);
  close(10, 0.202866616, 0.168652628);
  close(299, 0.198016567, 0.165287002);
});

test('K-09 a constant level, q 1e-5, r 0.01 (Welch & Bishop)', () => {
  const filter = new Small([1]);
  const expected = new Map([
    [1, 0.00990099],
    [2, 0.00497765],
    [10, 0.00102732],
    [50, 0.000339211],
    [1000, 0.000311267],
  ]);
  for (let n = 1; n <= 1000; n += 1) {
    filter.add(0, 0, 1e-5);
    filter.measure(0.01);
    const value = expected.get(n);
    if (value !== undefined) expect(Math.abs(filter.at(0, 0) / value - 1)).toBeLessThan(1e-5);
  }
});

test.each([
  { q: 0.1, r: 1, gain: [0.5485276271, 0.2124787926] },
  { q: 1, r: 1, gain: [0.7567381983, 0.493215776] },
  { q: 10, r: 1, gain: [0.918057022, 0.9052236075] },
  { q: 1, r: 100, gain: [0.3605916645, 0.0799630124] },
])('K-12, K-13 constant velocity, q $q, r $r: steady gains', ({ q, r, gain }) => {
  const filter = new Small([1, 1]);
  let k = [0, 0];
  for (let n = 0; n < 2000; n += 1) {
    filter.shift(1);
    filter.add(0, 0, q / 3);
    filter.add(0, 1, q / 2);
    filter.add(1, 0, q / 2);
    filter.add(1, 1, q);
    k = filter.measure(r).gain;
  }
  expect(k[0]).toBeCloseTo(gain[0]!, 9);
  expect(k[1]).toBeCloseTo(gain[1]!, 9);
});

test('K-16 a two-state run: innovations, S, NIS, states', () => {
  const filter = new Small([10, 10]);
  const x = [0, 0];
  const z = [1, 2.1, 2.9, 4.2, 5];
  const innovations = [1, 0.6349025974025975, -0.16154813432609538, 0.3379334879267777, -0.14783079294580315];
  const s = [
    20.533333333333335, 6.691653138528138, 2.6145027329253647, 1.7130027422861058, 1.4227703169572332,
  ];
  const nis = [
    0.0487012987012987, 0.06023942063996893, 0.009981936287762588, 0.0666660008436134, 0.015360134438088523,
  ];
  z.forEach((measured, n) => {
    x[0] = x[0]! + x[1]!;
    filter.shift(1);
    filter.add(0, 0, 0.1 / 3);
    filter.add(0, 1, 0.05);
    filter.add(1, 0, 0.05);
    filter.add(1, 1, 0.1);
    const innovation = measured - x[0];
    const result = filter.measure(0.5, innovation);
    expect(innovation).toBeCloseTo(innovations[n]!, 11);
    expect(result.s).toBeCloseTo(s[n]!, 11);
    expect(result.nis).toBeCloseTo(nis[n]!, 11);
    x[0] = x[0] + result.correction[0]!;
    x[1] = x[1]! + result.correction[1]!;
  });
  expect(x[0]).toBeCloseTo(5.051951742028874, 11);
  expect(x[1]).toBeCloseTo(1.0033705470707142, 11);
  expect(filter.at(0, 0)).toBeCloseTo(0.32428646632532, 11);
  expect(filter.at(0, 1)).toBeCloseTo(0.14576800788000527, 11);
  expect(filter.at(1, 1)).toBeCloseTo(0.17327216759274522, 11);
});

test.each([
  { tau: 100, sigma: 1, dt: 1, q: 0.019801326693244747 },
  { tau: 300, sigma: 0.01, dt: 0.01, q: 6.66644444938802e-9 },
  { tau: 1000, sigma: 5e-5, dt: 0.005, q: 2.4999875000431e-14 },
  { tau: 10, sigma: 2, dt: 10, q: 3.458658867053549 },
])('Q-06 Gauss–Markov noise of a step, τ $tau s', ({ tau, sigma, dt, q }) => {
  const half = halfBiasNoise((2 * sigma * sigma) / tau, 1 / tau, dt);
  expect(Math.abs((half * (1 + Math.exp((-2 * dt) / tau))) / q - 1)).toBeLessThan(1e-12);
});
