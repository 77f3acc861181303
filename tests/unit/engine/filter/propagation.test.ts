import fc from 'fast-check';
import { EigenvalueDecomposition, Matrix } from 'ml-matrix';
import {
  quatFromEuler,
  quatFromRotationVector,
  quatMultiply,
  rotationVectorFromQuat,
} from '@/workers/engine/attitude';
import { meridianRadius, transverseRadius } from '@/workers/engine/geodesy';
import { Propagation } from '@/workers/engine/filter/propagation';
import { STATES } from '@/workers/engine/filter/states';
import { DURATION, INTERVAL_SIZE } from '@/workers/engine/strapdown/imu-intervals';
import { HEIGHT, LAT, LON, NAV_SIZE, QUAT, VN } from '@/workers/engine/strapdown/navigation-state';
import { Strapdown } from '@/workers/engine/strapdown/strapdown';

const STEP_S = 0.05;
const SAMPLES = 10;

function startState(lat = 0.8): Float64Array {
  const nav = new Float64Array(NAV_SIZE);
  nav.set([lat, -0.25, 300, 35, -60, 2]);
  nav.set(quatFromEuler(0.2, -0.1, 1.1, new Float64Array(4)), QUAT);
  nav.set([0.001, -0.002, 0.0015, 0.05, -0.03, 0.02], 10);
  return nav;
}

/** Turning and accelerating, differently in each interval. */
function interval(k: number): Float64Array {
  const out = new Float64Array(INTERVAL_SIZE);
  const dt = STEP_S / SAMPLES;
  out[DURATION] = dt;
  const values = [0.3 + 0.02 * k, -0.1, 0.4, 1.5, -2 + 0.1 * k, -9.4];
  values.forEach((value, i) => (out[1 + i] = value * dt));
  return out;
}

function run(nav: Float64Array): Strapdown {
  const strapdown = new Strapdown('coning-sculling');
  strapdown.start(nav);
  for (let k = 0; k < SAMPLES; k += 1) strapdown.advance(interval(k), 0, 1);
  return strapdown;
}

/** nav with an error (computed minus true) added. */
function disturb(nav: Float64Array, error: ArrayLike<number>): Float64Array {
  const out = nav.slice();
  const rm = meridianRadius(nav[LAT]!) + nav[HEIGHT]!;
  const rn = transverseRadius(nav[LAT]!) + nav[HEIGHT]!;
  out[LAT] = nav[LAT]! + error[0]! / rm;
  out[LON] = nav[LON]! + error[1]! / (rn * Math.cos(nav[LAT]!));
  out[HEIGHT] = nav[HEIGHT]! - error[2]!;
  for (let i = 0; i < 3; i += 1) out[VN + i] = nav[VN + i]! + error[3 + i]!;
  const turn = quatFromRotationVector(-error[6]!, -error[7]!, -error[8]!, new Float64Array(4));
  out.set(quatMultiply(turn, nav.slice(QUAT, QUAT + 4), new Float64Array(4)), QUAT);
  for (let i = 0; i < 6; i += 1) out[10 + i] = nav[10 + i]! + error[9 + i]!;
  return out;
}

/** The error of `computed` against `nav`, the reverse of `disturb`. */
function errorOf(computed: Float64Array, nav: Float64Array): number[] {
  const rm = meridianRadius(nav[LAT]!) + nav[HEIGHT]!;
  const rn = transverseRadius(nav[LAT]!) + nav[HEIGHT]!;
  const q = nav.slice(QUAT, QUAT + 4);
  for (let i = 1; i < 4; i += 1) q[i] = -q[i]!;
  const turn = rotationVectorFromQuat(
    quatMultiply(computed.slice(QUAT, QUAT + 4), q, new Float64Array(4)),
    new Float64Array(3),
  );
  return [
    (computed[LAT]! - nav[LAT]!) * rm,
    (computed[LON]! - nav[LON]!) * rn * Math.cos(nav[LAT]!),
    nav[HEIGHT]! - computed[HEIGHT]!,
    ...[0, 1, 2].map((i) => computed[VN + i]! - nav[VN + i]!),
    ...[0, 1, 2].map((i) => -turn[i]!),
    ...[0, 1, 2, 3, 4, 5].map((i) => computed[10 + i]! - nav[10 + i]!),
  ];
}

/** Sizes of error at which the strapdown is linear and the difference keeps its digits. */
const SIZE = [100, 100, 100, 0.1, 0.1, 0.1, 1e-4, 1e-4, 1e-4, 1e-4, 1e-4, 1e-4, 1e-2, 1e-2, 1e-2];

