/**
 * The score of one fix against what the filter predicted of it: −2 ln of the predictive density, but for n·ln 2π.
 *
 * A filter's innovations are white under the right parameters, so that the density of all measurements is the product of
 * the densities N(ν; 0, S) of each given those before it (prediction-error decomposition: Schweppe 1965; Harvey 1989,
 * § 3.4). Minimising Σ(ln|S| + νᵀS⁻¹ν) is then maximum likelihood.
 *
 * The gate. To sum over accepted fixes alone would reward a small S: whatever it turns away no longer counts. To give a
 * rejected fix the gate's own probability (censoring) mixes a probability with densities, and the gate moves with S, so
 * that the same data are not scored for two sets of parameters. So every fix is scored, accepted or not, by a density
 * that integrates to one (prequential scoring: Dawid 1984). Real logs hold outliers, and one of 50 σ would drive the
 * plain Gaussian's R up: a share ε of fixes may come from a wide density that does not depend on the parameters,
 *   p(ν) = (1 − ε) N(ν; 0, S) + ε N(ν; 0, S_wide)
 * (contaminated normal: Tukey 1960; Huber 1964). Up to 4 σ a fix is scored as the Gaussian alone would. While a search goes
 * on the filter's own gate stands wide open (a good fix in ten million rejected): outliers still do not move the state,
 * and the score does not jump where a fix passes the gate. With ε = 0 there is no gate and the score is the plain sum.
 *
 * Fixes whose errors are correlated in time break the product: their innovations are no longer white, and the search
 * takes the correlation for process noise. Aids' innovations are not scored; given them, the fixes' densities hold.
 */
import { MAX_ROWS, type MeasurementUpdate } from '../filter/measurement-update';

/** The prepared part of an update that a score needs; `s` is 3×3 row by row, rows not in use are the identity's. */
export type PreparedInnovation = Pick<MeasurementUpdate, 'rows' | 's' | 'innovation' | 'nis'>;

/** ln|S| + νᵀS⁻¹ν. */
export function gaussianScore({ s, nis }: PreparedInnovation): number {
  const a = s[0]!;
  const b = s[1]!;
  const c = s[2]!;
  const e = s[MAX_ROWS + 1]!;
  const f = s[MAX_ROWS + 2]!;
  const i = s[2 * MAX_ROWS + 2]!;
  const determinant = a * (e * i - f * f) - b * (b * i - c * f) + c * (b * f - c * e);
  return Math.log(determinant) + nis;
}

/** −2 ln((1 − ε) e^{−g/2} + ε e^{−w/2}) of the Gaussian's score g and the wide density's score w; ε in [0, 1). */
export function mixedScore(gaussian: number, wide: number, share: number): number {
  if (share === 0) return gaussian;
  const good = Math.log1p(-share) - gaussian / 2;
  const bad = Math.log(share) - wide / 2;
  const larger = Math.max(good, bad);
  return -2 * (larger + Math.log1p(Math.exp(-Math.abs(good - bad))));
}

/** The wide density's score: independent axes of σ `wideSigma`, m or m/s. */
export function wideScore({ rows, innovation }: PreparedInnovation, wideSigma: number): number {
  let sum = 2 * rows * Math.log(wideSigma);
  for (let m = 0; m < rows; m += 1) sum += (innovation[m]! / wideSigma) ** 2;
  return sum;
}

/** Sums of one side of the split. */
export class Tally {
  groups = 0;
  score = 0;
  windows = 0;
  /** Σ of squared horizontal errors at the windows' ends, m². */
  driftSquares = 0;

  add(other: Tally): void {
    this.groups += other.groups;
    this.score += other.score;
    this.windows += other.windows;
    this.driftSquares += other.driftSquares;
  }
}
