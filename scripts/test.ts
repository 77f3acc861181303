/** Runs the stages one after the other, shows each failure, and ends with "N passed, N failed". */
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { stopSignal } from './lib/stop-signal';
import { STAGES, type Count, type Stage, type StageContext } from './test/stages';

/** `names` picks stages (npm test -- types lint); all of them without. Sets the exit code. */
export async function test(names: string[]): Promise<void> {
  const unknown = names.filter((name) => !STAGES.some((stage) => stage.name === name));
  if (unknown.length > 0) {
    console.error(
      `There is no stage "${unknown.join('", "')}". Stages: ${STAGES.map(({ name }) => name).join(', ')}.`,
    );
    process.exitCode = 1;
    return;
  }
  const stages = STAGES.filter(({ name }) => names.length === 0 || names.includes(name));
  const stopping = stopSignal();
  const folder = mkdtempSync(path.join(tmpdir(), 'driftwright-test-'));
  const total: Count = { passed: 0, failed: 0 };
  const lines: string[] = [];
  for (const stage of stages) {
    const startedAt = performance.now();
    const count = await runStage(stage, { folder, stopping });
    total.passed += count.passed;
    total.failed += count.failed;
    const seconds = ((performance.now() - startedAt) / 1000).toFixed(1);
    lines.push(`${stage.name.padEnd(8)} ${count.passed} passed, ${count.failed} failed (${seconds} s)`);
  }
  rmSync(folder, { recursive: true, force: true });
  console.log(`\n${lines.join('\n')}\n\n${total.passed} passed, ${total.failed} failed`);
  process.exitCode = total.failed === 0 && total.passed > 0 ? 0 : 1;
}

/** A stage that cannot even be set up counts as one failure, and the others still run. */
async function runStage(stage: Stage, context: StageContext): Promise<Count> {
  console.log(`\n── ${stage.name} ${'─'.repeat(60)}`);
  try {
    return await stage.run(context);
  } catch (error) {
    console.error(error instanceof Error ? error.message : error);
    return { passed: 0, failed: 1 };
  }
}
