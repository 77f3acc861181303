/**
 * Which finer pieces a zoomed stretch of time asks for. The whole is level 0; each level halves the tiles of the one before, so
 * that neighbouring views ask for the same pieces and what was fetched once serves again. Pure.
 */

export interface Tile {
  level: number;
  index: number;
  fromS: number;
  toS: number;
}

export type Span = readonly [fromS: number, toS: number];

/** Deeper than this no log goes: 2²⁴ tiles of a day are 5 ms each. */
const DEEPEST = 24;

/**
 * The one or two tiles that hold `view`: of the deepest level whose tiles are at least as long as it. None where that is the
 * whole, which is held in any case.
 */
export function tilesOf(view: Span, whole: Span): Tile[] {
  const [span, all] = [view[1] - view[0], whole[1] - whole[0]];
  if (!(span > 0) || !(all > 0)) return [];
  const level = Math.min(DEEPEST, Math.floor(Math.log2(all / span) + 1e-9));
  if (level < 1) return [];
  const length = all / 2 ** level;
  const last = 2 ** level - 1;
  const at = (timeS: number) => Math.min(last, Math.max(0, Math.floor((timeS - whole[0]) / length)));
  // The end of a view that ends where a tile begins needs nothing of it.
  const [first, end] = [at(view[0]), at(view[1] - length * 1e-9)];
  return Array.from({ length: end - first + 1 }, (_, i) => {
    const index = first + i;
    const fromS = whole[0] + index * length;
    return { level, index, fromS, toS: index === last ? whole[1] : fromS + length };
  });
}

/** Whether one of `whole` (pieces in which no row was left out) holds all of `tile`: then nothing finer is to be had. */
export const isHeld = (tile: Tile, pieces: readonly Span[]): boolean =>
  pieces.some(([fromS, toS]) => fromS <= tile.fromS + 1e-9 && toS >= tile.toS - 1e-9);
