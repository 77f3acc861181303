/**
 * The sum over innovations is the likelihood of all measurements at once: prediction-error decomposition (Schweppe 1965,
 * IEEE Trans. Inf. Theory 11; Harvey 1989, Forecasting, Structural Time Series Models and the Kalman Filter, § 3.4),
 * against the dense joint Gaussian built with ml-matrix.
 */
import { CholeskyDecomposition, Matrix } from 'ml-matrix';
import { MeasurementUpdate } from '@/workers/engine/filter/measurement-update';
import { POSITION, STATES, VELOCITY } from '@/workers/engine/filter/states';
import { createRandom } from '@/workers/engine/random';
import { gaussianScore } from '@/workers/engine/search/score';

const DT = 0.5;
const EPOCHS = 40;
/** Six states: position and velocity of three axes, driven by white acceleration of unequal density. */
const SIZE = 6;
const PHI = Matrix.eye(SIZE);
for (let i = 0; i < 3; i += 1) PHI.set(i, 3 + i, DT);
const Q = Matrix.zeros(SIZE, SIZE);
[0.3, 0.02, 1.1].forEach((q, i) => {
  Q.set(i, i, (q * DT ** 3) / 3);
  Q.set(i, 3 + i, (q * DT ** 2) / 2);
  Q.set(3 + i, i, (q * DT ** 2) / 2);
  Q.set(3 + i, 3 + i, q * DT);
});
const P0 = Matrix.diag([4, 1, 9, 0.3, 0.2, 0.5]);
P0.set(0, 4, 0.3);
P0.set(4, 0, 0.3);

/** Epochs measure three rows of mixed states, two positions, or one velocity. */
const ROWS: { h: Matrix; r: number[] }[] = Array.from({ length: EPOCHS }, (_, k) => {
  if (k % 3 === 0)
    return { h: new Matrix([[1, 0.2, 0, 0, 0, 0.1], [0, 1, 0, 0.3, 0, 0], [0, 0, 1, 0, -0.5, 0]]), r: [0.5, 0.2, 2] }; // prettier-ignore
  if (k % 3 === 1) return { h: new Matrix([[1, 0, 0, 0, 0, 0], [0, 0, 1, 0, 0, 0]]), r: [1, 0.1] }; // prettier-ignore
  return { h: new Matrix([[0, 0, 0, 0, 1, 0]]), r: [0.05] };
});

function measurements(seed: number): number[][] {
  const random = createRandom(seed);
  const draw = (covariance: Matrix) => {
    const root = new CholeskyDecomposition(covariance).lowerTriangularMatrix;
    return root.mmul(Matrix.columnVector(Array.from({ length: covariance.rows }, () => random.normal())));
  };
  let x = draw(P0);
  return ROWS.map(({ h, r }) => {
    x = PHI.mmul(x).add(draw(Q));
    return h.mmul(x).to1DArray().map((y, m) => y + Math.sqrt(r[m]!) * random.normal()); // prettier-ignore
  });
}

/** ln|Σ| + yᵀΣ⁻¹y of all measurements together. */
function denseScore(y: number[][]): number {
  const covariances: Matrix[] = [];
  let p = P0;
  for (let k = 0; k < EPOCHS; k += 1) covariances.push((p = PHI.mmul(p).mmul(PHI.transpose()).add(Q)));
  const offsets = ROWS.map((_, k) => ROWS.slice(0, k).reduce((sum, { r }) => sum + r.length, 0));
  const all = y.flat();
  const joint = Matrix.zeros(all.length, all.length);
  for (let j = 0; j < EPOCHS; j += 1) {
    let cross = covariances[j]!;
    for (let i = j; i < EPOCHS; i += 1) {
      if (i > j) cross = PHI.mmul(cross);
      const block = ROWS[i]!.h.mmul(cross).mmul(ROWS[j]!.h.transpose());
      if (i === j) block.add(Matrix.diag(ROWS[i]!.r));
      joint.setSubMatrix(block, offsets[i]!, offsets[j]!);
      joint.setSubMatrix(block.transpose(), offsets[j]!, offsets[i]!);
    }
  }
  const root = new CholeskyDecomposition(joint.add(joint.transpose()).mul(0.5));
  const logs = root.lowerTriangularMatrix.diagonal().reduce((sum, d) => sum + 2 * Math.log(d), 0);
  const column = Matrix.columnVector(all);
  return logs + column.transpose().mmul(root.solve(column)).get(0, 0);
}

/** The same by the filter's own update, its states 0…5 driven by the same model. */
function filterScore(y: number[][]): number {
  const update = new MeasurementUpdate();
  const columns = [0, 1, 2, 3, 4, 5];
  let p = P0.clone();
  let x = Matrix.zeros(SIZE, 1);
  let sum = 0;
  ROWS.forEach(({ h, r }, k) => {
    x = PHI.mmul(x);
    p = PHI.mmul(p).mmul(PHI.transpose()).add(Q);
    const predicted = h.mmul(x);
    update.begin(r.length, columns);
    r.forEach((variance, m) => {
      for (const j of columns) update.h[m * STATES + j] = h.get(m, j);
      update.r[m] = variance;
      update.innovation[m] = y[k]![m]! - predicted.get(m, 0);
    });
    const flat = new Float64Array(STATES * STATES);
    for (const i of columns) for (const j of columns) flat[i * STATES + j] = p.get(i, j);
    update.prepare(flat);
    sum += gaussianScore(update);
    update.apply(flat);
    p = new Matrix(columns.map((i) => columns.map((j) => flat[i * STATES + j]!)));
    x = x.add(Matrix.columnVector(columns.map((i) => update.correction[i]!)));
  });
  return sum;
}

test('the states in use are position and velocity', () => {
  expect([POSITION, VELOCITY]).toEqual([0, 3]);
});

test.each([1, 2, 3])('Σ(ln|S| + νᵀS⁻¹ν) is the joint density of all measurements, seed %p', (seed) => {
  const y = measurements(seed);
  const dense = denseScore(y);
  expect(Math.abs(filterScore(y) - dense)).toBeLessThan(1e-9 * Math.abs(dense));
});

test('wrong by a tenth in one measurement, it shows', () => {
  const y = measurements(1);
  const moved = y.map((row, k) => (k === 20 ? row.map((v) => v + 0.1) : row));
  expect(Math.abs(filterScore(moved) - filterScore(y))).toBeGreaterThan(1e-3);
  expect(filterScore(moved)).toBeCloseTo(denseScore(moved), 8);
});
