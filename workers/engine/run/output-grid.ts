/** Which IMU samples are kept: those nearest to a grid of multiples of the output interval. */

/** Marks for samples from…last (1: keep); first and last are always kept. */
export function keptSamples(timeS: Float64Array, from: number, rateHz: number): Uint8Array {
  const last = timeS.length - 1;
  const kept = new Uint8Array(timeS.length);
  kept[from] = 1;
  kept[last] = 1;
  const step = 1 / rateHz;
  let next = Math.floor(timeS[from]! * rateHz) + 1;
  for (let k = from + 1; k < last; k += 1) {
    const target = next * step;
    // The next sample is nearer to the grid time: wait for it.
    if (target - timeS[k]! > Math.abs(timeS[k + 1]! - target)) continue;
    kept[k] = 1;
    // On to the first grid time that this sample does not already stand for.
    next = Math.max(next + 1, Math.floor(timeS[k]! * rateHz + 0.5) + 1);
  }
  return kept;
}

export function countKept(kept: Uint8Array): number {
  let count = 0;
  for (let k = 0; k < kept.length; k += 1) count += kept[k]!;
  return count;
}
