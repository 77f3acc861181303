/** One child process of the pool: started, spoken to, watched until it is gone. */
import { fork, type ChildProcess } from 'node:child_process';
import type { FromWorker, ToWorker } from './protocol';
import type { StoreConfig } from './store/types';

export interface PoolLog {
  info(fields: object, message: string): void;
  warn(fields: object, message: string): void;
  error(fields: object, message: string): void;
}

export interface WorkerProcessOptions {
  /** The bundled `workers/entry.ts`. */
  entry: string;
  store: StoreConfig;
  cacheBytes: number;
  log: PoolLog;
}

export interface WorkerProcessEvents {
  message(message: FromWorker): void;
  /** All its messages have been delivered and the process has ended. */
  gone(exit: { code: number | null; signal: NodeJS.Signals | null }): void;
}

/** How long a child that was told to end may take, ms. */
const END_LIMIT_MS = 2000;

export class WorkerProcess {
  /** 'starting' until the child has said that it is ready. */
  state: 'starting' | 'ready' | 'gone' = 'starting';
  /** Affinities served lately, the newest last: what the child probably still holds in memory. */
  private readonly served: string[] = [];
  private readonly child: ChildProcess;
  private exit: { code: number | null; signal: NodeJS.Signals | null } | null = null;
  private readonly ended: Promise<void>;

  constructor(
    private readonly options: WorkerProcessOptions,
    events: WorkerProcessEvents,
  ) {
    this.child = fork(options.entry, [], {
      execArgv: [],
      serialization: 'advanced',
      stdio: ['ignore', 'pipe', 'pipe', 'ipc'],
    });
    this.child.stdout?.on('data', (text: Buffer) => this.logOutput('info', text));
    this.child.stderr?.on('data', (text: Buffer) => this.logOutput('error', text));
    this.child.on('message', (message) => {
      const known = message as FromWorker;
      if (known.type === 'ready') this.state = 'ready';
      events.message(known);
    });
    this.ended = new Promise((resolve) => {
      // A message may still be under way when the process has exited: it is gone when its channel is closed as well.
      const settle = () => {
        if (this.state === 'gone' || this.exit === null || this.child.connected) return;
        this.state = 'gone';
        resolve();
        events.gone(this.exit);
      };
      this.child.on('error', (error) => {
        options.log.error({ err: error }, 'A worker process could not be started or reached.');
        if (this.child.pid === undefined) this.exit = { code: null, signal: null };
        settle();
      });
      this.child.on('exit', (code, signal) => {
        this.exit = { code, signal };
        settle();
      });
      this.child.on('disconnect', settle);
    });
    this.send({ type: 'init', store: options.store, cacheBytes: options.cacheBytes });
  }

  get pid(): number | undefined {
    return this.child.pid;
  }

  /** A message to a dying child is dropped: its end is reported through `gone`. */
  send(message: ToWorker): void {
    if (this.child.connected) this.child.send(message, () => undefined);
  }

  serves(affinity: string): boolean {
    return this.served.includes(affinity);
  }

  markServed(affinity: string): void {
    const at = this.served.indexOf(affinity);
    if (at >= 0) this.served.splice(at, 1);
    this.served.push(affinity);
    if (this.served.length > 8) this.served.shift();
  }

  /** The child ends by itself when the channel closes; one that does not is killed. */
  async end(): Promise<void> {
    if (this.state === 'gone') return;
    if (this.child.connected) this.child.disconnect();
    const timer = setTimeout(() => this.child.kill('SIGKILL'), END_LIMIT_MS);
    await this.ended;
    clearTimeout(timer);
  }

  private logOutput(level: 'info' | 'error', text: Buffer): void {
    const message = text.toString('utf8').trim().slice(0, 4000);
    if (message) this.options.log[level]({ workerPid: this.child.pid }, message);
  }
}
