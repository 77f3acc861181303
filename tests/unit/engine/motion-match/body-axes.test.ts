import { strayAxes } from '@/workers/engine/motion-match/body-axes';
import { imuScale, imuSwapAxes } from '@/workers/engine/simulator/defects';
import type { ImuColumns } from '@/workers/engine/types';
import { drive, integrals } from './support';

const negate = (imu: ImuColumns, axes: readonly number[]): ImuColumns =>
  axes.reduce((made, axis) => imuScale(imuScale(made, 'accel', -1, axis as 0), 'gyro', -1, axis as 0), imu);

test.each([1, 2, 3, 4, 5])('drive %d, mounted as said: nothing is found', (seed) => {
  const { imu, gnss } = drive({ seed });
  expect(strayAxes(integrals(imu), gnss, 0)).toBeNull();
});

test('forward and right exchanged', () => {
  const { imu, gnss } = drive({ seed: 6 });
  expect(strayAxes(integrals(imuSwapAxes(imu, 0, 1)), gnss, 0)).toEqual([
    { axis: 1, sign: 1 },
    { axis: 0, sign: 1 },
    { axis: 2, sign: 1 },
  ]);
});

test('forward–left–up in place of forward–right–down', () => {
  const { imu, gnss } = drive({ seed: 7 });
  expect(strayAxes(integrals(negate(imu, [1, 2])), gnss, 0)).toEqual([
    { axis: 0, sign: 1 },
    { axis: 1, sign: -1 },
    { axis: 2, sign: -1 },
  ]);
});

test('lying on its side and backwards', () => {
  const { imu, gnss } = drive({ seed: 8 });
  // Now: forward reads −forward, right reads down, down reads right.
  const turned = negate(imuSwapAxes(imu, 1, 2), [0]);
  expect(strayAxes(integrals(turned), gnss, 0)).toEqual([
    { axis: 0, sign: -1 },
    { axis: 2, sign: 1 },
    { axis: 1, sign: 1 },
  ]);
});

test('a vehicle that banks, hovers or rests tells nothing', () => {
  for (const motion of ['fixed-wing', 'multirotor', 'static'] as const) {
    const { imu, gnss } = drive({ motion, seed: 9 });
    expect(strayAxes(integrals(imu), gnss, 0)).toBeNull();
  }
});
