/** Slowly changing errors: first-order Gauss–Markov and random walk, discretised exactly. */
import type { RandomSource } from '../random';

/** Local names: a global looked up in each call costs more than the call. */
const { exp, expm1, sqrt } = Math;

/**
 * Zero-mean process with standard deviation σ and correlation time τ (s), stationary from the start:
 * x ← φx + w, φ = e^(−Δt/τ), var w = σ²(1 − φ²) (Gelb 1974). τ = 0 is white.
 */
export class GaussMarkov {
  value: number;

  constructor(
    private readonly sigma: number,
    private readonly tauS: number,
    private readonly random: RandomSource,
  ) {
    this.value = sigma * random.normal();
  }

  /** The value after `dt` seconds. */
  step(dt: number): number {
    if (this.tauS === 0) return (this.value = this.sigma * this.random.normal());
    const x = dt / this.tauS;
    const drive = this.sigma * sqrt(-expm1(-2 * x));
    return (this.value = exp(-x) * this.value + drive * this.random.normal());
  }
}

/** Random walk from N(0, σ²) with the density that a Gauss–Markov process of σ and τ has at short times, 2σ²/τ. */
export class MatchedRandomWalk {
  value: number;

  constructor(
    private readonly sigma: number,
    private readonly tauS: number,
    private readonly random: RandomSource,
  ) {
    this.value = sigma * random.normal();
  }

  /** The value after `dt` seconds. */
  step(dt: number): number {
    return (this.value += this.sigma * sqrt((2 * dt) / this.tauS) * this.random.normal());
  }
}
