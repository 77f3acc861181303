/** A backward pass over a tape: smoothed states and covariances at the tape's outputs, last first, slice by slice. */
import { dcmFromQuat } from '../attitude';
import { bendAccelBias, tiltInBody } from '../filter/bias-feedback';
import { correctState } from '../filter/correct-state';
import type { ProcessNoise } from '../filter/process-noise';
import { Smoother } from '../filter/smoother';
import type { Tape, TapeMark } from '../filter/tape';
import { addOptional } from '../filter/optional-states';
import type { StateLayout } from '../filter/states';
import { NAV_SIZE, QUAT } from '../strapdown/navigation-state';

export class SmoothingPass {
  private readonly smoother: Smoother;
  private readonly nav = new Float64Array(NAV_SIZE);
  private readonly quat = this.nav.subarray(QUAT, QUAT + 4);
  private readonly dcm = new Float64Array(9);
  private readonly tilt = new Float64Array(3);
  private readonly optional: Float64Array;
  /** Sample that the pass has come back to. */
  reached: number;

  /** From the tape's end back to `until` (null: its beginning), each output handed to `emit`. */
  constructor(
    private readonly tape: Tape,
    private readonly until: TapeMark | null,
    noise: Pick<ProcessNoise, 'gyroDecay' | 'accelDecay'>,
    layout: StateLayout,
    lastSample: number,
    private readonly emit: (
      sample: number,
      nav: Float64Array,
      covariance: Float64Array,
      optional: Float64Array,
    ) => void,
  ) {
    this.smoother = new Smoother(tape, noise.gyroDecay, noise.accelDecay, layout);
    this.optional = new Float64Array(tape.optional.length);
    this.reached = lastSample;
  }

  /** True when the pass has come to its end. */
  advance(outputs: number): boolean {
    const { smoother, tape, nav } = this;
    for (let i = 0; i < outputs; i += 1) {
      if (!smoother.next(this.until)) return true;
      nav.set(tape.motion.nav);
      dcmFromQuat(this.quat, this.dcm);
      tiltInBody(this.dcm, smoother.correction, this.tilt);
      bendAccelBias(this.tilt, smoother.correction);
      correctState(nav, tape.motion.earth, smoother.correction);
      this.optional.set(tape.optional);
      addOptional(this.optional, smoother.correction);
      this.reached = tape.sample;
      this.emit(tape.sample, nav, smoother.covariance, this.optional);
    }
    return false;
  }
}
