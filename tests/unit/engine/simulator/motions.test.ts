/** Every motion's stated derivatives against finite differences of what they are derivatives of. */
import { createRandom } from '@/workers/engine/random';
import {
  newKinematics,
  type Kinematics,
  type Motion,
  type MotionOptions,
} from '@/workers/engine/simulator/motion';
import { crawlerMotion } from '@/workers/engine/simulator/motions/crawler';
import { fixedWingMotion } from '@/workers/engine/simulator/motions/fixed-wing';
import { multirotorMotion } from '@/workers/engine/simulator/motions/multirotor';
import { roadMotion } from '@/workers/engine/simulator/motions/road';
import { staticMotion } from '@/workers/engine/simulator/motions/static';

const options = (seed: number, staticStartS = 20): MotionOptions => ({
  durationS: 400,
  staticStartS,
  initialHeadingRad: 0.6,
  random: createRandom(seed),
});
const motions: [string, (seed: number) => Motion][] = [
  ['road', (seed) => roadMotion(options(seed))],
  ['crawler', (seed) => crawlerMotion(options(seed))],
  ['fixed wing from the ground', (seed) => fixedWingMotion(options(seed))],
  ['fixed wing in flight', (seed) => fixedWingMotion(options(seed, 0))],
  ['multirotor', (seed) => multirotorMotion(options(seed))],
  ['coning multirotor', (seed) => multirotorMotion({ ...options(seed), coning: { angleRad: 0.03, hz: 3 } })],
  ['static', () => staticMotion(1)],
];
const at = (motion: Motion, t: number): Kinematics => {
  const out = newKinematics();
  motion.evaluate(t, out);
  return out;
};
const pairs = [
  ['vn', 'an'],
  ['ve', 'ae'],
  ['vd', 'ad'],
  ['roll', 'rollRate'],
  ['pitch', 'pitchRate'],
  ['yaw', 'yawRate'],
] as const;

test.each(motions)('%s: derivatives are exact', (_name, make) => {
  for (const seed of [1, 2]) {
    const motion = make(seed);
    const h = 1e-4;
    let worst = 0;
    for (let t = 0.01; t < 400; t += 0.173) {
      const now = at(motion, t);
      const [a, b, c, d] = [
        at(motion, t - 2 * h),
        at(motion, t - h),
        at(motion, t + h),
        at(motion, t + 2 * h),
      ];
      for (const [value, rate] of pairs) {
        const numeric = (a[value] - 8 * b[value] + 8 * c[value] - d[value]) / (12 * h);
        worst = Math.max(worst, Math.abs(numeric - now[rate]));
      }
    }
    expect(worst).toBeLessThan(1e-6);
  }
});

test.each(motions)('%s: accelerations and angle rates never jump', (_name, make) => {
  const motion = make(3);
  const h = 1e-5;
  let worst = 0;
  for (let t = 0.02; t < 400; t += 0.02) {
    const left = at(motion, t - h);
    const right = at(motion, t + h);
    for (const [, rate] of pairs) worst = Math.max(worst, Math.abs(right[rate] - left[rate]));
  }
  expect(worst).toBeLessThan(0.02);
  expect(worst).toBeGreaterThan(motion.kind === 'static' ? -1 : 0);
});

test.each(motions)('%s: stands still first, where it starts from the ground', (name, make) => {
  if (name === 'fixed wing in flight') return expect(at(make(1), 0).vn).not.toBe(0);
  const motion = make(1);
  for (const t of [-0.01, 0, 10, 19.9]) {
    const k = at(motion, t);
    for (const key of ['vn', 've', 'vd', 'an', 'ae', 'ad', 'rollRate', 'pitchRate', 'yawRate'] as const)
      expect(Math.abs(k[key])).toBe(0);
  }
});

test('the road vehicle and the crawler go where they point; the aircraft does not slip', () => {
  for (const motion of [roadMotion(options(5)), crawlerMotion(options(5)), fixedWingMotion(options(5))]) {
    for (let t = 60; t < 400; t += 1.7) {
      const k = at(motion, t);
      const sideways = -k.vn * Math.sin(k.yaw) + k.ve * Math.cos(k.yaw);
      expect(Math.abs(sideways)).toBeLessThan(1e-12);
    }
  }
});

test('seeds give different drives, the same seed the same one', () => {
  const [a, b, c] = [1, 1, 2].map((seed) => at(roadMotion(options(seed)), 111.1));
  expect(a).toEqual(b);
  expect(a).not.toEqual(c);
});

test('long drives stay near where they began', () => {
  const motion = roadMotion({ ...options(4), durationS: 7200 });
  let [n, e, far] = [0, 0, 0];
  for (let t = 0; t < 7200; t += 0.5) {
    const k = at(motion, t);
    n += 0.5 * k.vn;
    e += 0.5 * k.ve;
    far = Math.max(far, Math.hypot(n, e));
  }
  expect(far).toBeGreaterThan(500);
  expect(far).toBeLessThan(6000);
});
