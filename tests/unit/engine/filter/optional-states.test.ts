import { inverse, Matrix } from 'ml-matrix';
import { parametersSchema, type ParametersInput } from '@/shared/contracts/parameters';
import { quatFromEuler } from '@/workers/engine/attitude';
import { prepareFixes } from '@/workers/engine/filter/fixes';
import { GnssModels } from '@/workers/engine/filter/gnss-models';
import { OptionalStates } from '@/workers/engine/filter/optional-states';
import { layoutOf, STATES } from '@/workers/engine/filter/states';
import { WidePropagation } from '@/workers/engine/filter/wide-propagation';
import { createRandom } from '@/workers/engine/random';
import { averageBounds } from '@/workers/engine/statistics/consistency';
import { DURATION, INTERVAL_SIZE } from '@/workers/engine/strapdown/imu-intervals';
import { NAV_SIZE, QUAT, VN } from '@/workers/engine/strapdown/navigation-state';
import { WideUpdate } from '@/workers/engine/filter/wide-update';
import { Strapdown } from '@/workers/engine/strapdown/strapdown';
import { optionalNees, runCase } from '../support/optional-case';

jest.setTimeout(60_000);

const ALL: ParametersInput['states'] = {
  gyroScale: { enabled: true },
  accelScale: { enabled: true },
  leverArm: { enabled: true },
  barometerBias: { enabled: true },
};
const layout = layoutOf(parametersSchema.parse({ states: ALL }));
const LEVER = [1, 0.5, -0.3] as const;

function startNav(): Float64Array {
  const nav = new Float64Array(NAV_SIZE);
  nav.set([0.8, -0.25, 300, 35, -60, 2]);
  nav.set(quatFromEuler(0.2, -0.1, 1.1, new Float64Array(4)), QUAT);
  return nav;
}

/** Strapdown over 0.05 s of turning and accelerating, the intervals scaled by the estimates `scale` (6). */
function run(scale: readonly number[]) {
  const strapdown = new Strapdown('coning-sculling');
  strapdown.start(startNav());
  const optional = OptionalStates.of(layout, LEVER)!;
  optional.values.set(scale);
  for (let k = 0; k < 10; k += 1) {
    const interval = new Float64Array(INTERVAL_SIZE);
    interval[DURATION] = 0.005;
    [0.3 + 0.02 * k, -0.1, 0.4, 1.5, -2 + 0.1 * k, -9.4].forEach((x, i) => (interval[1 + i] = x * 0.005));
    optional.scaleInterval(interval);
    strapdown.advance(interval, 0, 1);
    optional.gather(interval, 0, 1);
  }
  return { strapdown, optional };
}

function formed() {
  const { strapdown, optional } = run([0, 0, 0, 0, 0, 0]);
  const { nav, earth, sumDcm, sumForce } = strapdown;
  const propagation = new WidePropagation(layout);
  const { transition } = propagation;
  transition.form({ nav, earth, sumDcm, sumForce, sumMeasured: optional.sumMeasured }, 1 / 20, 1 / 50);
  return { transition, propagation };
}

test('the layout places what is switched on, in a fixed order', () => {
  expect(layout).toEqual({ size: 25, gyroScale: 15, accelScale: 18, leverArm: 21, barometerBias: 24 });
  expect(layoutOf(parametersSchema.parse({}))).toMatchObject({ size: STATES, leverArm: -1 });
  const two = { leverArm: { enabled: true }, barometerBias: { enabled: true } };
  expect(layoutOf(parametersSchema.parse({ states: two }))).toMatchObject({
    leverArm: 15,
    barometerBias: 18,
  });
});

