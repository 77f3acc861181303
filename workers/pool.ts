/**
 * A small pool of warm worker processes. Interactive jobs go before bulk ones, jobs of one recording prefer the process
 * that holds it in memory, and a newer job of the same key takes the place of the older one, waiting or running.
 */
import { JobCancelled, JobFailed, WorkerCrashed } from './protocol';
import type { FromWorker, JobEvent, JobKind, JobResults, Pool, WorkerJob } from './protocol';
import { sweepStore } from './store/open';
import type { StoreConfig } from './store/types';
import { WorkerProcess, type PoolLog } from './worker-process';

export interface PoolOptions {
  /** Processes. */
  size: number;
  /** The bundled `workers/entry.ts`. */
  entry: string;
  store: StoreConfig;
  log: PoolLog;
  /** Decoded recordings that each process may hold in memory, bytes. */
  cacheBytes?: number;
  /** Nobody waits at a screen for it: no process is kept free of bulk jobs. */
  bulkOnly?: boolean;
}

/** Starts the processes at once, so that the first job finds them warm. */
export const createPool = (options: PoolOptions): WorkerPool => new WorkerPool(options);

type SubmitOptions = NonNullable<Parameters<Pool['submit']>[1]>;
type AnyResult = JobResults[JobKind];

interface Entry {
  id: number;
  job: WorkerJob;
  options: SubmitOptions;
  bulk: boolean;
  resolve: (result: AnyResult) => void;
  reject: (error: Error) => void;
  /** The caller has its answer; the process may still be winding the job up. */
  settled: boolean;
  /** Processes that were given it, and those that have begun on it. */
  sends: number;
  tries: number;
  /** Until then it waits for the process that holds its recording and is just winding up, ms. */
  holdUntil: number;
}

interface Slot {
  worker: WorkerProcess;
  entry: Entry | null;
  /** It has been ready once. */
  wasReady: boolean;
}

const DEFAULT_CACHE_BYTES = 512 * 1024 * 1024;
/** Cancel is heard within about 10 ms; after this the job goes to another process. */
const HOLD_MS = 40;
/** The children of a server that was killed end a moment after it, and so after our first sweep, ms. */
const SECOND_SWEEP_MS = 5000;
/** Processes in a row that end before they are ready, after which the pool stops trying by itself. */
const MAX_FAILED_STARTS = 3;
/** Processes that a job is given to before it is given up: one that ends them at once never says that it has begun. */
const MAX_SENDS = 4;
const BULK_KINDS: ReadonlySet<JobKind> = new Set(['decode', 'scenario', 'verification-run']);

export class WorkerPool implements Pool {
  private readonly slots: Slot[] = [];
  private readonly waiting: Entry[] = [];
  private readonly newestOfKey = new Map<string, Entry>();
  private nextId = 1;
  private failedStarts = 0;
  private closing: Promise<void> | null = null;
  private readonly readyWaiters: (() => void)[] = [];

  constructor(private readonly options: PoolOptions) {
    this.sweep();
    setTimeout(() => this.sweep(), SECOND_SWEEP_MS).unref();
    this.fill();
  }

  get stats() {
    const busy = this.slots.filter((slot) => slot.entry).length;
    return { size: this.options.size, busy, waiting: this.waiting.length };
  }

  /** Process ids of the living children. */
  get pids(): number[] {
    return this.slots.flatMap((slot) => slot.worker.pid ?? []);
  }

  /** Resolves when every process is warm. */
  async ready(): Promise<void> {
    if (!this.isReady()) await new Promise<void>((resolve) => this.readyWaiters.push(resolve));
  }

  submit<J extends WorkerJob>(job: J, options: SubmitOptions = {}) {
    let entry: Entry | undefined;
    const result = new Promise<AnyResult>((resolve, reject) => {
      const bulk = BULK_KINDS.has(job.kind) || (job.kind === 'run' && options.latestKey === undefined);
      entry = {
        id: this.nextId++, job, options, bulk, resolve, reject,
        settled: false, sends: 0, tries: 0, holdUntil: 0,
      }; // prettier-ignore
      this.accept(entry);
    });
    return {
      // The child answers each kind with its own result: JobHandlers (jobs/handlers.ts) holds it to that.
      result: result as Promise<JobResults[J['kind']]>,
      cancel: () => {
        if (entry) this.drop(entry, new JobCancelled(false));
      },
    };
  }

  close(): Promise<void> {
    this.closing ??= this.shutDown();
    return this.closing;
  }

  private async shutDown(): Promise<void> {
    for (const entry of [...this.waiting]) this.drop(entry, new JobCancelled(false));
    for (const { entry } of this.slots) if (entry) this.drop(entry, new JobCancelled(false));
    await Promise.all([...this.slots].map((slot) => slot.worker.end()));
  }

  private accept(entry: Entry): void {
    if (this.closing) return this.settle(entry, new JobCancelled(false));
    const key = entry.options.latestKey;
    if (key !== undefined) {
      const older = this.newestOfKey.get(key);
      if (older) this.drop(older, new JobCancelled(true));
      this.newestOfKey.set(key, entry);
    }
    this.waiting.push(entry);
    if (this.slots.length < this.options.size) {
      this.failedStarts = 0;
      this.fill();
    }
    this.dispatch();
  }

  /** Answers the caller at once; a running job is told to stop and keeps its process until it has. */
  private drop(entry: Entry, reason: JobCancelled): void {
    if (entry.settled) return;
    this.settle(entry, reason);
    const at = this.waiting.indexOf(entry);
    if (at >= 0) this.waiting.splice(at, 1);
    this.slots.find((slot) => slot.entry === entry)?.worker.send({ type: 'cancel', id: entry.id });
  }

