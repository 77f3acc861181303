/** Start and stop as one object: what is opened here, in order, is closed here in the opposite order. */
import http from 'node:http';
import type { AddressInfo } from 'node:net';
import type { RecordingChanged } from '@/shared/contracts/live';
import { createApp } from './app';
import { type Config, ConfigError } from './config';
import type { Context } from './context';
import { startMailer } from './mail/mailer';
import { startMailSink } from './mail/sink';
import { openSessions } from './middleware/session';
import { Closers, GRACE_MS, openCommon, openLog, requireWorkerBundle } from './opening';
import { jobHandlers } from './queue/handlers';
import { createLive, type Live } from './realtime/live';
import type { Relay } from './realtime/relay';
import { seedDemo } from './seed/demo';
import { ActiveRuns } from './services/active-runs';
import { clearUpAfter, keepRecovering, recover } from './services/recovery';
import { sweepUploads } from './services/upload-folder';
import { answerStarting } from './starting';

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
  const closers = new Closers();
  try {
    return await open(config, closers);
  } catch (error) {
    await closers.closeAll();
    throw error;
  }
}

async function open(config: Config, closers: Closers): Promise<RunningServer> {
  requireWorkerBundle(config);
  const log = openLog(config);
  const server = http.createServer({ keepAliveTimeout: KEEP_ALIVE_MS }, answerStarting);
  await listen(server, config); // first, so that a busy port is told before anything else is touched
  closers.add(async () => void server.close());
  const opened = await openCommon(config, log, closers, false);
  const { db, queue, relay, instance, activeJobs, clock } = opened;
  const sink = config.smtpUrl ? null : await startMailSink(db, log);
  if (sink) closers.add(() => sink.stop());
  const smtpUrl = config.smtpUrl ?? sink!.url;
  const mail = startMailer({ db, smtpUrl, from: config.mailFrom, log, clock });
  closers.add(() => mail.stop());
  const sessions = openSessions(config, log);
  closers.add(() => sessions.close());
  closers.add(() => closeHttp(server));
  const live = createLive();
  closers.add(() => live.close());

  const stopping = new AbortController();
  const activeRuns = new ActiveRuns();
  const ctx: Context = {
    ...opened, config, mail, activeRuns, live: tellingOthers(live, relay), stopping: stopping.signal,
  }; // prettier-ignore
  closers.add(async () => {
    server.close();
    stopping.abort();
    await activeJobs.cancelAll();
    for (const run of activeRuns.all()) run.cancel();
    await Promise.all(activeRuns.all().map((run) => run.ended));
    activeRuns.clear();
  });

  await sweepUploads(config.dataDir);
  await recover(ctx, clearUpAfter);
  const consumers = Math.max(1, config.workers - 1);
  await queue.consume(jobHandlers(ctx), consumers);
  if (config.demo) await seedDemo(ctx);
  void keepRecovering(ctx, clearUpAfter);
  server.off('request', answerStarting);
  server.on('request', createApp(ctx, sessions));
  live.attach(server, ctx, sessions); // after the application: it takes its own requests out of those before it
  const { port } = server.address() as AddressInfo;
  const url = `http://${config.host.includes(':') ? `[${config.host}]` : config.host}:${port}`;
  log.info({ url, instance: instance.id }, 'listening');
  let stopped: Promise<void> | undefined;
  return { url, ctx, stop: () => (stopped ??= closers.closeAll()) };
}

/** What changes here is told to the servers beside, and what changes there to the pages that are connected here. */
function tellingOthers(live: Live, relay: Relay): Live {
  relay.on((message) => {
    if (message.type !== 'recording-changed') return;
    const { workspaceId, recordingId, status, progress } = message;
    live.recordingChanged({ workspaceId, recordingId, status, progress });
  });
  const recordingChanged = (message: RecordingChanged) => {
    live.recordingChanged(message);
    relay.tell({ type: 'recording-changed', ...message });
  };
  return { ...live, recordingChanged };
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
