/** Allan deviation of a series of rates. */

export interface AllanPoint {
  /** Samples a cluster, and their span τ = m·τ₀, s. */
  m: number;
  tauS: number;
  /** σ(τ), in the unit of the rates. */
  deviation: number;
  /** Differences that were averaged. */
  terms: number;
}

/**
 * Fully overlapping Allan deviation (NIST SP 1065, Riley 2008, §5.2.4) at the cluster sizes given:
 * σ² = Σ(x_{i+2m} − 2x_{i+m} + x_i)² ÷ (2 (mτ₀)² (N + 1 − 2m)) over the phase x of N rates, O(N) a cluster size.
 * The mean is taken off first, which the definition does not see but the digits do.
 * @param rates N samples of a constant interval, any unit; @param intervalS τ₀, s.
 * @throws RangeError for a value that is not finite, or a cluster size that is not a whole number in 1…N/2.
 */
export function overlappingAllan(
  rates: ArrayLike<number>,
  intervalS: number,
  clusters: readonly number[] = logSpacedClusters(rates.length),
): AllanPoint[] {
  const n = rates.length;
  const phase = phaseOf(rates, intervalS);
  return clusters.map((m) => {
    if (!(Number.isInteger(m) && m >= 1 && 2 * m <= n))
      throw new RangeError(`A cluster of ${m} samples does not fit twice into a series of ${n}.`);
    const terms = n + 1 - 2 * m;
    let sum = 0;
    for (let i = 0; i < terms; i += 1) {
      const d = phase[i + 2 * m]! - 2 * phase[i + m]! + phase[i]!;
      sum += d * d;
    }
    const tauS = m * intervalS;
    return { m, tauS, deviation: Math.sqrt(sum / (2 * terms)) / tauS, terms };
  });
}

/** Whole cluster sizes from 1 to a share of the series, evenly spaced in the logarithm, without repeats. */
export function logSpacedClusters(count: number, perDecade = 10, longestShare = 1 / 4): number[] {
  const longest = Math.max(Math.floor(count * longestShare), 1);
  const sizes = new Set<number>();
  for (let i = 0; ; i += 1) {
    const m = Math.round(10 ** (i / perDecade));
    if (m > longest || 2 * m > count) break;
    sizes.add(m);
  }
  return [...sizes];
}

function phaseOf(rates: ArrayLike<number>, intervalS: number): Float64Array {
  const n = rates.length;
  let mean = 0;
  for (let i = 0; i < n; i += 1) mean += rates[i]!;
  mean /= n;
  if (!Number.isFinite(mean))
    throw new RangeError('The series holds a value that is not a finite number: cut the stretch there.');
  const phase = new Float64Array(n + 1);
  for (let i = 0; i < n; i += 1) phase[i + 1] = phase[i]! + (rates[i]! - mean) * intervalS;
  return phase;
}
