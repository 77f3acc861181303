import { determinant, inverse, Matrix } from 'ml-matrix';
import { MAX_ROWS, MeasurementUpdate } from '@/workers/engine/filter/measurement-update';
import { STATES } from '@/workers/engine/filter/states';
import { gaussianScore, mixedScore, wideScore } from '@/workers/engine/search/score';

/** An update of one to three rows with the given S (P = 0 but for a block, H = I). */
function prepared(s: Matrix, innovation: number[]): MeasurementUpdate {
  const update = new MeasurementUpdate();
  const rows = innovation.length;
  update.begin(rows, [0, 1, 2]);
  const p = new Float64Array(STATES * STATES);
  for (let i = 0; i < rows; i += 1) {
    update.h[i * STATES + i] = 1;
    update.r[i] = 0.5 * s.get(i, i);
    update.innovation[i] = innovation[i]!;
    for (let j = 0; j < rows; j += 1) p[i * STATES + j] = i === j ? 0.5 * s.get(i, i) : s.get(i, j);
  }
  update.prepare(p);
  return update;
}

const S = new Matrix([[4, 0.5, -0.3], [0.5, 1, 0.2], [-0.3, 0.2, 0.01 + 0.1]]); // prettier-ignore

test.each([1, 2, 3])('ln|S| + νᵀS⁻¹ν of %p rows as ml-matrix has it', (rows) => {
  const nu = [1.5, -2, 0.2].slice(0, rows);
  const s = S.subMatrix(0, rows - 1, 0, rows - 1);
  const v = Matrix.columnVector(nu);
  const expected = Math.log(determinant(s)) + v.transpose().mmul(inverse(s)).mmul(v).get(0, 0);
  expect(gaussianScore(prepared(s, nu))).toBeCloseTo(expected, 10);
  expect(prepared(s, nu).s).toHaveLength(MAX_ROWS * MAX_ROWS);
});

describe('with a share of outliers', () => {
  const one = (nu: number, sigma: number, wide: number, share: number) => {
    const update = prepared(new Matrix([[sigma * sigma]]), [nu]);
    return mixedScore(gaussianScore(update), wideScore(update, wide), share);
  };

  test.each([0, 0.01, 0.2])('the density integrates to one, share %p', (share) => {
    const step = 0.01;
    let sum = 0;
    for (let nu = -300; nu <= 300; nu += step) sum += Math.exp(-one(nu, 0.7, 30, share) / 2) * step;
    expect(sum / Math.sqrt(2 * Math.PI)).toBeCloseTo(1, 6);
  });

  test('a good fix is scored as before, but for the share', () => {
    for (const nu of [0, 0.5, 1, 2]) {
      const plain = one(nu, 0.7, 30, 0);
      expect(Math.abs(one(nu, 0.7, 30, 0.01) - (plain - 2 * Math.log(0.99)))).toBeLessThan(0.05);
    }
  });

  test('a fix of 50 σ costs what a stranger costs, not 2500', () => {
    expect(one(35, 0.7, 30, 0)).toBeGreaterThan(2400);
    expect(one(35, 0.7, 30, 0.01)).toBeLessThan(25);
    expect(one(1e6, 0.7, 30, 0.01)).toBeLessThan(Infinity);
  });

  test('turning fixes away never pays: a σ a hundred times too small is the worse score', () => {
    const sum = (sigma: number) =>
      [-1.2, 0.1, 0.7, -0.4, 1.9].reduce((s, nu) => s + one(nu, sigma, 30, 0.01), 0);
    expect(sum(0.01)).toBeGreaterThan(sum(1) + 10);
  });
});
