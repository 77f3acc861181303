import { screen } from '@testing-library/react-native';
import { budgetWords } from '@/components/bench/BudgetView';
import { errorBudget } from '@/components/bench/budget-data';
import { BudgetChart } from '@/components/charts/quiet/BudgetChart';
import { driftPoint, makeSummary, outage } from '../../unit/components/bench/summary';
import { renderAs } from '../render';

const summary = makeSummary({
  outages: [
    {
      ...outage(100, [driftPoint(30, 4, 5), driftPoint(60, 12, 10)]),
      budget: [30, 60].map((afterS) => ({
        afterS,
        shares: [
          { source: 'gyro bias', horizontalM: (4 * afterS) / 30, verticalM: 0 },
          { source: 'GNSS noise', horizontalM: (3 * afterS) / 30, verticalM: 1 },
        ],
      })),
    },
  ],
});
const budget = errorBudget(summary, 'horizontal')!;

/** Properties of all drawn shapes of a kind. */
function drawn(kind: string): Record<string, unknown>[] {
  const found: Record<string, unknown>[] = [];
  const walk = (node: unknown): void => {
    if (Array.isArray(node)) return node.forEach(walk);
    if (typeof node !== 'object' || node === null) return;
    const { type, props, children } = node as Record<string, unknown>;
    if (type === kind) found.push(props as Record<string, unknown>);
    walk(children);
  };
  walk(screen.toJSON());
  return found;
}

test('each column stands over its time, under its predicted 1σ, and its bars are as high as their shares', () => {
  renderAs(<BudgetChart columns={budget.columns} width={360} height={240} />);
  const texts = drawn('RNSVGTSpan').map(({ content }) => content);
  for (const text of ['30', '60', '5.00 m', '10.0 m', 's without GNSS']) expect(texts).toContain(text);
  // Each bar is a ground and its ink, alike in height; the plot is 240 − 26 − 40 px high.
  const heights = drawn('RNSVGRect').map(({ height }) => Number(height));
  const [bias, noise] = [0.64 * 174, 0.36 * 174];
  expect(heights).toHaveLength(8);
  [bias, bias, noise, noise, bias, bias, noise, noise].forEach((height, i) =>
    expect(heights[i]).toBeCloseTo(height, 6),
  );
});

test('the words say what the bars show', () => {
  expect(budgetWords(budget)).toBe(
    'After 30.0 s 5.00 m (1σ): gyro bias 64 %, GNSS noise 36 %. After 60.0 s 10.0 m (1σ): gyro bias 64 %, GNSS noise 36 %.',
  );
});
