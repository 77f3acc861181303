/**
 * Keeps other sites from using a person's cookie. SameSite=Lax stops most; this refuses the rest: a state-changing
 * request that a browser marks as another site's, and one with a session cookie but without the header that a
 * cross-site form cannot send. A request with a token is let through: its cookie counts for nothing, and no page of another
 * site can add the token's header without being asked first, which this server never allows.
 */
import type { Request, RequestHandler } from 'express';
import { CSRF_HEADER } from '@/shared/contracts/common';
import type { Config } from '../config';
import { crossSite } from '../errors';
import { bearerToken } from './authenticate';
import { SESSION_COOKIE } from './session';

const SAFE = new Set(['GET', 'HEAD', 'OPTIONS']);

export function refuseCrossSite(config: Config): RequestHandler {
  return (req, _res, next) => {
    if (!SAFE.has(req.method) && bearerToken(req) === null) check(req, config);
    next();
  };
}

function check(req: Request, config: Config): void {
  const site = req.get('Sec-Fetch-Site');
  if (site && site !== 'same-origin' && site !== 'none') throw crossSite(OTHER_SITE);
  const origin = req.get('Origin');
  if (origin && !isOwnOrigin(origin, req, config)) throw crossSite(OTHER_SITE);
  if (hasSessionCookie(req) && !req.get(CSRF_HEADER)) {
    throw crossSite(
      `A request that changes something and comes with a session cookie must carry the header ${CSRF_HEADER} (any value).`,
    );
  }
}

const OTHER_SITE =
  'Changes are accepted from this server’s own pages alone. Open the address of this server itself.';

/** Same host and port as the request was sent to, or the public address. */
export function isOwnOrigin(origin: string, req: { headers: { host?: string } }, config: Config): boolean {
  if (config.publicUrl && origin === new URL(config.publicUrl).origin) return true;
  return URL.canParse(origin) && new URL(origin).host === req.headers.host;
}

const hasSessionCookie = (req: Request) => (req.get('Cookie') ?? '').includes(`${SESSION_COOKIE}=`);
