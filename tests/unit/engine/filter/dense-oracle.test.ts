import { ErrorStateFilter } from '@/workers/engine/filter/error-state-filter';
import { prepareFixes } from '@/workers/engine/filter/fixes';
import { STATES } from '@/workers/engine/filter/states';
import { align } from '@/workers/engine/alignment/align';
import { NAV_SIZE } from '@/workers/engine/strapdown/navigation-state';
import { DenseFilter } from '@/tests/support/dense-filter';
import { simulateCase } from '../support/monte-carlo';

const NO_LISTENER = { onInnovation: () => undefined, onWarning: () => undefined };

/** Both filters over the same stretch of driving: the flat one and the plain one of ml-matrix. */
function both(covarianceIntervalS: number) {
  const { recording, parameters, scenario } = simulateCase(
    { motion: 'road', durationS: 40, imuRateHz: 40, staticStartS: 8, leverArmM: [0.5, -0.3, -1.2], seed: 4 },
    { mechanisation: { covarianceIntervalS }, gate: { enabled: false } },
  );
  const { imu, gnss } = recording;
  const fixes = prepareFixes(gnss, parameters.gnss);
  const start = align(imu, fixes, parameters, scenario.leverArmM);
  const flat = new ErrorStateFilter(
    imu, fixes, new Uint8Array(fixes.count), parameters, scenario.leverArmM, NO_LISTENER,
  ); // prettier-ignore
  flat.start(start.sample, start.fix, start.nav, start.p);
  const dense = new DenseFilter(imu, fixes, parameters, scenario.leverArmM, start);
  while (flat.sample < imu.timeS.length - 1) {
    flat.advanceSample();
    dense.advanceSample();
  }
  return { flat, dense };
}

test.each([0, 0.1])('equals the dense ml-matrix filter, covariance every %p s', (interval) => {
  const { flat, dense } = both(interval);
  const sigma = (i: number) => Math.sqrt(flat.p[i * (STATES + 1)]!);
  for (let i = 0; i < STATES; i += 1)
    for (let j = 0; j < STATES; j += 1)
      expect(Math.abs(flat.p[i * STATES + j]! - dense.p.get(i, j)) / (sigma(i) * sigma(j))).toBeLessThan(
        interval === 0 ? 1e-3 : 4e-3,
      );
  const scale = [1 / 6.4e6, 1 / 4.3e6, 1];
  for (let i = 0; i < NAV_SIZE; i += 1) {
    const state = i < 6 ? i : i - 1; // the quaternion's four for the attitude's three
    const unit = sigma(Math.min(14, state < 6 ? state : state < 9 ? 8 : state)) * (scale[i] ?? 1);
    expect(Math.abs(flat.strapdown.nav[i]! - dense.strapdown.nav[i]!) / unit).toBeLessThan(0.02);
  }
});

test('covariance at 20 Hz agrees with every sample', () => {
  const fast = both(0).flat;
  const slow = both(0.05).flat;
  for (let i = 0; i < STATES; i += 1) {
    const at = i * (STATES + 1);
    expect(Math.sqrt(slow.p[at]! / fast.p[at]!)).toBeCloseTo(1, 2);
  }
});
