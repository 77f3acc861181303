/** Small helpers around child processes that the scripts share. */
import { spawnSync, type SpawnSyncOptions } from 'node:child_process';

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

export const pause = (milliseconds: number): Promise<void> =>
  new Promise((resolve) => setTimeout(resolve, milliseconds));
