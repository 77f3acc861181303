/**
 * Test functions with published minima: Branin and Hartman 3 (Dixon & Szegö 1978, Towards Global Optimisation 2), six-hump
 * camel back, all three in Jones, Perttunen & Stuckman 1993, J. Optim. Theory Appl. 79, table 1; Rosenbrock 1960, Computer J. 3.
 */
import { searchBox, type Asking } from '@/workers/engine/search/box-search';
import { refine } from '@/workers/engine/search/refine';

type Objective = (x: readonly number[]) => number;

/** Answers all that a search asks. */
function answer<T>(asking: Asking<T>, f: Objective): { result: T; points: number[][] } {
  const points: number[][] = [];
  let step = asking.next();
  while (step.done !== true) {
    points.push(step.value);
    step = asking.next(f(step.value));
  }
  return { result: step.value, points };
}

const branin: Objective = ([x, y]) =>
  (y! - (5.1 / (4 * Math.PI ** 2)) * x! ** 2 + (5 / Math.PI) * x! - 6) ** 2 +
  10 * (1 - 1 / (8 * Math.PI)) * Math.cos(x!) +
  10;

const camel: Objective = ([x, y]) =>
  (4 - 2.1 * x! ** 2 + x! ** 4 / 3) * x! ** 2 + x! * y! + (-4 + 4 * y! ** 2) * y! ** 2;

const HARTMAN_A = [[3, 10, 30], [0.1, 10, 35], [3, 10, 30], [0.1, 10, 35]]; // prettier-ignore
const HARTMAN_P = [[0.3689, 0.117, 0.2673], [0.4699, 0.4387, 0.747], [0.1091, 0.8732, 0.5547], [0.03815, 0.5743, 0.8828]]; // prettier-ignore
const hartman: Objective = (x) =>
  -[1, 1.2, 3, 3.2].reduce(
    (sum, c, i) =>
      sum + c * Math.exp(-x.reduce((d, v, j) => d + HARTMAN_A[i]![j]! * (v - HARTMAN_P[i]![j]!) ** 2, 0)),
    0,
  );

const rosenbrock: Objective = ([x, y]) => 100 * (y! - x! ** 2) ** 2 + (1 - x!) ** 2;

test.each([
  ['Branin', branin, [-5, 0], [10, 15], 0.397887, 250],
  ['six-hump camel back', camel, [-3, -2], [3, 2], -1.031628, 400],
  ['Hartman 3', hartman, [0, 0, 0], [1, 1, 1], -3.862782, 250],
] as [string, Objective, number[], number[], number, number][])(
  '%s: the published minimum',
  (_name, f, low, high, minimum, budget) => {
    // A likelihood's scale: what is worth while is fixed in it.
    const scaled: Objective = (x) => 100 * f(x);
    const { result, points } = answer(searchBox(low, high, budget), scaled);
    expect(result.value).toBe(scaled(result.point));
    expect(Math.abs(result.value - 100 * minimum)).toBeLessThan(0.2 * Math.abs(minimum));
    expect(points.length).toBeLessThan(1.3 * budget);
    for (const point of points)
      point.forEach((x, i) => {
        expect(x).toBeGreaterThanOrEqual(low[i]!);
        expect(x).toBeLessThanOrEqual(high[i]!);
      });
    const fine = answer(refine(result, low, high), scaled).result;
    expect(fine.converged).toBe(true);
    expect(fine.value).toBeLessThanOrEqual(result.value);
    expect(Math.abs(fine.value - 100 * minimum)).toBeLessThan(0.05);
  },
);

test('no point is asked for twice', () => {
  const { points } = answer(searchBox([-5, 0], [10, 15], 200), branin);
  expect(new Set(points.map((p) => p.map((x) => x.toFixed(9)).join(' '))).size).toBe(points.length);
});

test.each([3e4, -3e4, 1e8])('values of the order of %p do not stop it', (offset) => {
  const { result } = answer(searchBox([-5, 0], [10, 15], 300), (x) => 50 * branin(x) + offset);
  expect(Math.abs(result.value - offset - 50 * 0.397887)).toBeLessThan(2);
});

test('a part of the box that cannot be scored is left alone', () => {
  const { result } = answer(searchBox([-5, 0], [10, 15], 300), (x) => (x[0]! < 5 ? 1e9 : branin(x)));
  expect(Math.abs(result.value - 0.397887)).toBeLessThan(5e-3);
  expect(result.point[0]!).toBeCloseTo(9.42, 0);
});

describe('refinement', () => {
  test('follows Rosenbrock’s valley to its end', () => {
    const f: Objective = (x) => 20 * rosenbrock(x);
    const start = { point: [0.5, 0.3], value: f([0.5, 0.3]) };
    const { result } = answer(refine(start, [-2, -2], [2, 2]), f);
    expect(result.converged).toBe(true);
    // 0.1 in −2 ln likelihood: a third of a σ.
    expect(result.value).toBeLessThan(0.1);
    expect(result.point[0]!).toBeCloseTo(1, 1);
  });

  test('says so when it runs out of steps', () => {
    const f: Objective = (x) => 1000 * rosenbrock(x);
    const start = { point: [-1.2, 1], value: f([-1.2, 1]) };
    const { result } = answer(refine(start, [-2, -2], [2, 2]), f);
    expect(result.converged).toBe(false);
    expect(result.value).toBeLessThan(start.value);
    expect(result.value).toBe(f(result.point));
  });

  test('stops at the side of the box, and finds the rest along it', () => {
    // Free minimum at (2, 1); on the side x = 1 the minimum in y is at 1 + 0.5·(2 − 1)/2.
    const f: Objective = ([x, y]) => 40 * ((x! - 2) ** 2 + (y! - 1) ** 2 + 0.5 * (x! - 2) * (y! - 1));
    const start = { point: [0, 0], value: f([0, 0]) };
    const { result } = answer(refine(start, [-1, -3], [1, 3]), f);
    expect(result.point[0]!).toBe(1);
    expect(result.point[1]!).toBeCloseTo(1.25, 2);
    expect(result.converged).toBe(true);
  });

  test('a flat axis does not keep the others from their minimum', () => {
    const f: Objective = ([x]) => 200 * (x! - 0.3) ** 2;
    const { result } = answer(refine({ point: [-1, 0], value: f([-1, 0]) }, [-2, -2], [2, 2]), f);
    expect(result.point[0]!).toBeCloseTo(0.3, 2);
  });
});
