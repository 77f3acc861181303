/**
 * Search for the parameters under which the recordings are most likely: over the whole box first (box-search.ts), then
 * refined (refine.ts), all in ln x; uncertainties from the Hessian at the end. Pure: no files, no clock, no chance.
 */
import type { Parameters } from '@/shared/contracts/parameters';
import { EngineError } from '../types';
import { searchBox, type Asking } from './box-search';
import { deviations } from './curvature';
import { Evaluation, objectiveOf, scoreOf, type Ground } from './evaluation';
import { layGround, priorOf, type Axis } from './ground';
import { refine, type Refined } from './refine';
import { describeTunable, readTunable, writeTunable } from './tunables';
import type { SearchRequest, SearchResult, SearchRun, TunedValue } from './types';

/** Stands for what cannot be scored: worse than anything that can. */
const HOPELESS = 1e9;
const EVALUATIONS_A_VALUE = 25;
/** A value this near to a bound, in ln x, lies at it. */
const AT_BOUND = 1e-3;

/** @throws EngineError 'search-request' for a request that cannot be carried out. */
export function createSearch(request: SearchRequest): SearchRun {
  return new Search(request);
}

class Search implements SearchRun {
  evaluations = 0;
  readonly best: { objective: number; values: number[] };
  private readonly ground: Ground;
  private readonly axes: Axis[];
  private readonly asking: Asking<Refined>;
  private readonly expected: number;
  private phase: 'start' | 'search' | 'tuned' | 'done' = 'start';
  private evaluation: Evaluation;
  private point: number[];
  private startEvaluation: Evaluation | null = null;
  private startObjective = 0;
  private refined: Refined | null = null;
  private furthest = 0;

  constructor(private readonly request: SearchRequest) {
    const { ground, axes } = layGround(request);
    this.ground = ground;
    this.axes = axes;
    const n = axes.length;
    const inBox = request.evaluations ?? EVALUATIONS_A_VALUE * n;
    this.expected = inBox + 3 * (n * (n + 1) + 2) + 2;
    this.asking = program(axes, inBox);
    this.point = axes.map((axis) => axis.start);
    this.best = { objective: 0, values: this.valuesAt(this.point) };
    this.evaluation = this.evaluate('all');
  }

  get progress(): number {
    if (this.phase === 'done') return 1;
    this.furthest = Math.max(this.furthest, Math.min(0.99, this.evaluations / this.expected));
    return this.furthest;
  }

  /** @throws EngineError where the start parameters themselves cannot be scored. */
  advance(samples: number): boolean {
    let left = samples;
    while (left > 0 && this.phase !== 'done') {
      left -= this.evaluation.advance(left);
      if (this.evaluation.isDone) this.conclude();
    }
    return this.phase === 'done';
  }

  /** The evaluation under way is complete: its value goes to whoever asked for it. */
  private conclude(): void {
    const { evaluation } = this;
    this.evaluations += 1;
    if (this.phase === 'start') this.concludeStart(evaluation);
    else if (this.phase === 'tuned') this.phase = 'done';
    else this.hand(this.objective(evaluation));
  }

  private concludeStart(evaluation: Evaluation): void {
    if (evaluation.failure !== null) throw evaluation.failure;
    if (evaluation.training.groups === 0)
      throw new EngineError(
        'search-request',
        'No fix lies in the training intervals after the filter has settled. Make them longer, or begin them earlier.',
      );
    this.startEvaluation = evaluation;
    this.startObjective = this.rawObjective(evaluation);
    this.phase = 'search';
    this.take(this.asking.next());
  }

  private hand(objective: number): void {
    if (objective < this.best.objective) {
      this.best.objective = objective;
      this.best.values = this.valuesAt(this.point);
    }
    this.take(this.asking.next(objective));
  }

  private take(step: IteratorResult<number[], Refined>): void {
    if (step.done === true) {
      this.refined = step.value;
      this.point = step.value.point;
      this.phase = 'tuned';
      this.evaluation = this.evaluate('all');
    } else {
      this.point = step.value;
      this.evaluation = this.evaluate('training');
    }
  }

  private evaluate(scope: 'training' | 'all'): Evaluation {
    const from = this.startEvaluation?.scoredFromS ?? null;
    return new Evaluation(this.ground, this.parametersAt(this.point), scope, from);
  }

  private rawObjective({ training }: Evaluation): number {
    return objectiveOf(training, this.ground.driftWeight) + priorOf(this.axes, this.point);
  }

  /** Relative to the start's. Whatever scores other fixes than the start did cannot be compared. */
  private objective(evaluation: Evaluation): number {
    const { groups, windows } = this.startEvaluation!.training;
    const { failure, training } = evaluation;
    if (failure !== null || training.groups !== groups || training.windows !== windows) return HOPELESS;
    return Math.min(HOPELESS, this.rawObjective(evaluation) - this.startObjective);
  }

  private valuesAt(point: readonly number[]): number[] {
    return point.map((x) => Math.exp(x));
  }

  private parametersAt(point: readonly number[]): Parameters {
    const parameters = structuredClone(this.request.parameters);
    this.request.tuned.forEach(({ name }, i) => writeTunable(name, parameters, Math.exp(point[i]!)));
    return parameters;
  }

  finish(): SearchResult {
    if (this.phase !== 'done') throw new Error('finish() before advance() answered true.');
    const [before, after] = [this.startEvaluation!, this.evaluation];
    if (after.failure !== null) throw after.failure;
    const isHeldOut = before.heldOut.groups > 0;
    return {
      parameters: this.parametersAt(this.point),
      tuned: this.tunedValues(),
      training: { start: scoreOf(before.training), tuned: scoreOf(after.training) },
      heldOut: isHeldOut ? { start: scoreOf(before.heldOut), tuned: scoreOf(after.heldOut) } : null,
      evaluations: this.evaluations,
      converged: this.refined!.converged,
    };
  }

  private tunedValues(): TunedValue[] {
    const { request, axes } = this;
    const { point, quadratic } = this.refined!;
    // What the prior adds to the curvature is not what the data say.
    const hessian = quadratic.hessian.clone();
    axes.forEach(({ prior }, i) => {
      if (prior !== null) hessian.set(i, i, hessian.get(i, i) - 2 / prior.sigma ** 2);
    });
    const sigma = deviations(hessian);
    return request.tuned.map(({ name }, i) => {
      const { low, high } = axes[i]!;
      const atBound = point[i]! - low < AT_BOUND || high - point[i]! < AT_BOUND;
      const standing = atBound ? 'at-bound' : sigma[i] === null ? 'not-observable' : 'observable';
      return {
        name,
        ...describeTunable(name, request.parameters),
        start: readTunable(name, request.parameters),
        value: Math.exp(point[i]!),
        standing,
        sigmaPercent: standing === 'observable' ? 100 * sigma[i]! : null,
      };
    });
  }
}

/** All points of a search, in the order in which their values are wanted. */
function* program(axes: readonly Axis[], evaluations: number): Asking<Refined> {
  const low = axes.map((axis) => axis.low);
  const high = axes.map((axis) => axis.high);
  const found = yield* searchBox(low, high, evaluations);
  return yield* refine(found, low, high);
}
