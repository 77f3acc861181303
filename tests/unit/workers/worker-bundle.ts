/** The real worker bundle for tests, built once a test file. It lies beside the packages, which it loads at run time. */
import { execFileSync } from 'node:child_process';
import { mkdirSync, rmSync } from 'node:fs';
import path from 'node:path';

const FOLDER = path.resolve('node_modules/.cache/driftwright');

export function buildWorkerBundle(): { entry: string; remove(): void } {
  mkdirSync(FOLDER, { recursive: true });
  const entry = path.join(FOLDER, `worker-${process.pid}-${Date.now()}.js`);
  execFileSync(process.execPath, ['--import', 'tsx', path.join(__dirname, 'build-worker.ts'), entry], {
    stdio: ['ignore', 'ignore', 'inherit'],
  });
  const remove = () => {
    for (const file of [entry, `${entry}.map`]) rmSync(file, { force: true });
  };
  return { entry, remove };
}
