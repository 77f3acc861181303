/** What the team has without an IMU: a constant-acceleration track through the GNSS positions. */
import { KalmanFilter, State } from 'kalman-filter';
import { nedOffset, nedToGeodetic } from './geodesy';
import type { GnssColumns } from './types';

export interface GnssOnlyOptions {
  /** Density of the white jerk that drives each axis, m²/s⁵: 1 suits road vehicles and small craft. */
  jerkDensity?: number;
  /** 1σ where the receiver gives none, m. */
  defaultSigmaHorizontalM?: number;
  defaultSigmaVerticalM?: number;
  /** Intervals [from, to) in which fixes are not used: the track coasts on. s */
  withheldS?: readonly (readonly [number, number])[];
  /** After this long without a fix the track starts anew at the next, s. */
  restartAfterS?: number;
}

/** The track at the fixes' times; σ are 1σ. */
export interface GnssOnlyTrack {
  timeS: Float64Array;
  latRad: Float64Array;
  lonRad: Float64Array;
  heightM: Float64Array;
  velocityNed: readonly [Float64Array, Float64Array, Float64Array];
  positionSigma: readonly [Float64Array, Float64Array, Float64Array];
  /** 1 where the fix was used, 0 where the row is a prediction. */
  used: Uint8Array;
}

/**
 * Tracks the fixes with a position, in order of time; rows whose time does not advance are passed over. North, east and
 * down of the first fix are filtered apart, each with position, velocity and acceleration (Bar-Shalom, Li & Kirubarajan
 * 2001, §6.2: white jerk); Δt and R are each fix's own. Empty columns when no fix has a position.
 */
export function gnssOnlyTrack(gnss: GnssColumns, options: GnssOnlyOptions = {}): GnssOnlyTrack {
  const rows = usableRows(gnss);
  const track = emptyTrack(rows.length);
  if (rows.length === 0) return track;
  const origin = rows[0]!;
  const place = (out: Float64Array, n: number, e: number, d: number) =>
    nedToGeodetic(gnss.latRad[origin]!, gnss.lonRad[origin]!, gnss.heightM[origin]!, n, e, d, out);
  const axes = [0, 1, 2].map(() => new AxisTrack(options.jerkDensity ?? 1));
  const ned = new Float64Array(3);
  let lastUsed = -Infinity;
  rows.forEach((row, k) => {
    const t = gnss.timeS[row]!;
    const withheld = (options.withheldS ?? []).some(([from, to]) => t >= from && t < to);
    const restart = lastUsed === -Infinity || (!withheld && t - lastUsed > (options.restartAfterS ?? 60));
    const use = restart || !withheld;
    nedOffset(
      gnss.latRad[origin]!,
      gnss.lonRad[origin]!,
      gnss.heightM[origin]!,
      gnss.latRad[row]!,
      gnss.lonRad[row]!,
      gnss.heightM[row]!,
      ned,
    );
    axes.forEach((axis, i) => {
      const variance = fixSigma(gnss, row, i, options) ** 2;
      if (restart) axis.start(ned[i]!, variance);
      else {
        axis.predict(t - gnss.timeS[rows[k - 1]!]!);
        if (use) axis.correct(ned[i]!, variance);
      }
      track.velocityNed[i as 0 | 1 | 2][k] = axis.state.mean[1]![0]!;
      track.positionSigma[i as 0 | 1 | 2][k] = Math.sqrt(axis.state.covariance[0]![0]!);
    });
    if (use) lastUsed = t;
    const [n, e, d] = axes.map((axis) => axis.state.mean[0]![0]!) as [number, number, number];
    place(ned, n, e, d);
    track.timeS[k] = t;
    track.latRad[k] = ned[0]!;
    track.lonRad[k] = ned[1]!;
    track.heightM[k] = ned[2]!;
    track.used[k] = use ? 1 : 0;
  });
  return track;
}

/** First spread of velocity (m/s) and acceleration (m/s²) about zero. */
const START_SPEED_SIGMA = 30;
const START_ACCELERATION_SIGMA = 3;

/** Position, velocity and acceleration along one axis, filtered by the `kalman-filter` package. */
export class AxisTrack {
  state: State;
  private readonly filter: KalmanFilter<{ dt: number; variance: number }>;

  /** @param jerkDensity density q of the white jerk, m²/s⁵. */
  constructor(jerkDensity: number) {
    const init = startState(0, 1);
    this.state = init;
    this.filter = new KalmanFilter({
      observation: { dimension: 1, stateProjection: [[1, 0, 0]], covariance: ({ variance }) => [[variance]] },
      dynamic: {
        dimension: 3,
        init,
        transition: ({ dt }) => [
          [1, dt, (dt * dt) / 2],
          [0, 1, dt],
          [0, 0, 1],
        ],
        covariance: ({ dt }) => whiteJerk(dt, jerkDensity),
      },
    });
  }

  start(position: number, variance: number): void {
    this.state = startState(position, variance);
  }

  predict(dt: number): void {
    this.state = this.filter.predict({ previousCorrected: this.state, dt, variance: 0 });
  }

  /** Takes in a position (m) of the given variance (m²). */
  correct(position: number, variance: number): void {
    this.state = this.filter.correct({ predicted: this.state, observation: [position], dt: 0, variance });
  }
}

/** Process noise over `dt` s of a state driven by white jerk of density q (Bar-Shalom et al. 2001, §6.2.3). */
export function whiteJerk(dt: number, q: number): number[][] {
  const [t1, t2, t3] = [q * dt, (q * dt ** 2) / 2, (q * dt ** 3) / 6];
  const [t4, t5] = [(q * dt ** 4) / 8, (q * dt ** 5) / 20];
  return [
    [t5, t4, t3],
    [t4, (q * dt ** 3) / 3, t2],
    [t3, t2, t1],
  ];
}

const startState = (position: number, variance: number) =>
  new State({
    mean: [[position], [0], [0]],
    covariance: [
      [variance, 0, 0],
      [0, START_SPEED_SIGMA ** 2, 0],
      [0, 0, START_ACCELERATION_SIGMA ** 2],
    ],
  });

function usableRows(gnss: GnssColumns): number[] {
  const rows: number[] = [];
  let last = -Infinity;
  for (let i = 0; i < gnss.timeS.length; i += 1) {
    const whole = gnss.timeS[i]! + gnss.latRad[i]! + gnss.lonRad[i]! + gnss.heightM[i]!;
    if (!Number.isFinite(whole) || gnss.timeS[i]! <= last) continue;
    last = gnss.timeS[i]!;
    rows.push(i);
  }
  return rows;
}

/** The receiver's σ of one axis; where it gives none, the default one. Never below 1 cm. */
function fixSigma(gnss: GnssColumns, row: number, axis: number, options: GnssOnlyOptions): number {
  const own = gnss.positionSigma[axis as 0 | 1 | 2][row]!;
  const otherwise =
    axis < 2 ? (options.defaultSigmaHorizontalM ?? 1.5) : (options.defaultSigmaVerticalM ?? 2.5);
  return Math.max(own > 0 && Number.isFinite(own) ? own : otherwise, 0.01);
}

function emptyTrack(n: number): GnssOnlyTrack {
  const triple = () => [new Float64Array(n), new Float64Array(n), new Float64Array(n)] as const;
  return {
    timeS: new Float64Array(n),
    latRad: new Float64Array(n),
    lonRad: new Float64Array(n),
    heightM: new Float64Array(n),
    velocityNed: triple(),
    positionSigma: triple(),
    used: new Uint8Array(n),
  };
}
