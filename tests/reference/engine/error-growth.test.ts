/**
 * The covariance of the whole model, unaided at rest, against the closed forms of one horizontal channel with its
 * Schuler oscillation (Titterton & Weston 2004, ch. 12; Woodman, UCAM-CL-TR-696, 2007).
 */
import { degToRad } from '@/shared/units';
import { Propagation } from '@/workers/engine/filter/propagation';
import { ACCEL_BIAS, ATTITUDE, GYRO_BIAS, POSITION, STATES, VELOCITY } from '@/workers/engine/filter/states';
import { halfBiasNoise } from '@/workers/engine/filter/bias-models';
import { EARTH_RATE } from '@/workers/engine/geodesy';
import { normalGravity } from '@/workers/engine/gravity';
import { INTERVAL_SIZE } from '@/workers/engine/strapdown/imu-intervals';
import { NAV_SIZE } from '@/workers/engine/strapdown/navigation-state';
import { Strapdown } from '@/workers/engine/strapdown/strapdown';

const LAT = degToRad(45);
const G = normalGravity(LAT, 0);
/** The channel's constants, as the check values have them. */
const R = 6371008.7714;
const G0 = 9.80665;
const OMEGA = Math.sqrt(G0 / R);
const STEP_S = 0.1;

interface Sources {
  /** Variances of initial states. */
  initial?: Partial<Record<number, number>>;
  gyroWhite?: number;
  accelWhite?: number;
  gyroWalk?: number;
  accelWalk?: number;
  accelDecay?: number;
}

/** P after `seconds` at rest, level, heading north, latitude 45°, from the given sources. */
function unaided(seconds: number, sources: Sources): Float64Array {
  const nav = new Float64Array(NAV_SIZE);
  nav.set([LAT, 0, 0, 0, 0, 0, 1]);
  const interval = new Float64Array(INTERVAL_SIZE);
  interval[0] = STEP_S;
  interval.set(
    [EARTH_RATE * Math.cos(LAT) * STEP_S, 0, -EARTH_RATE * Math.sin(LAT) * STEP_S, 0, 0, -G * STEP_S],
    1,
  );
  const strapdown = new Strapdown('coning-sculling');
  strapdown.start(nav);
  const propagation = new Propagation();
  const half = new Float64Array(STATES);
  const decay = sources.accelDecay ?? 0;
  for (let i = 0; i < 3; i += 1) {
    half[VELOCITY + i] = 0.5 * (sources.accelWhite ?? 0) * STEP_S;
    half[ATTITUDE + i] = 0.5 * (sources.gyroWhite ?? 0) * STEP_S;
    half[GYRO_BIAS + i] = halfBiasNoise(sources.gyroWalk ?? 0, 0, STEP_S);
    half[ACCEL_BIAS + i] = halfBiasNoise(sources.accelWalk ?? 0, decay, STEP_S);
  }
  const p = new Float64Array(STATES * STATES);
  for (const [i, variance] of Object.entries(sources.initial ?? {})) p[Number(i) * (STATES + 1)] = variance!;
  for (let n = 0; n < Math.round(seconds / STEP_S); n += 1) {
    strapdown.advance(interval, 0, 1);
    propagation.transition.form(strapdown, 0, decay);
    propagation.propagate(p, half);
    strapdown.resetSums();
  }
  return p;
}

const sigma = (p: Float64Array, i: number) => Math.sqrt(p[i * (STATES + 1)]!);
const within = (actual: number, expected: number, share: number) =>
  expect(Math.abs(actual / expected - 1)).toBeLessThan(share);

const MG = 0.00980665;
const TEN_DEG_PER_HOUR = 4.84813681109536e-5;
const N_A = 1 / 600;
const N_G = 1.4544410433286e-4;

