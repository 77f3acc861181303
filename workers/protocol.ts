/**
 * What the server and the worker processes say to each other. Workers know no database and no HTTP:
 * they take parameters and store keys, read and write the store, report events, hear cancel.
 */
import type { Outage, Provenance, RunSummary } from '@/shared/contracts/runs';
import type { NoiseAnalysis } from '@/shared/contracts/noise';
import type { Parameters } from '@/shared/contracts/parameters';
import type {
  ChannelMap,
  FilePreview,
  FileRole,
  HealthReport,
  IntakeProblem,
  MapPreview,
  Series,
  SeriesChannel,
  Strip,
  TimeOrigin,
} from '@/shared/contracts/recordings';
import type { DecodedChannel } from '@/shared/contracts/recording-files';
import type { Schedule } from '@/shared/contracts/requirements';
import type { Scenario } from '@/shared/contracts/scenarios';
import type { AxisMap } from '@/shared/contracts/vehicles';
import type { BiasSigma } from '@/shared/requirements/bias-sigma';
import type { StoreConfig } from './store/types';

export interface DecodeJob {
  kind: 'decode';
  recordingId: string;
  files: { role: FileRole; name: string; key: string }[];
  /** What the uploader said; parts left out are guessed from headers. */
  channelMap: ChannelMap | null;
  /** Used where the channel map says nothing of axes. */
  vehicleAxes: AxisMap;
}
/** What a channel map makes of the beginnings of the files; nothing is kept. */
export interface MapPreviewJob extends Omit<DecodeJob, 'kind'> {
  kind: 'map-preview';
}
/** A bad file is an outcome, not an error: nothing of it is kept in the store but the raw upload. */
export type DecodeResult =
  | {
      outcome: 'ready';
      channelMap: ChannelMap;
      startS: number;
      endS: number;
      hasReference: boolean;
      timeOrigin: TimeOrigin;
      health: HealthReport;
      strip: Strip;
      /** Over the decoded channel files. */
      sha256: string;
      previews: FilePreview[];
    }
  | { outcome: 'needs-mapping'; channelMap: ChannelMap; problems: IntakeProblem[]; previews: FilePreview[] }
  | {
      outcome: 'rejected';
      /** What was settled before the fault, so that the mapping screen can begin with it. */
      channelMap: ChannelMap | null;
      problems: IntakeProblem[];
      previews: FilePreview[];
    };

/** Simulates a scenario and writes it as raw uploads (IMU, GNSS and reference CSV) that are then decoded like any others. */
export interface ScenarioJob {
  kind: 'scenario';
  recordingId: string;
  scenario: Scenario;
}
export interface ScenarioResult {
  files: { role: FileRole; name: string; key: string; bytes: number; sha256: string }[];
}

export interface RunSpec {
  runId: string;
  recordingId: string;
  parameters: Parameters;
  leverArmM: [number, number, number];
  outages: Outage[];
  outputRateHz: number;
  /** Also the fixed-interval smoother. */
  smooth: boolean;
  /** Also the predicted error of each outage, split by its sources. */
  errorBudget: boolean;
}
export interface RunJob extends RunSpec {
  kind: 'run';
  /** Columns that a screen can show: frames are thinned to about this many points a series. 0: no frames. */
  framePoints: number;
}
export interface RunJobResult {
  summary: RunSummary;
  resultSha256: string;
  provenance: Omit<Provenance, 'files' | 'resultSha256'>;
}

/** A run without frames for requirements; windows are laid by `schedule`, which counts from the run's own alignment. */
export interface VerificationRunJob extends Omit<RunSpec, 'outages' | 'smooth' | 'errorBudget'> {
  kind: 'verification-run';
  schedule: Schedule;
}
export interface VerificationRunResult extends RunJobResult {
  /** The windows that were laid. */
  outages: Outage[];
  biasSigma: BiasSigma;
}

