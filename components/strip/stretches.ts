/** Stretches of a recording that can be chosen on its strip. Pure. */

/** Start and end on the recording's axis, s. */
export type Stretch = readonly [number, number];

/** The stretch under `timeS`; of several the shortest, which is the hardest to hit otherwise. Null where there is none. */
export function stretchAt(stretches: readonly Stretch[], timeS: number): Stretch | null {
  const under = stretches.filter(([from, to]) => timeS >= from && timeS <= to);
  return under.reduce<Stretch | null>(
    (best, one) => (best && best[1] - best[0] <= one[1] - one[0] ? best : one),
    null,
  );
}
