/** From a motion to what perfect instruments record of it: truth and IMU samples. */
import { wrapAngle } from '../geodesy';
import { EngineError, type ImuColumns, type ImuSampling, type ReferenceColumns } from '../types';
import { bodyMotion, newBodyMotion } from './body-motion';
import { newKinematics, type Motion } from './motion';

/** Local names: a global looked up in each call costs more than the call. */
const { abs, ceil, max, min } = Math;

export interface Place {
  latRad: number;
  lonRad: number;
  heightM: number;
}

export interface PerfectRecording {
  imu: ImuColumns;
  truth: ReferenceColumns;
}

/** Beyond this the local-level axes turn too fast to be of use. */
const LATITUDE_LIMIT = (89.5 * Math.PI) / 180;

/**
 * Truth at each of `timeS` (s, increasing; the place holds at the first), and the IMU samples that belong to the
 * intervals ending there: ∫ω dt and ∫f dt in body axes by four-point Gauss–Legendre quadrature over panels shorter than
 * a sixth of the period of the motion's highest frequency. The first sample's interval is as long as the second's.
 * @throws EngineError 'latitude' when the track leaves ±89.5°.
 */
export function inverseMechanisation(
  motion: Motion,
  start: Place,
  timeS: Float64Array,
  sampling: ImuSampling = 'mean-rate',
): PerfectRecording {
  const walker = new TrackWalker(motion, start, timeS[0]!);
  const n = timeS.length;
  const imu = emptyImu(timeS, sampling);
  const truth = emptyReference(timeS);
  const sums = walker.sums;
  const first = n > 1 ? timeS[1]! - timeS[0]! : 1;
  for (let k = 0; k < n; k += 1) {
    if (k === 0) walker.integrateBackwards(first);
    else walker.advanceTo(timeS[k]!);
    const interval = k === 0 ? first : timeS[k]! - timeS[k - 1]!;
    const scale = sampling === 'mean-rate' ? 1 / interval : 1;
    for (let axis = 0; axis < 3; axis += 1) {
      imu.gyro[axis]![k] = sums[axis]! * scale;
      imu.accel[axis]![k] = sums[3 + axis]! * scale;
    }
    if (sampling === 'instantaneous') walker.instant(imu, k);
    walker.writeTruth(truth, k);
  }
  return { imu, truth };
}

/** Follows a motion over the Earth: the place by quadrature of its velocity, body increments on the way. */
export class TrackWalker {
  lat: number;
  lon: number;
  height: number;
  /** ∫ω (rad) and ∫f (m/s) over the last interval. */
  readonly sums = new Float64Array(6);
  readonly kinematics = newKinematics();
  private readonly body = newBodyMotion();
  private readonly panelS: number;

  constructor(
    private readonly motion: Motion,
    start: Place,
    public t: number,
  ) {
    this.lat = start.latRad;
    this.lon = start.lonRad;
    this.height = start.heightM;
    this.panelS = min(0.15 / motion.bandwidthHz, 0.05);
  }

  /** Moves to `t`, leaving the increments since the last call in `sums`. */
  advanceTo(t: number): void {
    this.sums.fill(0);
    const span = t - this.t;
    const panels = max(1, ceil(span / this.panelS - 1e-9));
    for (let i = 0; i < panels; i += 1) {
      const from = this.t;
      const to = i === panels - 1 ? t : from + span / panels;
      this.panel(from, to - from);
      this.t = to;
    }
    if (abs(this.lat) > LATITUDE_LIMIT)
      throw new EngineError(
        'latitude',
        'The simulated track leaves ±89.5° of latitude. Start it farther from the pole or make it shorter.',
      );
    this.motion.evaluate(t, this.kinematics);
  }

  /** Increments over the interval of length `spanS` that ends here; the place stays. */
  integrateBackwards(spanS: number): void {
    const { t, lat, lon, height } = this;
    // The place at the interval's start by one step back, then forward again.
    this.motion.evaluate(t, this.kinematics);
    bodyMotion(this.kinematics, lat, height, this.body);
    this.lat = lat - this.body.latRate * spanS;
    this.lon = lon - this.body.lonRate * spanS;
    this.height = height - this.body.heightRate * spanS;
    this.t = t - spanS;
    this.advanceTo(t);
    this.lat = lat;
    this.lon = lon;
    this.height = height;
  }

  /** Rate and force at this instant, as sample k. */
  instant(imu: ImuColumns, k: number): void {
    const b = this.here();
    imu.gyro[0][k] = b.wx;
    imu.gyro[1][k] = b.wy;
    imu.gyro[2][k] = b.wz;
    imu.accel[0][k] = b.fx;
    imu.accel[1][k] = b.fy;
    imu.accel[2][k] = b.fz;
  }

  /** Rates and forces at this instant. */
  here() {
    return bodyMotion(this.kinematics, this.lat, this.height, this.body);
  }

  writeTruth(truth: ReferenceColumns, k: number): void {
    const m = this.kinematics;
    truth.latRad[k] = this.lat;
    truth.lonRad[k] = wrapAngle(this.lon);
    truth.heightM[k] = this.height;
    truth.velocityNed[0][k] = m.vn;
    truth.velocityNed[1][k] = m.ve;
    truth.velocityNed[2][k] = m.vd;
    truth.attitude[0][k] = m.roll;
    truth.attitude[1][k] = m.pitch;
    truth.attitude[2][k] = wrapAngle(m.yaw);
  }

  private panel(from: number, length: number): void {
    const { kinematics, body, sums } = this;
    this.motion.evaluate(from, kinematics);
    bodyMotion(kinematics, this.lat, this.height, body);
    // Inside a panel the place enters gravity and curvature alone: a straight line is good to 1e-13 of either.
    const latRate = body.latRate;
    const heightRate = body.heightRate;
    const heightCurve = -kinematics.ad;
    let dLat = 0;
    let dLon = 0;
    let dHeight = 0;
    for (let i = 0; i < 4; i += 1) {
      const since = length * NODES[i]!;
      const w = length * WEIGHTS[i]!;
      this.motion.evaluate(from + since, kinematics);
      const height = this.height + since * (heightRate + (since / 2) * heightCurve);
      bodyMotion(kinematics, this.lat + latRate * since, height, body);
      sums[0]! += w * body.wx;
      sums[1]! += w * body.wy;
      sums[2]! += w * body.wz;
      sums[3]! += w * body.fx;
      sums[4]! += w * body.fy;
      sums[5]! += w * body.fz;
      dLat += w * body.latRate;
      dLon += w * body.lonRate;
      dHeight += w * body.heightRate;
    }
    this.lat += dLat;
    this.lon += dLon;
    this.height += dHeight;
  }
}

/** Four-point Gauss–Legendre on [0, 1]. */
const NODES = [0.06943184420297371, 0.33000947820757187, 0.6699905217924281, 0.9305681557970263];
const WEIGHTS = [0.17392742256872692, 0.32607257743127307, 0.32607257743127307, 0.17392742256872692];

const triple = (n: number) => [new Float64Array(n), new Float64Array(n), new Float64Array(n)] as const;

function emptyImu(timeS: Float64Array, sampling: ImuSampling): ImuColumns {
  return { timeS, gyro: triple(timeS.length), accel: triple(timeS.length), sampling };
}

/** Reference columns over the given times, not filled yet. */
export function emptyReference(timeS: Float64Array): ReferenceColumns {
  const n = timeS.length;
  return {
    timeS,
    latRad: new Float64Array(n),
    lonRad: new Float64Array(n),
    heightM: new Float64Array(n),
    velocityNed: triple(n),
    attitude: triple(n),
  };
}