  private settle(entry: Entry, outcome: Error | { result: AnyResult }): void {
    if (entry.settled) return;
    entry.settled = true;
    const key = entry.options.latestKey;
    if (key !== undefined && this.newestOfKey.get(key) === entry) this.newestOfKey.delete(key);
    if (outcome instanceof Error) entry.reject(outcome);
    else entry.resolve(outcome.result);
  }

  private isReady(): boolean {
    return (
      this.slots.length === this.options.size && this.slots.every((slot) => slot.worker.state === 'ready')
    );
  }

  private fill(): void {
    while (this.slots.length < this.options.size) {
      const { entry, store, log, cacheBytes = DEFAULT_CACHE_BYTES } = this.options;
      const slot: Slot = {
        entry: null,
        wasReady: false,
        worker: new WorkerProcess(
          { entry, store, log, cacheBytes },
          { message: (message) => this.hear(slot, message), gone: (exit) => this.bury(slot, exit) },
        ),
      };
      this.slots.push(slot);
    }
  }

  private dispatch(): void {
    if (this.closing) return;
    const ordered = [...this.waiting.filter((entry) => !entry.bulk), ...this.waiting.filter((e) => e.bulk)];
    for (const entry of ordered) {
      if (entry.bulk && !this.hasRoomForBulk()) continue;
      const slot = this.slotFor(entry);
      if (slot) this.start(entry, slot);
    }
  }

  /** Where there are several processes, one is always left to the people who wait at a screen. */
  private hasRoomForBulk(): boolean {
    const bulkRunning = this.slots.filter((slot) => slot.entry?.bulk).length;
    const { size, bulkOnly = false } = this.options;
    return bulkRunning < (bulkOnly ? size : Math.max(1, size - 1));
  }

  private slotFor(entry: Entry): Slot | null {
    const free = this.slots.filter((slot) => slot.worker.state === 'ready' && !slot.entry);
    const { affinity } = entry.options;
    if (affinity === undefined) return free[0] ?? null;
    const home = free.find((slot) => slot.worker.serves(affinity));
    if (home) return home;
    const windingUp = this.slots.some((slot) => slot.entry?.settled && slot.worker.serves(affinity));
    if (windingUp && free.length > 0) {
      if (entry.holdUntil === 0) {
        entry.holdUntil = Date.now() + HOLD_MS;
        setTimeout(() => this.dispatch(), HOLD_MS).unref();
      }
      if (Date.now() < entry.holdUntil) return null;
    }
    return free[0] ?? null;
  }

  private start(entry: Entry, slot: Slot): void {
    this.waiting.splice(this.waiting.indexOf(entry), 1);
    slot.entry = entry;
    entry.sends += 1;
    if (entry.options.affinity !== undefined) slot.worker.markServed(entry.options.affinity);
    slot.worker.send({ type: 'job', id: entry.id, job: entry.job });
  }

  private hear(slot: Slot, message: FromWorker): void {
    if (message.type === 'ready') {
      slot.wasReady = true;
      this.failedStarts = 0;
      if (this.isReady()) for (const resolve of this.readyWaiters.splice(0)) resolve();
      return this.dispatch();
    }
    const { entry } = slot;
    if (!entry || entry.id !== message.id) return;
    if (message.type === 'event') return this.report(entry, message.event);
    if (message.type === 'begun') {
      entry.tries += 1;
      return;
    }
    slot.entry = null;
    if (message.type === 'result') this.settle(entry, { result: message.result });
    else if (message.type === 'cancelled') this.settle(entry, new JobCancelled(false));
    else this.settle(entry, new JobFailed(message.code, message.message));
    this.dispatch();
  }

  /** A listener that throws must not take the pool with it. */
  private report(entry: Entry, event: JobEvent): void {
    if (entry.settled) return;
    try {
      entry.options.onEvent?.(event);
    } catch (error) {
      this.options.log.error({ err: error }, 'A listener to a job failed.');
    }
  }

  private bury(slot: Slot, exit: { code: number | null; signal: NodeJS.Signals | null }): void {
    this.slots.splice(this.slots.indexOf(slot), 1);
    const { pid } = slot.worker;
    if (pid !== undefined) this.sweep(pid);
    const { entry } = slot;
    slot.entry = null;
    if (entry && !entry.settled) {
      if (this.mayGoAgain(entry)) this.waiting.unshift(entry);
      else this.settle(entry, new WorkerCrashed(exit.signal));
    }
    if (this.closing) return;
    this.options.log.warn({ workerPid: pid, ...exit }, 'A worker process ended and is replaced.');
    this.replace(slot);
  }

  /** A job that was sent to a process already dead, its end not yet heard of, did not kill that one. */
  private mayGoAgain({ options, tries, sends }: Entry): boolean {
    if (this.closing || sends >= MAX_SENDS) return false;
    return tries === 0 || (options.retryOnCrash === true && tries < 2);
  }

  /** Clears away what processes that died in the middle of a write left in the store; `pid`: that one alone. */
  private sweep(pid?: number): void {
    sweepStore(this.options.store, pid).catch((error: unknown) =>
      this.options.log.warn({ err: error }, 'Temporary files of dead processes could not be removed.'),
    );
  }

  private replace(dead: Slot): void {
    if (!dead.wasReady) this.failedStarts += 1;
    if (this.failedStarts < MAX_FAILED_STARTS) {
      this.fill();
      return this.dispatch();
    }
    this.options.log.error({ entry: this.options.entry }, 'Worker processes end before they are ready.');
    if (this.slots.length > 0) return;
    const reason =
      'The computing processes do not start; the server’s log says why. Tell your administrator.';
    for (const entry of this.waiting.splice(0)) this.settle(entry, new JobFailed('worker-start', reason));
  }
}
