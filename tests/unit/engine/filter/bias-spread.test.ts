import { CholeskyDecomposition, Matrix } from 'ml-matrix';
import { dcmFromQuat, quatFromEuler } from '@/workers/engine/attitude';
import { BiasSpread } from '@/workers/engine/filter/bias-spread';
import { createRandom } from '@/workers/engine/random';
import { mean } from '@/workers/engine/statistics/descriptive';
import { monteCarlo } from '@/tests/support/monte-carlo';

test.each([15, 16])('adds the second moment of ½ w×x, as drawn from the covariance: %p states', (size) => {
  const random = createRandom(8);
  const root = Matrix.zeros(size, size);
  for (let i = 0; i < size; i += 1) for (let j = 0; j <= i; j += 1) root.set(i, j, random.normal());
  const covariance = root.mmul(root.transpose());
  const factor = new CholeskyDecomposition(covariance).lowerTriangularMatrix;
  const dcm = dcmFromQuat(quatFromEuler(0.3, -0.4, 1.1, new Float64Array(4)), new Float64Array(9));
  const p = Float64Array.from(covariance.to1DArray());
  new BiasSpread().add(p, dcm);

  const draws = 40_000;
  const sums = new Float64Array(9);
  const unit = new Float64Array(size);
  for (let draw = 0; draw < draws; draw += 1) {
    for (let i = 0; i < size; i += 1) unit[i] = random.normal();
    const at = (state: number) => unit.reduce((sum, u, j) => sum + factor.get(state, j) * u, 0);
    const [north, east] = [at(6), at(7)];
    const x = [at(12), at(13), at(14)] as const;
    const w = [0, 1, 2].map((i) => dcm[i]! * north + dcm[3 + i]! * east) as [number, number, number];
    const q = [
      (w[1] * x[2] - w[2] * x[1]) / 2,
      (w[2] * x[0] - w[0] * x[2]) / 2,
      (w[0] * x[1] - w[1] * x[0]) / 2,
    ];
    for (let i = 0; i < 9; i += 1) sums[i] = sums[i]! + (q[Math.floor(i / 3)]! * q[i % 3]!) / draws;
  }
  const scale = Math.max(sums[0]!, sums[4]!, sums[8]!);
  for (let r = 0; r < size; r += 1)
    for (let c = 0; c < size; c += 1) {
      const added = p[r * size + c]! - covariance.get(r, c);
      const isBias = Math.min(r, c) >= 12 && Math.max(r, c) < 15;
      if (isBias) expect(Math.abs(added - sums[3 * (r - 12) + c - 12]!) / scale).toBeLessThan(0.04);
      else expect(added).toBe(0);
    }
});

test('before the first turns the vertical bias is no surer than tilt and bias leave it', () => {
  const { nees, failures } = monteCarlo(
    {
      name: 'before the turns',
      scenario: { motion: 'road', durationS: 50, imuRateHz: 50, staticStartS: 30, imuGrade: 'consumer' },
      start: 'found',
      wander: 'random-walk',
      outagesS: [],
      settleS: 35,
    },
    32,
  );
  expect(failures).toEqual([]);
  // 9.8 and 29 from the covariance along the curve alone.
  expect(mean(nees.accelBias)).toBeLessThan(4.5);
  expect(mean(nees.all)).toBeLessThan(18);
});
