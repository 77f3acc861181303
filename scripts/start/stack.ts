/** Database and server as one thing. */
import type { ChildProcess } from 'node:child_process';
import path from 'node:path';
import { BUILD, type Settings } from '../lib/project';
import { endProcess, ended } from '../lib/shell';
import { startLocalPostgres, type LocalPostgres } from '../local-postgres';
import { launchServer, serverReady, type ServerOptions } from './server-child';

const SERVER_STOP_LIMIT_MS = 10_000;
/** What dies sooner than this after its start would die again. */
const STEADY_AFTER_MS = 10_000;

export class Stack {
  readonly logFile: string;
  private postgres: LocalPostgres | undefined;
  private server: ChildProcess | undefined;
  private restarting: Promise<void> | undefined;

  constructor(
    private readonly settings: Settings,
    readonly address: string,
    private readonly stopping: AbortSignal,
  ) {
    this.logFile = path.join(settings.dataFolder, 'server.log');
  }

  /** Starts both; returns early where we are asked to stop meanwhile. */
  async up(): Promise<void> {
    await this.startPostgres();
    await this.startServer();
  }

  /** Server before database, so that no request finds it gone. */
  async down(): Promise<void> {
    if (this.server) await endProcess(this.server, SERVER_STOP_LIMIT_MS);
    await this.postgres?.stop();
  }

  /** The server alone, with what is in dist/ now. */
  async restartServer(): Promise<void> {
    this.restarting = (async () => {
      if (this.server) await endProcess(this.server, SERVER_STOP_LIMIT_MS);
      await this.startServer();
    })();
    try {
      await this.restarting;
    } finally {
      this.restarting = undefined;
    }
  }

  /** Until we are asked to stop: starts again what died under us. */
  async keepUp(): Promise<void> {
    const stopped = new Promise<'stop'>((resolve) => {
      if (this.stopping.aborted) resolve('stop');
      this.stopping.addEventListener('abort', () => resolve('stop'));
    });
    for (;;) {
      const upSince = Date.now();
      const lost = await Promise.race([stopped, this.loss()]);
      if (lost === 'stop') return;
      if (Date.now() - upSince < STEADY_AFTER_MS) {
        throw new Error(`${lost} stopped by itself just after its start; see ${this.logFile}.`);
      }
      console.log(`${lost} stopped unexpectedly. Starting it again …`);
      await (lost === 'PostgreSQL' ? this.replacePostgres() : this.restartServer());
      console.log(`Up again at ${this.address}.`);
    }
  }

  /** On the port of before the server finds it again by itself. */
  private async replacePostgres(): Promise<void> {
    const before = this.postgres?.url;
    await this.startPostgres();
    if (this.postgres?.url !== before) await this.restartServer();
  }

  private async startPostgres(): Promise<void> {
    const folder = path.join(this.settings.dataFolder, 'postgres');
    this.postgres = await startLocalPostgres({ folder, log: console.log });
  }

  private async startServer(): Promise<void> {
    if (this.stopping.aborted || !this.postgres) return;
    const options: ServerOptions = {
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
    await serverReady(this.server, this.logFile, this.stopping);
  }

  /** Resolves with the name of what is gone, a restart of our own apart. */
  private async loss(): Promise<'The server' | 'PostgreSQL'> {
    for (;;) {
      await this.restarting;
      const { server, postgres } = this;
      if (!server || !postgres) throw new Error('Nothing was started.');
      const lost = await Promise.race([
        ended(server).then(() => 'The server' as const),
        postgres.ended.then(() => 'PostgreSQL' as const),
      ]);
      if (lost === 'PostgreSQL' || !this.restarting) return lost;
    }
  }
}