describe.each([10, 60, 120, 600])('after %p s', (t) => {
  const w = OMEGA * t;

  test('X-01 accelerometer bias 1 mg: ½bt² with Schuler', () => {
    within(
      sigma(unaided(t, { initial: { [ACCEL_BIAS]: MG ** 2 } }), POSITION),
      (MG / OMEGA ** 2) * 2 * Math.sin(w / 2) ** 2,
      0.01,
    );
  });
  test('X-02 gyro bias 10 °/h: gbt³/6 with Schuler', () => {
    const p = unaided(t, { initial: { [GYRO_BIAS + 1]: TEN_DEG_PER_HOUR ** 2 } });
    within(sigma(p, POSITION), R * TEN_DEG_PER_HOUR * (t - Math.sin(w) / OMEGA), 0.01);
  });
  test('X-03 initial velocity; X-04 initial tilt', () => {
    within(
      sigma(unaided(t, { initial: { [VELOCITY + 1]: 0.01 } }), POSITION + 1),
      (0.1 * Math.sin(w)) / OMEGA,
      0.01,
    );
    const tilt = degToRad(0.1);
    const p = unaided(t, { initial: { [ATTITUDE]: tilt ** 2 } });
    within(sigma(p, POSITION + 1), R * tilt * 2 * Math.sin(w / 2) ** 2, 0.01);
  });
  test('X-05, X-06 velocity random walk 0.1 m/s/√h', () => {
    const p = unaided(t, { accelWhite: N_A ** 2 });
    within(sigma(p, VELOCITY), N_A * Math.sqrt(t / 2 + Math.sin(2 * w) / (4 * OMEGA)), 0.01);
    within(sigma(p, POSITION), (N_A / OMEGA) * Math.sqrt(t / 2 - Math.sin(2 * w) / (4 * OMEGA)), 0.01);
  });
  test('X-07, X-08, X-09 angle random walk 0.5 °/√h', () => {
    const p = unaided(t, { gyroWhite: N_G ** 2 });
    within(sigma(p, ATTITUDE + 2), N_G * Math.sqrt(t), 0.01);
    within(
      sigma(p, VELOCITY),
      Math.sqrt(G0 * R) * N_G * Math.sqrt(t / 2 - Math.sin(2 * w) / (4 * OMEGA)),
      0.01,
    );
    const expected = R * N_G * Math.sqrt(1.5 * t - (2 * Math.sin(w)) / OMEGA + Math.sin(2 * w) / (4 * OMEGA));
    within(sigma(p, POSITION), expected, 0.01);
  });
});

test('X-10, X-11 bias random walks: K_a t^{5/2}/√20, g K_g t^{7/2}/√252 at 120 s', () => {
  const t = 120;
  within(sigma(unaided(t, { accelWalk: 1e-10 }), POSITION), (1e-5 * t ** 2.5) / Math.sqrt(20), 0.01);
  within(sigma(unaided(t, { gyroWalk: 1e-14 }), POSITION), (G0 * 1e-7 * t ** 3.5) / Math.sqrt(252), 0.01);
});

test('X-14 table: 1 mg, 10 °/h, 0.1 m/s/√h, 0.5 °/√h at 600 s', () => {
  within(sigma(unaided(600, { initial: { [ACCEL_BIAS]: MG ** 2 } }), POSITION), 1685.1748251, 0.01);
  within(
    sigma(unaided(600, { initial: { [GYRO_BIAS + 1]: TEN_DEG_PER_HOUR ** 2 } }), POSITION),
    16647.8185008,
    0.01,
  );
  within(sigma(unaided(600, { accelWhite: N_A ** 2 }), POSITION), 13.3779335201, 0.01);
  within(sigma(unaided(600, { gyroWhite: N_G ** 2 }), POSITION), 2721.10912041, 0.01);
});

test('X-15 Schuler period: a tilt brings velocity back to zero after half of it', () => {
  // 84.4 min on the mean sphere; the period of this place is 2π√(R/g) with its own radius and gravity.
  const half = Math.PI * Math.sqrt(6367381.8 / G);
  const peak = unaided(half / 2, { initial: { [ATTITUDE]: 1e-8 } });
  const at = unaided(half, { initial: { [ATTITUDE]: 1e-8 } });
  // The Earth's turn (Foucault) leaves a few per cent.
  expect(sigma(at, VELOCITY + 1)).toBeLessThan(0.1 * sigma(peak, VELOCITY + 1));
  within(sigma(peak, VELOCITY + 1), 1e-4 * Math.sqrt(G * 6367381.8), 0.02);
  expect(Math.abs((2 * half) / 60 - 84.4)).toBeLessThan(0.2);
});

test.each([
  { tau: 100, t: 60, expected: 16.3517660952 },
  { tau: 100, t: 120, expected: 60.9864412916 },
  { tau: 1000, t: 60, expected: 17.5119460697 },
])('X-20 Gauss–Markov accelerometer bias 1 mg, τ $tau s, after $t s', ({ tau, t, expected }) => {
  const p = unaided(t, {
    initial: { [ACCEL_BIAS]: MG ** 2 },
    accelWalk: (2 * MG ** 2) / tau,
    accelDecay: 1 / tau,
  });
  // The figures are without Schuler: 0.2 % at 120 s.
  within(sigma(p, POSITION), expected, 0.01);
  within(sigma(p, ACCEL_BIAS), MG, 1e-9);
});
