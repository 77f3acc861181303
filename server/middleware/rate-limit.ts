/** Slows down guessing: counted by the caller's address and the e-mail it tries. */
import type { RequestHandler } from 'express';
import { ipKeyGenerator, rateLimit } from 'express-rate-limit';
import { tooMany } from '../errors';

const WINDOW_MS = 15 * 60_000;
/** One address may try this many times more over all e-mails. */
const ADDRESS_FACTOR = 20;

/** Two limits: per address and e-mail, and per address alone. Successes do not count. */
export function limitAttempts(attempts: number): RequestHandler[] {
  const limit = (most: number, key: (address: string, email: string) => string) =>
    rateLimit({
      windowMs: WINDOW_MS,
      limit: most,
      standardHeaders: 'draft-8',
      legacyHeaders: false,
      skipSuccessfulRequests: true,
      requestWasSuccessful: (_req, res) => res.statusCode < 400 && res.statusCode !== 202,
      keyGenerator: (req) => key(ipKeyGenerator(req.ip ?? ''), emailOf(req.body)),
      handler: (_req, _res, next) => {
        const detail = 'Too many attempts for this e-mail address. Wait 15 minutes, or reset the password.';
        next(tooMany(detail, { retryAfterS: WINDOW_MS / 1000 }));
      },
    });
  return [
    limit(attempts * ADDRESS_FACTOR, (address) => address),
    limit(attempts, (address, email) => `${address} ${email}`),
  ];
}

function emailOf(body: unknown): string {
  if (typeof body !== 'object' || body === null || !('email' in body)) return '';
  return String(body.email).trim().toLowerCase().slice(0, 254);
}
