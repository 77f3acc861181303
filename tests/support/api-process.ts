/** A server as a process of its own, to be killed. */
import { type ChildProcess, spawn } from 'node:child_process';
import fs from 'node:fs';
import path from 'node:path';
import { ended, endProcess } from '@/scripts/lib/shell';
import { inRoot } from '@/scripts/lib/project';
import { apiEnvironment, Caller, until } from './api';

const STOP_LIMIT_MS = 20_000;

export interface ServerProcess {
  url: string;
  child: ChildProcess;
  stranger(): Caller;
  /** kill -9: nothing is tidied up. */
  kill(): Promise<void>;
  /** SIGTERM, and its exit code. */
  stop(): Promise<number | null>;
}

/** Starts one and waits until it listens. Throws with what it printed where it ends instead. */
export async function startProcess(
  databaseUrl: string,
  dataDir: string,
  env: Record<string, string> = {},
): Promise<ServerProcess> {
  const logFile = path.join(dataDir, `server-${Date.now()}.log`);
  const log = fs.openSync(logFile, 'w');
  const child = spawn(process.execPath, ['--import', 'tsx', inRoot('server/index.ts')], {
    cwd: inRoot(),
    env: { ...process.env, ...apiEnvironment(databaseUrl, dataDir, { LOG_LEVEL: 'info', ...env }) },
    stdio: ['ignore', log, log],
  });
  fs.closeSync(log);
  const printed = () => fs.readFileSync(logFile, 'utf8');
  const url = await until('the server listens', () => {
    if (child.exitCode !== null) throw new Error(`The server ended with ${child.exitCode}: ${printed()}`);
    return /"url":"(http:[^"]+)".*"msg":"listening"/.exec(printed())?.[1];
  });
  return {
    url,
    child,
    stranger: () => new Caller(url),
    async kill() {
      child.kill('SIGKILL');
      await ended(child);
    },
    async stop() {
      await endProcess(child, STOP_LIMIT_MS);
      return child.exitCode;
    },
  };
}
