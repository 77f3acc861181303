/** Filter parameters out of a noise analysis. */
import type { NoiseAnalysis } from './analysis';

/** In the unit of the rates; null where the record does not tell. */
export interface NoiseStartValues {
  /** White noise density N (angle or velocity random walk). */
  whiteNoise: number | null;
  /** Wander σ and correlation time of the bias, s. */
  biasInstability: number | null;
  biasCorrelationTimeS: number | null;
  /** Random walk density K. */
  biasRandomWalk: number | null;
}

/** Peak of a Gauss–Markov process' Allan deviation over its σ, and the τ of the peak over the correlation time. */
const MARKOV_PEAK = 0.6173643;
const MARKOV_PEAK_AT = 1.8926178;
const FLICKER_PLATEAU = 0.6642824702679601;

/**
 * The wander is the Gauss–Markov process that rises as high as the fitted bias instability (IEEE Std 952-1997, annex C:
 * peak 0.617 σ at 1.89 T). Its correlation time follows from the rate random walk where there is one (K² = 2σ²/T);
 * else the plateau is taken to end with the curve, which is the quickest wander that the record does not contradict.
 */
export function noiseStartValues(analysis: NoiseAnalysis): NoiseStartValues {
  const { white, biasInstability, rateRandomWalk } = analysis.terms;
  const whiteNoise = white.value;
  const k = rateRandomWalk.value;
  const longest = analysis.points[analysis.points.length - 1]!.tauS;
  if (biasInstability.value === null) {
    const tau = longest / MARKOV_PEAK_AT;
    return {
      whiteNoise,
      biasInstability: k === null ? null : k * Math.sqrt(tau / 2),
      biasCorrelationTimeS: k === null ? null : tau,
      biasRandomWalk: k,
    };
  }
  const sigma = (biasInstability.value * FLICKER_PLATEAU) / MARKOV_PEAK;
  return {
    whiteNoise,
    biasInstability: sigma,
    biasCorrelationTimeS: k === null ? longest / MARKOV_PEAK_AT : (2 * sigma * sigma) / (k * k),
    biasRandomWalk: k,
  };
}
