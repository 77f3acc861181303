/** Who calls, and in which workspace: a person by their session's cookie, or a program by its token. */
import type { Request } from 'express';
import { WORKSPACE_HEADER } from '@/shared/contracts/common';
import { can, type Permission, ROLE_SUMMARY, scopesCan } from '@/shared/contracts/roles';
import type { Actor, Context, Person } from '../context';
import { forbidden, notFound, notSignedIn, outOfScope, workspaceRequired } from '../errors';
import { loadPerson } from '../services/accounts';
import { actorOfToken } from '../services/api-tokens';
import { renewSession } from './session';

/** The person behind the session cookie. Throws 401 when there is none, or the session has ended. */
export async function authenticate(ctx: Context, req: Request): Promise<Person> {
  const userId = req.session.userId;
  const person = userId ? await loadPerson(ctx, userId, req.ip ?? null) : null;
  if (!person)
    throw notSignedIn('Sign in first. If you were signed in, your session has ended: sign in again.');
  renewSession(req, ctx.clock());
  return person;
}

/** The token of a request that carries one; its cookie, if it has any, then counts for nothing. */
export function bearerToken(req: Request): string | null {
  const [scheme, token] = (req.get('Authorization') ?? '').split(' ');
  return scheme?.toLowerCase() === 'bearer' ? (token ?? '') : null;
}

/** The token as an actor of its workspace. Throws 401 for one that opens nothing, 404 where another workspace is named. */
export async function authenticateToken(ctx: Context, req: Request, token: string): Promise<Actor> {
  const actor = await actorOfToken(ctx, token, req.ip ?? null);
  const named = namedWorkspace(req);
  if (named && named !== actor.workspaceId) {
    throw notFound(
      `The token belongs to another workspace than ${WORKSPACE_HEADER} names; it may be left out.`,
    );
  }
  return actor;
}

/** Puts the person into the workspace that the request names. Somebody else's is answered as one that does not exist. */
export function inWorkspace(person: Person, req: Request): Actor {
  const named = namedWorkspace(req);
  if (!named && person.memberships.length !== 1) throw workspaceRequired(whichWorkspace(person));
  const membership = named
    ? person.memberships.find((candidate) => candidate.workspaceId === named)
    : person.memberships[0];
  if (!membership) {
    throw notFound(
      `The workspace that ${WORKSPACE_HEADER} names does not exist, or you are not a member of it. GET /me lists yours.`,
    );
  }
  return { ...person, ...membership };
}

const namedWorkspace = (req: Request) => req.get(WORKSPACE_HEADER)?.trim() ?? linkedWorkspace(req);

/** A link that a browser follows (a download) cannot carry the header: it names the workspace in its query. */
function linkedWorkspace(req: Request): string | undefined {
  const { workspace } = req.query;
  return req.method === 'GET' && typeof workspace === 'string' ? workspace : undefined;
}

/** Throws 403 unless the actor's role, or the token's scopes, grant `permission`. */
export function authorise(actor: Actor, permission: Permission): void {
  const { token } = actor;
  if (token) {
    if (scopesCan(token.scopes, permission)) return;
    const scopes = token.scopes.join(', ');
    throw outOfScope(
      `This needs ${permission}; the token “${token.name}” has ${scopes}. An admin can make another.`,
    );
  }
  if (can(actor.role, permission)) return;
  const role = actor.role;
  throw forbidden(
    `As ${role} of “${actor.workspaceName}” you may not do this. What the role does: ${ROLE_SUMMARY[role]} An admin of the workspace can change it.`,
  );
}

const whichWorkspace = (person: Person) =>
  person.memberships.length === 0
    ? 'You belong to no workspace any more. Ask an admin of your team for an invitation.'
    : `You belong to ${person.memberships.length} workspaces: name one by the header ${WORKSPACE_HEADER}. GET /me lists them.`;
