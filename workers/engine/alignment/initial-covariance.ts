/**
 * Covariance at the start as J S Jᵀ: S holds the variances of independent causes, J says how each cause enters the
 * error states. Only so are the correlations right: a levelled tilt is the accelerometer bias over gravity, a heading
 * carried back by the gyros is wrong by their bias.
 */
import { Matrix } from 'ml-matrix';
import type { BudgetSource } from '../filter/error-budget';
import { EARTH_RATE } from '../geodesy';
import {
  ACCEL_BIAS, ATTITUDE, GYRO_BIAS, POSITION, STATES, VELOCITY, type StateLayout,
} from '../filter/states'; // prettier-ignore

/** Independent causes of the initial error. */
export interface InitialCauses {
  /** n←b at the start, row by row. */
  dcm: Float64Array;
  latRad: number;
  gravity: number;
  /** Antenna seen from the IMU where the position came from an antenna fix, in n, m. */
  armNed: readonly [number, number, number] | null;
  positionVariance: readonly [number, number, number];
  velocityVariance: readonly [number, number, number];
  /** Bias variances left after whatever was learnt, and whether the gyro bias was taken from rest. */
  gyroBiasVariance: readonly [number, number, number];
  accelBiasVariance: readonly [number, number, number];
  gyroBiasFromRest: boolean;
  /** Level from gravity: accelerometer bias tilts it. Variance of what else tilts, rad², about n and e. */
  levelled: boolean;
  /** Attitude of its own, rad², 3×3 in n (about north, east, down), row by row. */
  attitudeVariance: Float64Array;
  /** Heading carried by the gyros: ∫C_D· dt, s; null if not. */
  headingArm: readonly [number, number, number] | null;
  /** Heading from the Earth's rotation: variance of the gyro bias towards east, which turned it, (rad/s)²; null if not. */
  eastBiasVariance: number | null;
  /** States behind the fifteen: where they lie and their variances, one after the other. */
  layout: StateLayout;
  optionalVariance: Float64Array;
}

/** P (size × size, row by row). */
export function initialCovariance(causes: InitialCauses): Float64Array {
  const { size } = causes.layout;
  const j = Matrix.zeros(size, size);
  const s = Matrix.zeros(size, size);
  for (let i = 0; i < 3; i += 1) {
    // Causes, in the places of the states that they are the own part of.
    s.set(POSITION + i, POSITION + i, causes.positionVariance[i]!);
    s.set(VELOCITY + i, VELOCITY + i, causes.velocityVariance[i]!);
    s.set(GYRO_BIAS + i, GYRO_BIAS + i, causes.gyroBiasVariance[i]!);
    s.set(ACCEL_BIAS + i, ACCEL_BIAS + i, causes.accelBiasVariance[i]!);
    for (let k = 0; k < 3; k += 1) s.set(ATTITUDE + i, ATTITUDE + k, causes.attitudeVariance[3 * i + k]!);
  }
  for (let i = STATES; i < size; i += 1) s.set(i, i, causes.optionalVariance[i - STATES]!);
  for (let i = 0; i < size; i += 1) j.set(i, i, 1);
  addEastBias(s, causes);
  addLevelling(j, causes);
  addCompass(j, causes);
  addHeadingArm(j, causes);
  addEarthRate(j, causes);
  addLeverArm(j, causes);
  const p = j.mmul(s).mmul(j.transpose());
  const out = new Float64Array(size * size);
  for (let r = 0; r < size; r += 1)
    for (let c = 0; c < size; c += 1) out[r * size + c] = 0.5 * (p.get(r, c) + p.get(c, r));
  return out;
}

/** P split by cause: the parts sum to `initialCovariance(causes)`. */
export function initialBudget(causes: InitialCauses): Partial<Record<BudgetSource, Float64Array>> {
  const none = [0, 0, 0] as const;
  const nothing: InitialCauses = {
    ...causes,
    positionVariance: none,
    velocityVariance: none,
    gyroBiasVariance: none,
    eastBiasVariance: causes.eastBiasVariance === null ? null : 0,
    accelBiasVariance: none,
    attitudeVariance: new Float64Array(9),
    optionalVariance: new Float64Array(causes.optionalVariance.length),
  };
  const alone = (part: Partial<InitialCauses>) => initialCovariance({ ...nothing, ...part });
  return {
    'gyro bias': alone({
      gyroBiasVariance: causes.gyroBiasVariance,
      eastBiasVariance: causes.eastBiasVariance,
    }),
    'accelerometer bias': alone({ accelBiasVariance: causes.accelBiasVariance }),
    'initial attitude': alone({ attitudeVariance: causes.attitudeVariance }),
    'initial velocity': alone({ velocityVariance: causes.velocityVariance }),
    'initial position': alone({ positionVariance: causes.positionVariance }),
    ...optionalBudget(causes, alone),
  };
}

function optionalBudget(
  { layout, optionalVariance }: InitialCauses,
  alone: (part: Partial<InitialCauses>) => Float64Array,
): Partial<Record<BudgetSource, Float64Array>> {
  if (layout.size === STATES) return {};
  const between = (from: number, to: number) =>
    alone({
      optionalVariance: optionalVariance.map((v, i) => (i >= from - STATES && i < to - STATES ? v : 0)),
    });
  const arm = layout.leverArm;
  const barometer = layout.barometerBias;
  const scaleEnd = arm >= 0 ? arm : barometer >= 0 ? barometer : layout.size;
  return {
    'scale factors': between(STATES, scaleEnd),
    'lever arm': arm < 0 ? between(0, 0) : between(arm, arm + 3),
    'barometer bias': barometer < 0 ? between(0, 0) : between(barometer, barometer + 1),
  };
}

