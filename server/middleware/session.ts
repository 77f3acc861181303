/** Sessions: a signed cookie, the rest in PostgreSQL. */
import connectPgSimple from 'connect-pg-simple';
import type { Request, RequestHandler } from 'express';
import session from 'express-session';
import { Pool } from 'pg';
import type { Logger } from 'pino';
import type { Config } from '../config';

declare module 'express-session' {
  interface SessionData {
    userId: string;
    /** When the cookie was last given its full life, ms since 1970. */
    renewedAt: number;
    /** When it began, and when it was last used (to ten minutes), ms since 1970. Left out by sessions of older versions. */
    startedAt?: number;
    seenAt?: number;
    /** Where from, and with which browser, when it began. */
    address?: string | null;
    userAgent?: string;
  }
}

export const SESSION_COOKIE = 'driftwright.sid';
const LIFE_MS = 7 * 24 * 3_600_000;
const RENEW_AFTER_MS = 24 * 3_600_000;
const SEEN_EVERY_MS = 10 * 60_000;
const LONGEST_USER_AGENT = 300;

export interface Sessions {
  middleware: RequestHandler;
  /** Whose live session `sid` is; null when it has ended. */
  ownerOf(sid: string): Promise<string | null>;
  /** Ends every session of a person, but one. */
  endAllOf(userId: string, exceptSid?: string): Promise<void>;
  close(): Promise<void>;
}

export function openSessions(config: Config, log: Logger): Sessions {
  const pool = new Pool({
    connectionString: config.databaseUrl,
    max: 6,
    connectionTimeoutMillis: 5_000,
    keepAlive: true,
  });
  pool.on('error', (error) => log.warn({ err: error }, 'session store'));
  const Store = connectPgSimple(session);
  const store = new Store({
    pool,
    tableName: 'sessions',
    disableTouch: true,
    pruneSessionInterval: 15 * 60,
    errorLog: (...args: unknown[]) => log.warn({ args }, 'session store'),
  });
  return {
    middleware: session({
      store,
      name: SESSION_COOKIE,
      secret: config.sessionSecret,
      resave: false,
      saveUninitialized: false,
      proxy: config.trustProxy > 0,
      cookie: {
        httpOnly: true,
        sameSite: 'lax',
        secure: config.publicUrl?.startsWith('https:') ?? false,
        maxAge: LIFE_MS,
        path: '/',
      },
    }),
    async ownerOf(sid) {
      const sql = "SELECT sess ->> 'userId' AS owner FROM sessions WHERE sid = $1 AND expire >= now()";
      const { rows } = await pool.query<{ owner: string | null }>(sql, [sid]);
      return rows[0]?.owner ?? null;
    },
    async endAllOf(userId, exceptSid = '') {
      await pool.query("DELETE FROM sessions WHERE sess ->> 'userId' = $1 AND sid <> $2", [
        userId,
        exceptSid,
      ]);
    },
    async close() {
      store.close();
      await pool.end();
    },
  };
}

/** Begins a session for `userId` under a fresh id, so that an id known before sign-in is worth nothing. */
export async function beginSession(req: Request, userId: string, now: Date): Promise<void> {
  await settle((done) => req.session.regenerate(done));
  req.session.userId = userId;
  const at = now.getTime();
  Object.assign(req.session, { renewedAt: at, startedAt: at, seenAt: at, address: req.ip ?? null });
  req.session.userAgent = (req.get('User-Agent') ?? '').slice(0, LONGEST_USER_AGENT);
  await settle((done) => req.session.save(done));
}

export const endSession = (req: Request): Promise<void> => settle((done) => req.session.destroy(done));

/** Gives a session in use its full life again, once a day, and notes now and then that it is used. */
export function renewSession(req: Request, now: Date): void {
  if (now.getTime() - (req.session.seenAt ?? 0) >= SEEN_EVERY_MS) req.session.seenAt = now.getTime();
  const age = now.getTime() - (req.session.renewedAt ?? 0);
  if (age < RENEW_AFTER_MS) return;
  req.session.renewedAt = now.getTime();
  req.session.cookie.maxAge = LIFE_MS;
}

const settle = (start: (done: (error?: unknown) => void) => void): Promise<void> =>
  new Promise((resolve, reject) => start((error) => (error ? reject(error) : resolve())));
