import fc from 'fast-check';
import { EigenvalueDecomposition, inverse, Matrix } from 'ml-matrix';
import { MAX_ROWS, MeasurementUpdate } from '@/workers/engine/filter/measurement-update';
import { STATES } from '@/workers/engine/filter/states';
import { createRandom } from '@/workers/engine/random';

const ALL = Array.from({ length: STATES }, (_, i) => i);

function randomCovariance(seed: number): Matrix {
  const random = createRandom(seed);
  const root = Matrix.zeros(STATES, STATES);
  for (let i = 0; i < STATES; i += 1) for (let j = 0; j < STATES; j += 1) root.set(i, j, random.normal());
  const p = root.mmul(root.transpose()).add(Matrix.eye(STATES).mul(0.1));
  return p.add(p.transpose()).mul(0.5);
}

function setUp(update: MeasurementUpdate, h: Matrix, r: readonly number[], nu: readonly number[]): void {
  update.begin(h.rows, ALL);
  for (let m = 0; m < h.rows; m += 1) {
    for (let j = 0; j < STATES; j += 1) update.h[m * STATES + j] = h.get(m, j);
    update.r[m] = r[m]!;
    update.innovation[m] = nu[m]!;
  }
}

function randomRows(rows: number, seed: number): Matrix {
  const random = createRandom(seed);
  const h = Matrix.zeros(rows, STATES);
  for (let m = 0; m < rows; m += 1) for (let j = 0; j < STATES; j += 1) h.set(m, j, random.normal());
  return h;
}

const worst = (a: ArrayLike<number>, b: ArrayLike<number>) =>
  Array.from(a).reduce((most, x, i) => Math.max(most, Math.abs(x - b[i]!)), 0);

describe.each([1, 2, 3])('update by %p rows', (rows) => {
  const r = [0.5, 2, 0.01].slice(0, rows);
  const nu = [1, -2, 0.3].slice(0, rows);

  test('equals the textbook form in ml-matrix', () => {
    const start = randomCovariance(rows);
    const h = randomRows(rows, 10 + rows);
    const update = new MeasurementUpdate();
    const p = Float64Array.from(start.to1DArray());
    setUp(update, h, r, nu);
    update.prepare(p);
    update.apply(p);

    const s = h
      .mmul(start)
      .mmul(h.transpose())
      .add(Matrix.diag([...r]));
    const k = start.mmul(h.transpose()).mmul(inverse(s));
    const rest = Matrix.eye(STATES).sub(k.mmul(h));
    const expected = rest
      .mmul(start)
      .mmul(rest.transpose())
      .add(k.mmul(Matrix.diag([...r])).mmul(k.transpose()));
    const v = Matrix.columnVector([...nu]);
    expect(worst(p, expected.to1DArray())).toBeLessThan(1e-11);
    expect(worst(update.correction, k.mmul(v).to1DArray())).toBeLessThan(1e-11);
    expect(Math.abs(update.nis - v.transpose().mmul(inverse(s)).mmul(v).get(0, 0))).toBeLessThan(1e-11);
    for (let a = 0; a < rows; a += 1)
      for (let b = 0; b < rows; b += 1)
        expect(Math.abs(update.s[a * MAX_ROWS + b]! - s.get(a, b))).toBeLessThan(1e-11);
  });

  test('K-18 one after the other equals all at once', () => {
    const start = randomCovariance(20 + rows);
    const h = randomRows(rows, 30 + rows);
    const block = Float64Array.from(start.to1DArray());
    const update = new MeasurementUpdate();
    setUp(update, h, r, nu);
    update.prepare(block);
    update.apply(block);
    const together = update.correction.slice();

    const single = Float64Array.from(start.to1DArray());
    const state = new Float64Array(STATES);
    for (let m = 0; m < rows; m += 1) {
      const row = h.subMatrix(m, m, 0, STATES - 1);
      // What is already corrected is no longer new.
      const seen = row.to1DArray().reduce((sum, x, j) => sum + x * state[j]!, 0);
      setUp(update, row, [r[m]!], [nu[m]! - seen]);
      update.prepare(single);
      update.apply(single);
      for (let j = 0; j < STATES; j += 1) state[j] = state[j]! + update.correction[j]!;
    }
    expect(worst(single, block)).toBeLessThan(1e-11);
    expect(worst(state, together)).toBeLessThan(1e-11);
  });
});

test('K-17 NIS of a vector innovation', () => {
  const update = new MeasurementUpdate();
  const p = new Float64Array(STATES * STATES);
  p.set([3, 1], 0);
  p.set([1, 7], STATES);
  for (let i = 2; i < STATES; i += 1) p[i * (STATES + 1)] = 1;
  const h = Matrix.zeros(2, STATES);
  h.set(0, 0, 1);
  h.set(1, 1, 1);
  setUp(update, h, [1, 2], [2, -3]);
  update.prepare(p);
  expect(update.nis).toBeCloseTo(2.4, 14);
});

test('K-18 scaling P and R together leaves the gain and scales P; NIS by the inverse', () => {
  const h = randomRows(3, 40);
  const one = new MeasurementUpdate();
  const ten = new MeasurementUpdate();
  const p1 = Float64Array.from(randomCovariance(41).to1DArray());
  const p10 = p1.map((x) => 10 * x);
  setUp(one, h, [1, 2, 3], [1, 1, -1]);
  setUp(ten, h, [10, 20, 30], [1, 1, -1]);
  one.prepare(p1);
  ten.prepare(p10);
  expect(ten.nis).toBeCloseTo(one.nis / 10, 12);
  one.apply(p1);
  ten.apply(p10);
  expect(worst(one.gain, ten.gain)).toBeLessThan(1e-12);
  expect(
    worst(
      p1,
      p10.map((x) => x / 10),
    ),
  ).toBeLessThan(1e-11);
});

test('P stays symmetric positive definite through many exact measurements of a wide prior', () => {
  fc.assert(
    fc.property(fc.integer({ min: 1, max: 1e6 }), (seed) => {
      const random = createRandom(seed);
      const update = new MeasurementUpdate();
      const p = Float64Array.from(randomCovariance(seed).mul(1e4).to1DArray());
      for (let n = 0; n < 100; n += 1) {
        setUp(update, randomRows(3, seed + n), [1e-4, 1e-4, 1e-4], [random.normal(), 0, 1]);
        update.prepare(p);
        update.apply(p);
      }
      const matrix = Matrix.from1DArray(STATES, STATES, p);
      expect(worst(p, matrix.transpose().to1DArray())).toBe(0);
      const values = new EigenvalueDecomposition(matrix, { assumeSymmetric: true }).realEigenvalues;
      expect(Math.min(...values)).toBeGreaterThan(0);
    }),
    { seed: 18, numRuns: 20 },
  );
});
