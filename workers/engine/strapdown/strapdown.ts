/**
 * Strapdown mechanisation in the local level frame north–east–down (Titterton & Weston, Strapdown Inertial Navigation
 * Technology, 2004, ch. 3 and 11; Savage, JGCD 21, 1998, 19–28 and 208–221).
 *
 * One step takes the bias-free rotation and velocity increments of an interval or of a part of it. Earth and transport
 * rate, Coriolis and gravity are taken at the step's middle; position is trapezoidal. While it goes it sums ∫C dt and
 * ∫f_n dt, which the covariance needs.
 */
import { EARTH_RATE } from '../geodesy';
import { EngineError } from '../types';
import { DURATION } from './imu-intervals';
import { formIncrements, sumIncrements } from './increments';
import { GRAVITY, localEarth, MERIDIAN_PLUS_H, TRANSVERSE_PLUS_H } from './local-earth';
import { HEIGHT, LAT, LON, NAV_SIZE, QUAT, VD, VE, VN } from './navigation-state';

export type Scheme = 'coning-sculling' | 'trapezoidal' | 'rectangular';

/** Beyond this the local level frame turns too fast to be useful. */
export const MAX_LATITUDE_RAD = (89.5 * Math.PI) / 180;

/** Sine and cosine of latitude are evaluated anew after this much, rad. */
const NEAR_LATITUDE_RAD = 1e-4;

export class Strapdown {
  readonly nav = new Float64Array(NAV_SIZE);
  /** n←b, row by row, of `nav`'s quaternion. */
  readonly dcm = new Float64Array(9);
  /** R_M + h, R_N + h (m), gravity (m/s²) at the middle of the last step. */
  readonly earth = new Float64Array(3);
  /** A latitude (rad) near the present one with its sine and cosine, from which others follow by series. */
  private readonly nearLat = new Float64Array(3);
  /** Since `resetSums`: ∫C dt (s). */
  readonly sumDcm = new Float64Array(9);
  /** Since `resetSums`: ∫f_n dt (m/s), and the time itself (s) as the fourth. */
  readonly sumForce = new Float64Array(4);
  /** Rotation vector of the step (rad) and its velocity increment in the axes of the step's start (m/s). */
  private readonly increment = new Float64Array(6);
  /** Rotation of n in the step, rad. */
  private readonly frameTurn = new Float64Array(3);
  /** Gravity and Coriolis of the last step, m/s²: predicts the middle of the next one. */
  private readonly field = new Float64Array(3);

  constructor(readonly scheme: Scheme) {}

  /** Takes over `nav` (copied) and makes what hangs on it. */
  start(nav: Float64Array): void {
    this.nav.set(nav);
    this.attitudeChanged();
    this.evaluateLatitude();
    const s = this.nearLat[1]!;
    localEarth(s * s, nav[HEIGHT]!, this.earth);
    this.field.fill(0);
    this.field[2] = this.earth[GRAVITY]!;
    this.resetSums();
  }

  /** Makes `dcm` from `nav`'s quaternion; to be called after the latter was changed from outside. */
  attitudeChanged(): void {
    this.renewDcm(0);
  }

  /** Makes `dcm` from `nav`'s quaternion and adds `weight` × (old + new) to ∫C dt. */
  private renewDcm(weight: number): void {
    const { nav, dcm, sumDcm } = this;
    const w = nav[QUAT]!;
    const x = nav[QUAT + 1]!;
    const y = nav[QUAT + 2]!;
    const z = nav[QUAT + 3]!;
    const ww = w * w;
    const xx = x * x;
    const yy = y * y;
    const zz = z * z;
    const c0 = ww + xx - yy - zz;
    const c1 = 2 * (x * y - w * z);
    const c2 = 2 * (x * z + w * y);
    const c3 = 2 * (x * y + w * z);
    const c4 = ww - xx + yy - zz;
    const c5 = 2 * (y * z - w * x);
    const c6 = 2 * (x * z - w * y);
    const c7 = 2 * (y * z + w * x);
    const c8 = ww - xx - yy + zz;
    if (weight !== 0) {
      sumDcm[0] = sumDcm[0]! + weight * (dcm[0]! + c0);
      sumDcm[1] = sumDcm[1]! + weight * (dcm[1]! + c1);
      sumDcm[2] = sumDcm[2]! + weight * (dcm[2]! + c2);
      sumDcm[3] = sumDcm[3]! + weight * (dcm[3]! + c3);
      sumDcm[4] = sumDcm[4]! + weight * (dcm[4]! + c4);
      sumDcm[5] = sumDcm[5]! + weight * (dcm[5]! + c5);
      sumDcm[6] = sumDcm[6]! + weight * (dcm[6]! + c6);
      sumDcm[7] = sumDcm[7]! + weight * (dcm[7]! + c7);
      sumDcm[8] = sumDcm[8]! + weight * (dcm[8]! + c8);
    }
    dcm[0] = c0;
    dcm[1] = c1;
    dcm[2] = c2;
    dcm[3] = c3;
    dcm[4] = c4;
    dcm[5] = c5;
    dcm[6] = c6;
    dcm[7] = c7;
    dcm[8] = c8;
  }

