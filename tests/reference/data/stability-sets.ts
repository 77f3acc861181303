/** The two published series of NIST SP 1065 (Riley, Handbook of Frequency Stability Analysis, 2008), §12.4. */

/** Nine values of NBS Monograph 140, annex 8.E. */
export const nbs14Set = () => Float64Array.of(892, 809, 823, 798, 671, 644, 883, 903, 677);

/** 1000 values of the prime-modulus generator n ← 16807 n mod 2147483647, n₁ = 1234567890; exact in doubles. */
export function nistSet(): Float64Array {
  const values = new Float64Array(1000);
  let n = 1234567890;
  for (let i = 0; i < values.length; i += 1) {
    values[i] = n / 2147483647;
    n = (16807 * n) % 2147483647;
  }
  return values;
}
