/**
 * What a pass of the filter leaves for the smoother: its covariance steps, updates, breaks and outputs, in order, packed
 * into large blocks. Read from the end back. About 25 kB a second of recording at 20 Hz covariance and 5 Hz fixes.
 */
import { ATTITUDE, STATES } from './states';
import type { MeasurementUpdate } from './measurement-update';
import { MAX_ROWS } from './measurement-update';
import type { TransitionSource } from './transition-coefficients';
import { NAV_SIZE } from '../strapdown/navigation-state';

/** Kinds of records. */
export const STEP = 1;
export const UPDATE = 2;
export const BREAK = 3;
export const OUTPUT = 4;

const BLOCK = 1 << 17;
/** Payload of a step: what `Transition.form` reads, and the last for states behind the fifteen. */
const MOTION_SIZE = 9 + 4 + NAV_SIZE + 3;
const MEASURED_SIZE = 6;

/** What a transition is formed from, kept apart from a strapdown. */
export class Motion {
  readonly sumDcm = new Float64Array(9);
  readonly sumForce = new Float64Array(4);
  readonly nav = new Float64Array(NAV_SIZE);
  readonly earth = new Float64Array(3);
  readonly sumMeasured = new Float64Array(MEASURED_SIZE);

  /** These sums less those of a part that came first. */
  subtract(part: Motion): void {
    for (let i = 0; i < 9; i += 1) this.sumDcm[i] = this.sumDcm[i]! - part.sumDcm[i]!;
    for (let i = 0; i < 4; i += 1) this.sumForce[i] = this.sumForce[i]! - part.sumForce[i]!;
    for (let i = 0; i < MEASURED_SIZE; i += 1)
      this.sumMeasured[i] = this.sumMeasured[i]! - part.sumMeasured[i]!;
  }

  copy(from: Motion): void {
    this.sumDcm.set(from.sumDcm);
    this.sumForce.set(from.sumForce);
    this.nav.set(from.nav);
    this.earth.set(from.earth);
    this.sumMeasured.set(from.sumMeasured);
  }
}

export interface TapeMark {
  block: number;
  at: number;
}

export class Tape {
  /** The record that `back` read. */
  readonly motion = new Motion();
  sample = 0;
  readonly p: Float64Array;
  /** Estimates of the states behind the fifteen. */
  readonly optional: Float64Array;
  readonly h: Float64Array;
  readonly gain: Float64Array;
  readonly inverse = new Float64Array(MAX_ROWS * MAX_ROWS);
  readonly innovation = new Float64Array(MAX_ROWS);
  /** Attitude part of the correction that was fed back, rad. */
  readonly turn = new Float64Array(3);
  /** Its tilt in b, rad: what the accelerometer bias was turned by (bias-feedback.ts). */
  readonly tilt = new Float64Array(3);
  /** 1 for states that a recovery cut from the past. */
  readonly cut: Float64Array;
  private readonly blocks: Float64Array[] = [];
  private block = -1;
  private at = BLOCK;
  private readonly triangle: number;
  private readonly motionSize: number;

  /** `size`: number of states. */
  constructor(readonly size: number = STATES) {
    this.p = new Float64Array(size * size);
    this.optional = new Float64Array(size - STATES);
    this.h = new Float64Array(MAX_ROWS * size);
    this.gain = new Float64Array(size * MAX_ROWS);
    this.cut = new Float64Array(size);
    this.triangle = (size * (size + 1)) / 2;
    this.motionSize = MOTION_SIZE + (size > STATES ? MEASURED_SIZE : 0);
  }

  /** Bytes held. */
  get bytes(): number {
    return this.blocks.length * BLOCK * 8;
  }

  writeStep(motion: TransitionSource): void {
    this.open(this.motionSize);
    this.putMotion(motion);
    this.close(this.motionSize, STEP);
  }

  /** An accepted update, after its gain was formed, and the tilt of its correction in b, rad. */
  writeUpdate(update: MeasurementUpdate, tilt: Float64Array): void {
    const size = MAX_ROWS * this.size * 2 + MAX_ROWS * MAX_ROWS + MAX_ROWS + 6;
    this.open(size);
    this.put(update.h);
    this.put(update.gain);
    this.put(update.inverse);
    this.put(update.innovation);
    for (let i = 0; i < 3; i += 1) this.blocks[this.block]![this.at + i] = update.correction[ATTITUDE + i]!;
    this.at += 3;
    this.put(tilt);
    this.close(size, UPDATE);
  }

