/**
 * The inverse mechanisation against mechanics written anew: Newton's law in an inertial frame, by finite differences of
 * the track, and a Runge–Kutta integration of the continuous equations in Earth-centred axes.
 */
import { dcmFromQuat, quatFromEuler, quatMultiply, rotationVectorFromQuat } from '@/workers/engine/attitude';
import { EARTH_RATE, geodeticToEcef } from '@/workers/engine/geodesy';
import { normalGravity } from '@/workers/engine/gravity';
import { createRandom } from '@/workers/engine/random';
import { inverseMechanisation } from '@/workers/engine/simulator/inverse';
import type { Motion, MotionOptions } from '@/workers/engine/simulator/motion';
import { fixedWingMotion } from '@/workers/engine/simulator/motions/fixed-wing';
import { multirotorMotion } from '@/workers/engine/simulator/motions/multirotor';
import { roadMotion } from '@/workers/engine/simulator/motions/road';
import { staticMotion } from '@/workers/engine/simulator/motions/static';
import { regularTimes } from '@/workers/engine/simulator/scenario';
import { integrateEcef } from '@/tests/support/ecef-integrator';

const options = (seed: number, staticStartS: number): MotionOptions => ({
  durationS: 120,
  staticStartS,
  initialHeadingRad: 0.6,
  random: createRandom(seed),
});
const place = { latRad: 0.824, lonRad: -0.255, heightM: 120 };
const motions: [string, Motion][] = [
  ['road', roadMotion(options(1, 5))],
  ['fixed wing', fixedWingMotion(options(2, 0))],
  ['multirotor', multirotorMotion({ ...options(3, 2), coning: { angleRad: 0.03, hz: 3 } })],
  ['static', staticMotion(0.4)],
];

/** Attitude i←b and position in a frame that does not turn, from the truth columns. */
function inertial(truth: ReturnType<typeof inverseMechanisation>['truth'], k: number) {
  const lat = truth.latRad[k]!;
  const lon = truth.lonRad[k]! + EARTH_RATE * truth.timeS[k]!;
  // Axes n in i: yaw about the pole, then to the local level (north–east–down).
  const toLevel = quatMultiply(
    Float64Array.of(Math.cos(lon / 2), 0, 0, Math.sin(lon / 2)),
    Float64Array.of(Math.cos(lat / 2 + Math.PI / 4), 0, -Math.sin(lat / 2 + Math.PI / 4), 0),
    new Float64Array(4),
  );
  const [roll, pitch, yaw] = truth.attitude.map((angle) => angle[k]!) as [number, number, number];
  const body = quatFromEuler(roll, pitch, yaw, new Float64Array(4));
  const q = quatMultiply(toLevel, body, new Float64Array(4));
  const r = geodeticToEcef(lat, lon, truth.heightM[k]!, new Float64Array(3));
  return { q, r, lat, toLevel };
}

test.each(motions)('%s: body rates are those of the attitude against inertial space', (_name, motion) => {
  const h = 2.5e-4;
  for (const from of [10, 31.7, 64.2, 101.3]) {
    const times = Float64Array.from({ length: 3 }, (_, k) => from + (k - 1) * h);
    const { truth, imu } = inverseMechanisation(motion, place, times, 'instantaneous');
    const before = inertial(truth, 0).q;
    before[0]! *= -1; // conjugate, up to sign
    const change = quatMultiply(before, inertial(truth, 2).q, new Float64Array(4));
    const v = rotationVectorFromQuat(change, new Float64Array(3));
    for (const axis of [0, 1, 2] as const)
      expect(Math.abs(v[axis]! / (2 * h) - imu.gyro[axis][1]!)).toBeLessThan(5e-6);
  }
});

