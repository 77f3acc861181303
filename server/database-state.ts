/** Telling “the database is away” from every other failure, and waiting until it is back. */
import { ConnectionError, DatabaseError } from 'sequelize';
import type { Logger } from 'pino';
import { codeOf, messageOf } from './error-details';

/** SQLSTATE classes 08 (connection) and 57P (operator intervention), 53300 (too many connections). */
const AWAY_STATES = /^(08|57P0[123]|53300)/;
const AWAY_SYSTEM = /^(ECONNREFUSED|ECONNRESET|EPIPE|ETIMEDOUT|ENOTFOUND|EAI_AGAIN)$/;
const AWAY_TEXT =
  /Connection terminated|connection timeout|ConnectionManager .* closed|Client has encountered a connection error|timeout exceeded when trying to connect|Client was closed/i;

const FIRST_WAIT_MS = 100;

/** Whether `error` means that the database could not be reached, rather than that it refused. */
export function isDatabaseAway(error: unknown): boolean {
  if (error instanceof ConnectionError) return true;
  const source = error instanceof DatabaseError ? error.original : error;
  const code = codeOf(source);
  if (code && (AWAY_STATES.test(code) || AWAY_SYSTEM.test(code))) return true;
  return AWAY_TEXT.test(messageOf(source));
}

/** Repeats `work` until the database lets it through; any other failure is thrown at once. */
export async function persist<T>(
  work: () => Promise<T>,
  options: { log: Logger; stopping: AbortSignal },
): Promise<T> {
  for (let waitMs = FIRST_WAIT_MS; ; waitMs = Math.min(waitMs * 2, 2_000)) {
    try {
      return await work();
    } catch (error) {
      if (!isDatabaseAway(error) || options.stopping.aborted) throw error;
      if (waitMs === FIRST_WAIT_MS)
        options.log.warn({ err: error }, 'the database is away; what is to be written waits');
      await pause(waitMs, options.stopping);
    }
  }
}

/** Resolves after `ms`, or as soon as `signal` aborts. */
export function pause(ms: number, signal: AbortSignal): Promise<void> {
  return new Promise((resolve) => {
    const done = () => {
      clearTimeout(timer);
      signal.removeEventListener('abort', done);
      resolve();
    };
    const timer = setTimeout(done, ms);
    signal.addEventListener('abort', done);
  });
}
