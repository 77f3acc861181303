/**
 * How the 1σ of the bias estimates came down over a run: for each sensor a falling curve of the largest σ of its axes from
 * a time on, kept where it has fallen by a hundredth. From it the time until a σ stays below any threshold is read.
 */

export interface SigmaCurve {
  /** Seconds after the alignment. */
  afterS: number[];
  /** From then on no axis exceeds it; rad/s or m/s². */
  sigma: number[];
}
export interface BiasSigma {
  gyro: SigmaCurve;
  accel: SigmaCurve;
}

/** A point is kept where the curve has come down to this share of the point before. */
const STEP = 0.99;

/** `axes`: the 1σ of each axis at `timeS` (increasing); times are counted from `startS`. */
export function sigmaCurve(
  timeS: ArrayLike<number>,
  axes: readonly ArrayLike<number>[],
  startS: number,
): SigmaCurve {
  const fromThere = new Float64Array(timeS.length);
  let largest = 0;
  for (let k = timeS.length - 1; k >= 0; k -= 1) {
    for (const axis of axes) largest = Math.max(largest, axis[k]!);
    fromThere[k] = largest;
  }
  const curve: SigmaCurve = { afterS: [], sigma: [] };
  let kept = Infinity;
  for (let k = 0; k < timeS.length; k += 1) {
    const isLast = k === timeS.length - 1;
    if (!(fromThere[k]! <= kept * STEP) && !(isLast && fromThere[k]! < kept)) continue;
    kept = fromThere[k]!;
    curve.afterS.push(timeS[k]! - startS);
    curve.sigma.push(kept);
  }
  return curve;
}

/** Seconds after the alignment from which on the σ of every axis is below `threshold`; null: never. Late by at most the time in which σ falls by a hundredth. */
export function firstTimeBelow(of: BiasSigma, sensor: 'gyro' | 'accel', threshold: number): number | null {
  const { afterS, sigma } = of[sensor];
  const at = sigma.findIndex((value) => value < threshold);
  return at < 0 ? null : afterS[at]!;
}
