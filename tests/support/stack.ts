/** The real thing for tests: the built server with its worker processes on a database of its own. */
import type { ChildProcess } from 'node:child_process';
import { randomUUID } from 'node:crypto';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { Client } from 'pg';
import { freePort } from '@/scripts/lib/ports';
import { BUILD } from '@/scripts/lib/project';
import { endProcess, ended } from '@/scripts/lib/shell';
import { launchServer, serverReady } from '@/scripts/start/server-child';

export interface StackOptions {
  /** Seed the demo workspace; left out: an empty installation. */
  demo?: boolean;
  /** Size of the pool. */
  workers?: number;
  env?: Record<string, string>;
}

const STOP_LIMIT_MS = 10_000;

export class Stack {
  private server: ChildProcess | undefined;
  private readonly beside: ChildProcess[] = [];

  private constructor(
    readonly url: string,
    readonly folder: string,
    private readonly database: { adminUrl: string; name: string },
    private readonly env: Record<string, string>,
  ) {}

  /** Starts one; `postgresUrl` is a role that may create databases. */
  static async boot(postgresUrl: string, options: StackOptions = {}): Promise<Stack> {
    const name = `stack_${randomUUID().replaceAll('-', '')}`;
    await sql(postgresUrl, `CREATE DATABASE ${name}`);
    const databaseUrl = new URL(postgresUrl);
    databaseUrl.pathname = `/${name}`;
    const folder = mkdtempSync(path.join(tmpdir(), 'driftwright-stack-'));
    const port = await freePort();
    const stack = new Stack(
      `http://127.0.0.1:${port}`,
      folder,
      { adminUrl: postgresUrl, name },
      {
        DATABASE_URL: databaseUrl.href,
        DATA_DIR: folder,
        PORT: String(port),
        HOST: '127.0.0.1',
        CLIENT_DIR: BUILD.client,
        WORKER_ENTRY: BUILD.worker,
        WORKERS: String(options.workers ?? 2),
        DEMO: options.demo ? 'on' : 'off',
        ...options.env,
      },
    );
    try {
      await stack.start();
    } catch (error) {
      await stack.stop();
      throw error;
    }
    return stack;
  }

  async start(): Promise<void> {
    this.server = launchServer({ logFile: this.logFile, env: this.env });
    await serverReady(this.server, this.logFile);
  }

  /** A process without an HTTP side that takes jobs too, with as many worker processes. */
  async startBeside(): Promise<void> {
    const logFile = path.join(this.folder, `consumer-${this.beside.length + 1}.log`);
    const child = launchServer({ logFile, env: this.env, entry: BUILD.consumer });
    this.beside.push(child);
    await serverReady(child, logFile);
  }

  /** kill -9 of the server. */
  async kill(): Promise<void> {
    if (!this.server) return;
    this.server.kill('SIGKILL');
    await ended(this.server);
  }

  /** Process ids of the worker processes that live now. */
  workerPids(): number[] {
    const pid = this.server?.pid;
    if (pid === undefined) return [];
    const children = readFileSync(`/proc/${pid}/task/${pid}/children`, 'utf8');
    return children.trim().split(/\s+/).filter(Boolean).map(Number);
  }

  get logFile(): string {
    return path.join(this.folder, 'server.log');
  }

  async stop(): Promise<void> {
    for (const child of this.beside) await endProcess(child, STOP_LIMIT_MS);
    if (this.server) await endProcess(this.server, STOP_LIMIT_MS);
    await sql(this.database.adminUrl, `DROP DATABASE IF EXISTS ${this.database.name} WITH (FORCE)`);
    rmSync(this.folder, { recursive: true, force: true });
  }
}

async function sql(url: string, text: string): Promise<void> {
  const client = new Client({ connectionString: url });
  await client.connect();
  try {
    await client.query(text);
  } finally {
    await client.end();
  }
}
