/** Plain figures of a sample. Non-finite values are not filtered: what goes in must be clean. */
export { percentile, percentileOfSorted } from '@/shared/math/percentile';

export function mean(x: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < x.length; i += 1) sum += x[i]!;
  return sum / x.length;
}

/** Root mean square about zero. */
export function rms(x: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < x.length; i += 1) sum += x[i]! * x[i]!;
  return Math.sqrt(sum / x.length);
}

/** Sample standard deviation, divisor n − 1, in two passes. */
export function standardDeviation(x: ArrayLike<number>): number {
  const m = mean(x);
  let sum = 0;
  for (let i = 0; i < x.length; i += 1) sum += (x[i]! - m) ** 2;
  return Math.sqrt(sum / (x.length - 1));
}
