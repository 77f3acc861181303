/** A server, or a consumer of the queue, as a process of its own, to be killed. */
import { type ChildProcess, spawn } from 'node:child_process';
import { randomUUID } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import { z } from 'zod';
import { ended, endProcess } from '@/scripts/lib/shell';
import { inRoot } from '@/scripts/lib/project';
import { apiEnvironment, Caller, until } from './api';

const STOP_LIMIT_MS = 20_000;

export interface OwnProcess {
  child: ChildProcess;
  /** By which rows name it. */
  instanceId: string;
  /** kill -9: nothing is tidied up. */
  kill(): Promise<void>;
  /** SIGTERM, and its exit code. */
  stop(): Promise<number | null>;
}

export interface ServerProcess extends OwnProcess {
  url: string;
  stranger(): Caller;
}

/** Starts a server and waits until it listens. Throws with what it printed where it ends instead. */
export async function startProcess(
  databaseUrl: string,
  dataDir: string,
  env: Record<string, string> = {},
): Promise<ServerProcess> {
  const { line, ...started } = await launch('server/index.ts', 'listening', databaseUrl, dataDir, env);
  const { url } = z.object({ url: z.string() }).parse(line);
  return { ...started, url, stranger: () => new Caller(url) };
}

/** The same without an HTTP side: waits until it takes jobs. */
export async function startConsumerProcess(
  databaseUrl: string,
  dataDir: string,
  env: Record<string, string> = {},
): Promise<OwnProcess> {
  return launch('server/consumer.ts', 'taking jobs', databaseUrl, dataDir, env);
}

async function launch(
  entry: string,
  readyWords: string,
  databaseUrl: string,
  dataDir: string,
  env: Record<string, string>,
): Promise<OwnProcess & { line: unknown }> {
  const logFile = path.join(dataDir, `${path.basename(entry, '.ts')}-${randomUUID().slice(0, 8)}.log`);
  const log = fs.openSync(logFile, 'w');
  const child = spawn(process.execPath, ['--import', 'tsx', inRoot(entry)], {
    cwd: inRoot(),
    env: { ...process.env, ...apiEnvironment(databaseUrl, dataDir, { LOG_LEVEL: 'info', ...env }) },
    stdio: ['ignore', log, log],
  });
  fs.closeSync(log);
  const printed = () => fs.readFileSync(logFile, 'utf8');
  const line = await until(`${entry} says “${readyWords}”`, () => {
    if (child.exitCode !== null) throw new Error(`${entry} ended with ${child.exitCode}: ${printed()}`);
    const said = printed().split('\n').find((text) => text.includes(`"msg":"${readyWords}"`)); // prettier-ignore
    return said ? (JSON.parse(said) as { instance: string }) : undefined;
  });
  return {
    child,
    line,
    instanceId: line.instance,
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
