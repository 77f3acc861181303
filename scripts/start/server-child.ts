/** The server as a child process: started from dist/, watched until it answers. */
import { spawn, type ChildProcess } from 'node:child_process';
import { closeSync, openSync, readFileSync } from 'node:fs';
import { BUILD } from '../lib/project';

export interface ServerOptions {
  logFile: string;
  env: Record<string, string>;
  /** Left out: the server itself. */
  entry?: string;
}

const READY_LIMIT_MS = 180_000; // the first start makes the demo's recordings

/** Starts the server; its log goes to `logFile`. Over the channel it notices when we are gone, and ends. */
export function launchServer(options: ServerOptions): ChildProcess {
  const log = openSync(options.logFile, 'a', 0o600);
  const child = spawn(process.execPath, ['--enable-source-maps', options.entry ?? BUILD.server], {
    env: { ...process.env, NODE_ENV: 'production', ...options.env },
    stdio: ['ignore', log, log, 'ipc'],
    // A Ctrl-C in the terminal reaches us alone; we tell the server when its turn has come.
    detached: true,
  });
  closeSync(log);
  return child;
}

/** Resolves when the server takes requests, or `stopping` is aborted; throws with the end of its log where it does not. */
export async function serverReady(
  child: ChildProcess,
  logFile: string,
  stopping?: AbortSignal,
): Promise<void> {
  const ready = await new Promise<boolean>((resolve) => {
    const limit = setTimeout(() => resolve(false), READY_LIMIT_MS);
    const settle = (answer: boolean) => {
      clearTimeout(limit);
      resolve(answer);
    };
    child.once('message', () => settle(true));
    child.once('exit', () => settle(false));
    stopping?.addEventListener('abort', () => settle(true));
  });
  if (ready) return;
  const end = readFileSync(logFile, 'utf8').trim().split('\n').slice(-8).join('\n');
  throw new Error(`The server did not start. The end of ${logFile}:\n${end}`);
}
