/**
 * Noise-free closure: the strapdown's own answer against the simulator's truth, and coning residuals against theory
 * (Miller, JGCD 6, 1983: uncorrected a²Ωx²/12, two intervals a²Ωx⁴/60; rows T-13, T-14).
 */
import { closure } from '@/tests/support/closure';
import { degToRad } from '@/shared/units';
import { createRandom } from '@/workers/engine/random';
import type { MotionOptions } from '@/workers/engine/simulator/motion';
import { fixedWingMotion } from '@/workers/engine/simulator/motions/fixed-wing';
import { multirotorMotion } from '@/workers/engine/simulator/motions/multirotor';
import { roadMotion } from '@/workers/engine/simulator/motions/road';

const options = (durationS: number, staticStartS: number): MotionOptions => ({
  durationS,
  staticStartS,
  initialHeadingRad: 0.6,
  random: createRandom(1),
});

test('road vehicle, 600 s at 200 Hz: within 1 mm', () => {
  const result = closure(roadMotion(options(600, 10)), 600, 200);
  expect(result.positionM).toBeLessThan(1e-3);
  expect(result.attitudeRad).toBeLessThan(1e-8);
});

test('fixed wing, 600 s at 200 Hz: within 1 mm', () => {
  const result = closure(fixedWingMotion(options(600, 0)), 600, 200);
  expect(result.positionM).toBeLessThan(1e-3);
});

test('multirotor with 3 Hz coning, 400 s at 200 Hz: within 10 mm; uncorrected it drifts by what theory says', () => {
  const motion = multirotorMotion({
    ...options(400, 5),
    vibration: { accelerationMPerS2: 0, hz: 27 },
    coning: { angleRad: degToRad(0.5), hz: 3 },
  });
  const corrected = closure(motion, 400, 200);
  const uncorrected = closure(motion, 400, 200, 'trapezoidal');
  expect(corrected.positionM).toBeLessThan(0.01);
  const omega = 2 * Math.PI * 3;
  const x = omega / 200;
  const flown = 400 - 6.5; // airborne from the middle of the start
  const theory = (degToRad(0.5) ** 2 * omega * x * x * flown) / 12;
  expect(uncorrected.attitudeRad / theory).toBeGreaterThan(0.9);
  expect(uncorrected.attitudeRad / theory).toBeLessThan(1.1);
  expect(uncorrected.attitudeRad / corrected.attitudeRad).toBeGreaterThan(0.9 * (5 / (x * x)));
  expect(uncorrected.positionM).toBeGreaterThan(20 * corrected.positionM);
});