  writeBreak(cut: Float64Array): void {
    this.open(this.size);
    this.put(cut);
    this.close(this.size, BREAK);
  }

  /** State (`optional`: of those behind the fifteen) and covariance at an IMU sample, and what was summed since the last step. */
  writeOutput(sample: number, motion: TransitionSource, p: Float64Array, optional?: Float64Array): void {
    const { size } = this;
    const payload = 1 + this.motionSize + this.triangle + size - STATES;
    this.open(payload);
    this.blocks[this.block]![this.at] = sample;
    this.at += 1;
    this.putMotion(motion);
    if (optional !== undefined) this.put(optional);
    const block = this.blocks[this.block]!;
    for (let i = 0; i < size; i += 1)
      for (let j = i; j < size; j += 1) {
        block[this.at] = p[i * size + j]!;
        this.at += 1;
      }
    this.close(payload, OUTPUT);
  }

  mark(): TapeMark {
    return { block: this.block, at: this.at };
  }

  /** Is the tape wound back to `mark`? */
  isAt(mark: TapeMark): boolean {
    return this.block === mark.block && this.at === mark.at;
  }

  get isEmpty(): boolean {
    return this.block < 0;
  }

  /** Gives up what lies beyond the present place: writing goes on from here. */
  forgetBeyond(): void {
    this.blocks.length = this.block + 1;
  }

  /** Winds back over the last record and reads it; its kind, or 0 at the tape's beginning. */
  back(): number {
    if (this.block < 0) return 0;
    const block = this.blocks[this.block]!;
    const kind = block[this.at - 1]!;
    this.at -= 2 + block[this.at - 2]!;
    this.read(kind, block);
    // Blocks end where a record no longer fitted: the one before says where in its own last element.
    if (this.at === 0) {
      this.block -= 1;
      this.at = this.block < 0 ? BLOCK : this.blocks[this.block]![BLOCK - 1]!;
    }
    return kind;
  }

  private read(kind: number, block: Float64Array): void {
    let at = this.at;
    const take = (out: Float64Array) => {
      for (let i = 0; i < out.length; i += 1) out[i] = block[at + i]!;
      at += out.length;
    };
    if (kind === OUTPUT) {
      this.sample = block[at]!;
      at += 1;
    }
    if (kind === STEP || kind === OUTPUT) {
      take(this.motion.sumDcm);
      take(this.motion.sumForce);
      take(this.motion.nav);
      take(this.motion.earth);
      if (this.size > STATES) take(this.motion.sumMeasured);
    }
    if (kind === UPDATE) {
      take(this.h);
      take(this.gain);
      take(this.inverse);
      take(this.innovation);
      take(this.turn);
      take(this.tilt);
    }
    if (kind === BREAK) take(this.cut);
    if (kind !== OUTPUT) return;
    take(this.optional);
    const { size, p } = this;
    for (let i = 0; i < size; i += 1)
      for (let j = i; j < size; j += 1) {
        const value = block[at]!;
        at += 1;
        p[i * size + j] = value;
        p[j * size + i] = value;
      }
  }

  /** Room for a record: payload, its length, its kind. The last element of a block tells where its records end. */
  private open(size: number): void {
    if (this.at + size + 3 <= BLOCK) return;
    if (this.block >= 0) this.blocks[this.block]![BLOCK - 1] = this.at;
    this.block += 1;
    this.at = 0;
    if (this.blocks.length <= this.block) this.blocks.push(new Float64Array(BLOCK));
  }

  private put(values: Float64Array): void {
    const block = this.blocks[this.block]!;
    for (let i = 0; i < values.length; i += 1) block[this.at + i] = values[i]!;
    this.at += values.length;
  }

  private putMotion(motion: TransitionSource): void {
    this.put(motion.sumDcm);
    this.put(motion.sumForce);
    this.put(motion.nav);
    this.put(motion.earth);
    if (this.size > STATES) this.put(motion.sumMeasured!);
  }

  private close(size: number, kind: number): void {
    const block = this.blocks[this.block]!;
    block[this.at] = size;
    block[this.at + 1] = kind;
    this.at += 2;
  }
}
