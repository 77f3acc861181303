/** The web client as static files. */
import { spawnSync } from 'node:child_process';
import { existsSync, renameSync, rmSync } from 'node:fs';
import path from 'node:path';
import { BUILD, inRoot, ROOT } from '../lib/project';
import { hashInputs, isStamped, writeStamp } from './stamp';

const INPUTS = [
  ...['app', 'components', 'hooks', 'constants', 'shared', 'assets'],
  ...['app.json', 'babel.config.js', 'metro.config.js', 'package-lock.json', 'tsconfig.json'],
];
const QUIET = { EXPO_NO_TELEMETRY: '1', EXPO_OFFLINE: '1', CI: '1', NODE_ENV: 'production' } as const;

/** Exports where something has changed; answers whether it did. The old build stays until the new one is whole. */
export function buildClient(log: (line: string) => void): boolean {
  const hash = hashInputs(INPUTS);
  if (isStamped('client', hash) && existsSync(path.join(BUILD.client, 'index.html'))) return false;
  log('Building the client (about a minute the first time) …');
  const unfinished = `${BUILD.client}.new`;
  rmSync(unfinished, { recursive: true, force: true });
  expo(['export', '--platform', 'web', '--output-dir', path.relative(ROOT, unfinished)]);
  rmSync(BUILD.client, { recursive: true, force: true });
  renameSync(unfinished, BUILD.client);
  writeStamp('client', hash);
  return true;
}

/** Types of the routes in app/, which are generated and not kept in git. */
export function writeRouteTypes(): void {
  expo(['customize', 'tsconfig.json']);
}

function expo(args: string[]): void {
  const result = spawnSync(process.execPath, [inRoot('node_modules/expo/bin/cli'), ...args], {
    cwd: ROOT,
    env: { ...process.env, ...QUIET },
    encoding: 'utf8',
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  if (result.status !== 0) {
    throw new Error(`"expo ${args[0]}" failed:\n${result.stdout}${result.stderr}`);
  }
}
