/** The web client as static files. */
import { existsSync, renameSync, rmSync } from 'node:fs';
import path from 'node:path';
import { BUILD, inRoot, ROOT } from '../lib/project';
import { runAside } from '../lib/shell';
import { hashInputs, isStamped, writeStamp } from './stamp';

export const CLIENT_INPUTS = [
  ...['app', 'components', 'hooks', 'constants', 'shared', 'assets'],
  ...['app.json', 'babel.config.js', 'metro.config.js', 'package-lock.json', 'tsconfig.json'],
];
const QUIET = { EXPO_NO_TELEMETRY: '1', EXPO_OFFLINE: '1', CI: '1', NODE_ENV: 'production' } as const;

/** Exports where something has changed; answers whether it did. The old build stays until the new one is whole. */
export async function buildClient(log: (line: string) => void, signal?: AbortSignal): Promise<boolean> {
  const hash = hashInputs(CLIENT_INPUTS);
  if (isStamped('client', hash) && existsSync(path.join(BUILD.client, 'index.html'))) return false;
  log('Building the client (about a minute the first time) …');
  const unfinished = `${BUILD.client}.new`;
  rmSync(unfinished, { recursive: true, force: true });
  await expo(['export', '--platform', 'web', '--output-dir', path.relative(ROOT, unfinished)], signal);
  rmSync(BUILD.client, { recursive: true, force: true });
  renameSync(unfinished, BUILD.client);
  writeStamp('client', hash);
  return true;
}

/** Types of the routes in app/, which are generated and not kept in git. */
export async function writeRouteTypes(): Promise<void> {
  await expo(['customize', 'tsconfig.json']);
}

async function expo(args: string[], signal?: AbortSignal): Promise<void> {
  const result = await runAside(process.execPath, [inRoot('node_modules/expo/bin/cli'), ...args], {
    cwd: ROOT,
    env: { ...process.env, ...QUIET },
    signal,
  });
  if (!result.ok) throw new Error(`"expo ${args[0]}" failed:\n${result.stdout}${result.stderr}`);
}
