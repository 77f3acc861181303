/** The server as a child process: started from dist/, watched until it answers. */
import { spawn, type ChildProcess } from 'node:child_process';
import { closeSync, openSync, readFileSync } from 'node:fs';
import { BUILD } from '../lib/project';
import { hasEnded, pause } from '../lib/shell';

export interface ServerOptions {
  address: string;
  logFile: string;
  env: Record<string, string>;
}

const READY_LIMIT_MS = 180_000; // the first start makes the demo's recordings

/** Starts the server; its log goes to `logFile`. Over the channel it notices when we are gone, and ends. */
export function launchServer(options: ServerOptions): ChildProcess {
  const log = openSync(options.logFile, 'a', 0o600);
  const child = spawn(process.execPath, ['--enable-source-maps', BUILD.server], {
    env: { ...process.env, NODE_ENV: 'production', ...options.env },
    stdio: ['ignore', log, log, 'ipc'],
    // A Ctrl-C in the terminal reaches us alone; we tell the server when its turn has come.
    detached: true,
  });
  closeSync(log);
  return child;
}

/** Resolves when the server answers, or when `stopping` is aborted; throws with the end of its log when it does not. */
export async function serverReady(
  child: ChildProcess,
  options: ServerOptions,
  stopping?: AbortSignal,
): Promise<void> {
  const deadline = Date.now() + READY_LIMIT_MS;
  while (!hasEnded(child) && Date.now() < deadline) {
    if (stopping?.aborted || (await answers(options.address))) return;
    await pause(50);
  }
  const end = readFileSync(options.logFile, 'utf8').trim().split('\n').slice(-8).join('\n');
  throw new Error(`The server did not start. The end of ${options.logFile}:\n${end}`);
}

async function answers(address: string): Promise<boolean> {
  try {
    return (await fetch(`${address}/api/v1/health`, { signal: AbortSignal.timeout(2000) })).ok;
  } catch {
    return false; // not listening yet
  }
}