  private evaluateLatitude(): void {
    const lat = this.nav[LAT]!;
    this.nearLat[0] = lat;
    this.nearLat[1] = Math.sin(lat);
    this.nearLat[2] = Math.cos(lat);
  }

  resetSums(): void {
    const { sumDcm, sumForce } = this;
    // Plain loops: a call of fill() costs more than it clears.
    for (let i = 0; i < 9; i += 1) sumDcm[i] = 0;
    for (let i = 0; i < 4; i += 1) sumForce[i] = 0;
  }

  /** Copies of all that carries over from step to step; `restore` goes on from there to the same bits. */
  save(): readonly Float64Array[] {
    return this.parts().map((part) => part.slice());
  }

  private parts(): Float64Array[] {
    return [this.nav, this.earth, this.nearLat, this.field, this.sumDcm, this.sumForce];
  }

  restore(saved: readonly Float64Array[]): void {
    this.parts().forEach((part, i) => part.set(saved[i]!));
    this.attitudeChanged();
  }

  /**
   * Moves the state over the part (from, to] of an interval (shares of its duration, 0 ≤ from < to ≤ 1).
   * Throws EngineError near a pole, where local level axes fail.
   */
  advance(interval: Float64Array, from: number, to: number): void {
    const dt = interval[DURATION]! * (to - from);
    if (this.scheme === 'rectangular') {
      sumIncrements(interval, from, to, this.nav, this.increment);
      this.stepRectangular(dt);
    } else {
      formIncrements(interval, from, to, this.nav, this.scheme === 'coning-sculling', this.increment);
      this.step(dt);
    }
    const lat = this.nav[LAT]!;
    if (lat > MAX_LATITUDE_RAD || lat < -MAX_LATITUDE_RAD)
      throw new EngineError(
        'near-pole',
        'The solution reached a latitude beyond 89.5°, where north and east cannot be told apart. Recordings next to a pole are not supported; check the position columns.',
      );
  }

  /** One step of `dt` s with the increments formed. */
  private step(dt: number): void {
    const { nav, dcm, earth, nearLat, field, increment, frameTurn, sumForce } = this;
    const lat = nav[LAT]!;
    const height = nav[HEIGHT]!;
    const vn = nav[VN]!;
    const ve = nav[VE]!;
    const vd = nav[VD]!;
    const ux = increment[3]!;
    const uy = increment[4]!;
    const uz = increment[5]!;

    // Velocity increment in the axes of n at the step's start.
    const an = dcm[0]! * ux + dcm[1]! * uy + dcm[2]! * uz;
    const ae = dcm[3]! * ux + dcm[4]! * uy + dcm[5]! * uz;
    const ad = dcm[6]! * ux + dcm[7]! * uy + dcm[8]! * uz;

    // Middle of the step, predicted: velocity, latitude, height; radii, gravity, Earth and transport rate there.
    const half = 0.5 * dt;
    const vnMid = vn + 0.5 * an + half * field[0]!;
    const veMid = ve + 0.5 * ae + half * field[1]!;
    const vdMid = vd + 0.5 * ad + half * field[2]!;
    const perM = 1 / earth[MERIDIAN_PLUS_H]!;
    if (Math.abs(lat - nearLat[0]!) > NEAR_LATITUDE_RAD) this.evaluateLatitude();
    const d = lat + half * vn * perM - nearLat[0]!;
    // sin and cos of a small difference by series: the next terms are below 1e-18.
    const sinD = d - (d * d * d) / 6;
    const cosD = 1 - 0.5 * d * d;
    const sinLat = nearLat[1]! * cosD + nearLat[2]! * sinD;
    const cosLat = nearLat[2]! * cosD - nearLat[1]! * sinD;
    const perCos = 1 / cosLat;
    localEarth(sinLat * sinLat, height - half * vd, earth);
    const inverseM = 1 / earth[MERIDIAN_PLUS_H]!;
    const inverseN = 1 / earth[TRANSVERSE_PLUS_H]!;
    const earthN = EARTH_RATE * cosLat;
    const earthD = -EARTH_RATE * sinLat;
    const transportN = veMid * inverseN;
    const transportE = -vnMid * inverseM;
    const transportD = -veMid * inverseN * sinLat * perCos;

    // Gravity and Coriolis: g − (2ω_ie + ω_en) × v.
    const wn = 2 * earthN + transportN;
    const wd = 2 * earthD + transportD;
    const fieldN = -(transportE * vdMid - wd * veMid);
    const fieldE = -(wd * vnMid - wn * vdMid);
    const fieldD = earth[GRAVITY]! - (wn * veMid - transportE * vnMid);
    field[0] = fieldN;
    field[1] = fieldE;
    field[2] = fieldD;

    // The frame turns by ζ = (ω_ie + ω_en) dt in the step: half of it is taken off the increment.
    const zn = (earthN + transportN) * dt;
    const ze = transportE * dt;
    const zd = (earthD + transportD) * dt;
    const forceN = an - 0.5 * (ze * ad - zd * ae);
    const forceE = ae - 0.5 * (zd * an - zn * ad);
    const forceD = ad - 0.5 * (zn * ae - ze * an);
    const vnNew = vn + forceN + fieldN * dt;
    const veNew = ve + forceE + fieldE * dt;
    const vdNew = vd + forceD + fieldD * dt;
    nav[VN] = vnNew;
    nav[VE] = veNew;
    nav[VD] = vdNew;
    nav[LAT] = lat + half * (vn + vnNew) * inverseM;
    nav[LON] = nav[LON]! + half * (ve + veNew) * inverseN * perCos;
    nav[HEIGHT] = height - half * (vd + vdNew);

    frameTurn[0] = zn;
    frameTurn[1] = ze;
    frameTurn[2] = zd;
    sumForce[0] = sumForce[0]! + forceN;
    sumForce[1] = sumForce[1]! + forceE;
    sumForce[2] = sumForce[2]! + forceD;
    sumForce[3] = sumForce[3]! + dt;
    this.rotate();
    // ∫C dt by the mean of the step's ends.
    this.renewDcm(half);
  }

