/** Follows the clipped runs of a recording sample by sample. */
import type { ClippedRun } from './clipping';
import type { ErrorStateFilter } from './error-state-filter';

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

  /** At the run's first sample k: noise for what its samples may have missed, until `leave`. */
  enter(k: number, filter: ErrorStateFilter): void {
    const { run } = this;
    if (run === null || k > run.from) return;
    filter.covarianceStep();
    filter.noise.gyroExtra = run.gyroNoise;
    filter.noise.accelExtra = run.accelNoise;
    filter.warn(
      'clipped',
      `${run.to - run.from + 1} IMU samples were at the end of the sensor's range; the uncertainty was widened over them.`,
      filter.timeS,
    );
  }

  /** After the run's last sample. */
  leave(k: number, filter: ErrorStateFilter): void {
    if (k < this.run!.to) return;
    filter.covarianceStep();
    filter.noise.gyroExtra = 0;
    filter.noise.accelExtra = 0;
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