describe('transition matrix', () => {
  test.each([0.8, -0.6, 1.4])('is the derivative of the strapdown itself, latitude %p rad', (lat) => {
    const nav = startState(lat);
    const truth = run(nav);
    const propagation = new Propagation();
    propagation.transition.form(truth, 0, 0);
    const phi = propagation.transition.dense(new Float64Array(STATES * STATES));
    const wrong: string[] = [];
    for (let j = 0; j < STATES; j += 1) {
      const error = new Float64Array(STATES);
      error[j] = SIZE[j]!;
      const plus = errorOf(run(disturb(nav, error)).nav, truth.nav);
      error[j] = -SIZE[j]!;
      const minus = errorOf(run(disturb(nav, error)).nav, truth.nav);
      for (let i = 0; i < STATES; i += 1) {
        const numeric = (plus[i]! - minus[i]!) / (2 * SIZE[j]!);
        const change = Math.abs(numeric - (i === j ? 1 : 0));
        // Each entry to 1 % of itself or of what a typical error could do in a step (third order is left out).
        const unit = SIZE[i]! / SIZE[j]!;
        const miss = Math.abs(phi[i * STATES + j]! - numeric) - (0.01 * change + 1e-6 * unit);
        if (miss > 0) wrong.push(`Φ[${i}][${j}] ${phi[i * STATES + j]} against ${numeric}`);
      }
    }
    expect(wrong).toEqual([]);
  });

  test('keeps the second-order terms', () => {
    const propagation = new Propagation();
    const strapdown = run(startState());
    propagation.transition.form(strapdown, 0, 0);
    const phi = propagation.transition.dense(new Float64Array(STATES * STATES));
    const at = (row: number, column: number) => phi[row * STATES + column]!;
    const [fn, fe, fd] = strapdown.sumForce;
    // Position–attitude ½[f×]Δt², position–accelerometer bias −½CΔt², velocity–gyro bias ½[f×]CΔt².
    expect(at(0, 7)).toBeCloseTo(-0.5 * fd! * STEP_S, 6);
    expect(at(1, 6)).toBeCloseTo(0.5 * fd! * STEP_S, 6);
    expect(at(0, 12)).toBeCloseTo(-0.5 * strapdown.sumDcm[0]! * STEP_S, 8);
    const c = strapdown.sumDcm;
    expect(at(3, 9)).toBeCloseTo(0.5 * (fe! * c[6]! - fd! * c[3]!), 6);
    expect(at(5, 11)).toBeCloseTo(0.5 * (fn! * c[5]! - fe! * c[2]!), 6);
  });
});

describe('covariance', () => {
  const propagation = new Propagation();
  propagation.transition.form(run(startState()), 1 / 20, 1 / 50);
  const phi = Matrix.from1DArray(
    STATES,
    STATES,
    propagation.transition.dense(new Float64Array(STATES * STATES)),
  );
  const halfNoise = Float64Array.from(
    { length: STATES },
    (_, i) => [0, 2e-8, 3e-10, 1e-13, 1e-9][Math.floor(i / 3)]!,
  );

  const covariances = fc
    .array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: STATES ** 2, maxLength: STATES ** 2 })
    .map((values) => {
      const root = Matrix.from1DArray(STATES, STATES, values);
      for (let i = 0; i < STATES; i += 1) root.mulRow(i, SIZE[i]!);
      const p = root.mmul(root.transpose()).add(Matrix.diag(SIZE.map((s) => 1e-4 * s * s)));
      return p.add(p.transpose()).mul(0.5);
    });

  test('is ΦPΦᵀ with trapezoidal noise, exactly symmetric and positive definite', () => {
    fc.assert(
      fc.property(covariances, (start) => {
        const p = Float64Array.from(start.to1DArray());
        propagation.propagate(p, halfNoise);
        const half = Matrix.diag([...halfNoise]);
        const expected = phi.mmul(Matrix.add(start, half)).mmul(phi.transpose()).add(half);
        let asymmetry = 0;
        let deviation = 0;
        for (let i = 0; i < STATES; i += 1)
          for (let j = 0; j < STATES; j += 1) {
            const scale = Math.sqrt(expected.get(i, i) * expected.get(j, j));
            asymmetry = Math.max(asymmetry, Math.abs(p[i * STATES + j]! - p[j * STATES + i]!));
            deviation = Math.max(deviation, Math.abs(p[i * STATES + j]! - expected.get(i, j)) / scale);
          }
        expect(asymmetry).toBe(0);
        expect(deviation).toBeLessThan(1e-12);
        const scaled = Matrix.from1DArray(STATES, STATES, p);
        for (let i = 0; i < STATES; i += 1) {
          scaled.mulRow(i, 1 / SIZE[i]!);
          scaled.mulColumn(i, 1 / SIZE[i]!);
        }
        const values = new EigenvalueDecomposition(scaled, { assumeSymmetric: true }).realEigenvalues;
        expect(Math.min(...values)).toBeGreaterThan(0);
      }),
      { seed: 15, numRuns: 50 },
    );
  });
});
