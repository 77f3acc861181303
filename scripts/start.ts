/** Brings up database and server, keeps them up, and takes them down together. */
import type { ChildProcess } from 'node:child_process';
import path from 'node:path';
import { buildAll } from './build';
import { isPortFree } from './lib/ports';
import { BUILD, failWith, readSettings, type Settings } from './lib/project';
import { endProcess, ended } from './lib/shell';
import { startLocalPostgres, type LocalPostgres } from './local-postgres';
import { announce } from './start/announce';
import { takeLock } from './start/lock';
import { launchServer, serverReady } from './start/server-child';

const SERVER_STOP_LIMIT_MS = 10_000;
/** A server that dies sooner than this after its start would die again. */
const STEADY_AFTER_MS = 10_000;

/** Runs until a signal comes; `startedAt` is the performance.now() that the printed seconds count from. */
export async function start(startedAt: number): Promise<void> {
  try {
    await run(startedAt);
  } catch (error) {
    failWith(error);
  }
}

async function run(startedAt: number): Promise<void> {
  const settings = readSettings();
  const address = `http://${settings.host.includes(':') ? `[${settings.host}]` : settings.host}:${settings.port}`;
  const lock = takeLock(settings.dataFolder, address);
  if (!lock.taken) {
    throw new Error(`Driftwright is already running at ${lock.holder.address} (process ${lock.holder.pid}).`);
  }
  try {
    if (!(await isPortFree(settings.port, settings.host))) {
      throw new Error(
        `Port ${settings.port} of ${settings.host} is taken by another program: free it, or choose another (PORT=4601 npm start).`,
      );
    }
    await runStack(settings, address, startedAt);
  } finally {
    lock.release();
  }
}

async function runStack(settings: Settings, address: string, startedAt: number): Promise<void> {
  const stopping = stopSignal();
  const stack = new Stack(settings, address);
  try {
    await buildAll(console.log, stopping);
    if (stopping.aborted) return;
    await stack.up(stopping);
    if (stopping.aborted) return;
    await announce(address, (performance.now() - startedAt) / 1000, stack.logFile);
    await stack.keepUp(stopping);
  } catch (error) {
    if (!stopping.aborted) throw error;
  } finally {
    await stack.down();
  }
}

/** Aborted by the first signal that asks us to stop; the second one does not wait for anybody. */
function stopSignal(): AbortSignal {
  const controller = new AbortController();
  const stop = () => {
    if (controller.signal.aborted) process.exit(130);
    console.log('\nStopping …');
    controller.abort();
  };
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const) process.on(signal, stop);
  return controller.signal;
}

/** Database and server as one thing. */
class Stack {
  readonly logFile: string;
  private postgres: LocalPostgres | undefined;
  private server: ChildProcess | undefined;

  constructor(
    private readonly settings: Settings,
    private readonly address: string,
  ) {
    this.logFile = path.join(settings.dataFolder, 'server.log');
  }

  async up(stopping: AbortSignal): Promise<void> {
    const folder = path.join(this.settings.dataFolder, 'postgres');
    this.postgres = await startLocalPostgres({ folder, log: console.log });
    if (stopping.aborted) return;
    const options = {
      address: this.address,
      logFile: this.logFile,
      env: {
        DATABASE_URL: this.postgres.url,
        HOST: this.settings.host,
        PORT: String(this.settings.port),
        DATA_DIR: this.settings.dataFolder,
        CLIENT_DIR: process.env.CLIENT_DIR ?? BUILD.client,
        WORKER_ENTRY: process.env.WORKER_ENTRY ?? BUILD.worker,
      },
    };
    this.server = launchServer(options);
    await serverReady(this.server, options, stopping);
  }

  /** Server before database, so that no request finds it gone. */
  async down(): Promise<void> {
    if (this.server) await endProcess(this.server, SERVER_STOP_LIMIT_MS);
    await this.postgres?.stop();
  }

  /** Until `stopping`: starts both again when one of them died under us. */
  async keepUp(stopping: AbortSignal): Promise<void> {
    const stopped = new Promise<'stop'>((resolve) => {
      if (stopping.aborted) resolve('stop');
      stopping.addEventListener('abort', () => resolve('stop'));
    });
    for (;;) {
      const upSince = Date.now();
      const { server, postgres } = this;
      if (!server || !postgres) return;
      const lost = await Promise.race([
        stopped,
        ended(server).then(() => 'The server'),
        postgres.ended.then(() => 'PostgreSQL'),
      ]);
      if (lost === 'stop') return;
      if (Date.now() - upSince < STEADY_AFTER_MS) {
        throw new Error(`${lost} stopped by itself just after its start; see ${this.logFile}.`);
      }
      console.log(`${lost} stopped unexpectedly. Starting again …`);
      await this.down();
      await this.up(stopping);
      console.log(`Up again at ${this.address}.`);
    }
  }
}
