import { nonNegativeLeastSquares } from '@/workers/engine/allan/nnls';
import { createRandom } from '@/workers/engine/random';

const solve = (a: number[][], b: number[], w = b.map(() => 1)) =>
  Array.from(
    nonNegativeLeastSquares(
      Float64Array.from(a.flat()),
      Float64Array.from(b),
      Float64Array.from(w),
      a[0]!.length,
    ),
  );

test('an interior solution is the least-squares one', () => {
  expect(solve([[1, 0], [0, 2], [1, 1]], [1, 4, 3])[0]).toBeCloseTo(1, 14); // prettier-ignore
});

test('an unknown that would be negative is zero, and the rest is fitted without it', () => {
  const x = solve([[1, 0], [0, 1], [1, 1]], [2, -1, 0.5]); // prettier-ignore
  expect(x[1]).toBe(0);
  expect(x[0]).toBeCloseTo(1.25, 14);
  expect(solve([[1], [1]], [-1, -2])).toEqual([0]);
});

test('Karush–Kuhn–Tucker conditions hold on seeded problems', () => {
  const random = createRandom(1);
  for (let problem = 0; problem < 200; problem += 1) {
    const a = Array.from({ length: 8 }, () => Array.from({ length: 4 }, () => random.normal()));
    const b = Array.from({ length: 8 }, () => random.normal());
    const w = Array.from({ length: 8 }, () => 0.2 + random.uniform());
    const x = solve(a, b, w);
    const residual = a.map((row, i) => w[i]! ** 2 * (b[i]! - row.reduce((s, v, j) => s + v * x[j]!, 0)));
    for (let j = 0; j < 4; j += 1) {
      const gradient = a.reduce((s, row, i) => s + row[j]! * residual[i]!, 0);
      expect(x[j]!).toBeGreaterThanOrEqual(0);
      if (x[j]! > 0) expect(Math.abs(gradient)).toBeLessThan(1e-10);
      else expect(gradient).toBeLessThan(1e-10);
    }
  }
});
