/** The three bias models: how a bias estimate decays and what noise its state takes. */
import type { BiasModel } from '@/shared/contracts/parameters';

export interface BiasModelParameters {
  model: BiasModel;
  /** In-run wander σ, in the bias' unit (rad/s or m/s²). */
  instability: number;
  /** Correlation time τ of the wander, s. */
  correlationTimeS: number;
  /** Turn-on bias 1σ. */
  turnOnSigma: number;
  /** Random walk density K, unit/√s. */
  randomWalk: number;
}

/** Variance of the bias before anything was measured, for each model. */
export function initialBiasVariance(bias: BiasModelParameters): number {
  const wander = bias.instability * bias.instability;
  const turnOn = bias.turnOnSigma * bias.turnOnSigma;
  if (bias.model === 'gauss-markov') return wander;
  return bias.model === 'random-walk' ? turnOn : turnOn + wander;
}

/** Noise density of the bias' random walk, unit²/s; for Gauss–Markov the driving noise 2σ²/τ. */
export function biasNoiseDensity(bias: BiasModelParameters): number {
  if (bias.model === 'random-walk') return bias.randomWalk * bias.randomWalk;
  return (2 * bias.instability * bias.instability) / bias.correlationTimeS;
}

/** 1/τ of a bias that decays to zero, 1/s; 0 for the models whose estimate stays. */
export function biasDecayRate(bias: BiasModelParameters): number {
  return bias.model === 'gauss-markov' ? 1 / bias.correlationTimeS : 0;
}

/**
 * Variance to add before and after a step of `dt` s so that both together are the model's exact discrete noise
 * (Gauss–Markov: σ²(1 − e^{−2Δt/τ}), Gelb 1974, split as Q/(1 + e^{−2Δt/τ})).
 */
export function halfBiasNoise(density: number, decayRate: number, dt: number): number {
  if (decayRate === 0) return 0.5 * density * dt;
  const exact = (-density * Math.expm1(-2 * decayRate * dt)) / (2 * decayRate);
  return exact / (1 + Math.exp(-2 * decayRate * dt));
}
