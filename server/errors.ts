/**
 * Failures that a caller can do something about, each with its identity. One middleware (middleware/problems.ts)
 * answers them as application/problem+json (RFC 9457); anything else is logged and answered as a bare 500.
 */
import type { FieldError } from '@/shared/contracts/common';

export class ProblemError extends Error {
  constructor(
    readonly status: number,
    /** Last part of the stable type `urn:driftwright:problem:…`. */
    readonly code: string,
    readonly title: string,
    detail: string,
    readonly extra: { errors?: FieldError[]; retryAfterS?: number } = {},
  ) {
    super(detail);
    this.name = 'ProblemError';
  }
}

const problem =
  (status: number, code: string, title: string) => (detail: string, extra?: ProblemError['extra']) =>
    new ProblemError(status, code, title, detail, extra);

export const badRequest = problem(400, 'bad-request', 'The request cannot be read');
export const workspaceRequired = problem(400, 'workspace-required', 'The workspace is not named');
export const notSignedIn = problem(401, 'not-signed-in', 'Not signed in');
export const badToken = problem(401, 'bad-token', 'The token is not valid');
export const wrongCredentials = problem(401, 'wrong-credentials', 'Sign-in failed');
export const forbidden = problem(403, 'forbidden', 'Your role does not allow this');
export const outOfScope = problem(403, 'out-of-scope', 'The token’s scopes do not allow this');
export const ownWork = problem(403, 'own-work', 'Not for its own author');
export const crossSite = problem(403, 'cross-site', 'The request came from another site');
export const notFound = problem(404, 'not-found', 'Not found');
export const conflict = problem(409, 'conflict', 'Not possible as things stand');
export const inUse = problem(409, 'in-use', 'Still in use');
export const tooLarge = problem(413, 'too-large', 'Too large');
export const unsupportedMedia = problem(415, 'unsupported-media', 'This kind of body is not understood');
export const invalid = problem(422, 'invalid', 'Some of what was sent is not valid');
export const tooMany = problem(429, 'too-many-attempts', 'Too many attempts');
export const unavailable = problem(503, 'unavailable', 'Not available just now');
export const noSpace = problem(507, 'no-space', 'Not enough space');

/** `What` of this id, in this workspace: somebody else's is answered the same, so that nothing leaks. */
export const noSuch = (what: string) =>
  notFound(`There is no such ${what} in this workspace. It may have been deleted; go back to the list.`);
