import { findClockOffsets } from '@/workers/engine/motion-match/find-offsets';
import type { GnssColumns, ImuColumns } from '@/workers/engine/types';
import { drive, integrals } from './support';

jest.setTimeout(60_000);

/** What a receiver whose clock runs `offsetS` behind would have stamped. */
const stamped = (gnss: GnssColumns, offsetS: number): GnssColumns => ({
  ...gnss,
  timeS: gnss.timeS.map((t) => t - offsetS),
});
const withoutVelocity = (gnss: GnssColumns): GnssColumns => {
  const none = new Float64Array(gnss.timeS.length).fill(NaN);
  return { ...gnss, velocityNed: [none, none, none] };
};

test.each([
  [1, -2],
  [2, 0],
  [3, 0.337],
  [4, 5],
])('turning drive %d at one fix a second: an offset of %d s is found within 20 ms', (seed, offsetS) => {
  const { imu, gnss } = drive({ seed });
  const { offset, velocityLag, turnFactor } = findClockOffsets(integrals(imu), stamped(gnss, offsetS));
  expect(Math.abs(offset!.offsetS - offsetS)).toBeLessThan(0.02);
  expect(Math.abs(offset!.offsetS - offsetS)).toBeLessThan(3 * offset!.sigmaS);
  expect(velocityLag).toBeNull();
  expect(turnFactor).toBeCloseTo(1, 1);
});

test('positions alone tell it as well, less sharply, and say so', () => {
  const { imu, gnss } = drive({ seed: 5, gnss: { positionSigmaHorizontalM: 0.3 } });
  const { offset } = findClockOffsets(integrals(imu), withoutVelocity(stamped(gnss, 1.5)));
  expect(Math.abs(offset!.offsetS - 1.5)).toBeLessThan(3 * offset!.sigmaS);
  expect(offset!.sigmaS).toBeLessThan(0.15);
});

test('velocities that are older than the positions are told apart from the clocks', () => {
  const { imu, gnss } = drive({ seed: 6, gnss: { positionSigmaHorizontalM: 0.05 } }, { velocityLagS: 0.4 });
  const { offset, velocityLag } = findClockOffsets(integrals(imu), stamped(gnss, 0.8));
  expect(Math.abs(offset!.offsetS - 0.8)).toBeLessThan(0.1);
  expect(Math.abs(velocityLag!.lagS - 0.4)).toBeLessThan(0.1);
});

test('gyros mounted the other way round are seen by the sense of turning', () => {
  const { imu, gnss } = drive({ seed: 7 });
  const mirrored: ImuColumns = { ...imu, gyro: [imu.gyro[0], imu.gyro[1], imu.gyro[2].map((w) => -w)] };
  expect(findClockOffsets(integrals(mirrored), gnss).turnFactor).toBeCloseTo(-1, 1);
});

test('a gyro read in the wrong unit, or on the wrong axis, is seen', () => {
  const { imu, gnss } = drive({ seed: 9 });
  const [x, y, z] = imu.gyro;
  const inDegrees: ImuColumns = { ...imu, gyro: [x, y, z.map((w) => w * 57.29578)] };
  expect(1 / findClockOffsets(integrals(inDegrees), gnss).turnFactor!).toBeCloseTo(57.3, 0);
  const swapped = findClockOffsets(integrals({ ...imu, gyro: [x, z, y] }), gnss);
  expect(swapped).toMatchObject({ turnFactor: null, turnAxis: 1 });
});

test('a vehicle at rest tells nothing, and no number is made up', () => {
  const { imu, gnss } = drive({ motion: 'static', seed: 8 });
  expect(findClockOffsets(integrals(imu), gnss)).toEqual({
    offset: null,
    velocityLag: null,
    turnFactor: null,
    turnAxis: null,
  });
});