test('Φ of the scale factors is the derivative of the strapdown itself', () => {
  const { transition } = formed();
  const phi = transition.dense(new Float64Array(layout.size ** 2));
  for (let j = 0; j < 6; j += 1) {
    const size = j < 3 ? 1e-4 : 1e-3;
    const [plus, minus] = [size, -size].map((s) => {
      const scale = [0, 0, 0, 0, 0, 0];
      scale[j] = s;
      return run(scale).strapdown.nav;
    });
    for (let i = 0; i < 3; i += 1) {
      const numeric = (plus![VN + i]! - minus![VN + i]!) / (2 * size);
      // Rates are taken as their mean over the step: a tenth of ½·g·ω·Δt², and 1 % of f·Δt.
      expect(Math.abs(phi[(3 + i) * layout.size + 15 + j]! - numeric)).toBeLessThan(j < 3 ? 5e-4 : 5e-3);
    }
    // φ = −(turn of the computed against the true frame), by the difference of the quaternions.
    const [qp, qm] = [plus!, minus!].map((nav) => nav.subarray(QUAT, QUAT + 4));
    const w = qm!;
    const vector = [1, 2, 3].map((i) => qp![i]! - w[i]!);
    const length = Math.hypot(...vector, qp![0]! - w[0]!) / size;
    const own = Math.hypot(...[6, 7, 8].map((i) => phi[i * layout.size + 15 + j]!));
    expect(length).toBeCloseTo(own, 4);
  }
});

test('covariance with all states is ΦPΦᵀ with trapezoidal noise', () => {
  const { size } = layout;
  const { transition, propagation } = formed();
  const random = createRandom(3);
  const root = Matrix.zeros(size, size);
  for (let i = 0; i < size; i += 1) for (let j = 0; j < size; j += 1) root.set(i, j, random.normal());
  const start = root.mmul(root.transpose());
  const p = Float64Array.from(start.to1DArray());
  const halfNoise = Float64Array.from({ length: size }, (_, i) => 1e-3 * (i + 1));
  propagation.propagate(p, halfNoise);
  const phi = Matrix.from1DArray(size, size, transition.dense(new Float64Array(size * size)));
  const half = Matrix.diag([...halfNoise]);
  const expected = phi.mmul(Matrix.add(start, half)).mmul(phi.transpose()).add(half);
  for (let i = 0; i < size; i += 1)
    for (let j = 0; j < size; j += 1) {
      const unit = Math.sqrt(expected.get(i, i) * expected.get(j, j));
      expect(Math.abs(p[i * size + j]! - expected.get(i, j)) / unit).toBeLessThan(1e-12);
      expect(p[i * size + j]).toBe(p[j * size + i]);
    }
});

test('an update of all states is Joseph’s form, written out', () => {
  const { size } = layout;
  const random = createRandom(5);
  const draw = (rows: number, columns: number) => {
    const out = Matrix.zeros(rows, columns);
    for (let i = 0; i < rows; i += 1) for (let j = 0; j < columns; j += 1) out.set(i, j, random.normal());
    return out;
  };
  const root = draw(size, size);
  const start = root.mmul(root.transpose());
  const h = draw(2, size);
  const p = Float64Array.from(start.to1DArray());
  const update = new WideUpdate(size);
  update.begin(
    2,
    Array.from({ length: size }, (_, i) => i),
  );
  update.h.set(h.to1DArray());
  update.r.set([0.5, 2]);
  update.innovation.set([1.2, -0.7]);
  update.prepare(p);
  update.apply(p);
  const r = Matrix.diag([0.5, 2]);
  const s = h.mmul(start).mmul(h.transpose()).add(r);
  const k = start.mmul(h.transpose()).mmul(inverse(s));
  const rest = Matrix.eye(size).sub(k.mmul(h));
  const expected = rest.mmul(start).mmul(rest.transpose()).add(k.mmul(r).mmul(k.transpose()));
  const nu = Matrix.columnVector([1.2, -0.7]);
  const correction = k.mmul(nu);
  expect(update.nis).toBeCloseTo(nu.transpose().mmul(inverse(s)).mmul(nu).get(0, 0), 10);
  for (let i = 0; i < size; i += 1) {
    expect(update.correction[i]).toBeCloseTo(correction.get(i, 0), 9);
    for (let j = 0; j < size; j += 1) expect(p[i * size + j]).toBeCloseTo(expected.get(i, j), 8);
  }
});

