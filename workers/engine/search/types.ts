/** What a search is asked for and what it answers. SI units, radians; every tuned value is positive and moved in ln. */
import type { Parameters } from '@/shared/contracts/parameters';
import type { Outage } from '@/shared/contracts/runs';
import type { RecordingColumns } from '../types';
import type { TunableName } from './tunables';

/** [from, to) on the recording's axis, s. */
export type Interval = readonly [number, number];

/** A recording with the parts of it that train and the parts that judge. */
export interface SearchCase {
  recording: RecordingColumns;
  /** GNSS antenna seen from the IMU, m. */
  leverArmM: readonly [number, number, number];
  /** Fixes measured here make the objective. */
  trainingS: readonly Interval[];
  /** Fixes measured here never do; they show what the tuned values are worth. */
  heldOutS: readonly Interval[];
  /** Coasting is judged over these; each lies wholly within an interval and counts where that one counts. */
  outages?: readonly Outage[];
}

export interface Tuned {
  name: TunableName;
  /** Smallest and largest value that may come out; left out: a tenth and ten times the start value. */
  bounds?: readonly [number, number];
  /**
   * What is known beforehand: ln x is normal about ln `value` with σ = ln `factor` (log-normal). Left out: a factor of
   * ten about the start value, which moves nothing that the data can tell. null: none.
   */
  prior?: { value: number; factor: number } | null;
}

export interface SearchRequest {
  cases: readonly SearchCase[];
  /** Complete; where the search starts, and what is not tuned. */
  parameters: Parameters;
  tuned: readonly Tuned[];
  /** Share of fixes that may be anything (see score.ts). 0: the plain Gaussian likelihood, no gate. Default 0.01. */
  outlierShare?: number;
  /** Weight of the coasting drift beside the likelihood; 1: each window counts like one more fix. Default 0. */
  driftWeight?: number;
  /** Evaluations for the search over the whole box before it is refined; default 25 a tuned value. */
  evaluations?: number;
}

/** How one set of parameters does on one side of the split. */
export interface Score {
  /** Position and velocity fixes scored, each as one group. */
  groups: number;
  /** Σ(ln|S| + νᵀS⁻¹ν), with the outliers' share where there is one: −2 ln likelihood but for a constant. */
  negativeLogLikelihood: number;
  /** The same a group: what can be compared between training and held-out. */
  perGroup: number;
  /** Coasting windows judged, and the RMS of the horizontal error at their ends, m; null without windows. */
  windows: number;
  driftRmsM: number | null;
}

/**
 * `observable`: the data tell the value. `not-observable`: they do not, to within a factor of two, or only together
 * with another one. `at-bound`: the best value lies at the end of what was allowed.
 */
export type Standing = 'observable' | 'not-observable' | 'at-bound';

export interface TunedValue {
  name: TunableName;
  label: string;
  unit: string;
  start: number;
  value: number;
  standing: Standing;
  /** 1σ of ln x in percent, from the objective's curvature; null unless observable. */
  sigmaPercent: number | null;
}

export interface SearchResult {
  /** The start parameters with the tuned values in their places. */
  parameters: Parameters;
  tuned: TunedValue[];
  training: { start: Score; tuned: Score };
  /** null where nothing is held out. */
  heldOut: { start: Score; tuned: Score } | null;
  evaluations: number;
  /** The refinement came to rest; else it ran out of steps and the values are the best seen. */
  converged: boolean;
}

/** A search that its caller drives slice by slice, so that it can report and hear cancel in between. */
export interface SearchRun {
  /** 0…1; an estimate, never falling. */
  readonly progress: number;
  /** Evaluations finished so far. */
  readonly evaluations: number;
  /** Best so far: objective (relative to the start's) and values in the request's order. */
  readonly best: { objective: number; values: readonly number[] };
  /** Works on about `samples` IMU samples; true when all is done. */
  advance(samples: number): boolean;
  /** After advance() returned true. */
  finish(): SearchResult;
}
