/**
 * Aids that are measured by a sensor of their own (Groves 2013, § 6.2–6.3, 15.4, 16.3). Innovations measured − predicted, H
 * for computed minus true with Ĉ = (I − [φ×])C.
 */
import { eulerFromQuat, quatFromEuler, quatMultiply, rotationVectorFromQuat } from '../attitude';
import { wrapAngle } from '../geodesy';
import { HEIGHT, QUAT, VN } from '../strapdown/navigation-state';
import type { Strapdown } from '../strapdown/strapdown';
import type { MeasurementUpdate } from './measurement-update';
import { ATTITUDE, POSITION, VELOCITY } from './states';

const HEADING_COLUMNS = [6, 7, 8];
const BODY_VELOCITY_COLUMNS = [3, 4, 5, 6, 7, 8];
/** Nearer to the vertical than this a heading says nothing: 1/cos of the pitch. */
const MIN_COS_PITCH = 0.1;

/**
 * Height above the ellipsoid plus a bias, h + b; its error is −δr_D + δb. `bias` and `heightM` m, `variance` m²;
 * `biasState`: where the bias lies among the states, −1: it is not estimated.
 */
export function barometricHeight(
  { nav }: Strapdown,
  bias: number,
  biasState: number,
  heightM: number,
  variance: number,
  update: MeasurementUpdate,
): void {
  const down = POSITION + 2;
  update.begin(1, biasState < 0 ? [down] : [down, biasState]);
  update.h[down] = -1;
  if (biasState >= 0) update.h[biasState] = 1;
  update.innovation[0] = heightM - nav[HEIGHT]! - bias;
  update.r[0] = variance;
}

const quaternion = new Float64Array(4);
const euler = new Float64Array(3);

/**
 * Heading, rad; its error is −φ_D − tan θ (φ_N cos ψ + φ_E sin ψ) (alignment/euler-errors.ts). `variance` rad². False
 * where the vehicle points too near to the vertical for a heading to mean anything.
 */
export function heading(
  { nav }: Strapdown,
  headingRad: number,
  variance: number,
  update: MeasurementUpdate,
): boolean {
  for (let i = 0; i < 4; i += 1) quaternion[i] = nav[QUAT + i]!;
  eulerFromQuat(quaternion, euler);
  const pitch = euler[1]!;
  const yaw = euler[2]!;
  if (Math.cos(pitch) < MIN_COS_PITCH) return false;
  const slope = Math.tan(pitch);
  update.begin(1, HEADING_COLUMNS);
  update.h[ATTITUDE] = -slope * Math.cos(yaw);
  update.h[ATTITUDE + 1] = -slope * Math.sin(yaw);
  update.h[ATTITUDE + 2] = -1;
  update.innovation[0] = wrapAngle(headingRad - yaw);
  update.r[0] = variance;
  return true;
}

/**
 * Speed along the vehicle's forward axis at its unsteered axle, m/s, backwards negative: the forward part of
 * Cᵀv + ω × l. With the axle straight behind the IMU, l = (−a, 0, 0), ω × l has no forward part, so that only Cᵀv
 * remains; its error is row 1 of Cᵀδv − Cᵀ[v×]φ. `variance` (m/s)².
 */
export function forwardSpeed(
  { nav, dcm }: Strapdown,
  speed: number,
  variance: number,
  update: MeasurementUpdate,
): void {
  update.begin(1, BODY_VELOCITY_COLUMNS);
  const vn = nav[VN]!;
  const ve = nav[VN + 1]!;
  const vd = nav[VN + 2]!;
  const n = dcm[0]!;
  const e = dcm[3]!;
  const d = dcm[6]!;
  update.h[VELOCITY] = n;
  update.h[VELOCITY + 1] = e;
  update.h[VELOCITY + 2] = d;
  update.h[ATTITUDE] = -(e * vd - d * ve);
  update.h[ATTITUDE + 1] = -(d * vn - n * vd);
  update.h[ATTITUDE + 2] = -(n * ve - e * vn);
  update.innovation[0] = speed - (n * vn + e * ve + d * vd);
  update.r[0] = variance;
}

const measured = new Float64Array(4);
const turn = new Float64Array(4);
const vector = new Float64Array(3);

/**
 * Attitude as a whole (star or horizon tracker): roll, pitch, yaw, rad. The turn from the computed to the measured frame
 * seen in the body's axes, Cᵀ times that in n, whose error is −Cᵀφ; `variances` about forward, right, down, rad².
 */
export function fullAttitude(
  { nav, dcm }: Strapdown,
  roll: number,
  pitch: number,
  yaw: number,
  variances: readonly [number, number, number],
  update: MeasurementUpdate,
): void {
  quaternion[0] = nav[QUAT]!;
  for (let i = 1; i < 4; i += 1) quaternion[i] = -nav[QUAT + i]!;
  quatFromEuler(roll, pitch, yaw, measured);
  // q̂* ⊗ q of the measurement: what the body still has to turn by, in its own axes.
  rotationVectorFromQuat(quatMultiply(quaternion, measured, turn), vector);
  update.begin(3, HEADING_COLUMNS);
  for (let i = 0; i < 3; i += 1) {
    const at = i * update.size + ATTITUDE;
    for (let c = 0; c < 3; c += 1) update.h[at + c] = -dcm[3 * c + i]!;
    update.innovation[i] = vector[i]!;
    update.r[i] = variances[i]!;
  }
}
