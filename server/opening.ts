/** What every process of ours opens, with or without an HTTP side: files, worker processes, database, queue. */
import fs from 'node:fs';
import { type Logger, pino } from 'pino';
import { checkStore, createPool, openStore, StoreFailed, sweepStore } from '@/workers';
import { type Config, ConfigError } from './config';
import type { JobContext } from './context';
import { joinInstances } from './instance';
import { migrate } from './migrations';
import { openDatabase } from './models';
import { openQueue } from './queue/queue';
import { Relay } from './realtime/relay';
import { ActiveJobs } from './services/active-jobs';

/** How long jobs in hand and open connections may take to end, ms. */
export const GRACE_MS = 4_000;

/** What is to be closed, in the order of opening; run in the opposite order. */
export class Closers {
  private readonly closers: (() => Promise<unknown>)[] = [];

  add(close: () => Promise<unknown>): void {
    this.closers.push(close);
  }

  async closeAll(): Promise<void> {
    for (const close of this.closers.splice(0).reverse()) await close();
  }
}

/** All but what only an HTTP side has. */
export type Opened = Omit<JobContext, 'live' | 'stopping'>;

export const openLog = (config: Config): Logger =>
  pino({ level: config.logLevel, base: null, timestamp: pino.stdTimeFunctions.isoTime });

/** Throws ConfigError where the bundle of the worker processes is missing. */
export function requireWorkerBundle({ workerEntry }: Config): void {
  if (fs.existsSync(workerEntry)) return;
  throw new ConfigError(`The worker bundle ${workerEntry} is missing: npm run build makes it.`);
}

/** `bulkOnly`: the worker processes serve nobody who waits at a screen. Throws ConfigError for what the operator can mend. */
export async function openCommon(
  config: Config,
  log: Logger,
  closers: Closers,
  bulkOnly: boolean,
): Promise<Opened> {
  await reachStore(config);
  const store = openStore(config.store);
  const { workers: size, workerEntry: entry } = config;
  const pool = createPool({ size, entry, store: config.store, log, bulkOnly });
  closers.add(() => pool.close());

  await migrate(config.databaseUrl); // while the worker processes warm up
  const db = openDatabase(config.databaseUrl, log);
  closers.add(() => db.close());
  const relay = new Relay(log);
  const instance = await joinInstances(config.databaseUrl, log, (text) => relay.hear(text));
  relay.join(instance.id, db.sequelize);
  closers.add(() => instance.stop());
  const queue = await openQueue(config.databaseUrl, db.sequelize, log);
  closers.add(() => queue.stop(GRACE_MS));
  const activeJobs = new ActiveJobs();
  relay.on((message) => {
    if (message.type !== 'stop-decoding') return;
    void activeJobs.cancel(message.recordingId, message.before ?? Infinity);
  });
  return {
    log, db, store, pool, queue, instance, relay, activeJobs,
    sweepStore: () => sweepStore(config.store),
    clock: () => new Date(),
  }; // prettier-ignore
}

async function reachStore(config: Config): Promise<void> {
  try {
    await checkStore(config.store);
  } catch (error) {
    throw error instanceof StoreFailed ? new ConfigError(error.message) : error;
  }
}
