/**
 * npm run bench -- health: every defect that the generator can put into a log, on seeded drives: how often the intake
 * finds it with its interval, and what it says of sound logs.
 */
import type { HealthFinding } from '@/shared/contracts/recordings';
import { CLEAN_MOTIONS, DEFECTS, healthOf, soundDrive, type Defect } from '@/tests/support/health-cases';

export async function benchHealth(seeds = 20): Promise<void> {
  console.log(`\nHealth report: ${seeds} seeded drives a defect`);
  const share = (count: number) => `${count}/${seeds}`;
  console.log('defect                          code            found  with interval  other warnings');
  for (const defect of DEFECTS) {
    const tally = { found: 0, placed: 0, others: new Set<string>() };
    for (let seed = 1; seed <= seeds; seed += 1) await judge(defect, seed, tally);
    console.log(
      `${defect.name.padEnd(32)}${defect.code.padEnd(16)}${share(tally.found)}  ${share(tally.placed).padStart(13)}  ${[...tally.others].join(', ')}`,
    );
  }
  console.log('\nsound logs: findings above info');
  for (const motion of CLEAN_MOTIONS) {
    const codes: string[] = [];
    for (let seed = 101; seed < 101 + seeds; seed += 1)
      codes.push(
        ...loud((await healthOf(soundDrive(motion, seed))).findings).map(
          (one) => `${one.code} (${one.severity})`,
        ),
      );
    console.log(`${motion.padEnd(32)}${codes.length === 0 ? 'none' : codes.join(', ')}`);
  }
}

async function judge(
  defect: Defect,
  seed: number,
  tally: { found: number; placed: number; others: Set<string> },
) {
  const { findings } = await healthOf(defect.spoil(soundDrive(defect.motion ?? 'road', seed), seed));
  const hit = findings.find(({ code }) => code === defect.code);
  if (hit) tally.found += 1;
  if (hit && (!defect.intervalS || meets(hit, defect.intervalS))) tally.placed += 1;
  for (const { code } of loud(findings)) if (code !== defect.code) tally.others.add(code);
}

const loud = (findings: readonly HealthFinding[]) => findings.filter(({ severity }) => severity !== 'info');
const meets = ({ intervalsS }: HealthFinding, [from, to]: readonly [number, number]) =>
  intervalsS.some(([a, b]) => a < to + 1 && b > from - 1);
