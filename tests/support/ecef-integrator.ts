/** An inertial navigator of another kind, for tests: Earth-centred axes, fourth-order Runge–Kutta on continuous signals. */
import { dcmFromQuat, quatFromEuler, quatMultiply, quatNormalise } from '@/workers/engine/attitude';
import { EARTH_RATE, ecefToGeodetic, geodeticToEcef } from '@/workers/engine/geodesy';
import { normalGravity } from '@/workers/engine/gravity';
import { bodyMotion, newBodyMotion } from '@/workers/engine/simulator/body-motion';
import { newKinematics, type Motion } from '@/workers/engine/simulator/motion';
import type { ReferenceColumns } from '@/workers/engine/types';

/** Axes e←n of local level at a latitude and longitude, row by row. */
function levelAxes(lat: number, lon: number): Float64Array {
  const [s, c, S, C] = [Math.sin(lat), Math.cos(lat), Math.sin(lon), Math.cos(lon)];
  return Float64Array.of(-s * C, -S, -c * C, -s * S, C, -c * S, c, 0, -s);
}

const rotate = (m: Float64Array, x: number, y: number, z: number) =>
  [0, 3, 6].map((i) => m[i]! * x + m[i + 1]! * y + m[i + 2]! * z) as [number, number, number];

/** State: position (3), velocity (3) and quaternion e←b (4), all in Earth-centred axes. */
function stateOf(truth: ReferenceColumns, k: number): Float64Array {
  const [lat, lon] = [truth.latRad[k]!, truth.lonRad[k]!];
  const level = levelAxes(lat, lon);
  const r = geodeticToEcef(lat, lon, truth.heightM[k]!, new Float64Array(3));
  const v = rotate(level, truth.velocityNed[0][k]!, truth.velocityNed[1][k]!, truth.velocityNed[2][k]!);
  const half = lat / 2 + Math.PI / 4;
  const levelQuat = quatMultiply(
    Float64Array.of(Math.cos(lon / 2), 0, 0, Math.sin(lon / 2)),
    Float64Array.of(Math.cos(half), 0, -Math.sin(half), 0),
    new Float64Array(4),
  );
  const body = quatFromEuler(
    truth.attitude[0][k]!,
    truth.attitude[1][k]!,
    truth.attitude[2][k]!,
    new Float64Array(4),
  );
  return Float64Array.of(...r, ...v, ...quatMultiply(levelQuat, body, new Float64Array(4)));
}

/** Integrates the motion's ideal rates and forces from the truth's first row to its last; errors at the end. */
export function integrateEcef(motion: Motion, truth: ReferenceColumns, stepS: number) {
  const n = truth.timeS.length;
  const state = stateOf(truth, 0);
  const kinematics = newKinematics();
  const signals = newBodyMotion();
  const place = new Float64Array(3);
  const placeAt = placeOnTrack(truth);
  const derivative = (t: number, x: Float64Array) => {
    // The signals are those of the true place; everything else is of this navigator's own state.
    motion.evaluate(t, kinematics);
    const [lat, height] = placeAt(t);
    bodyMotion(kinematics, lat, height, signals);
    const q = quatNormalise(x.slice(6));
    const f = rotate(dcmFromQuat(q, new Float64Array(9)), signals.fx, signals.fy, signals.fz);
    ecefToGeodetic(x[0]!, x[1]!, x[2]!, place);
    const g = rotate(levelAxes(place[0]!, place[1]!), 0, 0, normalGravity(place[0]!, place[2]!));
    const rate = Float64Array.of(0, signals.wx / 2, signals.wy / 2, signals.wz / 2);
    const earth = Float64Array.of(0, 0, 0, EARTH_RATE / 2);
    const qb = quatMultiply(q, rate, new Float64Array(4));
    const qe = quatMultiply(earth, q, new Float64Array(4));
    return Float64Array.of(
      x[3]!,
      x[4]!,
      x[5]!,
      f[0] + g[0] + 2 * EARTH_RATE * x[4]!,
      f[1] + g[1] - 2 * EARTH_RATE * x[3]!,
      f[2] + g[2],
      ...qb.map((value, i) => value - qe[i]!),
    );
  };
  const shifted = (k: Float64Array, h: number) => state.map((value, i) => value + h * k[i]!);
  const start = truth.timeS[0]!;
  const steps = Math.round((truth.timeS[n - 1]! - start) / stepS);
  for (let i = 0; i < steps; i += 1) {
    const t = start + i * stepS;
    const k1 = derivative(t, state);
    const k2 = derivative(t + stepS / 2, shifted(k1, stepS / 2));
    const k3 = derivative(t + stepS / 2, shifted(k2, stepS / 2));
    const k4 = derivative(t + stepS, shifted(k3, stepS));
    for (let j = 0; j < 10; j += 1) state[j]! += (stepS / 6) * (k1[j]! + 2 * k2[j]! + 2 * k3[j]! + k4[j]!);
  }
  const end = stateOf(truth, n - 1);
  const error = (from: number, to: number) =>
    Math.hypot(...end.slice(from, to).map((v, i) => v - state[from + i]!));
  const sign = Math.sign(end.slice(6).reduce((sum, v, i) => sum + v * state[6 + i]!, 0));
  const attitudeErrorRad = 2 * Math.hypot(...end.slice(6).map((v, i) => v - sign * state[6 + i]!));
  return { positionErrorM: error(0, 3), velocityErrorMPerS: error(3, 6), attitudeErrorRad };
}

/** Latitude and height between the truth's rows, by cubic Hermite on the exact rates' differences. */
function placeOnTrack(truth: ReferenceColumns) {
  const { timeS, latRad, heightM } = truth;
  const step = timeS[1]! - timeS[0]!;
  return (t: number): [number, number] => {
    const i = Math.min(Math.max(Math.floor((t - timeS[0]!) / step), 1), timeS.length - 3);
    const u = (t - timeS[i]!) / step;
    const cubic = (y: Float64Array) => {
      const [a, b, c, d] = [y[i - 1]!, y[i]!, y[i + 1]!, y[i + 2]!];
      return b + u * (c - b) + ((u * (u - 1)) / 6) * ((2 - u) * (a - 2 * b + c) + (u + 1) * (b - 2 * c + d));
    };
    return [cubic(latRad), cubic(heightM)];
  };
}
