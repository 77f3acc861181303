import { errorBudget, OTHERS } from '@/components/bench/budget-data';
import { budgetLayout } from '@/components/charts/quiet/budget-layout';
import type { BudgetPoint } from '@/shared/contracts/runs';
import { driftPoint, makeSummary, outage } from './summary';

const split = (afterS: number, sigmas: Record<string, number>): BudgetPoint => ({
  afterS,
  shares: Object.entries(sigmas).map(([source, horizontalM]) => ({
    source,
    horizontalM,
    verticalM: horizontalM / 2,
  })),
});
const windowOf = (...points: BudgetPoint[]) => ({
  ...outage(100, [driftPoint(points[points.length - 1]!.afterS, 1, 1)]),
  budget: points,
});

describe('errorBudget', () => {
  it('shares variance: 3 m and 4 m make 5 m, 36 and 64 %', () => {
    const summary = makeSummary({ outages: [windowOf(split(60, { 'gyro bias': 4, 'GNSS noise': 3 }))] });
    const budget = errorBudget(summary, 'horizontal')!;
    expect(budget.sources).toEqual(['gyro bias', 'GNSS noise']);
    expect(budget.columns).toHaveLength(1);
    expect(budget.columns[0]!.totalM).toBeCloseTo(5, 12);
    expect(budget.columns[0]!.shares[0]).toBeCloseTo(0.64, 12);
    expect(budget.columns[0]!.shares[1]).toBeCloseTo(0.36, 12);
    expect(errorBudget(summary, 'vertical')!.columns[0]!.totalM).toBeCloseTo(2.5, 12);
  });

  it('takes windows together by variance, each where it lasts', () => {
    const summary = makeSummary({
      outages: [
        windowOf(split(30, { 'gyro bias': 1 }), split(60, { 'gyro bias': 6 })),
        windowOf(split(30, { 'gyro bias': 7 })),
      ],
    });
    const { columns } = errorBudget(summary, 'horizontal')!;
    expect(columns.map(({ afterS, windows }) => [afterS, windows])).toEqual([
      [30, 2],
      [60, 1],
    ]);
    expect(columns[0]!.totalM).toBeCloseTo(5, 12);
    expect(columns[1]!.totalM).toBeCloseTo(6, 12);
  });

  it('gathers what never matters, and loses nothing of it', () => {
    const sigmas = { 'gyro bias': 10, 'initial position': 0.5, aids: 0.5 };
    const budget = errorBudget(makeSummary({ outages: [windowOf(split(60, sigmas))] }), 'horizontal')!;
    expect(budget.sources).toEqual(['gyro bias', OTHERS]);
    const [column] = budget.columns;
    expect(column!.shares.reduce((sum, share) => sum + share, 0)).toBeCloseTo(1, 12);
    expect(column!.shares[1]).toBeCloseTo(0.5 / 100.5, 12);
  });

  it('shows the usual times and the longest window, not each window’s own end', () => {
    const ends = [21, 33, 47].map((end) => windowOf(split(10, { aids: 1 }), split(end, { aids: 2 })));
    const { columns } = errorBudget(makeSummary({ outages: ends }), 'horizontal')!;
    expect(columns.map(({ afterS }) => afterS)).toEqual([10, 47]);
  });

  it('is not there where nothing was split', () => {
    expect(
      errorBudget(makeSummary({ outages: [outage(10, [driftPoint(10, 1, 1)])] }), 'horizontal'),
    ).toBeNull();
    expect(errorBudget(null, 'horizontal')).toBeNull();
  });
});

test('bars stand on each other from the ground to the top, as high as their shares', () => {
  const box = { left: 0, right: 300, top: 20, bottom: 120 };
  const [column] = budgetLayout([{ shares: [0.64, 0.36] }], box);
  expect(column!.bars.map(({ height }) => Math.round(height * 1e6) / 1e6)).toEqual([64, 36]);
  expect(column!.bars[0]!.y + column!.bars[0]!.height).toBeCloseTo(120, 9);
  expect(column!.bars[1]!.y).toBeCloseTo(20, 9);
  expect(column!.x + column!.width / 2).toBe(150);
});