test.each(['position', 'velocity'] as const)(
  'H of lever arm and gyro scale is the derivative: %s',
  (kind) => {
    const one = (x: number) => Float64Array.of(x);
    const ones = [one(1), one(1), one(1)] as const;
    const fixes = prepareFixes(
    {
      timeS: one(0), latRad: one(0.8), lonRad: one(-0.25), heightM: one(300),
      velocityNed: [one(35), one(-60), one(2)], positionSigma: ones, velocitySigma: ones,
    },
    parametersSchema.parse({}).gnss,
  ); // prettier-ignore
    const strapdown = new Strapdown('coning-sculling');
    strapdown.start(startNav());
    const rate = [0.2, -0.3, 0.5];
    const at = (arm: readonly number[], scale: readonly number[]) => {
      const update = new WideUpdate(layout.size);
      const models = new GnssModels(arm, 0, layout);
      if (kind === 'position') models.position(strapdown, fixes, 0, 7, update);
      else
        models.velocity(
          strapdown,
          Float64Array.from(rate, (w, i) => w * (1 - scale[i]!)),
          fixes,
          0,
          7,
          update,
        );
      return update;
    };
    const { h } = at(LEVER, [0, 0, 0]);
    const size = 1e-3;
    for (let c = 0; c < 3; c += 1) {
      const unit = [0, 1, 2].map((i) => (i === c ? size : 0));
      const differences = [
      [layout.leverArm, at(LEVER.map((l, i) => l + unit[i]!), [0, 0, 0]), at(LEVER.map((l, i) => l - unit[i]!), [0, 0, 0])],
      [layout.gyroScale, at(LEVER, unit), at(LEVER, unit.map((u) => -u))],
    ] as const; // prettier-ignore
      for (const [first, plus, minus] of differences)
        for (let i = 0; i < 3; i += 1) {
          const numeric = (plus.innovation[i]! - minus.innovation[i]!) / (2 * size);
          expect(h[i * layout.size + first + c]! + numeric).toBeCloseTo(0, 8);
        }
    }
  },
);

test('states that are certain change nothing', () => {
  const plain = runCase(1, {}, 60);
  const certain = runCase(
    1,
    {
      gyroScale: { enabled: true, initialSigmaPpm: 1 },
      accelScale: { enabled: true, initialSigmaPpm: 1 },
      leverArm: { enabled: true, initialSigmaM: 0.001 },
      barometerBias: { enabled: true },
    },
    60,
  );
  for (let i = 0; i < STATES; i += 1) {
    const ratio = certain.p[i * (certain.size + 1)]! / plain.p[i * (STATES + 1)]!;
    expect(ratio).toBeCloseTo(1, 2);
    expect(
      Math.abs(certain.error[i]! - plain.error[i]!) / Math.sqrt(plain.p[i * (STATES + 1)]!),
    ).toBeLessThan(0.02);
  }
});

describe('with scale factors and a lever arm that are off', () => {
  const states = {
    gyroScale: { enabled: true, initialSigmaPpm: 5000 },
    accelScale: { enabled: true, initialSigmaPpm: 4000 },
    leverArm: { enabled: true, initialSigmaM: 0.5 },
  };
  const wrong = { gyroScale: 5e-3, accelScale: 4e-3, leverArm: 0.5 };
  const RUNS = 16;
  const runs = Array.from({ length: RUNS }, (_, i) => runCase(100 + i, states, 150, wrong));

  test('NEES of the optional states, of the fifteen and of all lies within its 99.9 % bounds', () => {
    for (const [first, count] of [
      [15, 9],
      [15, 3],
      [18, 3],
      [21, 3],
      [0, 15],
      [0, 24],
    ] as const) {
      const mean = runs.reduce((sum, r) => sum + optionalNees(r, first, count), 0) / RUNS;
      const [low, high] = averageBounds(RUNS, count, 0.999);
      expect(mean).toBeGreaterThan(low);
      expect(mean).toBeLessThan(high);
    }
  });

  test('the motion shows them: σ shrinks', () => {
    const { p, size } = runs[0]!;
    const sigma = (i: number) => Math.sqrt(p[i * (size + 1)]!);
    expect(sigma(17)).toBeLessThan(0.3 * 5e-3);
    expect(sigma(20)).toBeLessThan(0.9 * 4e-3);
    for (const i of [21, 22, 23]) expect(sigma(i)).toBeLessThan(0.5 * 0.5);
  });

  test('left out, the filter is over-confident', () => {
    const without = Array.from({ length: 6 }, (_, i) => runCase(100 + i, {}, 150, wrong));
    const mean = without.reduce((sum, r) => sum + optionalNees(r, 0, 15), 0) / without.length;
    expect(mean).toBeGreaterThan(30);
  });
});
