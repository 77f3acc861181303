/**
 * Fixed-interval smoother over the closed-loop filter, in the adjoint form (Bryson & Frazier 1963; Bierman, Factorization
 * Methods for Discrete Sequential Estimation, 1977, ch. X): equal to the smoother of Rauch, Tung and Striebel, but without
 * inverting a covariance at each step, and with nothing kept but what the filter did.
 *
 * Backwards in time, with e = true − computed (what is to be added to the state):
 *   over an update    λ ← Aᵀλ − HᵀS⁻¹ν,  Λ ← AᵀΛA + HᵀS⁻¹H,  A = G(I − KH), G the reset of the attitude
 *   over a step       λ ← Φᵀλ,           Λ ← ΦᵀΛΦ
 *   anywhere          e = −Pλ,           P_s = P − PΛP.
 */
import { MAX_ROWS } from './measurement-update';
import { ATTITUDE, STATES } from './states';
import { BREAK, Motion, OUTPUT, STEP, UPDATE, type Tape, type TapeMark } from './tape';
import { Transition } from './transition';

const N = STATES;

export class Smoother {
  /** Of the last output: what to add to its state, and its smoothed covariance. */
  readonly correction = new Float64Array(N);
  readonly covariance = new Float64Array(N * N);
  private readonly lambda = new Float64Array(N);
  private readonly information = new Float64Array(N * N);
  private readonly transition = new Transition();
  private readonly phi = new Float64Array(N * N);
  private readonly work = new Float64Array(N * N);
  private readonly outLambda = new Float64Array(N);
  private readonly outInformation = new Float64Array(N * N);
  private readonly vector = new Float64Array(N);
  private readonly projected = new Float64Array(MAX_ROWS * N);
  private readonly step = new Motion();
  private hasStep = false;

  /** `gyroDecay`, `accelDecay`: 1/τ of decaying biases, 1/s, as the filter has them. */
  constructor(
    private readonly tape: Tape,
    private readonly gyroDecay: number,
    private readonly accelDecay: number,
  ) {}

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
    const { tape, outLambda, outInformation, correction, covariance, work } = this;
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
    for (let i = 0; i < N; i += 1) {
      let sum = 0;
      for (let j = 0; j < N; j += 1) sum -= p[i * N + j]! * outLambda[j]!;
      correction[i] = sum;
    }
    congruence(p, outInformation, work, covariance);
    for (let i = 0; i < N * N; i += 1) covariance[i] = p[i]! - covariance[i]!;
  }
  private readonly rest = new Motion();

  private passUpdate(): void {
    this.passReset();
    const { tape, lambda, information, projected, vector } = this;
    const { h, gain, inverse, innovation } = tape;
    // w = Kᵀλ + S⁻¹ν; λ ← λ − Hᵀw.
    for (let m = 0; m < MAX_ROWS; m += 1) {
      let sum = 0;
      for (let i = 0; i < N; i += 1) sum += gain[i * MAX_ROWS + m]! * lambda[i]!;
      for (let k = 0; k < MAX_ROWS; k += 1) sum += inverse[m * MAX_ROWS + k]! * innovation[k]!;
      vector[m] = sum;
    }
    for (let i = 0; i < N; i += 1)
      for (let m = 0; m < MAX_ROWS; m += 1) lambda[i] = lambda[i]! - h[m * N + i]! * vector[m]!;
    // B = KᵀΛ; Λ ← Λ − HᵀB − BᵀH + Hᵀ(KᵀΛK + S⁻¹)H.
    for (let m = 0; m < MAX_ROWS; m += 1)
      for (let j = 0; j < N; j += 1) {
        let sum = 0;
        for (let i = 0; i < N; i += 1) sum += gain[i * MAX_ROWS + m]! * information[i * N + j]!;
        projected[m * N + j] = sum;
      }
    for (let a = 0; a < MAX_ROWS; a += 1)
      for (let b = 0; b < MAX_ROWS; b += 1) {
        let sum = inverse[a * MAX_ROWS + b]!;
        for (let j = 0; j < N; j += 1) sum += projected[a * N + j]! * gain[j * MAX_ROWS + b]!;
        this.core[a * MAX_ROWS + b] = sum;
      }
    for (let i = 0; i < N; i += 1)
      for (let j = i; j < N; j += 1) {
        let value = information[i * N + j]!;
        for (let a = 0; a < MAX_ROWS; a += 1) {
          value -= h[a * N + i]! * projected[a * N + j]! + projected[a * N + i]! * h[a * N + j]!;
          for (let b = 0; b < MAX_ROWS; b += 1)
            value += h[a * N + i]! * this.core[a * MAX_ROWS + b]! * h[b * N + j]!;
        }
        information[i * N + j] = value;
        information[j * N + i] = value;
      }
  }
  private readonly core = new Float64Array(MAX_ROWS * MAX_ROWS);

  /** λ ← Gᵀλ, Λ ← GᵀΛG for the attitude's reset (attitude-feedback.ts). */
  private passReset(): void {
    const { turn } = this.tape;
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
    for (let j = 0; j < N; j += 1) {
      const at = a * N + j;
      transpose(information[at]!, information[at + N]!, information[at + 2 * N]!, information, at, N);
    }
    for (let i = 0; i < N; i += 1) {
      const at = i * N + a;
      transpose(information[at]!, information[at + 1]!, information[at + 2]!, information, at, 1);
    }
  }

  /** States that a recovery cut off hear nothing from later. */
  private passBreak(): void {
    const { lambda, information, tape } = this;
    for (let i = 0; i < N; i += 1) {
      if (tape.cut[i] === 0) continue;
      lambda[i] = 0;
      for (let j = 0; j < N; j += 1) {
        information[i * N + j] = 0;
        information[j * N + i] = 0;
      }
    }
  }
}

/** out = Mᵀx. */
function transposeTimes(m: Float64Array, x: Float64Array, out: Float64Array): void {
  out.fill(0);
  for (let i = 0; i < N; i += 1) {
    const xi = x[i]!;
    for (let j = 0; j < N; j += 1) out[j] = out[j]! + m[i * N + j]! * xi;
  }
}

/** out = MᵀSM for a symmetric S; exactly symmetric. `out` may be S. Zeros of M cost nothing. */
function congruence(m: Float64Array, s: Float64Array, work: Float64Array, out: Float64Array): void {
  // work = S M
  work.fill(0);
  for (let k = 0; k < N; k += 1)
    for (let j = 0; j < N; j += 1) {
      const value = m[k * N + j]!;
      if (value === 0) continue;
      for (let i = 0; i < N; i += 1) work[j * N + i] = work[j * N + i]! + s[k * N + i]! * value;
    }
  // Row j of work is column j of SM: out = Mᵀ(SM).
  for (let i = 0; i < N; i += 1)
    for (let j = i; j < N; j += 1) {
      let sum = 0;
      for (let k = 0; k < N; k += 1) sum += m[k * N + i]! * work[j * N + k]!;
      out[i * N + j] = sum;
      out[j * N + i] = sum;
    }
}
