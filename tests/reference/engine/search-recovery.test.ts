/**
 * From twenty minutes of simulated driving a search finds the sensors' own figures again, from start values wrong by a
 * factor of three: angle and velocity random walk within 20 %, the fixes' R within 10 %. `npm run bench -- search` prints
 * more drives, and a coarser receiver.
 */
import { runBundled } from '@/tests/support/bundled';
import type { Recovery } from '@/tests/support/search-recovery';

jest.setTimeout(300_000);

test.each([1, 2])('seed %p', (seed) => {
  const answer = runBundled('tests/support/search-recovery.ts', [String(seed)], { captured: true });
  const { values, perGroup, converged } = JSON.parse(answer) as Recovery;
  const [arw, vrw, position, velocity] = values.map(({ ratio }) => ratio) as [number, number, number, number];
  for (const walk of [arw, vrw]) expect(Math.abs(walk - 1)).toBeLessThan(0.2);
  for (const scale of [position, velocity]) expect(Math.abs(scale ** 2 - 1)).toBeLessThan(0.1);
  for (const { ratio, sigmaPercent, standing } of values) {
    expect(standing).toBe('observable');
    expect(Math.abs(Math.log(ratio))).toBeLessThan((4 * sigmaPercent!) / 100);
  }
  expect(converged).toBe(true);
  // The tuned values do as well as the true ones on what they were not tuned on.
  expect(perGroup.heldOut[1] - perGroup.truth[1]).toBeLessThan(0.02);
  expect(perGroup.heldOut[0] - perGroup.truth[1]).toBeGreaterThan(1);
});
