/** Series with known noise terms: for the uncertainty of a fit, for tests, for simulated logs at rest. */
import type { RandomSource } from '../random';
import type { TermName } from './terms';

/**
 * `count` mean rates over intervals of 1 s with one noise term of unit coefficient, exact at any cluster size
 * (bias instability: within 1 % from four samples on). For an interval T scale by `scaleForInterval`.
 */
export function unitSeries(term: TermName, count: number, random: RandomSource): Float64Array {
  switch (term) {
    case 'quantisation': {
      let last = random.normal();
      return fill(count, () => {
        const next = random.normal();
        const rate = next - last;
        last = next;
        return rate;
      });
    }
    case 'white':
      return fill(count, () => random.normal());
    case 'biasInstability':
      return flicker(count, random);
    case 'rateRandomWalk': {
      // Mean of the walk over an interval: half its step, and a part of its own of variance 1/12.
      let walk = 0;
      return fill(count, () => {
        const step = random.normal();
        const mean = walk + step / 2 + Math.sqrt(1 / 12) * random.normal();
        walk += step;
        return mean;
      });
    }
    case 'ramp': {
      const sign = random.uniform() < 0.5 ? -1 : 1;
      return Float64Array.from({ length: count }, (_, k) => sign * k);
    }
  }
}

/** Factor that turns a unit series at 1 s into one at an interval of T s. */
export function scaleForInterval(term: TermName, intervalS: number): number {
  switch (term) {
    case 'quantisation':
      return 1 / intervalS;
    case 'white':
      return 1 / Math.sqrt(intervalS);
    case 'biasInstability':
      return 1;
    case 'rateRandomWalk':
      return Math.sqrt(intervalS);
    case 'ramp':
      return intervalS;
  }
}

/** Spacing of the correlation times that together make flicker noise. */
const RATIO = 4;

/**
 * Flicker noise of density B²/(2πf), B = 1, as a sum of Gauss–Markov processes with correlation times RATIO apart:
 * their spectra add up to σ²/(2f ln RATIO), so σ² = ln RATIO/π each; the ripple is below 0.2 %. Interval means are exact.
 */
function flicker(count: number, random: RandomSource): Float64Array {
  const sigma = Math.sqrt(Math.log(RATIO) / Math.PI);
  const out = new Float64Array(count);
  for (let tau = 0.05; tau < 16 * count; tau *= RATIO) {
    const step = meanStep(tau);
    let x = random.normal();
    for (let k = 0; k < count; k += 1) {
      const a = random.normal();
      const b = random.normal();
      out[k]! += sigma * (step.carry * x + step.meanA * a + step.meanB * b);
      x = step.phi * x + step.driveA * a;
    }
  }
  return out;
}

/** Exact step of a unit Gauss–Markov process over 1 s, together with its mean over that second (both Gaussian). */
function meanStep(tau: number) {
  const u = 1 / tau;
  const phi = Math.exp(-u);
  const gone = -Math.expm1(-u);
  const driveA = Math.sqrt(-Math.expm1(-2 * u));
  // Variance of the integral: τ²(2u − 3 + 4φ − φ²), by series where the terms cancel.
  const bracket = u < 0.01 ? u * u * u * (2 / 3 - u / 2 + (7 / 30) * u * u) : 2 * u - 3 + 4 * phi - phi * phi;
  const meanA = (tau * gone * gone) / driveA;
  const meanB = Math.sqrt(Math.max(tau * tau * bracket - meanA * meanA, 0));
  return { phi, driveA, carry: tau * gone, meanA, meanB };
}

function fill(count: number, next: () => number): Float64Array {
  const out = new Float64Array(count);
  for (let k = 0; k < count; k += 1) out[k] = next();
  return out;
}
