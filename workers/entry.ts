/** Main of a worker process: one job at a time, told over the channel to the parent. It ends when the parent does. */
import { EngineError } from './engine/types';
import { performJob } from './jobs/handlers';
import { createHelpers } from './jobs/helpers';
import { JobCancelled, JobFailed } from './protocol';
import type { FromWorker, ToWorker, WorkerJob } from './protocol';
import { RecordingCache } from './recordings/cache';
import { openStore } from './store/open';
import { StoreFailed, StoreKeyMissing, type Store } from './store/types';

let store: Store | null = null;
let recordings: RecordingCache | null = null;
let current: { id: number; abort: AbortController } | null = null;

const tell = (message: FromWorker) => {
  if (process.connected) process.send?.(message, undefined, undefined, () => undefined);
};

async function work(id: number, job: WorkerJob): Promise<void> {
  if (!store || !recordings) throw new Error('A job came before the store was named.');
  const abort = new AbortController();
  current = { id, abort };
  tell({ type: 'begun', id });
  const helpers = createHelpers(store, recordings, abort.signal, (event) =>
    tell({ type: 'event', id, event }),
  );
  try {
    tell({ type: 'result', id, result: await performJob(job, helpers) });
  } catch (error) {
    tell(answerTo(error, id));
  } finally {
    current = null;
  }
}

function answerTo(error: unknown, id: number): FromWorker {
  if (error instanceof JobCancelled) return { type: 'cancelled', id };
  if (error instanceof JobFailed || error instanceof EngineError || error instanceof StoreFailed)
    return { type: 'failed', id, code: error.code, message: error.message };
  if (error instanceof StoreKeyMissing) {
    const message = 'A file of this recording or run is no longer in the store.';
    return { type: 'failed', id, code: 'missing-file', message };
  }
  console.error(error);
  const message = 'Something went wrong in the computing process; the server’s log has the details.';
  return { type: 'failed', id, code: 'internal', message };
}

process.on('message', (message: ToWorker) => {
  if (message.type === 'init') {
    store = openStore(message.store);
    recordings = new RecordingCache(store, message.cacheBytes);
    tell({ type: 'ready' });
  } else if (message.type === 'job') {
    void work(message.id, message.job);
  } else if (message.id === current?.id) {
    current.abort.abort();
  }
});
process.on('disconnect', () => process.exit(0));
// Ctrl-C reaches the whole terminal group: the parent decides when its children end.
process.on('SIGINT', () => undefined);
process.title = 'driftwright worker';
