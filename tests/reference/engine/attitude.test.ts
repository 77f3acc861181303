/** Attitude algebra against 30-digit arithmetic and closed forms. */
import {
  dcmFromQuat,
  eulerFromQuat,
  quatFromDcm,
  quatFromEuler,
  quatFromRotationVector,
  quatMultiply,
  rotationVectorFromQuat,
} from '@/workers/engine/attitude';
import { degToRad, radToDeg } from '@/shared/units';
import data from '../data/attitude.json';

const worst = (a: ArrayLike<number>, b: ArrayLike<number>, sign = 1) =>
  Math.max(...Array.from(b, (v, i) => Math.abs(sign * a[i]! - v)));
const quat = (yaw: number, pitch: number, roll: number) =>
  quatFromEuler(degToRad(roll), degToRad(pitch), degToRad(yaw), new Float64Array(4));

test.each(data.rows)('T-01 yaw $yaw pitch $pitch roll $roll', (row) => {
  const q = quat(row.yaw, row.pitch, row.roll);
  expect(Math.min(worst(q, row.q), worst(q, row.q, -1))).toBeLessThan(2e-15);
  const c = dcmFromQuat(q, new Float64Array(9));
  expect(worst(c, row.C.flat())).toBeLessThan(2e-15);
  const back = quatFromDcm(c, new Float64Array(4));
  expect(Math.min(worst(back, q), worst(back, q, -1))).toBeLessThan(2e-15);
});

test.each([
  ['T-02', 90, 35],
  ['T-03', -90, 85],
])('%s at pitch %d° roll is 0 and yaw carries the sum', (_id, pitch, yaw) => {
  const euler = eulerFromQuat(quat(60, pitch, 25), new Float64Array(3));
  expect(euler[0]).toBe(0);
  expect(radToDeg(euler[1]!)).toBeCloseTo(pitch, 7);
  expect(Math.abs(radToDeg(euler[2]!) - yaw)).toBeLessThan(1e-11);
});

test('T-04 angles taken next to the gimbal limit rebuild the matrix', () => {
  for (const pitch of [89.999, 89.9999999, -89.999, 90, -90]) {
    const c = dcmFromQuat(quat(10, pitch, 20), new Float64Array(9));
    const e = eulerFromQuat(quatFromDcm(c, new Float64Array(4)), new Float64Array(3));
    const again = dcmFromQuat(quatFromEuler(e[0]!, e[1]!, e[2]!, new Float64Array(4)), new Float64Array(9));
    expect(worst(again, c)).toBeLessThan(1e-12);
  }
  const beyond = Float64Array.of(0, 0, 1 + 1e-16, 0, 1, 0, -(1 + 1e-16), 0, 0);
  const e = eulerFromQuat(quatFromDcm(beyond, new Float64Array(4)), new Float64Array(3));
  expect(Array.from(e).every(Number.isFinite)).toBe(true);
});

test('T-05 rotated vector', () => {
  const c = dcmFromQuat(quat(30, 20, 10), new Float64Array(9));
  const v = [0, 1, 2].map((r) => c[3 * r]! + 2 * c[3 * r + 1]! + 3 * c[3 * r + 2]!);
  expect(worst(v, [1.06742537939899, 2.28905948262062, 2.76058141420237])).toBeLessThan(1e-13);
});

test.each([
  [
    'T-06',
    [0.1, -0.2, 0.3],
    [0.98255098215526, 0.04970884332486, -0.09941768664972, 0.14912652997458],
    1e-14,
  ],
  ['T-07', [1e-8, 2e-8, -3e-8], [1, 5e-9, 1e-8, -1.5e-8], 2.3e-16],
  ['T-08', [Math.PI, 0, 0], [0, 1, 0, 0], 1e-15],
  ['T-08', [3, 0, 0], [0.0707372016677029, 0.997494986604054, 0, 0], 1e-15],
  ['T-08', [0, 0, Math.PI / 2], [Math.SQRT1_2, 0, 0, Math.SQRT1_2], 1e-15],
] as const)('%s quaternion of a rotation vector, and back', (_id, v, expected, tolerance) => {
  const q = quatFromRotationVector(v[0], v[1], v[2], new Float64Array(4));
  expect(worst(q, expected)).toBeLessThan(tolerance);
  expect(worst(rotationVectorFromQuat(q, new Float64Array(3)), v)).toBeLessThan(2e-15);
});

test('T-09 order of rotations', () => {
  const x = Float64Array.of(Math.SQRT1_2, Math.SQRT1_2, 0, 0);
  const z = Float64Array.of(Math.SQRT1_2, 0, 0, Math.SQRT1_2);
  expect(worst(quatMultiply(x, z, new Float64Array(4)), [0.5, 0.5, -0.5, 0.5])).toBeLessThan(1e-15);
  expect(worst(quatMultiply(z, x, new Float64Array(4)), [0.5, 0.5, 0.5, 0.5])).toBeLessThan(1e-15);
});

test('T-11 angle of an attitude', () => {
  const v = rotationVectorFromQuat(quat(30, 20, 10), new Float64Array(3));
  expect(Math.abs(radToDeg(Math.hypot(v[0]!, v[1]!, v[2]!)) / 35.8171011735842 - 1)).toBeLessThan(1e-13);
});
