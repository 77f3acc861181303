/** Each defect on two drives, and sound logs. `npm run bench -- health` prints the table over twenty. */
import { CLEAN_MOTIONS, DEFECTS, healthOf, soundDrive } from '@/tests/support/health-cases';

jest.setTimeout(60_000);

const cases = DEFECTS.flatMap((defect) => [1, 2].map((seed) => ({ ...defect, seed })));

test.each(cases)('$name, drive $seed: $code', async ({ code, motion, intervalS, spoil, seed }) => {
  const { findings } = await healthOf(spoil(soundDrive(motion ?? 'road', seed), seed));
  const hit = findings.find((finding) => finding.code === code);
  expect(hit).toBeDefined();
  if (!intervalS) return;
  const [from, to] = intervalS;
  const overlap = hit!.intervalsS.filter(([a, b]) => a < to + 1 && b > from - 1);
  expect(overlap).not.toEqual([]);
});

test.each(CLEAN_MOTIONS)('a sound %s log: nothing above a remark', async (motion) => {
  const { findings, verdict } = await healthOf(soundDrive(motion, 3));
  expect(findings.filter(({ severity }) => severity !== 'info')).toEqual([]);
  expect(verdict).toBe('usable');
});
