/**
 * GNSS position and velocity as measurements of the antenna, l forward–right–down of the IMU (Groves 2013, § 14.3):
 *   position r + C l, velocity v + C(ω_ib × l) − ω_ie × (C l).
 * With computed minus true and Ĉ = (I − [φ×])C their error is
 *   δr + [(C l)×]φ   and   δv + [u×]φ + C[l×]δb_g, u = C(ω_ib × l),
 * and where the lever arm is a state + C δl and + (C[ω_ib×] − [ω_ie×]C)δl, a gyro scale factor + C[l×]diag(ω_ib)δs.
 */
import { EARTH_RATE, wrapAngle } from '../geodesy';
import { MERIDIAN_PLUS_H, TRANSVERSE_PLUS_H } from '../strapdown/local-earth';
import { HEIGHT, LAT, LON, VD, VE, VN } from '../strapdown/navigation-state';
import type { Strapdown } from '../strapdown/strapdown';
import type { Fixes } from './fixes';
import type { MeasurementUpdate } from './measurement-update';
import { ATTITUDE, GYRO_BIAS, PLAIN_LAYOUT, POSITION, VELOCITY, type StateLayout } from './states';

const POSITION_COLUMNS = [0, 1, 2, 6, 7, 8];
const VELOCITY_COLUMNS = [3, 4, 5, 6, 7, 8, 9, 10, 11];
const three = (first: number) => (first < 0 ? [] : [first, first + 1, first + 2]);

export class GnssModels {
  private readonly arm = new Float64Array(3);
  private readonly armVelocity = new Float64Array(3);
  private readonly full = new Float64Array(3);
  private readonly block = new Float64Array(27);
  /** Where the lever arm is a state: what a change of it does, 3×3, row by row. */
  private readonly armBlock = new Float64Array(9);
  private readonly positionColumns: readonly number[];
  private readonly velocityColumns: readonly number[];

  /** `leverArm`: m, read anew each time; `rateNoise`: variance of a single gyro rate reading, (rad/s)². */
  constructor(
    private readonly leverArm: ArrayLike<number>,
    private readonly rateNoise: number,
    private readonly layout: StateLayout = PLAIN_LAYOUT,
  ) {
    this.positionColumns = [...POSITION_COLUMNS, ...three(layout.leverArm)];
    this.velocityColumns = [...VELOCITY_COLUMNS, ...three(layout.gyroScale), ...three(layout.leverArm)];
  }

  /** Sets up `update` for the position of fix j (axes by bits); innovations in m, measured − predicted. */
  position(strapdown: Strapdown, fixes: Fixes, j: number, axes: number, update: MeasurementUpdate): void {
    const { nav, earth } = strapdown;
    const { arm, full, block } = this;
    rotate(strapdown.dcm, this.leverArm[0]!, this.leverArm[1]!, this.leverArm[2]!, arm);
    full[0] = (fixes.latRad[j]! - nav[LAT]!) * earth[MERIDIAN_PLUS_H]! - arm[0]!;
    full[1] =
      wrapAngle(fixes.lonRad[j]! - nav[LON]!) * earth[TRANSVERSE_PLUS_H]! * Math.cos(nav[LAT]!) - arm[1]!;
    full[2] = nav[HEIGHT]! - fixes.heightM[j]! - arm[2]!;
    block.fill(0);
    skew(arm, block, 0);
    this.fill(update, axes, POSITION, this.positionColumns, fixes.positionVariance, 3 * j);
    if (this.layout.leverArm < 0) return;
    this.armBlock.set(strapdown.dcm);
    this.fillOptional(update, axes, this.layout.leverArm, this.armBlock);
  }

  /** The same for its velocity, m/s; `rate`: ω_ib, rad/s, bias taken off. */
  velocity(
    strapdown: Strapdown,
    rate: Float64Array,
    fixes: Fixes,
    j: number,
    axes: number,
    update: MeasurementUpdate,
  ): void {
    const { nav, dcm } = strapdown;
    const { arm, armVelocity, full, block, leverArm } = this;
    const lx = leverArm[0]!;
    const ly = leverArm[1]!;
    const lz = leverArm[2]!;
    rotate(dcm, lx, ly, lz, arm);
    rotate(
      dcm,
      rate[1]! * lz - rate[2]! * ly,
      rate[2]! * lx - rate[0]! * lz,
      rate[0]! * ly - rate[1]! * lx,
      armVelocity,
    );
    const earthN = EARTH_RATE * Math.cos(nav[LAT]!);
    const earthD = -EARTH_RATE * Math.sin(nav[LAT]!);
    full[0] = fixes.velocity[0][j]! - nav[VN]! - armVelocity[0]! - earthD * arm[1]!;
    full[1] = fixes.velocity[1][j]! - nav[VE]! - armVelocity[1]! + (earthD * arm[0]! - earthN * arm[2]!);
    full[2] = fixes.velocity[2][j]! - nav[VD]! - armVelocity[2]! + earthN * arm[1]!;
    block.fill(0);
    skew(armVelocity, block, 0);
    for (let i = 0; i < 3; i += 1) {
      const c0 = dcm[3 * i]!;
      const c1 = dcm[3 * i + 1]!;
      const c2 = dcm[3 * i + 2]!;
      block[9 * i + 3] = c1 * lz - c2 * ly;
      block[9 * i + 4] = c2 * lx - c0 * lz;
      block[9 * i + 5] = c0 * ly - c1 * lx;
    }
    this.fill(update, axes, VELOCITY, this.velocityColumns, fixes.velocityVariance, 3 * j);
    const armNoise = (2 / 3) * (lx * lx + ly * ly + lz * lz) * this.rateNoise;
    for (let m = 0; m < update.rows; m += 1) update.r[m] = update.r[m]! + armNoise;
    this.fillScale(update, axes, rate);
    this.fillArmVelocity(update, axes, dcm, rate, earthN, earthD);
  }

