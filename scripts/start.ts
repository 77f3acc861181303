/** Brings up database and server, keeps them up, and takes them down together. */
import { buildAll } from './build';
import { isPortFree } from './lib/ports';
import { failWith, readSettings } from './lib/project';
import { stopSignal } from './lib/stop-signal';
import { announce } from './start/announce';
import { takeLock } from './start/lock';
import { Stack } from './start/stack';

export interface StartOptions {
  /** performance.now() that the printed seconds count from. */
  startedAt: number;
  /** Runs beside the stack once that is up, until `stopping` is aborted. */
  beside?: (stack: Stack, stopping: AbortSignal) => Promise<void>;
}

/** Runs until a signal comes. What goes wrong is told in a sentence, and in the exit code. */
export async function start(options: StartOptions): Promise<void> {
  try {
    await startLocked(options);
  } catch (error) {
    failWith(error);
  }
}

async function startLocked(options: StartOptions): Promise<void> {
  const { host, port, dataFolder } = readSettings();
  const address = `http://${host.includes(':') ? `[${host}]` : host}:${port}`;
  const lock = takeLock(dataFolder, address);
  if (!lock.taken) {
    throw new Error(`Driftwright is already running at ${lock.holder.address} (process ${lock.holder.pid}).`);
  }
  try {
    if (!(await isPortFree(port, host))) {
      throw new Error(
        `Port ${port} of ${host} is taken by another program: free it, or choose another (PORT=4601 npm start).`,
      );
    }
    const stopping = stopSignal(() => console.log('\nStopping …'));
    await runStack(new Stack({ host, port, dataFolder }, address, stopping), stopping, options);
  } finally {
    lock.release();
  }
}

async function runStack(stack: Stack, stopping: AbortSignal, options: StartOptions): Promise<void> {
  try {
    await buildAll(console.log, stopping);
    if (stopping.aborted) return;
    await stack.up();
    if (stopping.aborted) return;
    await announce(stack.address, (performance.now() - options.startedAt) / 1000, stack.logFile);
    await Promise.all([stack.keepUp(), options.beside?.(stack, stopping)]);
  } catch (error) {
    if (!stopping.aborted) throw error;
  } finally {
    await stack.down();
  }
}
