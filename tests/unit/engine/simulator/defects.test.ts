import { scenarioSchema } from '@/shared/contracts/scenarios';
import { createRandom } from '@/workers/engine/random';
import * as defects from '@/workers/engine/simulator/defects';
import { simulateScenario } from '@/workers/engine/simulator/scenario';

const sound = simulateScenario(scenarioSchema.parse({ durationS: 60, staticStartS: 5, imuRateHz: 50 }));
const { imu, gnss } = sound;
const before = JSON.stringify({ imu, gnss });
const at = (t: number) => imu.timeS.findIndex((x) => x >= t - 1e-9);

afterEach(() => expect(JSON.stringify({ imu, gnss }) === before).toBe(true)); // the sound recording is never touched

test('gap', () => {
  const gapped = defects.imuGap(imu, [10, 12]);
  expect(gapped.timeS.length).toBe(imu.timeS.length - 100);
  expect(gapped.timeS[at(10)]).toBe(12);
  expect(defects.gnssGap(gnss, [10, 12]).latRad.length).toBe(gnss.latRad.length - 10);
});

test('duplicates and disorder', () => {
  const twice = defects.imuDuplicates(imu, [10, 10.1]);
  expect(twice.timeS.length).toBe(imu.timeS.length + 5);
  expect(twice.timeS[at(10) + 1]).toBe(twice.timeS[at(10)]);
  const mixed = defects.imuReorder(imu, [10, 11]);
  expect(mixed.timeS[at(10)]).toBeGreaterThan(mixed.timeS[at(10) + 1]!);
  expect(mixed.timeS.slice().sort()).toEqual(imu.timeS);
  expect(mixed.gyro[0][at(10)]).toBe(imu.gyro[0][at(10) + 1]);
});

test('values: NaN, stuck, clipped, shock, units, sign, axes', () => {
  const missing = defects.imuNaN(imu, 'accel', 2, [10, 11]);
  expect(missing.accel[2].filter(Number.isNaN).length).toBe(50);
  expect(missing.accel[1]).toBe(imu.accel[1]);
  const stuck = defects.imuStuck(imu, 'gyro', 0, [10, 20]);
  expect(new Set(stuck.gyro[0].slice(at(10), at(20))).size).toBe(1);
  const clipped = defects.imuClip(imu, 'accel', 9.8);
  expect(Math.min(...clipped.accel[2])).toBe(-9.8);
  const shock = defects.imuShock(imu, 0, 300, [30, 30.1]);
  expect(Math.max(...shock.accel[0])).toBeGreaterThan(250);
  expect(defects.imuScale(imu, 'gyro', 57.3).gyro[2][500]).toBe(57.3 * imu.gyro[2][500]!);
  const flipped = defects.imuScale(imu, 'gyro', -1, 2);
  expect(flipped.gyro[2][500]).toBe(-imu.gyro[2][500]!);
  expect(flipped.gyro[1]).toBe(imu.gyro[1]);
  const swapped = defects.imuSwapAxes(imu, 0, 1);
  expect(swapped.accel[0]).toBe(imu.accel[1]);
  expect(swapped.gyro[1]).toBe(imu.gyro[0]);
});

test('clocks: jitter keeps the order, offsets shift', () => {
  const jittered = defects.imuJitter(imu, 0.02, createRandom(1)).timeS;
  expect(jittered.every((t, i) => i === 0 || t > jittered[i - 1]!)).toBe(true);
  expect(defects.gnssClockOffset(gnss, 1.5).timeS[0]).toBe(1.5);
});

test('GNSS: velocity lag, jump, freeze', () => {
  const lagging = defects.gnssVelocityLag(gnss, 0.2);
  expect(lagging.velocityNed[0][100]).toBeCloseTo(gnss.velocityNed[0][99]!, 9);
  const jumped = defects.gnssJump(gnss, [20, 21], 30, -40);
  expect((jumped.latRad[101]! - gnss.latRad[101]!) * 6.371e6).toBeCloseTo(30, 3);
  expect(jumped.latRad[99]).toBe(gnss.latRad[99]);
  const frozen = defects.gnssFrozen(gnss, [20, 25]);
  expect(new Set(frozen.latRad.slice(100, 125)).size).toBe(1);
  expect(frozen.timeS).toEqual(gnss.timeS);
});
