/** Builds what is stale, finds the database, and runs the queue's consumer until a signal comes. */
import { spawn, type ChildProcess } from 'node:child_process';
import path from 'node:path';
import { buildServer } from './build/server-bundle';
import { BUILD, failWith, readSettings } from './lib/project';
import { ended, endProcess } from './lib/shell';
import { stopSignal } from './lib/stop-signal';
import { findLocalPostgres } from './local-postgres';

const STOP_LIMIT_MS = 10_000;

/** Runs until a signal comes, or the consumer ends by itself. What goes wrong is told in a sentence, and in the exit code. */
export async function work(): Promise<void> {
  try {
    const { dataFolder } = readSettings();
    const databaseUrl = process.env.DATABASE_URL || findLocalPostgres(path.join(dataFolder, 'postgres'));
    if (!databaseUrl) {
      throw new Error(
        `No database runs in ${dataFolder}. Start Driftwright first (npm start), or set DATABASE_URL to the database of the servers that this one is to help.`,
      );
    }
    const stopping = stopSignal(() => console.log('\nStopping …'));
    await buildServer();
    if (!stopping.aborted) await runConsumer(databaseUrl, dataFolder, stopping);
  } catch (error) {
    failWith(error);
  }
}

/** Over the channel it notices when we are gone, and ends. */
async function runConsumer(databaseUrl: string, dataFolder: string, stopping: AbortSignal): Promise<void> {
  const child = spawn(process.execPath, ['--enable-source-maps', BUILD.consumer], {
    env: {
      ...process.env,
      NODE_ENV: 'production',
      DATABASE_URL: databaseUrl,
      DATA_DIR: dataFolder,
      WORKER_ENTRY: process.env.WORKER_ENTRY ?? BUILD.worker,
    },
    stdio: ['ignore', 'inherit', 'inherit', 'ipc'],
    detached: true, // a Ctrl-C in the terminal reaches us alone
  });
  child.once('message', () => console.log('Taking jobs off the queue. Ctrl-C stops it.'));
  const stopped = new Promise<'stop'>((resolve) => stopping.addEventListener('abort', () => resolve('stop')));
  const first = await Promise.race([stopped, ended(child).then(() => 'end' as const)]);
  if (first === 'stop') return void (await endProcess(child, STOP_LIMIT_MS));
  throw new Error(howItEnded(child));
}

const howItEnded = ({ exitCode, signalCode }: ChildProcess) =>
  `The worker stopped by itself (${signalCode ?? `exit code ${exitCode}`}); what it printed says why.`;
