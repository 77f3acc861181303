/** Runs the engine's figures as production runs the engine: one bundle, plain Node. */
import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { build } from 'esbuild';
import { ROOT } from '@/scripts/lib/project';

export async function benchEngine(): Promise<void> {
  const folder = mkdtempSync(path.join(tmpdir(), 'driftwright-engine-'));
  try {
    const outfile = path.join(folder, 'figures.js');
    await build({
      entryPoints: [path.join(ROOT, 'tests/bench/engine-figures.ts')],
      bundle: true,
      platform: 'node',
      target: 'node20',
      alias: { '@': ROOT },
      outfile,
      logLevel: 'error',
    });
    const { status } = spawnSync(process.execPath, ['--expose-gc', outfile], { stdio: 'inherit' });
    if (status !== 0) throw new Error(`The engine's benchmark ended with status ${status}.`);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
