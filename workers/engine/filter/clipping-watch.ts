/** Follows the clipped runs of a recording sample by sample. */
import type { ClippedRun } from './clipping';

export class ClippingWatch {
  /** Sample at which the next run begins; Infinity after the last. */
  from = Infinity;
  private at = 0;

  constructor(private readonly runs: readonly ClippedRun[]) {}

  /** The run that has begun or is next to come. */
  get run(): ClippedRun | null {
    return this.runs[this.at] ?? null;
  }

  /** Looks for runs after this sample. */
  start(sample: number): void {
    const next = this.runs.findIndex((run) => run.from > sample);
    this.restore(next < 0 ? this.runs.length : next);
  }

  next(): void {
    this.restore(this.at + 1);
  }

  save(): number {
    return this.at;
  }
  restore(at: number): void {
    this.at = at;
    this.from = this.run?.from ?? Infinity;
  }
}
