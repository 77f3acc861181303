/** Seeded random numbers: the only source of chance in the engine. The same seed gives the same series on every machine. */

/** Local names: a global looked up in each call costs more than the call. */
const { imul, log, sqrt } = Math;

export interface RandomSource {
  /** Uniform in [0, 1), 53 bits. */
  uniform(): number;
  /** Standard normal. */
  normal(): number;
  /** A source of its own for a named purpose; does not move this one. */
  split(label: string): RandomSource;
}

/** Source of a 32-bit seed: xoshiro128** (Blackman & Vigna 2018) seeded by splitmix32. */
export function createRandom(seed: number): RandomSource {
  return fromSeed(seed >>> 0);
}

function fromSeed(seed: number): RandomSource {
  const next32 = xoshiro128(seed);
  let spare = Number.NaN;
  const uniform = () => {
    const high = next32() >>> 5;
    const low = next32() >>> 6;
    return (high * 67108864 + low) / 9007199254740992;
  };
  // Polar method (Marsaglia & Bray 1964): two numbers a turn, one kept.
  const normal = () => {
    if (!Number.isNaN(spare)) {
      const value = spare;
      spare = Number.NaN;
      return value;
    }
    for (;;) {
      const u = 2 * uniform() - 1;
      const v = 2 * uniform() - 1;
      const s = u * u + v * v;
      if (s > 0 && s < 1) {
        const f = sqrt((-2 * log(s)) / s);
        spare = v * f;
        return u * f;
      }
    }
  };
  return { uniform, normal, split: (label) => fromSeed(hash(seed, label)) };
}

function xoshiro128(seed: number): () => number {
  let t = seed;
  const splitmix = () => {
    t = (t + 0x9e3779b9) | 0;
    let z = t ^ (t >>> 16);
    z = imul(z, 0x21f0aaad);
    z ^= z >>> 15;
    z = imul(z, 0x735a2d97);
    return z ^ (z >>> 15);
  };
  let a = splitmix();
  let b = splitmix();
  let c = splitmix();
  let d = splitmix();
  return () => {
    const x = imul(b, 5);
    const result = imul((x << 7) | (x >>> 25), 9);
    const moved = b << 9;
    c ^= a;
    d ^= b;
    b ^= c;
    a ^= d;
    c ^= moved;
    d = (d << 11) | (d >>> 21);
    return result >>> 0;
  };
}

/** FNV-1a over the label, begun at the seed. */
function hash(seed: number, label: string): number {
  let h = (0x811c9dc5 ^ seed) >>> 0;
  h = imul(h, 0x01000193);
  for (let i = 0; i < label.length; i += 1) h = imul(h ^ label.charCodeAt(i), 0x01000193);
  return h >>> 0;
}
