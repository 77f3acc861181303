import { inverse, Matrix } from 'ml-matrix';
import { deviations, differences } from '@/workers/engine/search/curvature';

const HESSIAN = new Matrix([[200, 30, -20], [30, 90, 10], [-20, 10, 400]]); // prettier-ignore
const quadratic = (x: readonly number[]) => {
  const v = Matrix.columnVector([...x]);
  return 7 + 3 * x[0]! - x[2]! + 0.5 * v.transpose().mmul(HESSIAN).mmul(v).get(0, 0);
};

function quadraticAt(centre: number[], steps: number[]) {
  const asking = differences(centre, quadratic(centre), steps);
  let count = 0;
  let step = asking.next();
  while (step.done !== true) {
    count += 1;
    step = asking.next(quadratic(step.value));
  }
  return { ...step.value, count };
}

test('differences of a quadratic are exact', () => {
  const centre = [0.2, -0.1, 0.4];
  const { hessian, gradient, count } = quadraticAt(centre, [0.1, 0.2, 0.05]);
  expect(Matrix.sub(hessian, HESSIAN).norm()).toBeLessThan(1e-8);
  const slope = HESSIAN.mmul(Matrix.columnVector(centre)).to1DArray();
  gradient.forEach((g, i) => expect(g).toBeCloseTo(slope[i]! + [3, 0, -1][i]!, 9));
  expect(count).toBe(12);
});

test('1σ is the root of the inverse information’s diagonal', () => {
  const covariance = inverse(Matrix.mul(HESSIAN, 0.5));
  deviations(HESSIAN).forEach((sigma, i) => expect(sigma).toBeCloseTo(Math.sqrt(covariance.get(i, i)), 12));
});

describe('what the data do not tell is not given a number', () => {
  test('a flat, a falling and a barely rising direction', () => {
    for (const curvature of [0, -50, 1]) {
      const [known, hidden] = deviations(Matrix.diag([200, curvature]));
      expect(known).toBeCloseTo(0.1, 12);
      expect(hidden).toBeNull();
    }
  });

  test('two that are only known together', () => {
    // Their sum in ln is known well, their difference is not.
    const together = new Matrix([[100, 100, 0], [100, 100, 0], [0, 0, 50]]); // prettier-ignore
    expect(deviations(together)).toEqual([null, null, expect.closeTo(0.2, 12)]);
  });

  test('just better than a factor of two is given, just worse is not', () => {
    const at = (sigma: number) => deviations(Matrix.diag([2 / sigma ** 2]))[0]!;
    expect(at(0.69)).toBeCloseTo(0.69, 9);
    expect(at(0.7)).toBeNull();
  });
});
