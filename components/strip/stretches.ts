/** Stretches of a recording that can be chosen on its strip. Pure. */

/** Start and end on the recording's axis, s. */
export type Stretch = readonly [number, number];

/**
 * The stretch under `timeS`, else the nearest within `reachS`; of several under it the shortest, which is the hardest to
 * hit otherwise. Null where there is none.
 */
export function stretchAt(stretches: readonly Stretch[], timeS: number, reachS = 0): Stretch | null {
  const away = ([from, to]: Stretch) => Math.max(0, from - timeS, timeS - to);
  const nearest = Math.min(reachS, ...stretches.map(away));
  const under = stretches.filter((stretch) => away(stretch) === nearest);
  return under.reduce<Stretch | null>(
    (best, one) => (best && best[1] - best[0] <= one[1] - one[0] ? best : one),
    null,
  );
}
