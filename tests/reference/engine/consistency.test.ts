/**
 * Does the covariance tell the truth? Twenty seeded drives with exact truth (Bar-Shalom, Li & Kirubarajan 2001, §5.4):
 * average NEES and NIS against their χ² bounds, and drift without GNSS against what was predicted.
 */
import { monteCarlo, type MonteCarloCase } from '@/tests/support/monte-carlo';
import { averageBounds } from '@/workers/engine/statistics/consistency';
import { mean } from '@/workers/engine/statistics/descriptive';

const RUNS = 20;
const drive: MonteCarloCase = {
  name: 'road',
  scenario: {
    motion: 'road',
    durationS: 210,
    staticStartS: 20,
    imuRateHz: 50,
    gnssRateHz: 2,
    imuGrade: 'industrial',
    leverArmM: [0.3, -0.2, -1.1],
  },
  start: 'given',
  outagesS: [[140, 200]],
  settleS: 60,
  smooth: true,
};
const result = monteCarlo(drive, RUNS);
const rootMean = (values: number[]) => Math.sqrt(mean(values.map((x) => x * x)));

test('every run succeeds', () => {
  expect(result.failures).toEqual([]);
  expect(result.nees.all.length).toBe(RUNS);
});

test.each([
  ['position', 3],
  ['velocity', 3],
  ['attitude', 3],
  ['all', 15],
] as const)('S-02 average NEES of %s is inside the 95 %% bounds of 20 runs', (block, dimension) => {
  const [low, high] = averageBounds(RUNS, dimension);
  const average = mean(result.nees[block]);
  expect(average).toBeGreaterThan(low);
  expect(average).toBeLessThan(high);
});

test.each([
  ['position', 3],
  ['velocity', 3],
  ['attitude', 3],
  ['all', 15],
] as const)(
  'the smoother’s average NEES of %s likewise, the stretch without GNSS included',
  (block, dimension) => {
    const [low, high] = averageBounds(RUNS, dimension);
    const average = mean(result.smoothedNees[block]);
    expect(average).toBeGreaterThan(low);
    expect(average).toBeLessThan(high);
  },
);

test('average NIS of position and velocity is 3; clean fixes are refused at the gate’s own rate', () => {
  const fixes = result.measured / 2;
  const [low, high] = averageBounds(fixes, 3, 0.999);
  for (const group of ['position', 'velocity'] as const) {
    expect(mean(result.nis[group])).toBeGreaterThan(low);
    expect(mean(result.nis[group])).toBeLessThan(high);
  }
  expect(result.rejected / result.measured).toBeLessThan(0.004);
});

test('without GNSS the error grows as the covariance says', () => {
  const after = [10, 30, 60].map((s) => result.drift.get(s)!);
  const ratios = after.map(
    (list) => rootMean(list.map((d) => d.actual)) / rootMean(list.map((d) => d.predicted)),
  );
  for (const ratio of ratios) {
    expect(ratio).toBeGreaterThan(0.65);
    expect(ratio).toBeLessThan(1.45);
  }
  const [ten, , sixty] = after;
  expect(rootMean(sixty!.map((d) => d.actual))).toBeGreaterThan(5 * rootMean(ten!.map((d) => d.actual)));
  expect(rootMean(sixty!.map((d) => d.predicted))).toBeGreaterThan(
    5 * rootMean(ten!.map((d) => d.predicted)),
  );
});
