/** The chain that every route runs through: authenticate → authorise → validate → handle → answer. */
import type { Request, RequestHandler } from 'express';
import type { Actor, Context, Person } from '../context';
import { outOfScope, unsupportedMedia } from '../errors';
import {
  authenticate,
  authenticateToken,
  authorise,
  bearerToken,
  inWorkspace,
} from '../middleware/authenticate';
import { validate } from '../middleware/validate';
import { type Route, SENT } from './route';

export function handlersOf(ctx: Context, route: Route): RequestHandler[] {
  const handle: RequestHandler = async (req, res) => {
    const who = await identify(ctx, route, req);
    const { params, query, body } = route;
    if (body && req.body === undefined && hasBody(req)) {
      throw unsupportedMedia('Send the body as JSON, with Content-Type: application/json.');
    }
    const call = {
      ctx,
      params: params ? validate(params, req.params, 'address') : undefined,
      query: query ? validate(query, ownQuery(req), 'query') : undefined,
      body: body ? validate(body, req.body, 'body') : undefined,
      req,
      res,
    };
    const answer = await route.run(call, who);
    if (answer === SENT) return;
    if (answer === undefined) res.status(204).end();
    else res.status(route.success.status).json(answer);
  };
  return [...(route.before?.(ctx) ?? []), handle];
}

async function identify(
  ctx: Context,
  route: Route,
  req: Request,
): Promise<{ person: Person | null; actor: Actor | null }> {
  const { access } = route;
  if (access === 'public') return { person: null, actor: null };
  const token = bearerToken(req);
  if (token !== null) {
    const actor = await authenticateToken(ctx, req, token);
    if (access === 'signed-in') throw outOfScope('This is for people who sign in; a token is nobody.');
    authorise(actor, access);
    return { person: actor, actor };
  }
  const person = await authenticate(ctx, req);
  if (access === 'signed-in') return { person, actor: null };
  const actor = inWorkspace(person, req);
  authorise(actor, access);
  return { person, actor };
}

/** `workspace` stands in for the header where a browser follows a link; it is no field of the route's own. */
function ownQuery(req: Request): Record<string, unknown> {
  const own: Record<string, unknown> = { ...req.query };
  delete own.workspace;
  return own;
}

const hasBody = (req: Request) =>
  req.get('Transfer-Encoding') !== undefined || Number(req.get('Content-Length') ?? 0) > 0;
