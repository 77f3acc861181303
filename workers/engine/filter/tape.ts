/**
 * What a pass of the filter leaves for the smoother: its covariance steps, updates, breaks and outputs, in order, packed
 * into large blocks. Read from the end back. About 25 kB a second of recording at 20 Hz covariance and 5 Hz fixes.
 */
import { ATTITUDE, STATES } from './states';
import type { MeasurementUpdate } from './measurement-update';
import { MAX_ROWS } from './measurement-update';
import type { Strapdown } from '../strapdown/strapdown';
import { NAV_SIZE } from '../strapdown/navigation-state';

/** Kinds of records. */
export const STEP = 1;
export const UPDATE = 2;
export const BREAK = 3;
export const OUTPUT = 4;

const BLOCK = 1 << 17;
const TRIANGLE = (STATES * (STATES + 1)) / 2;
/** Payload of a step: what `Transition.form` reads. */
const MOTION_SIZE = 9 + 4 + NAV_SIZE + 3;

/** What a transition is formed from, kept apart from a strapdown. */
export class Motion {
  readonly sumDcm = new Float64Array(9);
  readonly sumForce = new Float64Array(4);
  readonly nav = new Float64Array(NAV_SIZE);
  readonly earth = new Float64Array(3);

  /** These sums less those of a part that came first. */
  subtract(part: Motion): void {
    for (let i = 0; i < 9; i += 1) this.sumDcm[i] = this.sumDcm[i]! - part.sumDcm[i]!;
    for (let i = 0; i < 4; i += 1) this.sumForce[i] = this.sumForce[i]! - part.sumForce[i]!;
  }

  copy(from: Pick<Motion, 'sumDcm' | 'sumForce' | 'nav' | 'earth'>): void {
    this.sumDcm.set(from.sumDcm);
    this.sumForce.set(from.sumForce);
    this.nav.set(from.nav);
    this.earth.set(from.earth);
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
  readonly p = new Float64Array(STATES * STATES);
  readonly h = new Float64Array(MAX_ROWS * STATES);
  readonly gain = new Float64Array(STATES * MAX_ROWS);
  readonly inverse = new Float64Array(MAX_ROWS * MAX_ROWS);
  readonly innovation = new Float64Array(MAX_ROWS);
  /** Attitude part of the correction that was fed back, rad. */
  readonly turn = new Float64Array(3);
  /** 1 for states that a recovery cut from the past. */
  readonly cut = new Float64Array(STATES);
  private readonly blocks: Float64Array[] = [];
  private block = -1;
  private at = BLOCK;

  /** Bytes held. */
  get bytes(): number {
    return this.blocks.length * BLOCK * 8;
  }

  writeStep(strapdown: Strapdown): void {
    this.open(MOTION_SIZE);
    this.putMotion(strapdown);
    this.close(MOTION_SIZE, STEP);
  }

  /** An accepted update, after its gain was formed. */
  writeUpdate(update: MeasurementUpdate): void {
    const size = MAX_ROWS * STATES * 2 + MAX_ROWS * MAX_ROWS + MAX_ROWS + 3;
    this.open(size);
    this.put(update.h);
    this.put(update.gain);
    this.put(update.inverse);
    this.put(update.innovation);
    for (let i = 0; i < 3; i += 1) this.blocks[this.block]![this.at + i] = update.correction[ATTITUDE + i]!;
    this.at += 3;
    this.close(size, UPDATE);
  }

  writeBreak(cut: Float64Array): void {
    this.open(STATES);
    this.put(cut);
    this.close(STATES, BREAK);
  }

  /** State and covariance at an IMU sample, and what the strapdown has summed since the last step. */
  writeOutput(sample: number, strapdown: Strapdown, p: Float64Array): void {
    const size = 1 + MOTION_SIZE + TRIANGLE;
    this.open(size);
    this.blocks[this.block]![this.at] = sample;
    this.at += 1;
    this.putMotion(strapdown);
    const block = this.blocks[this.block]!;
    for (let i = 0; i < STATES; i += 1)
      for (let j = i; j < STATES; j += 1) {
        block[this.at] = p[i * STATES + j]!;
        this.at += 1;
      }
    this.close(size, OUTPUT);
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
    }
    if (kind === UPDATE) {
      take(this.h);
      take(this.gain);
      take(this.inverse);
      take(this.innovation);
      take(this.turn);
    }
    if (kind === BREAK) take(this.cut);
    if (kind !== OUTPUT) return;
    for (let i = 0; i < STATES; i += 1)
      for (let j = i; j < STATES; j += 1) {
        const value = block[at]!;
        at += 1;
        this.p[i * STATES + j] = value;
        this.p[j * STATES + i] = value;
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

  private putMotion(strapdown: Strapdown): void {
    this.put(strapdown.sumDcm);
    this.put(strapdown.sumForce);
    this.put(strapdown.nav);
    this.put(strapdown.earth);
  }

  private close(size: number, kind: number): void {
    const block = this.blocks[this.block]!;
    block[this.at] = size;
    block[this.at + 1] = kind;
    this.at += 2;
  }
}