/** 0 = f_n×φ − C δb_a in north and east at rest, f_n = (0, 0, −g): φ_N = −(C δb_a)_E/g, φ_E = (C δb_a)_N/g. */
function addLevelling(j: Matrix, { levelled, dcm, gravity, layout }: InitialCauses): void {
  if (!levelled) return;
  for (let i = 0; i < 3; i += 1) {
    j.set(ATTITUDE, ACCEL_BIAS + i, -dcm[3 + i]! / gravity);
    j.set(ATTITUDE + 1, ACCEL_BIAS + i, dcm[i]! / gravity);
    if (layout.accelScale < 0) continue;
    // A scale factor error is a bias of its size times the specific force there, −g along down.
    const force = -dcm[6 + i]! * gravity;
    j.set(ATTITUDE, layout.accelScale + i, (-dcm[3 + i]! / gravity) * force);
    j.set(ATTITUDE + 1, layout.accelScale + i, (dcm[i]! / gravity) * force);
  }
}

/** The gyro bias towards east was not told by the rest: V(I − eeᵀ) + v_e eeᵀ for the east axis e in the body. */
function addEastBias(s: Matrix, { eastBiasVariance, gyroBiasVariance: [own], dcm }: InitialCauses): void {
  if (eastBiasVariance === null) return;
  for (let i = 0; i < 3; i += 1)
    for (let k = 0; k < 3; k += 1)
      s.set(
        GYRO_BIAS + i,
        GYRO_BIAS + k,
        (i === k ? own : 0) + (eastBiasVariance - own) * dcm[3 + i]! * dcm[3 + k]!,
      );
}

/** φ_D = −(C δb_g)_E/(Ω cos φ) − tan φ · φ_N, beside what is its own (gyrocompass.ts). */
function addCompass(j: Matrix, { eastBiasVariance, dcm, latRad }: InitialCauses): void {
  if (eastBiasVariance === null) return;
  const north = EARTH_RATE * Math.cos(latRad);
  for (let i = 0; i < 3; i += 1) j.set(ATTITUDE + 2, GYRO_BIAS + i, -dcm[3 + i]! / north);
  for (let cause = 0; cause < j.columns; cause += 1) {
    if (cause === ATTITUDE + 2) continue;
    const tilt = -Math.tan(latRad) * j.get(ATTITUDE, cause);
    j.set(ATTITUDE + 2, cause, j.get(ATTITUDE + 2, cause) + tilt);
  }
}

/** φ_D(start) = φ_D(course) − ∫C_D· dt δb_g. */
function addHeadingArm(j: Matrix, { headingArm }: InitialCauses): void {
  if (headingArm === null) return;
  for (let i = 0; i < 3; i += 1) j.set(ATTITUDE + 2, GYRO_BIAS + i, -headingArm[i]!);
}

/** A bias read at rest took the Earth rate off with the computed attitude: δb_g = n + Cᵀ(ω_ie × φ). */
function addEarthRate(j: Matrix, causes: InitialCauses): void {
  const { gyroBiasFromRest, dcm, latRad, eastBiasVariance } = causes;
  if (!gyroBiasFromRest) return;
  const north = EARTH_RATE * Math.cos(latRad);
  const down = -EARTH_RATE * Math.sin(latRad);
  // [ω_ie×] row by row.
  const cross = [0, -down, 0, down, 0, -north, 0, north, 0];
  // A heading from the Earth's rotation leaves no rate towards east, whatever the attitude.
  if (eastBiasVariance !== null) cross.fill(0, 3, 6);
  for (let axis = 0; axis < 3; axis += 1)
    for (let cause = 0; cause < j.columns; cause += 1) {
      let sum = j.get(GYRO_BIAS + axis, cause);
      for (let r = 0; r < 3; r += 1)
        for (let c = 0; c < 3; c += 1)
          sum += dcm[3 * r + axis]! * cross[3 * r + c]! * j.get(ATTITUDE + c, cause);
      j.set(GYRO_BIAS + axis, cause, sum);
    }
}

/** r̂ = antenna − Ĉl̂: δr = w − (C l)×φ − C δl. */
function addLeverArm(j: Matrix, { armNed, dcm, layout }: InitialCauses): void {
  if (armNed === null) return;
  const [n, e, d] = armNed;
  const cross = [0, -d, e, d, 0, -n, -e, n, 0];
  for (let r = 0; r < 3; r += 1)
    for (let cause = 0; cause < j.columns; cause += 1) {
      let sum = j.get(POSITION + r, cause);
      for (let c = 0; c < 3; c += 1) sum -= cross[3 * r + c]! * j.get(ATTITUDE + c, cause);
      j.set(POSITION + r, cause, sum);
    }
  if (layout.leverArm < 0) return;
  for (let r = 0; r < 3; r += 1)
    for (let c = 0; c < 3; c += 1) j.set(POSITION + r, layout.leverArm + c, -dcm[3 * r + c]!);
}
