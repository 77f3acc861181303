/** Round values of an axis: 1, 2 or 5 times a power of ten apart. Of our own, so that lists draw strips without a library. */

/** Distance between about `count` round values over a length of `span` (> 0). */
export function niceStep(span: number, count: number): number {
  const raw = span / Math.max(1, count);
  const power = 10 ** Math.floor(Math.log10(raw));
  const share = raw / power;
  // The borders are the geometric means of neighbours, so that as many are too close as are too far.
  if (share >= Math.sqrt(50)) return 10 * power;
  if (share >= Math.sqrt(10)) return 5 * power;
  return share >= Math.SQRT2 ? 2 * power : power;
}

/** About `count` round values within [low, high], ascending. */
export function niceTicks(low: number, high: number, count: number): number[] {
  if (!(high > low)) return [];
  const step = niceStep(high - low, count);
  const first = Math.ceil(low / step - 1e-9);
  const last = Math.floor(high / step + 1e-9);
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, i) => times(first + i, step));
}

/** [low, high] widened to round values; the step may grow with the extent, so it is taken again. */
export function niceExtent([low, high]: readonly [number, number], count = 4): readonly [number, number] {
  if (!(high > low)) return [low, high];
  let [from, to] = [low, high];
  for (let pass = 0; pass < 3; pass++) {
    const step = niceStep(to - from, count);
    [from, to] = [times(Math.floor(low / step + 1e-9), step), times(Math.ceil(high / step - 1e-9), step)];
  }
  return [from, to];
}

/** Decimals that tell values `step` apart. */
export const decimalsOf = (step: number): number =>
  Math.max(0, Math.min(9, -Math.floor(Math.log10(step) + 1e-9)));

/** k steps, without the noise of binary fractions: 3 × 0.1 is 0.3. */
function times(k: number, step: number): number {
  const decimals = decimalsOf(step);
  const value = decimals > 0 ? Number((k * step).toFixed(decimals)) : k * step;
  return value === 0 ? 0 : value;
}
