/**
 * A verification of 5 requirements over 4 recordings of 20 minutes at 100 Hz, through the whole stack: by a server with one
 * worker process, and with a process beside it that takes jobs too; and the report of that matrix.
 */
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { buildServer } from '@/scripts/build/server-bundle';
import { pause } from '@/scripts/lib/shell';
import { startLocalPostgres } from '@/scripts/local-postgres';
import { type Verification, verificationSchema } from '@/shared/contracts/verification';
import { writeLogs } from '@/tests/support/log-files';
import { Person } from '@/tests/support/person';
import { Stack } from '@/tests/support/stack';

const RECORDINGS = 4;
const every = (everyS: number, forS: number) => ({ kind: 'every', everyS, forS });
const drift = (quantity: string, afterS: number) => ({ kind: 'drift', quantity, afterS, statistic: 'p95' });

/** Three schedules, so that each recording needs three runs. */
const REQUIREMENTS = [
  { metric: drift('horizontal', 30), limit: 20, schedule: every(90, 30) },
  { metric: drift('vertical', 30), limit: 20, schedule: every(90, 30) },
  { metric: drift('horizontal', 60), limit: 60, schedule: every(120, 60) },
  { metric: { kind: 'nis-inside-share', group: 'position' }, comparison: 'at-least', limit: 0.8 },
  { metric: { kind: 'attitude-sigma', axis: 'largest', when: 'end' }, limit: 2 },
];

/** Measures and prints. */
export async function benchVerification(): Promise<void> {
  await buildServer();
  const folder = mkdtempSync(path.join(tmpdir(), 'driftwright-bench-'));
  const postgres = await startLocalPostgres();
  try {
    const stack = await Stack.boot(postgres.url, { workers: 1 });
    try {
      await benchOn(stack, folder);
    } finally {
      await stack.stop();
    }
  } finally {
    await postgres.stop();
    rmSync(folder, { recursive: true, force: true });
  }
}

async function benchOn(stack: Stack, folder: string): Promise<void> {
  const person = await Person.firstAdmin(stack.url);
  const recordingIds: string[] = [];
  for (let i = 0; i < RECORDINGS; i += 1) {
    const logs = writeLogs(folder, {
      motion: 'road',
      durationS: 1200,
      imuRateHz: 100,
      gnssRateHz: 5,
      seed: 30 + i,
    });
    recordingIds.push((await person.upload(`Drive ${i + 1}`, logs)).id);
  }
  for (const [i, requirement] of REQUIREMENTS.entries()) {
    const named = { name: `Requirement ${i + 1}`, comparison: 'at-most', recordingIds };
    await person.json('POST', '/requirements', { ...named, ...requirement });
  }
  console.log(
    `\nVerification: ${REQUIREMENTS.length} requirements × ${RECORDINGS} recordings of 20 min, 100 Hz\n`,
  );
  const alone = await measure(person, 'one worker process');
  await stack.startBeside();
  const together = await measure(person, 'two worker processes');
  console.log(`  verdicts alike: ${JSON.stringify(alone) === JSON.stringify(together) ? 'yes' : 'NO'}`);
}

/** Verifies a fresh set; answers its verdicts and values. */
async function measure(person: Person, title: string): Promise<unknown> {
  const set = { name: title, version: { note: 'Defaults.', parameters: {} } };
  const { id } = (await person.json('POST', '/parameter-sets', set)) as { id: string };
  const of = `/parameter-sets/${id}/versions/1`;
  const started = performance.now();
  await person.json('POST', `${of}/verify`);
  let verification: Verification;
  do {
    await pause(50);
    verification = verificationSchema.parse(await person.json('GET', `${of}/verification`));
  } while (verification.state === 'going');
  const seconds = (performance.now() - started) / 1000;
  const { pass, fail, failed } = verification.counts;
  const runs = new Set(verification.cells.map(({ runId }) => runId)).size;
  console.log(
    `  ${title}: ${seconds.toFixed(1)} s for ${runs} runs; ${pass} pass, ${fail} fail, ${failed} failed`,
  );
  await measureReport(person, of);
  return verification.cells.map(({ verdict, value }) => [verdict, value]);
}

async function measureReport(person: Person, of: string): Promise<void> {
  const started = performance.now();
  const answer = await person.request('GET', `${of}/report.pdf`);
  if (!answer.ok) throw new Error(`The report was answered ${answer.status}: ${await answer.text()}`);
  const { byteLength } = await answer.arrayBuffer();
  const seconds = (performance.now() - started) / 1000;
  console.log(`    its report: ${seconds.toFixed(2)} s, ${Math.round(byteLength / 1000)} kB of PDF`);
}