test.each(motions)('%s: specific force is inertial acceleration less gravitation', (_name, motion) => {
  const h = motion.kind === 'multirotor' ? 0.003 : 0.01; // the rotors' shaking is quick
  for (const from of [10, 31.7, 64.2, 101.3]) {
    const times = Float64Array.from({ length: 5 }, (_, k) => from + (k - 2) * h);
    const { truth, imu } = inverseMechanisation(motion, place, times, 'instantaneous');
    const r = [0, 1, 2, 3, 4].map((k) => inertial(truth, k).r);
    const here = inertial(truth, 2);
    const c = dcmFromQuat(here.q, new Float64Array(9));
    const level = dcmFromQuat(here.toLevel, new Float64Array(9));
    const g = normalGravity(here.lat, truth.heightM[2]!);
    const force = [0, 1, 2].map((i) => {
      const x = r.map((p) => p[i]!);
      const a = (-x[0]! + 16 * x[1]! - 30 * x[2]! + 16 * x[3]! - x[4]!) / (12 * h * h);
      // Gravity along the level frame's down axis; gravitation adds back what the Earth's turning takes off.
      const gravitation = g * level[3 * i + 2]! - (i < 2 ? EARTH_RATE ** 2 * x[2]! : 0);
      return a - gravitation;
    });
    for (const axis of [0, 1, 2] as const) {
      const f = c[axis]! * force[0]! + c[3 + axis]! * force[1]! + c[6 + axis]! * force[2]!;
      expect(Math.abs(f - imu.accel[axis][2]!)).toBeLessThan(motion.kind === 'multirotor' ? 4e-3 : 3e-4);
    }
  }
});

test.each(motions)(
  '%s: integrating the ideal signals in Earth-centred axes gives the truth back',
  (_name, motion) => {
    const times = regularTimes(60, 100);
    const { truth } = inverseMechanisation(motion, place, times);
    const end = integrateEcef(motion, truth, 1 / 1000);
    expect(end.positionErrorM).toBeLessThan(1e-5);
    expect(end.velocityErrorMPerS).toBeLessThan(1e-6);
    expect(end.attitudeErrorRad).toBeLessThan(1e-9);
  },
);

test('increments, mean rates and instantaneous rates are the same signal', () => {
  const [, motion] = motions[0]!;
  const times = regularTimes(40, 200);
  const mean = inverseMechanisation(motion, place, times, 'mean-rate').imu;
  const increment = inverseMechanisation(motion, place, times, 'increment').imu;
  const instant = inverseMechanisation(motion, place, times, 'instantaneous').imu;
  for (let k = 1; k < times.length; k += 7) {
    const dt = times[k]! - times[k - 1]!;
    for (const axis of [0, 1, 2] as const) {
      expect(Math.abs(mean.gyro[axis][k]! * dt - increment.gyro[axis][k]!)).toBeLessThan(1e-16);
      const middle = (instant.accel[axis][k]! + instant.accel[axis][k - 1]!) / 2;
      expect(Math.abs(mean.accel[axis][k]! - middle)).toBeLessThan(1e-3);
    }
  }
});

test('the rate of sampling does not move the truth, and increments add up', () => {
  const [, motion] = motions[2]!;
  const slow = inverseMechanisation(motion, place, regularTimes(60, 10), 'increment');
  const fast = inverseMechanisation(motion, place, regularTimes(60, 1000), 'increment');
  for (let k = 1; k <= 600; k += 1) {
    expect(Math.abs(slow.truth.latRad[k]! - fast.truth.latRad[100 * k]!) * 6.4e6).toBeLessThan(1e-6);
    for (const axis of [0, 1, 2] as const) {
      let sum = 0;
      for (let i = 100 * k - 99; i <= 100 * k; i += 1) sum += fast.imu.gyro[axis][i]!;
      expect(Math.abs(sum - slow.imu.gyro[axis][k]!)).toBeLessThan(1e-9);
    }
  }
});

test('uneven times are followed', () => {
  const random = createRandom(9);
  const [, motion] = motions[1]!;
  let t = 0;
  const uneven = Float64Array.from({ length: 3000 }, () => (t += 0.005 + 0.02 * random.uniform()));
  const { truth } = inverseMechanisation(motion, place, uneven);
  const even = inverseMechanisation(motion, place, Float64Array.of(uneven[0]!, uneven[2999]!)).truth;
  expect(Math.abs(truth.latRad[2999]! - even.latRad[1]!) * 6.4e6).toBeLessThan(1e-6);
});

test('a track that nears the pole is refused with a reason', () => {
  const [, motion] = motions[1]!;
  expect(() =>
    inverseMechanisation(motion, { latRad: 1.562, lonRad: 0, heightM: 0 }, regularTimes(60, 10)),
  ).toThrow(/pole/);
});
