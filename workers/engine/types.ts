/** What goes into the engine and comes out: flat columns, SI units, radians. */
import type { Outage, RunSummary } from '@/shared/contracts/runs';
import type { Parameters } from '@/shared/contracts/parameters';

export const ENGINE_VERSION = '0.4.0';

export type ImuSampling = 'mean-rate' | 'instantaneous' | 'increment';

/** IMU columns in the body frame (forward–right–down), each of length N, times strictly increasing. */
export interface ImuColumns {
  /** s, on the recording's axis; a sample is stamped at the end of its interval. */
  timeS: Float64Array;
  /** rad/s, or rad an interval when `sampling` is 'increment'. */
  gyro: readonly [Float64Array, Float64Array, Float64Array];
  /** Specific force, m/s², or m/s an interval when `sampling` is 'increment'. */
  accel: readonly [Float64Array, Float64Array, Float64Array];
  sampling: ImuSampling;
}

/** GNSS columns, each of length M; NaN where the receiver gave none. Position is the antenna's. */
export interface GnssColumns {
  timeS: Float64Array;
  latRad: Float64Array;
  lonRad: Float64Array;
  /** Above the ellipsoid, m. */
  heightM: Float64Array;
  /** North, east, down, m/s; NaN where missing. */
  velocityNed: readonly [Float64Array, Float64Array, Float64Array];
  /** 1σ north, east, down, m. */
  positionSigma: readonly [Float64Array, Float64Array, Float64Array];
  /** 1σ north, east, down, m/s. */
  velocitySigma: readonly [Float64Array, Float64Array, Float64Array];
}

/** Reference trajectory at the IMU's origin; NaN where missing. */
export interface ReferenceColumns {
  timeS: Float64Array;
  latRad: Float64Array;
  lonRad: Float64Array;
  heightM: Float64Array;
  velocityNed: readonly [Float64Array, Float64Array, Float64Array];
  /** roll, pitch, yaw, rad. */
  attitude: readonly [Float64Array, Float64Array, Float64Array];
}

/**
 * Sensors besides IMU and GNSS, each with its own times (s, not decreasing) and columns of equal length; NaN where a
 * reading is missing. 1σ: null where the log gives none.
 */
export interface AidColumns {
  /** Barometric height, m. */
  barometer?: { timeS: Float64Array; heightM: Float64Array; sigmaM: Float64Array | null } | null;
  /** Clockwise from north, rad. */
  heading?: { timeS: Float64Array; headingRad: Float64Array; sigmaRad: Float64Array | null } | null;
  /** Forward speed at the unsteered axle, backwards negative, m/s. */
  odometer?: { timeS: Float64Array; speedMPerS: Float64Array; sigmaMPerS: Float64Array | null } | null;
  /** Roll, pitch, yaw, rad; 1σ about forward, right, down, rad. */
  attitude?: {
    timeS: Float64Array;
    attitude: readonly [Float64Array, Float64Array, Float64Array];
    sigmaRad: readonly [Float64Array, Float64Array, Float64Array] | null;
  } | null;
}

export interface RecordingColumns {
  imu: ImuColumns;
  gnss: GnssColumns;
  reference: ReferenceColumns | null;
  /** Left out or null: none were logged. Only those that the parameters switch on are used. */
  aids?: AidColumns | null;
}

export interface RunRequest {
  /** Complete, the lever arm resolved. */
  parameters: Parameters;
  leverArmM: readonly [number, number, number];
  outages: readonly Outage[];
  outputRateHz: number;
  /** Also the fixed-interval smoother: memory grows by about 25 kB a second of recording. */
  smooth?: boolean;
  /** Also the error budget at the drift points of the outages: about eight times the covariance's work. */
  errorBudget?: boolean;
}

/** Kept solution at the output rate: one Float64Array of length K a column, names and units as SOLUTION_COLUMNS, and `cov_ne_m2`. */
export type SolutionTable = Record<string, Float64Array>;
/**
 * Innovations of one group, one row an epoch:
 * time_s, three innovations, three predicted σ (measured − predicted; m or m/s), nis, accepted (1 or 0).
 */
export interface InnovationTable {
  timeS: Float64Array;
  innovation: readonly [Float64Array, Float64Array, Float64Array];
  sigma: readonly [Float64Array, Float64Array, Float64Array];
  nis: Float64Array;
  accepted: Uint8Array;
}
/** Columns of the frame table `coasting`, Float64. */
export type CoastingTable = Record<string, Float64Array>;

export interface RunResult {
  solution: SolutionTable;
  position: InnovationTable;
  velocity: InnovationTable;
  coasting: CoastingTable;
  /** The smoothed solution at the rows of `solution`; null where it was not asked for. */
  smoothed: SolutionTable | null;
  summary: RunSummary;
}

/**
 * A run that its caller drives slice by slice, so that it can report and hear cancel in between.
 * Tables grow as it goes: rows below `counts` are final and may be read.
 */
export interface EngineRun {
  readonly extentS: readonly [number, number];
  readonly origin: { latDeg: number; lonDeg: number; heightM: number };
  /** 0…1 over all passes. */
  readonly progress: number;
  /** Time that the reported solution has reached, s. */
  readonly reachedS: number;
  readonly counts: { solution: number; position: number; velocity: number; coasting: number };
  readonly tables: {
    solution: SolutionTable;
    position: InnovationTable;
    velocity: InnovationTable;
    coasting: CoastingTable;
  };
  /** Works on about `samples` IMU samples; true when all is done. Throws EngineError for data that cannot be filtered. */
  advance(samples: number): boolean;
  /** After advance() returned true: tables cut to length, and the summary (without `computeS`, which the caller measures). */
  finish(): RunResult;
}

/** The data or the parameters do not allow a run: `message` says what is missing and what to do. */
export class EngineError extends Error {
  constructor(
    readonly code: string,
    message: string,
  ) {
    super(message);
    this.name = 'EngineError';
  }
}
