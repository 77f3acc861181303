/** How well an overlapping Allan deviation is known. */
import { chiSquaredQuantile } from '../statistics/distributions';

/** Local names: a global looked up in each call costs more than the call. */
const { max, sqrt } = Math;

/** Kinds of noise by what the *rate* does. */
export type NoiseKind = 'white-angle' | 'white-rate' | 'flicker-rate' | 'random-walk-rate';

/**
 * Equivalent degrees of freedom of the fully overlapping estimate (NIST SP 1065, Riley 2008, table 5, after Howe, Allan &
 * Barnes 1981) from `phasePoints` = samples + 1 and cluster size m. At least 1.
 */
export function equivalentDegrees(kind: NoiseKind, phasePoints: number, m: number): number {
  const n = phasePoints;
  let edf: number;
  switch (kind) {
    case 'white-angle':
      edf = ((n + 1) * (n - 2 * m)) / (2 * (n - m));
      break;
    case 'white-rate':
      edf = (((3 * (n - 1)) / (2 * m) - (2 * (n - 2)) / n) * 4 * m * m) / (4 * m * m + 5);
      break;
    case 'flicker-rate':
      edf = m === 1 ? (2 * (n - 2) ** 2) / (2.3 * n - 4.9) : (5 * n * n) / (4 * m * (n + 3 * m));
      break;
    case 'random-walk-rate':
      edf = ((n - 2) / (m * (n - 3) ** 2)) * ((n - 1) ** 2 - 3 * m * (n - 1) + 4 * m * m);
      break;
  }
  return max(edf, 1);
}

/** Two-sided interval of the true deviation round an estimated one (NIST SP 1065, eq. 45). */
export function deviationInterval(deviation: number, edf: number, level = 0.6827): [number, number] {
  return [
    deviation * sqrt(edf / chiSquaredQuantile((1 + level) / 2, edf)),
    deviation * sqrt(edf / chiSquaredQuantile((1 - level) / 2, edf)),
  ];
}

/** The kind whose Allan *variance* has the slope nearest to the given one in log–log. */
export function kindOfSlope(slope: number): NoiseKind {
  if (slope < -1.5) return 'white-angle';
  if (slope < -0.5) return 'white-rate';
  return slope < 0.5 ? 'flicker-rate' : 'random-walk-rate';
}
