/** The `kalman-filter` package, which the GNSS-only track stands on, against published and independently computed runs. */
import { KalmanFilter, State } from 'kalman-filter';

type Step = { dt: number };
const relative = (value: number, expected: number) => Math.abs(value / expected - 1);
const scalar = (q: number, r: number) =>
  new KalmanFilter<Step>({
    observation: { dimension: 1, stateProjection: [[1]], covariance: () => [[r]] },
    dynamic: {
      dimension: 1,
      init: { mean: [[0]], covariance: [[1]] },
      transition: () => [[1]],
      covariance: () => [[q]],
    },
  });
const constantVelocity = (q: number, r: number) =>
  new KalmanFilter<Step>({
    observation: { dimension: 1, stateProjection: [[1, 0]], covariance: () => [[r]] },
    dynamic: {
      dimension: 2,
      init: { mean: [[0], [0]], covariance: [[10, 0], [0, 10]] }, // prettier-ignore
      transition: ({ dt }) => [[1, dt], [0, 1]], // prettier-ignore
      covariance: ({ dt }) => [[(q * dt ** 3) / 3, (q * dt ** 2) / 2], [(q * dt ** 2) / 2, q * dt]], // prettier-ignore
    },
  });

test('K-08 constant level (building-height example): estimates and variances', () => {
  const z = [48.54, 47.11, 55.01, 55.15, 49.89, 40.85, 46.72, 50.05, 51.27, 49.95];
  const expected = [
    49.686, 48.465789, 50.569286, 51.683514, 51.332609, 49.617273, 49.209844, 49.313425, 49.528171, 49.56989,
  ];
  const filter = scalar(0, 25);
  let state = new State({ mean: [[60]], covariance: [[225]] });
  z.forEach((value, k) => {
    const predicted = filter.predict({ previousCorrected: state, dt: 1 });
    state = filter.correct({ predicted, observation: [value], dt: 1 });
    expect(Math.abs(state.mean[0]![0]! - expected[k]!)).toBeLessThan(1e-6);
  });
  expect(Math.abs(state.covariance[0]![0]! - 2.472527)).toBeLessThan(1e-6);
});

test.each([
  [1, 1, 0.618033988749895],
  [1, 0.1, 0.0916079783099616],
  [0.04, 1, 0.1809975124],
  [0.01, 4, 0.1950624902],
])('K-01…K-04 steady variance of a random walk, q %d, r %d', (q, r, expected) => {
  const filter = scalar(q, r);
  let state = new State({ mean: [[0]], covariance: [[1]] });
  for (let k = 0; k < 400; k += 1) {
    const predicted = filter.predict({ previousCorrected: state, dt: 1 });
    state = filter.correct({ predicted, observation: [0], dt: 1 });
  }
  expect(relative(state.covariance[0]![0]!, expected)).toBeLessThan(1e-9);
});

test.each([
  [0.1, 0.5485276271],
  [1, 0.7567381983],
  [10, 0.918057022],
])('K-12 steady gain of constant velocity, q %d, r 1 (Riccati)', (q, gain) => {
  const filter = constantVelocity(q, 1);
  let state = new State({ mean: [[0], [0]], covariance: [[10, 0], [0, 10]] }); // prettier-ignore
  for (let k = 0; k < 200; k += 1) {
    const predicted = filter.predict({ previousCorrected: state, dt: 1 });
    state = filter.correct({ predicted, observation: [0], dt: 1 });
  }
  // With r = 1 the filtered position variance is the gain.
  expect(relative(state.covariance[0]![0]!, gain)).toBeLessThan(1e-8);
});

test('K-16 a two-state run, checked against batch least squares', () => {
  const filter = constantVelocity(0.1, 0.5);
  const z = [1, 2.1, 2.9, 4.2, 5];
  const expected = [
    [0.9756493506493507, 0.48944805194805197],
    [2.052560108521835, 1.0089880258042605],
    [2.9308946195182095, 0.9311718925550132],
    [4.101362245493027, 1.0464685474527766],
    [5.051951742028874, 1.0033705470707142],
  ];
  let state = new State({ mean: [[0], [0]], covariance: [[10, 0], [0, 10]] }); // prettier-ignore
  z.forEach((value, k) => {
    const predicted = filter.predict({ previousCorrected: state, dt: 1 });
    state = filter.correct({ predicted, observation: [value], dt: 1 });
    expect(relative(state.mean[0]![0]!, expected[k]![0]!)).toBeLessThan(1e-11);
    expect(relative(state.mean[1]![0]!, expected[k]![1]!)).toBeLessThan(1e-11);
  });
  const p = state.covariance;
  expect(relative(p[0]![0]!, 0.32428646632532)).toBeLessThan(1e-11);
  expect(relative(p[0]![1]!, 0.14576800788000527)).toBeLessThan(1e-11);
  expect(relative(p[1]![1]!, 0.17327216759274522)).toBeLessThan(1e-11);
});
