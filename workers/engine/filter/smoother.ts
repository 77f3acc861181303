/**
 * Fixed-interval smoother over the closed-loop filter, in the adjoint form (Bryson & Frazier 1963; Bierman, Factorization
 * Methods for Discrete Sequential Estimation, 1977, ch. X): equal to the smoother of Rauch, Tung and Striebel, but without
 * inverting a covariance at each step, and with nothing kept but what the filter did.
 *
 * Backwards in time, with e = true − computed (what is to be added to the state):
 *   over an update    λ ← Aᵀλ − HᵀS⁻¹ν,  Λ ← AᵀΛA + HᵀS⁻¹H,  A = G(I − KH), G the reset of attitude and bias
 *   over a step       λ ← Φᵀλ,           Λ ← ΦᵀΛΦ
 *   anywhere          e = −Pλ,           P_s = P − PΛP.
 */
import { BiasTurn } from './bias-feedback';
import { MAX_ROWS } from './measurement-update';
import { ATTITUDE, PLAIN_LAYOUT, sizeOf, type StateLayout } from './states';
import { BREAK, Motion, OUTPUT, STEP, UPDATE, type Tape, type TapeMark } from './tape';
import type { Transition } from './transition';
import { transitionOf } from './wide-transition';

export class Smoother {
  /** Of the last output: what to add to its state, and its smoothed covariance. */
  readonly correction: Float64Array;
  readonly covariance: Float64Array;
  private readonly lambda: Float64Array;
  private readonly information: Float64Array;
  private readonly transition: Transition;
  private readonly n: number;
  private readonly phi: Float64Array;
  private readonly work: Float64Array;
  private readonly outLambda: Float64Array;
  private readonly outInformation: Float64Array;
  private readonly vector: Float64Array;
  private readonly projected: Float64Array;
  private readonly biasTurn = new BiasTurn();
  private readonly step = new Motion();
  private hasStep = false;

  /** `gyroDecay`, `accelDecay`: 1/τ of decaying biases, 1/s, and `layout` as the filter has them. */
  constructor(
    private readonly tape: Tape,
    private readonly gyroDecay: number,
    private readonly accelDecay: number,
    layout: StateLayout = PLAIN_LAYOUT,
  ) {
    const n = layout.size;
    this.n = n;
    this.transition = transitionOf(layout);
    this.correction = new Float64Array(n);
    this.covariance = new Float64Array(n * n);
    this.lambda = new Float64Array(n);
    this.information = new Float64Array(n * n);
    this.phi = new Float64Array(n * n);
    this.work = new Float64Array(n * n);
    this.outLambda = new Float64Array(n);
    this.outInformation = new Float64Array(n * n);
    this.vector = new Float64Array(n);
    this.projected = new Float64Array(MAX_ROWS * n);
  }

  /** True with the next output (tape.sample, tape.motion.nav, `correction`, `covariance`), false at `until` or the beginning. */
  next(until: TapeMark | null): boolean {
    for (;;) {
      if (this.tape.isEmpty || (until !== null && this.tape.isAt(until))) return false;
      switch (this.tape.back()) {
        case STEP:
          this.passStep();
          this.step.copy(this.tape.motion);
          this.hasStep = true;
          break;
        case UPDATE:
          this.passStep();
          this.passUpdate();
          break;
        case BREAK:
          this.passStep();
          this.passBreak();
          break;
        case OUTPUT:
          this.formOutput();
          return true;
      }
    }
  }

  /** λ and Λ over the whole of the step that was read. */
  private passStep(): void {
    if (!this.hasStep) return;
    this.hasStep = false;
    this.transition.form(this.step, this.gyroDecay, this.accelDecay);
    this.transition.dense(this.phi);
    transposeTimes(this.phi, this.lambda, this.vector);
    this.lambda.set(this.vector);
    congruence(this.phi, this.information, this.work, this.information);
  }

  /** The step's remainder from the output on, without moving λ and Λ; then e and P_s there. */
  private formOutput(): void {
    const { tape, outLambda, outInformation, correction, covariance, work, n } = this;
    if (this.hasStep) {
      const rest = this.rest;
      rest.copy(this.step);
      rest.subtract(tape.motion);
      this.transition.form(rest, this.gyroDecay, this.accelDecay);
      this.transition.dense(this.phi);
      transposeTimes(this.phi, this.lambda, outLambda);
      congruence(this.phi, this.information, work, outInformation);
    } else {
      outLambda.set(this.lambda);
      outInformation.set(this.information);
    }
    const { p } = tape;
    for (let i = 0; i < n; i += 1) {
      let sum = 0;
      for (let j = 0; j < n; j += 1) sum -= p[i * n + j]! * outLambda[j]!;
      correction[i] = sum;
    }
    congruence(p, outInformation, work, covariance);
    for (let i = 0; i < n * n; i += 1) covariance[i] = p[i]! - covariance[i]!;
  }
  private readonly rest = new Motion();