export interface RecordingSeriesJob {
  kind: 'recording-series';
  recordingId: string;
  channels: SeriesChannel[];
  fromS: number | null;
  toS: number | null;
  points: number;
}
/** Writes decoded columns as CSV under storeKeys.recordingExport and answers its key. */
export interface RecordingExportJob {
  kind: 'recording-export';
  recordingId: string;
  channel: DecodedChannel;
  name: string;
}
/** Allan analysis of a stretch at rest. */
export interface NoiseJob {
  kind: 'noise';
  recordingId: string;
  /** Null: the longest stretch at rest. */
  spanS: [number, number] | null;
}
/** GNSS-only baseline track, thinned, north/east of the first fix. */
export interface BaselineTrackJob {
  kind: 'baseline-track';
  recordingId: string;
  points: number;
}
export interface BaselineTrack {
  timeS: number[];
  latDeg: number[];
  lonDeg: number[];
}
/** A stored run as one encoded frame (shared/contracts/frames.ts). */
export interface RunSeriesJob {
  kind: 'run-series';
  runId: string;
  fromS: number | null;
  toS: number | null;
  points: number;
}
/** Writes a file under storeKeys.export and answers its key. Another rate than the kept one, or smoothing that was not kept, runs the filter again. */
export interface RunExportJob {
  kind: 'run-export';
  run: RunSpec;
  format: 'solution-csv' | 'innovations-csv' | 'geojson' | 'kml' | 'gpx';
  /** Hz; null: the kept rate. */
  rateHz: number | null;
  /** The smoothed solution in place of the filter's. */
  smoothed: boolean;
  name: string;
  /** UTC of the axis' zero where known, ISO 8601. */
  utcOrigin: string | null;
}

export interface JobResults {
  decode: DecodeResult;
  scenario: ScenarioResult;
  run: RunJobResult;
  'verification-run': VerificationRunResult;
  noise: NoiseAnalysis;
  'map-preview': MapPreview;
  'recording-series': Series;
  'recording-export': { key: string; bytes: number };
  'baseline-track': BaselineTrack;
  'run-series': Uint8Array;
  'run-export': { key: string; bytes: number };
}
export type WorkerJob =
  | DecodeJob
  | ScenarioJob
  | RunJob
  | VerificationRunJob
  | NoiseJob
  | MapPreviewJob
  | RecordingSeriesJob
  | RecordingExportJob
  | BaselineTrackJob
  | RunSeriesJob
  | RunExportJob;
export type JobKind = WorkerJob['kind'];
export type JobOf<K extends JobKind> = Extract<WorkerJob, { kind: K }>;

/** What a job reports while it works. */
export type JobEvent = { type: 'progress'; progress: number } | { type: 'frame'; frame: Uint8Array };

/** Parent → child. `init` comes first and once; `cancel` may come at any time. */
export type ToWorker =
  | { type: 'init'; store: StoreConfig; cacheBytes: number }
  | { type: 'job'; id: number; job: WorkerJob }
  | { type: 'cancel'; id: number };
/** Child → parent. */
export type FromWorker =
  | { type: 'ready' }
  /** The job has reached the process: from here on its end is the job's crash. */
  | { type: 'begun'; id: number }
  | { type: 'event'; id: number; event: JobEvent }
  | { type: 'result'; id: number; result: JobResults[JobKind] }
  | { type: 'cancelled'; id: number }
  | { type: 'failed'; id: number; code: string; message: string };

/** The job could not be done and says why in words for people (an EngineError, a missing file). */
export class JobFailed extends Error {
  constructor(
    readonly code: string,
    message: string,
  ) {
    super(message);
    this.name = 'JobFailed';
  }
}
export class JobCancelled extends Error {
  constructor(readonly superseded: boolean) {
    super(superseded ? 'A newer change took its place.' : 'It was cancelled.');
    this.name = 'JobCancelled';
  }
}
/** The worker process died under the job. */
export class WorkerCrashed extends Error {
  constructor(readonly signal: string | null) {
    super('The computing process stopped unexpectedly.');
    this.name = 'WorkerCrashed';
  }
}

/** The pool as the server sees it (workers/pool.ts implements it; tests may stand in for it). */
export interface Pool {
  submit<J extends WorkerJob>(
    job: J,
    options?: {
      /** A newer job of the same key supersedes the older one: its promise rejects with JobCancelled(superseded). */
      latestKey?: string;
      /** Jobs of one affinity prefer the same process, which keeps that recording in memory. */
      affinity?: string;
      /** Runs the job once more, from the start, when its process dies under it; left out: WorkerCrashed at once. */
      retryOnCrash?: boolean;
      onEvent?: (event: JobEvent) => void;
    },
  ): { result: Promise<JobResults[J['kind']]>; cancel(): void };
  close(): Promise<void>;
  readonly stats: { size: number; busy: number; waiting: number };
}