  /** q ← q(−ζ) ⊗ q ⊗ q(σ): the body turns by σ (rad, body axes), the frame by ζ (rad, n axes, tiny). */
  private rotate(): void {
    const { nav, increment, frameTurn } = this;
    const sx = increment[0]!;
    const sy = increment[1]!;
    const sz = increment[2]!;
    const s2 = sx * sx + sy * sy + sz * sz;
    let w: number;
    let k: number;
    if (s2 < 0.01) {
      w = 1 - s2 / 8 + (s2 * s2) / 384 - (s2 * s2 * s2) / 46080;
      k = 0.5 - s2 / 48 + (s2 * s2) / 3840 - (s2 * s2 * s2) / 645120;
    } else {
      const angle = Math.sqrt(s2);
      w = Math.cos(angle / 2);
      k = Math.sin(angle / 2) / angle;
    }
    const x = k * sx;
    const y = k * sy;
    const z = k * sz;
    const q0 = nav[QUAT]!;
    const q1 = nav[QUAT + 1]!;
    const q2 = nav[QUAT + 2]!;
    const q3 = nav[QUAT + 3]!;
    const r0 = q0 * w - q1 * x - q2 * y - q3 * z;
    const r1 = q0 * x + q1 * w + q2 * z - q3 * y;
    const r2 = q0 * y - q1 * z + q2 * w + q3 * x;
    const r3 = q0 * z + q1 * y - q2 * x + q3 * w;
    const hn = -0.5 * frameTurn[0]!;
    const he = -0.5 * frameTurn[1]!;
    const hd = -0.5 * frameTurn[2]!;
    const n0 = r0 - hn * r1 - he * r2 - hd * r3;
    const n1 = r1 + hn * r0 + he * r3 - hd * r2;
    const n2 = r2 - hn * r3 + he * r0 + hd * r1;
    const n3 = r3 + hn * r2 - he * r1 + hd * r0;
    // One Newton step to unit length: the square is within 1e-9 of 1.
    const scale = 1.5 - 0.5 * (n0 * n0 + n1 * n1 + n2 * n2 + n3 * n3);
    nav[QUAT] = n0 * scale;
    nav[QUAT + 1] = n1 * scale;
    nav[QUAT + 2] = n2 * scale;
    nav[QUAT + 3] = n3 * scale;
  }

  /** For study: attitude, gravity and Coriolis of the step's start, position with the velocity of its end. */
  private stepRectangular(dt: number): void {
    const { nav, earth } = this;
    const lat = nav[LAT]!;
    const height = nav[HEIGHT]!;
    const lon = nav[LON]!;
    this.step(dt);
    const cosLat = Math.cos(lat);
    nav[LAT] = lat + (nav[VN]! * dt) / earth[MERIDIAN_PLUS_H]!;
    nav[LON] = lon + (nav[VE]! * dt) / (earth[TRANSVERSE_PLUS_H]! * cosLat);
    nav[HEIGHT] = height - nav[VD]! * dt;
  }
}
