/** Small helpers around child processes that the scripts share. */
import {
  spawn,
  spawnSync,
  type ChildProcess,
  type SpawnOptions,
  type SpawnSyncOptions,
} from 'node:child_process';

export interface Outcome {
  ok: boolean;
  status: number | null;
  stdout: string;
  stderr: string;
}

export const isRoot = (): boolean => process.getuid?.() === 0;

/** Runs a command to its end and answers what it printed; never throws for a bad exit or a missing program. */
export function run(command: string, args: readonly string[], options: SpawnSyncOptions = {}): Outcome {
  const result = spawnSync(command, args, { ...options, encoding: 'utf8' });
  return {
    ok: result.status === 0,
    status: result.status,
    stdout: result.stdout ?? '',
    stderr: (result.stderr ?? '') || (result.error?.message ?? ''),
  };
}

/** As `run`, without holding up this process, and ended by `signal`. */
export function runAside(
  command: string,
  args: readonly string[],
  options: SpawnOptions & { signal?: AbortSignal } = {},
): Promise<Outcome> {
  const child = spawn(command, args, { ...options, stdio: ['ignore', 'pipe', 'pipe'] });
  let stdout = '';
  let stderr = '';
  child.stdout.on('data', (chunk: Buffer) => (stdout += chunk.toString()));
  child.stderr.on('data', (chunk: Buffer) => (stderr += chunk.toString()));
  return new Promise((resolve) => {
    child.once('error', (error) => resolve({ ok: false, status: null, stdout, stderr: error.message }));
    child.once('close', (status) => resolve({ ok: status === 0, status, stdout, stderr }));
  });
}

export const pause = (milliseconds: number): Promise<void> =>
  new Promise((resolve) => setTimeout(resolve, milliseconds));

export const hasEnded = (child: ChildProcess): boolean =>
  child.exitCode !== null || child.signalCode !== null;

/** Resolves when the process has ended, at once where it has already. */
export const ended = (child: ChildProcess): Promise<void> =>
  hasEnded(child) ? Promise.resolve() : new Promise((resolve) => child.once('exit', () => resolve()));

/** Asks a process to end and kills it where it has not within `limitMs`. */
export async function endProcess(child: ChildProcess, limitMs: number): Promise<void> {
  if (hasEnded(child)) return;
  child.kill('SIGTERM');
  const force = setTimeout(() => child.kill('SIGKILL'), limitMs);
  await ended(child);
  clearTimeout(force);
}