  private passUpdate(): void {
    this.passReset();
    const { tape, lambda, information, projected, vector, n } = this;
    const { h, gain, inverse, innovation } = tape;
    // w = Kᵀλ + S⁻¹ν; λ ← λ − Hᵀw.
    for (let m = 0; m < MAX_ROWS; m += 1) {
      let sum = 0;
      for (let i = 0; i < n; i += 1) sum += gain[i * MAX_ROWS + m]! * lambda[i]!;
      for (let k = 0; k < MAX_ROWS; k += 1) sum += inverse[m * MAX_ROWS + k]! * innovation[k]!;
      vector[m] = sum;
    }
    for (let i = 0; i < n; i += 1)
      for (let m = 0; m < MAX_ROWS; m += 1) lambda[i] = lambda[i]! - h[m * n + i]! * vector[m]!;
    // B = KᵀΛ; Λ ← Λ − HᵀB − BᵀH + Hᵀ(KᵀΛK + S⁻¹)H.
    for (let m = 0; m < MAX_ROWS; m += 1)
      for (let j = 0; j < n; j += 1) {
        let sum = 0;
        for (let i = 0; i < n; i += 1) sum += gain[i * MAX_ROWS + m]! * information[i * n + j]!;
        projected[m * n + j] = sum;
      }
    for (let a = 0; a < MAX_ROWS; a += 1)
      for (let b = 0; b < MAX_ROWS; b += 1) {
        let sum = inverse[a * MAX_ROWS + b]!;
        for (let j = 0; j < n; j += 1) sum += projected[a * n + j]! * gain[j * MAX_ROWS + b]!;
        this.core[a * MAX_ROWS + b] = sum;
      }
    for (let i = 0; i < n; i += 1)
      for (let j = i; j < n; j += 1) {
        let value = information[i * n + j]!;
        for (let a = 0; a < MAX_ROWS; a += 1) {
          value -= h[a * n + i]! * projected[a * n + j]! + projected[a * n + i]! * h[a * n + j]!;
          for (let b = 0; b < MAX_ROWS; b += 1)
            value += h[a * n + i]! * this.core[a * MAX_ROWS + b]! * h[b * n + j]!;
        }
        information[i * n + j] = value;
        information[j * n + i] = value;
      }
  }
  private readonly core = new Float64Array(MAX_ROWS * MAX_ROWS);

  /** λ ← Gᵀλ, Λ ← GᵀΛG for the resets (bias-feedback.ts, attitude-feedback.ts). */
  private passReset(): void {
    const { turn, tilt } = this.tape;
    this.biasTurn.form(tilt);
    this.biasTurn.adjoint(this.lambda, this.information);
    const size = this.n;
    const n = 0.5 * turn[0]!;
    const e = 0.5 * turn[1]!;
    const d = turn[2]!;
    if (n * n + e * e + d * d < 1e-14) return;
    const c = Math.cos(d);
    const s = Math.sin(d);
    const { lambda, information } = this;
    const a = ATTITUDE;
    const transpose = (x: number, y: number, z: number, out: Float64Array, at: number, stride: number) => {
      // G = [[c, s, ·], [−s, c, ·], [e, −n, 1]] with third column −c·e + s·n, s·e + c·n.
      out[at] = c * x - s * y + e * z;
      out[at + stride] = s * x + c * y - n * z;
      out[at + 2 * stride] = (s * n - c * e) * x + (s * e + c * n) * y + z;
    };
    transpose(lambda[a]!, lambda[a + 1]!, lambda[a + 2]!, lambda, a, 1);
    for (let j = 0; j < size; j += 1) {
      const at = a * size + j;
      transpose(
        information[at]!,
        information[at + size]!,
        information[at + 2 * size]!,
        information,
        at,
        size,
      );
    }
    for (let i = 0; i < size; i += 1) {
      const at = i * size + a;
      transpose(information[at]!, information[at + 1]!, information[at + 2]!, information, at, 1);
    }
  }

  /** States that a recovery cut off hear nothing from later. */
  private passBreak(): void {
    const { lambda, information, tape, n } = this;
    for (let i = 0; i < n; i += 1) {
      if (tape.cut[i] === 0) continue;
      lambda[i] = 0;
      for (let j = 0; j < n; j += 1) {
        information[i * n + j] = 0;
        information[j * n + i] = 0;
      }
    }
  }
}

/** out = Mᵀx. */
function transposeTimes(m: Float64Array, x: Float64Array, out: Float64Array): void {
  const n = x.length;
  out.fill(0);
  for (let i = 0; i < n; i += 1) {
    const xi = x[i]!;
    for (let j = 0; j < n; j += 1) out[j] = out[j]! + m[i * n + j]! * xi;
  }
}

/** out = MᵀSM for a symmetric S; exactly symmetric. `out` may be S. Zeros of M cost nothing. */
function congruence(m: Float64Array, s: Float64Array, work: Float64Array, out: Float64Array): void {
  const n = sizeOf(s);
  // work = S M
  work.fill(0);
  for (let k = 0, row = 0; k < n; k += 1, row += n)
    for (let j = 0, to = 0; j < n; j += 1, to += n) {
      const value = m[row + j]!;
      if (value === 0) continue;
      for (let i = 0; i < n; i += 1) work[to + i] = work[to + i]! + s[row + i]! * value;
    }
  // Row j of work is column j of SM: out = Mᵀ(SM), upper triangle, then mirrored.
  out.fill(0);
  for (let k = 0, row = 0; k < n; k += 1, row += n)
    for (let i = 0, to = 0; i < n; i += 1, to += n) {
      const value = m[row + i]!;
      if (value === 0) continue;
      for (let j = i, at = to + k; j < n; j += 1, at += n) out[to + j] = out[to + j]! + value * work[at]!;
    }
  for (let i = 1, row = n; i < n; i += 1, row += n)
    for (let j = 0, mirror = i; j < i; j += 1, mirror += n) out[row + j] = out[mirror]!;
}
