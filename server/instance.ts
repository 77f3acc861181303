/**
 * This server among those that share the database. Rows in hand (a run, an upload, a decoding) carry the id of
 * the server that has them; a lock that the server holds on its own connection tells the others whether it lives.
 * PostgreSQL gives the lock back by itself when the process dies, however it dies.
 */
import { randomUUID } from 'node:crypto';
import { Client } from 'pg';
import type { Logger } from 'pino';

/** First half of the two-part lock key: keeps these locks apart from every other use. */
const LOCK_CLASS = 1_148_347_975;
const RECONNECT_MS = 500;
/** PostgreSQL's channel for notifications. */
export const CHANNEL = 'driftwright';

export interface Instance {
  readonly id: string;
  /** Which of `ids` belong to a server that no longer lives. */
  deadAmong(ids: readonly string[]): Promise<string[]>;
  stop(): Promise<void>;
}

/**
 * Takes this server's lock, and takes it again whenever the database comes back. On the same connection it listens:
 * `hear` gets what the servers tell one another over the channel.
 */
export async function joinInstances(
  url: string,
  log: Logger,
  hear: (text: string) => void,
): Promise<Instance> {
  const id = randomUUID();
  let client: Client | null = null;
  let stopped = false;

  const hold = async () => {
    const next = new Client({ connectionString: url, connectionTimeoutMillis: 5_000, keepAlive: true });
    next.on('error', () => undefined); // 'end' follows and reconnects
    next.once('end', () => {
      if (client === next) client = null;
      if (!stopped) setTimeout(() => void holdAgain(), RECONNECT_MS).unref();
    });
    next.on('notification', ({ payload }) => hear(payload ?? ''));
    await next.connect();
    await next.query(`LISTEN ${CHANNEL}`);
    await next.query('SELECT pg_advisory_lock($1, hashtext($2))', [LOCK_CLASS, id]);
    client = next;
  };
  const holdAgain = async () => {
    if (stopped || client) return;
    try {
      await hold();
      log.info('the database is back; this server holds its lock again');
    } catch {
      if (!stopped) setTimeout(() => void holdAgain(), RECONNECT_MS).unref();
    }
  };

  await hold();
  return {
    id,
    deadAmong: (ids) => findDead(url, ids.filter((other) => other !== id)), // prettier-ignore
    async stop() {
      stopped = true;
      await client?.end().catch(() => undefined);
    },
  };
}

/** On a connection of its own: a lock that can be had belongs to nobody alive. */
async function findDead(url: string, ids: readonly string[]): Promise<string[]> {
  if (ids.length === 0) return [];
  const probe = new Client({ connectionString: url, connectionTimeoutMillis: 5_000 });
  probe.on('error', () => undefined);
  await probe.connect();
  try {
    const dead: string[] = [];
    for (const id of ids) {
      const sql = 'SELECT pg_try_advisory_lock($1, hashtext($2)) AS free';
      const { rows } = await probe.query<{ free: boolean }>(sql, [LOCK_CLASS, id]);
      if (rows[0]?.free) dead.push(id);
    }
    return dead;
  } finally {
    await probe.end().catch(() => undefined);
  }
}
