import { createRun } from '@/workers/engine';
import { requestOf, simulateCase } from '../support/monte-carlo';

const OPTIONAL = { accelScale: { enabled: true, randomWalkPpmPerSqrtS: 3 }, leverArm: { enabled: true } };

test.each([
  [true, {}],
  [false, {}],
  [false, OPTIONAL],
])('shares of the predicted error add up to the whole (truth: %p, states %j)', (withTruth, states) => {
  const simulated = simulateCase(
    { motion: 'road', durationS: 120, imuRateHz: 40, staticStartS: 15, seed: 11, leverArmM: [1, 0, -1] },
    { aids: { nonHolonomic: { enabled: true } }, states },
  );
  const recording = withTruth ? simulated.recording : { ...simulated.recording, reference: null };
  const outages = [
    { startS: 50, endS: 60.003, withhold: 'gnss' as const },
    { startS: 70, endS: 110, withhold: 'position' as const },
  ];
  const run = createRun(recording, requestOf(simulated, { outages, errorBudget: true }));
  while (!run.advance(1e6));
  const { outages: results } = run.finish().summary;
  for (const { points, budget } of results) {
    expect(budget!.map((b) => b.afterS)).toEqual(points.map((p) => p.afterS));
    budget!.forEach(({ shares }, i) => {
      const horizontal = Math.hypot(...shares.map((s) => s.horizontalM));
      const vertical = Math.hypot(...shares.map((s) => s.verticalM));
      expect(horizontal / points[i]!.predictedHorizontalM).toBeCloseTo(1, 9);
      expect(vertical / points[i]!.predictedVerticalM).toBeCloseTo(1, 9);
      expect(shares.every((s) => s.horizontalM >= 0)).toBe(true);
    });
  }
  const [coasting] = results[0]!.budget!.map(({ shares }) => shares);
  const share = (source: string) => coasting!.find((s) => s.source === source)!.horizontalM;
  expect(share('gyro white noise')).toBeGreaterThan(0);
  expect(share('GNSS noise')).toBeGreaterThan(0.05);
  expect(share('aids')).toBeGreaterThan(0);
  const optional = coasting!.map((s) => s.source).slice(9);
  expect(optional).toEqual(states === OPTIONAL ? ['scale factors', 'lever arm'] : []);
  for (const source of optional) expect(share(source)).toBeGreaterThan(0);
});

test('left out where it was not asked for', () => {
  const simulated = simulateCase({ motion: 'road', durationS: 60, imuRateHz: 25, staticStartS: 10, seed: 3 });
  const outages = [{ startS: 40, endS: 50, withhold: 'gnss' as const }];
  const run = createRun(simulated.recording, requestOf(simulated, { outages }));
  while (!run.advance(1e6));
  expect(run.finish().summary.outages[0]).not.toHaveProperty('budget');
});
