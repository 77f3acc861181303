/** The PostgreSQL-backed queue of batch work: small, idempotent jobs with retry and expiry. */
import PgBoss from 'pg-boss';
import type { Logger } from 'pino';
import { QueryTypes, type Sequelize, type Transaction } from 'sequelize';
import { z } from 'zod';

/** Every job's payload; a name without a handler does not compile. */
export const JOB_PAYLOADS = {
  decode: z.object({ recordingId: z.uuid(), generation: z.number().int() }),
  verify: z.object({ verificationRunId: z.uuid() }),
};
export type JobName = keyof typeof JOB_PAYLOADS;
export type JobPayload<N extends JobName> = z.infer<(typeof JOB_PAYLOADS)[N]>;
/** `lastAttempt`: there is no further try, so that the job had better say what went wrong. */
export type JobHandlers = { [N in JobName]: (payload: JobPayload<N>, lastAttempt: boolean) => Promise<void> };

const EXPIRE_S = 30 * 60;
const RETRIES = 4;
const POLL_S = 1;
const WARN_EVERY_MS = 30_000;

export interface Queue {
  /** Written within `transaction`: the job exists exactly when the rows written beside it do. */
  send<N extends JobName>(
    name: N,
    payload: JobPayload<N>,
    options: { transaction: Transaction; priority?: number },
  ): Promise<void>;
  /** Starts `concurrency` consumers of each job. */
  consume(handlers: JobHandlers, concurrency: number): Promise<void>;
  isUp(): Promise<boolean>;
  /** Takes no new job; those in hand may finish within `graceMs`, else they are given back. */
  stop(graceMs: number): Promise<void>;
}

/** Connects and brings the queue's own tables up to date. */
export async function openQueue(url: string, sequelize: Sequelize, log: Logger): Promise<Queue> {
  const boss = new PgBoss({ connectionString: url, max: 4, schedule: false, maintenanceIntervalSeconds: 30 });
  boss.on('error', warnSparingly(log));
  await boss.start();
  for (const name of Object.keys(JOB_PAYLOADS)) {
    await boss.createQueue(name, { name, retryLimit: RETRIES, retryDelay: 1, expireInSeconds: EXPIRE_S });
  }
  const consumers = new Map<string, string[]>();
  const wake = (name: string) => consumers.get(name)?.forEach((id) => boss.notifyWorker(id));

  return {
    async send(name, payload, { transaction, priority = 0 }) {
      await boss.send(name, payload, { db: within(sequelize, transaction), priority });
      transaction.afterCommit(() => wake(name));
    },
    async consume(handlers, concurrency) {
      for (const name of Object.keys(handlers) as JobName[]) {
        const ids = [];
        for (let i = 0; i < concurrency; i++) {
          const work = async ([job]: PgBoss.JobWithMetadata[]) => {
            if (job) await handle(handlers, name, job);
          };
          const options = { batchSize: 1, pollingIntervalSeconds: POLL_S, includeMetadata: true } as const;
          ids.push(await boss.work(name, options, work));
        }
        consumers.set(name, ids);
      }
    },
    async isUp() {
      const answer = boss.getDb().executeSql('SELECT 1', []);
      return answer.then(
        () => true,
        () => false,
      );
    },
    async stop(graceMs) {
      await boss.stop({ graceful: true, timeout: graceMs, wait: true });
    },
  };
}

/** Reads the payload by its own schema and hands it to its own handler. */
async function handle<N extends JobName>(
  handlers: JobHandlers,
  name: N,
  { data, retryCount, retryLimit }: PgBoss.JobWithMetadata,
): Promise<void> {
  const payload = JOB_PAYLOADS[name].parse(data) as JobPayload<N>;
  await handlers[name](payload, retryCount >= retryLimit);
}

/** While the database is away every poll fails: one line a while says as much. */
function warnSparingly(log: Logger): (error: Error) => void {
  let last = 0;
  return (error) => {
    if (Date.now() - last < WARN_EVERY_MS) return;
    last = Date.now();
    log.warn({ err: error }, 'queue');
  };
}

/** Lets the queue write through a transaction of ours. */
function within(sequelize: Sequelize, transaction: Transaction): PgBoss.Db {
  return {
    async executeSql(text, values: unknown[]) {
      const bind = values.map((value) => value ?? null);
      const rows = await sequelize.query(text, { bind, transaction, type: QueryTypes.SELECT });
      return { rows };
    },
  };
}
