import { Matrix } from 'ml-matrix';
import { dcmFromQuat, quatFromEuler, quatFromRotationVector } from '@/workers/engine/attitude';
import { bendAccelBias, BiasTurn, tiltInBody } from '@/workers/engine/filter/bias-feedback';
import { createRandom } from '@/workers/engine/random';
import { mean } from '@/workers/engine/statistics/descriptive';
import { monteCarlo } from '@/tests/support/monte-carlo';

const dcmOf = (x: number, y: number, z: number) =>
  Matrix.from1DArray(
    3,
    3,
    dcmFromQuat(quatFromRotationVector(x, y, z, new Float64Array(4)), new Float64Array(9)),
  );

/** |C(f̃ − b) − f_n| after a tilt (rad) and the bias that belongs to it to first order were fed back. */
function residual(north: number, east: number, bends: boolean): number {
  const force = Matrix.columnVector([0.3, -0.2, -9.81]);
  const dcm = dcmFromQuat(quatFromEuler(0.2, -0.3, 2, new Float64Array(4)), new Float64Array(9));
  const c = Matrix.from1DArray(3, 3, dcm);
  const measured = c.transpose().mmul(force);
  const cross = new Matrix([[0, 0, east], [0, 0, -north], [-east, north, 0]]); // prettier-ignore
  const bias = c.transpose().mmul(cross).mmul(force).mul(-1).to1DArray();
  const correction = new Float64Array(15);
  correction.set([north, east, 0], 6);
  correction.set(bias, 12);
  const w = new Float64Array(3);
  tiltInBody(dcm, correction, w);
  if (bends) bendAccelBias(w, correction);
  const left = Matrix.sub(measured, Matrix.columnVector([...correction.subarray(12)]));
  return dcmOf(-north, -east, 0).mmul(c).mmul(left).sub(force).norm();
}

test('a tilt and its bias stay one another’s counterpart, to second order', () => {
  const plain = residual(0.01, -0.02, false);
  const bent = residual(0.01, -0.02, true);
  // ½c²g without, c³g/6 with.
  expect(plain).toBeGreaterThan(0.4 * 0.0005 * 9.81);
  expect(bent).toBeLessThan(0.02 * plain);
  expect(residual(0.005, -0.01, true) / bent).toBeLessThan(0.15);
});

test.each([15, 22])('covariance and adjoint are the dense products, %p states', (size) => {
  const random = createRandom(3);
  const root = Matrix.zeros(size, size);
  for (let i = 0; i < size; i += 1) for (let j = 0; j < size; j += 1) root.set(i, j, random.normal());
  const p = root.mmul(root.transpose());
  const w = Float64Array.of(0.02, -0.3, 0.1);
  const t = Matrix.eye(size).setSubMatrix(dcmOf(0.02, -0.3, 0.1), 12, 12);
  const turn = new BiasTurn();
  const flat = Float64Array.from(p.to1DArray());
  turn.form(w);
  turn.covariance(flat);
  const expected = t.mmul(p).mmul(t.transpose()).to1DArray();
  flat.forEach((value, i) => expect(value).toBeCloseTo(expected[i]!, 10));
  for (let i = 0; i < size; i += 1)
    for (let j = 0; j < size; j += 1) expect(flat[i * size + j]).toBe(flat[j * size + i]);

  const lambda = Float64Array.from({ length: size }, () => random.normal());
  const back = t.transpose().mmul(Matrix.columnVector([...lambda])).to1DArray(); // prettier-ignore
  turn.form(w);
  turn.adjoint(lambda, flat);
  lambda.forEach((value, i) => expect(value).toBeCloseTo(back[i]!, 12));
  p.to1DArray().forEach((value, i) => expect(flat[i]).toBeCloseTo(value, 10));
});

test('after the first turns a large accelerometer bias is known as well as the filter says', () => {
  const { nees, failures } = monteCarlo(
    {
      name: 'first turns',
      scenario: { motion: 'road', durationS: 100, imuRateHz: 50, staticStartS: 30, imuGrade: 'consumer' },
      start: 'found',
      wander: 'random-walk',
      outagesS: [],
      settleS: 50,
    },
    24,
  );
  expect(failures).toEqual([]);
  // 8.7 and 21.5 where the bias is not turned along.
  expect(mean(nees.accelBias)).toBeLessThan(4.5);
  expect(mean(nees.all)).toBeLessThan(17.5);
});
