/** Start and stop as one object: what is opened here, in order, is closed here in the opposite order. */
import http from 'node:http';
import type { AddressInfo } from 'node:net';
import fs from 'node:fs';
import path from 'node:path';
import { pino } from 'pino';
import { createPool, openStore, type StoreConfig } from '@/workers';
import { createApp } from './app';
import { type Config, ConfigError } from './config';
import type { Context } from './context';
import { joinInstances } from './instance';
import { startMailer } from './mail/mailer';
import { startMailSink } from './mail/sink';
import { openSessions } from './middleware/session';
import { migrate } from './migrations';
import { openDatabase } from './models';
import { openQueue } from './queue/queue';
import { createLive } from './realtime/live';
import { seedDemo } from './seed/demo';
import { ActiveJobs } from './services/active-jobs';
import { ActiveRuns } from './services/active-runs';
import { decode } from './services/decoding';
import { keepRecovering, recover } from './services/recovery';
import { sweepUploads } from './services/upload-folder';
import { answerStarting } from './starting';

/** How long jobs in hand and open connections may take to end, ms. */
const GRACE_MS = 4_000;
/** A person thinks for longer than Node's five seconds between two clicks. */
const KEEP_ALIVE_MS = 65_000;

export interface RunningServer {
  /** Where it listens. */
  url: string;
  ctx: Context;
  stop(): Promise<void>;
}

/** Opens everything, serves, and answers when requests are taken. Throws ConfigError for what the operator can mend. */
export async function startServer(config: Config): Promise<RunningServer> {
  const closers: (() => Promise<unknown>)[] = [];
  const closeAll = async () => {
    for (const close of closers.splice(0).reverse()) await close();
  };
  try {
    return await open(config, closers, closeAll);
  } catch (error) {
    await closeAll();
    throw error;
  }
}

async function open(
  config: Config,
  closers: (() => Promise<unknown>)[],
  closeAll: () => Promise<void>,
): Promise<RunningServer> {
  if (!fs.existsSync(config.workerEntry)) {
    throw new ConfigError(`The worker bundle ${config.workerEntry} is missing: npm run build makes it.`);
  }
  const log = pino({ level: config.logLevel, base: null, timestamp: pino.stdTimeFunctions.isoTime });
  const clock = () => new Date();
  const server = http.createServer({ keepAliveTimeout: KEEP_ALIVE_MS }, answerStarting);
  await listen(server, config); // first, so that a busy port is told before anything else is touched
  closers.push(async () => void server.close());

  const storeConfig: StoreConfig = { kind: 'folder', root: path.join(config.dataDir, 'store') };
  const store = openStore(storeConfig);
  const pool = createPool({ size: config.workers, entry: config.workerEntry, store: storeConfig, log });
  closers.push(() => pool.close());

  await migrate(config.databaseUrl); // while the worker processes warm up
  const db = openDatabase(config.databaseUrl, log);
  closers.push(() => db.close());
  const instance = await joinInstances(config.databaseUrl, log);
  closers.push(() => instance.stop());
  const queue = await openQueue(config.databaseUrl, db.sequelize, log);
  closers.push(() => queue.stop(GRACE_MS));
  const sink = config.smtpUrl ? null : await startMailSink(db, log);
  if (sink) closers.push(() => sink.stop());
  const smtpUrl = config.smtpUrl ?? sink!.url;
  const mail = startMailer({ db, smtpUrl, from: config.mailFrom, log, clock });
  closers.push(() => mail.stop());
  const sessions = openSessions(config, log);
  closers.push(() => sessions.close());
  closers.push(() => closeHttp(server));
  const live = createLive();
  closers.push(() => live.close());

  const stopping = new AbortController();
  const activeRuns = new ActiveRuns();
  const activeJobs = new ActiveJobs();
  const ctx: Context = {
    config, log, db, store, pool, queue, mail, live, instance, activeRuns, activeJobs, clock,
    stopping: stopping.signal,
  }; // prettier-ignore
  closers.push(async () => {
    server.close();
    stopping.abort();
    await activeJobs.cancelAll();
    for (const run of activeRuns.all()) run.cancel();
    await Promise.all(activeRuns.all().map((run) => run.ended));
    activeRuns.clear();
  });

  await sweepUploads(config.dataDir);
  await recover(ctx);
  const consumers = Math.max(1, config.workers - 1);
  await queue.consume({ decode: (payload, lastAttempt) => decode(ctx, payload, lastAttempt) }, consumers);
  if (config.demo) await seedDemo(ctx);
  void keepRecovering(ctx);
  server.off('request', answerStarting);
  server.on('request', createApp(ctx, sessions));
  live.attach(server, ctx, sessions); // after the application: it takes its own requests out of those before it
  const { port } = server.address() as AddressInfo;
  const url = `http://${config.host.includes(':') ? `[${config.host}]` : config.host}:${port}`;
  log.info({ url, instance: instance.id }, 'listening');
  let stopped: Promise<void> | undefined;
  return { url, ctx, stop: () => (stopped ??= closeAll()) };
}

function listen(server: http.Server, { port, host }: Config): Promise<void> {
  return new Promise((resolve, reject) => {
    server.once('error', (error: NodeJS.ErrnoException) => {
      const words: Record<string, string> = {
        EADDRINUSE: `Port ${port} of ${host} is taken by another program: free it, or choose another by PORT.`,
        EACCES: `Port ${port} of ${host} may not be used by this account: choose another by PORT.`,
      };
      const message = words[error.code ?? ''];
      reject(message ? new ConfigError(message) : error);
    });
    server.listen(port, host, resolve);
  });
}

/** Lets the open requests end, and cuts what is left after a while. */
function closeHttp(server: http.Server): Promise<void> {
  return new Promise((resolve) => {
    const cut = setTimeout(() => server.closeAllConnections(), GRACE_MS);
    server.close(() => {
      clearTimeout(cut);
      resolve();
    });
    server.closeIdleConnections();
  });
}
