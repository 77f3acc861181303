/**
 * What a vehicle's own nature measures (Groves 2013, § 15.3–15.4): at a stop velocity and rotation are zero; a wheeled
 * vehicle moves neither sideways nor up in its own axes. Innovations measured − predicted, H for computed minus true.
 */
import { EARTH_RATE } from '../geodesy';
import { LAT, NAV_GYRO_BIAS, VN } from '../strapdown/navigation-state';
import type { Strapdown } from '../strapdown/strapdown';
import type { MeasurementUpdate } from './measurement-update';
import { ATTITUDE, GYRO_BIAS, VELOCITY } from './states';

const VELOCITY_COLUMNS = [3, 4, 5];
const ROTATION_COLUMNS = [6, 7, 8, 9, 10, 11];
const BODY_VELOCITY_COLUMNS = [3, 4, 5, 6, 7, 8];

/** 0 = v. `variance`: (m/s)². */
export function zeroVelocity({ nav }: Strapdown, variance: number, update: MeasurementUpdate): void {
  update.begin(3, VELOCITY_COLUMNS);
  for (let i = 0; i < 3; i += 1) {
    update.h[i * update.size + VELOCITY + i] = 1;
    update.innovation[i] = -nav[VN + i]!;
    update.r[i] = variance;
  }
}

/**
 * Mean gyro output at rest = b_g + Cᵀω_ie. Its error is δb_g − Cᵀ[ω_ie×]φ: a good gyro finds north by it.
 * `meanRate` raw, rad/s; `variance` (rad/s)².
 */
export function zeroRotation(
  { nav, dcm }: Strapdown,
  meanRate: Float64Array,
  variance: number,
  update: MeasurementUpdate,
): void {
  update.begin(3, ROTATION_COLUMNS);
  const north = EARTH_RATE * Math.cos(nav[LAT]!);
  const down = -EARTH_RATE * Math.sin(nav[LAT]!);
  for (let i = 0; i < 3; i += 1) {
    // Column i of C: body axis i in n; row i of Cᵀ[ω_ie×].
    const n = dcm[i]!;
    const e = dcm[3 + i]!;
    const d = dcm[6 + i]!;
    const at = i * update.size;
    update.h[at + ATTITUDE] = -(e * down);
    update.h[at + ATTITUDE + 1] = n * down - d * north;
    update.h[at + ATTITUDE + 2] = e * north;
    update.h[at + GYRO_BIAS + i] = 1;
    update.innovation[i] = meanRate[i]! - n * north - d * down - nav[NAV_GYRO_BIAS + i]!;
    update.r[i] = variance;
  }
}

/**
 * 0 = right and down parts of Cᵀv. Their error is Cᵀδv − Cᵀ[v×]φ. Variances (m/s)².
 */
export function nonHolonomic(
  { nav, dcm }: Strapdown,
  lateralVariance: number,
  verticalVariance: number,
  update: MeasurementUpdate,
): void {
  update.begin(2, BODY_VELOCITY_COLUMNS);
  const vn = nav[VN]!;
  const ve = nav[VN + 1]!;
  const vd = nav[VN + 2]!;
  for (let row = 0; row < 2; row += 1) {
    const axis = row + 1;
    const n = dcm[axis]!;
    const e = dcm[3 + axis]!;
    const d = dcm[6 + axis]!;
    const at = row * update.size;
    update.h[at + VELOCITY] = n;
    update.h[at + VELOCITY + 1] = e;
    update.h[at + VELOCITY + 2] = d;
    // −(row of Cᵀ)[v×]
    update.h[at + ATTITUDE] = -(e * vd - d * ve);
    update.h[at + ATTITUDE + 1] = -(d * vn - n * vd);
    update.h[at + ATTITUDE + 2] = -(n * ve - e * vn);
    update.innovation[row] = -(n * vn + e * ve + d * vd);
    update.r[row] = row === 0 ? lateralVariance : verticalVariance;
  }
}
