/** One point of a search: its parameters over all recordings, slice by slice, and the objective made of it. */
import type { Parameters } from '@/shared/contracts/parameters';
import { EngineError } from '../types';
import { Tally } from './score';
import { Trial, type TrialRules } from './trial';
import type { Interval, Score, SearchCase } from './types';

/** training: passes end with the last training interval, recordings without one are left out. all: everything is scored. */
export type Scope = 'training' | 'all';

/** What does not change from point to point. */
export interface Ground {
  cases: readonly SearchCase[];
  outlierShare: number;
  driftWeight: number;
  /** σ of the wide density, per recording. */
  wideSigmas: readonly TrialRules['wideSigma'][];
}

export class Evaluation {
  readonly training = new Tally();
  readonly heldOut = new Tally();
  /** Why these parameters cannot be scored; null while they can. */
  failure: EngineError | null = null;
  /** Where scoring began, per recording, s. */
  readonly scoredFromS: number[] = [];
  private next = 0;
  private trial: Trial | null = null;

  constructor(
    private readonly ground: Ground,
    private readonly parameters: Parameters,
    private readonly scope: Scope,
    /** Where scoring is to begin, per recording; null: a little after this evaluation's own starts. */
    private readonly fromS: readonly number[] | null,
  ) {}

  get isDone(): boolean {
    return this.failure !== null || (this.trial === null && this.next >= this.ground.cases.length);
  }

  /** Works on at most about `samples` IMU samples and answers how many it took (an alignment counts as one). */
  advance(samples: number): number {
    let used = 0;
    try {
      while (used < samples && !this.isDone) {
        if (this.trial === null) {
          this.trial = this.begin(this.next);
          this.next += 1;
          used += 1;
          continue;
        }
        used += this.trial.advance(samples - used);
        if (this.trial.isDone) this.close(this.trial);
      }
    } catch (error) {
      if (!(error instanceof EngineError)) throw error;
      this.failure = error;
    }
    return used;
  }

  private begin(index: number): Trial | null {
    const { ground, scope, parameters } = this;
    const source = ground.cases[index]!;
    const scored = scope === 'all' ? [...source.trainingS, ...source.heldOutS] : source.trainingS;
    if (scored.length === 0) return null;
    const { outlierShare } = ground;
    const trial = new Trial(source, parameters, {
      outlierShare,
      wideSigma: ground.wideSigmas[index]!,
      scoredFromS: this.fromS?.[index] ?? null,
      untilS: lastEnd(scored),
    });
    this.scoredFromS[index] = trial.scoredFromS;
    return trial;
  }

  private close(trial: Trial): void {
    this.training.add(trial.training);
    this.heldOut.add(trial.heldOut);
    this.trial = null;
  }
}

const lastEnd = (intervals: readonly Interval[]) => Math.max(...intervals.map(([, to]) => to));

/**
 * The objective without priors: −2 ln likelihood of the training fixes, and `driftWeight` × 2W ln(mean squared drift) of
 * the W training windows: −2 ln likelihood of their north and east errors with the common σ that fits them best.
 */
export function objectiveOf(tally: Tally, driftWeight: number): number {
  if (driftWeight === 0 || tally.windows === 0) return tally.score;
  return tally.score + driftWeight * 2 * tally.windows * Math.log(tally.driftSquares / tally.windows);
}

export function scoreOf(tally: Tally): Score {
  return {
    groups: tally.groups,
    negativeLogLikelihood: tally.score,
    perGroup: tally.groups === 0 ? 0 : tally.score / tally.groups,
    windows: tally.windows,
    driftRmsM: tally.windows === 0 ? null : Math.sqrt(tally.driftSquares / tally.windows),
  };
}
