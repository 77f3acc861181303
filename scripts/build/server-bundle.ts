/** The server, the queue's consumer and the worker process as plain JavaScript files. Packages stay outside, so that native ones work. */
import { existsSync } from 'node:fs';
import path from 'node:path';
import { build, type BuildOptions } from 'esbuild';
import { BUILD, inRoot, ROOT } from '../lib/project';
import { hashInputs, isStamped, writeStamp } from './stamp';

export const SERVER_INPUTS = [
  'server',
  'workers',
  'shared',
  'fixtures',
  'package-lock.json',
  'tsconfig.json',
  'scripts/build',
];

const COMMON: BuildOptions = {
  absWorkingDir: ROOT,
  bundle: true,
  platform: 'node',
  target: 'node20',
  format: 'cjs',
  packages: 'external',
  alias: { '@': ROOT },
  sourcemap: true,
  logLevel: 'warning',
};

/** Bundles where something has changed; answers whether it did. */
export async function buildServer(): Promise<boolean> {
  const hash = hashInputs(SERVER_INPUTS);
  if (
    isStamped('server', hash) &&
    [BUILD.server, BUILD.consumer, BUILD.worker].every((file) => existsSync(file))
  )
    return false;
  await build({
    ...COMMON,
    entryPoints: {
      index: inRoot('server/index.ts'),
      consumer: inRoot('server/consumer.ts'),
      worker: inRoot('workers/entry.ts'),
    },
    outdir: path.dirname(BUILD.server),
  });
  writeStamp('server', hash);
  return true;
}

/** The worker process alone, for tests that need no server: always built, in a moment. */
export async function buildWorker(outfile: string): Promise<void> {
  await build({ ...COMMON, entryPoints: [inRoot('workers/entry.ts')], outfile });
}