  /** The gyro bias' columns times the rate. */
  private fillScale(update: MeasurementUpdate, axes: number, rate: Float64Array): void {
    const { layout, block, armBlock } = this;
    if (layout.gyroScale < 0) return;
    for (let i = 0; i < 3; i += 1)
      for (let c = 0; c < 3; c += 1) armBlock[3 * i + c] = block[9 * i + 3 + c]! * rate[c]!;
    this.fillOptional(update, axes, layout.gyroScale, armBlock);
  }

  /** C[ω×] − [ω_ie×]C. */
  private fillArmVelocity(
    update: MeasurementUpdate,
    axes: number,
    dcm: Float64Array,
    rate: Float64Array,
    earthN: number,
    earthD: number,
  ): void {
    const { layout, armBlock } = this;
    if (layout.leverArm < 0) return;
    for (let i = 0; i < 3; i += 1)
      for (let c = 0; c < 3; c += 1) {
        const next = (c + 1) % 3;
        const last = (c + 2) % 3;
        // Column c of [ω×]: ω × e_c.
        armBlock[3 * i + c] = dcm[3 * i + next]! * rate[last]! - dcm[3 * i + last]! * rate[next]!;
      }
    for (let c = 0; c < 3; c += 1) {
      armBlock[c] = armBlock[c]! + earthD * dcm[3 + c]!;
      armBlock[3 + c] = armBlock[3 + c]! - (earthD * dcm[c]! - earthN * dcm[6 + c]!);
      armBlock[6 + c] = armBlock[6 + c]! - earthN * dcm[3 + c]!;
    }
    this.fillOptional(update, axes, layout.leverArm, armBlock);
  }

  /** A 3×3 block into the columns of an optional state, measured axes only. */
  private fillOptional(update: MeasurementUpdate, axes: number, first: number, block: Float64Array): void {
    let row = 0;
    for (let axis = 0; axis < 3; axis += 1) {
      if (((axes >> axis) & 1) === 0) continue;
      for (let c = 0; c < 3; c += 1) update.h[row * update.size + first + c] = block[3 * axis + c]!;
      row += 1;
    }
  }

  /** Copies the rows of the measured axes: identity at `first`, then attitude and gyro bias blocks. */
  private fill(
    update: MeasurementUpdate,
    axes: number,
    first: number,
    columns: readonly number[],
    variance: Float64Array,
    offset: number,
  ): void {
    const { full, block } = this;
    update.begin((axes & 1) + ((axes >> 1) & 1) + ((axes >> 2) & 1), columns);
    let row = 0;
    for (let axis = 0; axis < 3; axis += 1) {
      if (((axes >> axis) & 1) === 0) continue;
      const at = row * update.size;
      update.h[at + first + axis] = 1;
      for (let c = 0; c < 3; c += 1) {
        update.h[at + ATTITUDE + c] = block[9 * axis + c]!;
        update.h[at + GYRO_BIAS + c] = block[9 * axis + 3 + c]!;
      }
      update.innovation[row] = full[axis]!;
      update.r[row] = variance[offset + axis]!;
      row += 1;
    }
  }
}

function rotate(dcm: Float64Array, x: number, y: number, z: number, out: Float64Array): void {
  out[0] = dcm[0]! * x + dcm[1]! * y + dcm[2]! * z;
  out[1] = dcm[3]! * x + dcm[4]! * y + dcm[5]! * z;
  out[2] = dcm[6]! * x + dcm[7]! * y + dcm[8]! * z;
}

/** [a×] into columns `at…at+2` of a 3×9 block. */
function skew(a: Float64Array, out: Float64Array, at: number): void {
  out[at + 1] = -a[2]!;
  out[at + 2] = a[1]!;
  out[9 + at] = a[2]!;
  out[9 + at + 2] = -a[0]!;
  out[18 + at] = -a[1]!;
  out[18 + at + 1] = a[0]!;
}
