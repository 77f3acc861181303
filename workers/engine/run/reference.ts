/** Truth where a recording has it: interpolated at any time, compared with a state. */
import { quatFromEuler, quatMultiply, quatNormalise, rotationVectorFromQuat } from '../attitude';
import { meridianRadius, transverseRadius, wrapAngle } from '../geodesy';
import { HEIGHT, LAT, LON, QUAT, VN } from '../strapdown/navigation-state';
import type { ReferenceColumns } from '../types';
import { lowerBound, type CoastWindow } from './windows';

/** Reference rows further apart than this are not interpolated, s. */
const MAX_SPACING_S = 1.5;

/** A place, a velocity and an attitude to compare with; NaN where unknown. */
export interface ReferenceState {
  lat: number;
  lon: number;
  height: number;
  velocity: [number, number, number];
  /** n←b; NaN where unknown. */
  quaternion: Float64Array;
}

export const emptyReference = (): ReferenceState => ({
  lat: NaN,
  lon: NaN,
  height: NaN,
  velocity: [NaN, NaN, NaN],
  quaternion: new Float64Array(4).fill(NaN),
});

/** Reads a reference trajectory at increasing times. */
export class ReferenceReader {
  readonly state = emptyReference();
  private row = 0;
  private readonly qa = new Float64Array(4);
  private readonly qb = new Float64Array(4);

  constructor(private readonly columns: ReferenceColumns) {}

  /** Fills `state` for a time, s; false where the reference does not reach or has gaps. */
  read(timeS: number): boolean {
    const { timeS: time } = this.columns;
    if (this.row > 0 && time[this.row]! > timeS) this.row = Math.max(0, lowerBound(time, timeS) - 1);
    while (this.row + 2 < time.length && time[this.row + 1]! <= timeS) this.row += 1;
    const i = this.row;
    if (time.length < 2 || timeS < time[i]! - 1e-6 || timeS > time[i + 1]! + 1e-6) return false;
    const dt = time[i + 1]! - time[i]!;
    if (dt > MAX_SPACING_S) return false;
    this.interpolate(i, (timeS - time[i]!) / dt, dt);
    return Number.isFinite(this.state.lat) && Number.isFinite(this.state.lon);
  }

  private interpolate(i: number, u: number, dt: number): void {
    const { latRad, lonRad, heightM, velocityNed } = this.columns;
    const { state } = this;
    const [vn, ve, vd] = velocityNed;
    const lat = latRad[i]!;
    const height = Number.isFinite(heightM[i]!) ? heightM[i]! : 0;
    const perM = 1 / (meridianRadius(lat) + height);
    const perN = 1 / ((transverseRadius(lat) + height) * Math.cos(lat));
    state.lat = lat + hermite(0, latRad[i + 1]! - lat, vn[i]! * perM * dt, vn[i + 1]! * perM * dt, u);
    const east = wrapAngle(lonRad[i + 1]! - lonRad[i]!);
    state.lon = lonRad[i]! + hermite(0, east, ve[i]! * perN * dt, ve[i + 1]! * perN * dt, u);
    state.height = hermite(heightM[i]!, heightM[i + 1]!, -vd[i]! * dt, -vd[i + 1]! * dt, u);
    for (let a = 0; a < 3; a += 1) {
      const column = velocityNed[a as 0 | 1 | 2];
      state.velocity[a as 0 | 1 | 2] = mix(column[i]!, column[i + 1]!, u);
    }
    this.attitude(i, u);
  }

  /** Normalised linear interpolation: to second order in the angle between the rows. */
  private attitude(i: number, u: number): void {
    const { qa, qb, state } = this;
    const [roll, pitch, yaw] = this.columns.attitude;
    quatFromEuler(roll[i]!, pitch[i]!, yaw[i]!, qa);
    quatFromEuler(roll[i + 1]!, pitch[i + 1]!, yaw[i + 1]!, qb);
    const dot = qa[0]! * qb[0]! + qa[1]! * qb[1]! + qa[2]! * qb[2]! + qa[3]! * qb[3]!;
    const sign = dot < 0 ? -1 : 1;
    for (let k = 0; k < 4; k += 1) state.quaternion[k] = mix(qa[k]!, sign * qb[k]!, u);
    quatNormalise(state.quaternion);
  }
}

/** An end where u is 0 or 1 does not need the other row. */
function mix(a: number, b: number, u: number): number {
  if (u <= 0) return a;
  return u >= 1 ? b : a + (b - a) * u;
}

/** Cubic through two values with their slopes (per interval); straight where a slope is unknown. */
function hermite(a: number, b: number, slopeA: number, slopeB: number, u: number): number {
  if (u <= 0) return a;
  if (u >= 1) return b;
  const line = a + (b - a) * u;
  const bend = u * (1 - u) * ((1 - u) * (slopeA - (b - a)) - u * (slopeB - (b - a)));
  return Number.isFinite(bend) ? line + bend : line;
}

/** Does the reference reach over all windows, without holes at their drift points? */
export function truthCovers(
  columns: ReferenceColumns,
  windows: readonly CoastWindow[],
  timeS: Float64Array,
): boolean {
  const reader = new ReferenceReader(columns);
  return windows.every((window) => window.drift.every(({ sample }) => reader.read(timeS[sample]!)));
}

/** Errors computed minus reference. */
export interface StateError {
  /** north, east, down, m. */
  position: Float64Array;
  velocity: Float64Array;
  /** φ in n, rad, with Ĉ = (I − [φ×])C. */
  attitude: Float64Array;
}

export const emptyError = (): StateError => ({
  position: new Float64Array(3),
  velocity: new Float64Array(3),
  attitude: new Float64Array(3),
});

const conjugate = new Float64Array(4);
const product = new Float64Array(4);
const computed = new Float64Array(4);

/** Fills `out` with the error of a navigation state against a reference. */
export function stateError(nav: Float64Array, reference: ReferenceState, out: StateError): void {
  const lat = reference.lat;
  out.position[0] = (nav[LAT]! - lat) * (meridianRadius(lat) + nav[HEIGHT]!);
  out.position[1] =
    wrapAngle(nav[LON]! - reference.lon) * (transverseRadius(lat) + nav[HEIGHT]!) * Math.cos(lat);
  out.position[2] = reference.height - nav[HEIGHT]!;
  const q = reference.quaternion;
  conjugate[0] = q[0]!;
  for (let i = 0; i < 3; i += 1) {
    out.velocity[i] = nav[VN + i]! - reference.velocity[i as 0 | 1 | 2];
    conjugate[i + 1] = -q[i + 1]!;
  }
  for (let i = 0; i < 4; i += 1) computed[i] = nav[QUAT + i]!;
  quatMultiply(computed, conjugate, product);
  rotationVectorFromQuat(product, out.attitude);
  for (let i = 0; i < 3; i += 1) out.attitude[i] = -out.attitude[i]!;
}

/** Takes a navigation state as reference. */
export function referenceFromNav(nav: Float64Array, out: ReferenceState): void {
  out.lat = nav[LAT]!;
  out.lon = nav[LON]!;
  out.height = nav[HEIGHT]!;
  for (let i = 0; i < 3; i += 1) out.velocity[i as 0 | 1 | 2] = nav[VN + i]!;
  for (let i = 0; i < 4; i += 1) out.quaternion[i] = nav[QUAT + i]!;
}
