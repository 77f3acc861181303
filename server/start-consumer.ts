/** The server's code without its HTTP side: takes jobs off the queue, with worker processes of its own. */
import type { Config } from './config';
import type { JobContext } from './context';
import { Closers, openCommon, openLog, requireWorkerBundle } from './opening';
import { jobHandlers } from './queue/handlers';
import { keepRecovering, recover, takeUpJobs } from './services/recovery';

export interface RunningConsumer {
  ctx: JobContext;
  stop(): Promise<void>;
}

/** Opens everything and answers when jobs are taken. Throws ConfigError for what the operator can mend. */
export async function startConsumer(config: Config): Promise<RunningConsumer> {
  const closers = new Closers();
  try {
    return await open(config, closers);
  } catch (error) {
    await closers.closeAll();
    throw error;
  }
}

async function open(config: Config, closers: Closers): Promise<RunningConsumer> {
  requireWorkerBundle(config);
  const log = openLog(config);
  const opened = await openCommon(config, log, closers, true);
  const stopping = new AbortController();
  const ctx: JobContext = {
    ...opened,
    live: { recordingChanged: (message) => opened.relay.tell({ type: 'recording-changed', ...message }) },
    stopping: stopping.signal,
  };
  closers.add(async () => {
    stopping.abort();
    await ctx.activeJobs.cancelAll();
  });
  await recover(ctx, takeUpJobs);
  await ctx.queue.consume(jobHandlers(ctx), config.workers);
  void keepRecovering(ctx, takeUpJobs);
  log.info({ instance: ctx.instance.id }, 'taking jobs');
  let stopped: Promise<void> | undefined;
  return { ctx, stop: () => (stopped ??= closers.closeAll()) };
}
