/** Who may call which route: the published table (server/routes/access-table.ts), held against every route that there is. */
import { randomUUID } from 'node:crypto';
import { type Role, roleSchema, type TokenScope, tokenScopeSchema } from '@/shared/contracts/roles';
import type { TokenCreated } from '@/shared/contracts/tokens';
import { ACCESS_TABLE } from '@/server/routes/access-table';
import type { Method } from '@/server/routes/route';
import { ROUTES } from '@/server/routes';
import { type Answer, type Api, type Caller, startApi } from '../support/api';
import { buildMember } from '../support/api-factories';

const ROLES = roleSchema.options;
const SCOPES = tokenScopeSchema.options;

describe('access', () => {
  let api: Api;
  const members = {} as Record<Role, Caller>;
  const tokens = {} as Record<TokenScope, string>;
  let outsider: Caller;
  let revoked: string;
  beforeAll(async () => {
    api = await startApi();
    const admin = await buildMember(api, 'admin');
    for (const role of ROLES) members[role] = await buildMember(api, role, admin.workspaceId);
    const make = async (name: string, scopes: readonly TokenScope[]) =>
      (await admin.post('/tokens', { name, scopes })).body as TokenCreated;
    for (const scope of SCOPES) tokens[scope] = (await make(scope, [scope])).token;
    const void_ = await make('void', SCOPES);
    revoked = void_.token;
    await admin.delete(`/tokens/${void_.id}`);
    outsider = await buildMember(api, 'admin');
    outsider.workspaceId = admin.workspaceId;
  });
  afterAll(() => api.stop());

  it('is settled for every route, and for no other', () => {
    const routes = ROUTES.map(({ method, path }) => `${method} ${path}`);
    expect(routes.sort()).toEqual(Object.keys(ACCESS_TABLE).sort());
  });

  // A route that lets the caller in goes on to look at what was sent (nothing that exists): never 401 or 403.
  const call = (caller: Caller, route: string, headers: Record<string, string> = {}): Promise<Answer> => {
    const [method, path] = route.split(' ') as [Method, string];
    const filled = path
      .replace(':token', 'no-such-token-no-such-token')
      .replace(':n', '1')
      .replace(/:\w+/g, () => randomUUID());
    const body = method === 'get' || method === 'delete' ? undefined : {};
    return caller.send(method.toUpperCase(), filled, body, headers);
  };
  const byToken = (token: string, route: string) =>
    call(api.stranger(), route, { Authorization: `Bearer ${token}` });
  const letIn = ({ status }: Answer) => status !== 401 && status !== 403;

  const all = Object.entries(ACCESS_TABLE);
  const open = all.filter(([, { people }]) => people === 'anybody');
  const guarded = all.filter(([, { people }]) => people !== 'anybody');
  const ofWorkspaces = guarded.filter(([, { people }]) => people !== 'signed-in');

  it.each(open)('%s: open to anybody', async (route) => {
    expect(letIn(await call(api.stranger(), route))).toBe(true);
  });

  it.each(guarded)('%s: refused without a session, and by a token that was revoked', async (route) => {
    expect((await call(api.stranger(), route)).status).toBe(401);
    expect((await byToken(revoked, route)).status).toBe(401);
  });

  it.each(ofWorkspaces)('%s: let in are the roles of the table', async (route, { people }) => {
    const allowed = [];
    for (const role of ROLES) if (letIn(await call(members[role], route))) allowed.push(role);
    expect(allowed).toEqual(people);
  });

  it.each(guarded)('%s: let in are the scopes of the table', async (route, { scopes }) => {
    const allowed = [];
    for (const scope of SCOPES) {
      const answer = await byToken(tokens[scope], route);
      if (letIn(answer)) allowed.push(scope);
      else expect(answer.status).toBe(403);
    }
    expect(allowed).toEqual(scopes);
  });

  it.each(ofWorkspaces)(
    '%s: another workspace’s admin is told that there is no such workspace',
    async (route) => {
      expect((await call(outsider, route)).status).toBe(404);
    },
  );
});
