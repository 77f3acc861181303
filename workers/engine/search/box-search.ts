/**
 * Search over a whole box without derivatives: DIRECT, dividing rectangles (Jones, Perttunen & Stuckman 1993, J. Optim.
 * Theory Appl. 79), from the package ml-direct, turned inside out: the caller evaluates the points, when it likes.
 *
 * The package calls its objective by itself and can only be stopped between iterations. Here an iteration is run again
 * for each point with the values known so far, and left by an exception at the first unknown one: an iteration's
 * bookkeeping takes far less than one evaluation, and its state is handed in from the last one.
 */
import direct from 'ml-direct';

export interface Minimum {
  point: number[];
  value: number;
}

/** Values above this are taken for it: the package's hull of large values must keep its digits. */
const LARGEST = 1e9;
/**
 * Points this far above the line through the hull's ends still belong to it. The package's own 1e-12 loses the ends
 * themselves to rounding where values are in the thousands, and then it never returns.
 */
const HULL_TOLERANCE = 1e-6;

/** A rectangle must promise to undercut the best value by this much to be divided: it keeps the search from lingering. */
const WORTHWHILE = 0.1;

/** A search that hands out points and is given their values. */
export type Asking<T> = Generator<number[], T, number>;

class Unknown extends Error {
  constructor(readonly point: number[]) {
    super('A value is needed.');
  }
}

/**
 * Lowest point seen among about `evaluations` (the iteration under way is finished); the box' middle is the first.
 * Values must be numbers. `low` and `high`: n ends each.
 */
export function* searchBox(
  low: readonly number[],
  high: readonly number[],
  evaluations: number,
): Asking<Minimum> {
  const best: Minimum = { point: [], value: Infinity };
  let state: object = {};
  let count = 0;
  while (count < evaluations) {
    const known: number[] = [];
    const epsilon = WORTHWHILE / Math.max(1, Math.min(LARGEST, Math.abs(best.value)));
    const iterate = () => iteration(low, high, state, known, epsilon);
    let next = iterate();
    while (next.point !== null) {
      const value: number = yield next.point;
      count += 1;
      if (value < best.value) Object.assign(best, { point: next.point, value });
      known.push(Math.min(value, LARGEST));
      next = iterate();
    }
    if (known.length === 0) break;
    state = { ...next.state, bestCurrentValue: best.value };
  }
  return best;
}

/** One iteration from a state: the point whose value it lacks, or the state after it. */
function iteration(
  low: readonly number[],
  high: readonly number[],
  state: object,
  known: readonly number[],
  epsilon: number,
) {
  let calls = 0;
  const objective = (point: ArrayLike<number>) => {
    if (calls === known.length) throw new Unknown(Array.from(point));
    calls += 1;
    return known[calls - 1]!;
  };
  try {
    // The package works on the state in place.
    const options = {
      iterations: 1,
      epsilon,
      tolerance2: HULL_TOLERANCE,
      initialState: structuredClone(state),
    };
    const { finalState } = direct(objective, [...low], [...high], options);
    return { point: null, state: finalState as object };
  } catch (error) {
    if (error instanceof Unknown) return { point: error.point, state };
    throw error;
  }
}
