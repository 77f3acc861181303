/** Who may call which route: the whole table, held against every route that there is. */
import { randomUUID } from 'node:crypto';
import type { Role } from '@/shared/contracts/roles';
import type { Method } from '@/server/routes/route';
import { ROUTES } from '@/server/routes';
import { type Api, type Caller, startApi } from '../support/api';
import { buildMember } from '../support/api-factories';

const ROLES: readonly Role[] = ['viewer', 'engineer', 'approver', 'admin'];
const ANYBODY = 'anybody';
const SIGNED_IN = 'signed in';
const ALL = 'viewer, engineer, approver, admin';
const TUNERS = 'engineer, approver, admin';
const ADMINS = 'admin';
const APPROVERS = 'approver';

/** One line a route; a route that is missing here fails the test. */
const TABLE: Record<string, string> = {
  'get /health': ANYBODY,
  'get /openapi.json': ANYBODY,
  'get /installation': ANYBODY,
  'post /installation/first-admin': ANYBODY,
  'post /sessions': ANYBODY,
  'delete /sessions/current': SIGNED_IN,
  'get /me': SIGNED_IN,
  'patch /me/preferences': SIGNED_IN,
  'post /password-resets': ANYBODY,
  'post /password-resets/complete': ANYBODY,
  'get /members': ALL,
  'patch /members/:userId': ADMINS,
  'delete /members/:userId': ADMINS,
  'get /invitations': ADMINS,
  'post /invitations': ADMINS,
  'delete /invitations/:id': ADMINS,
  'get /invitations/:token': ANYBODY,
  'post /invitations/:token/accept': ANYBODY,
  'get /mail': ADMINS,
  'get /audit': ADMINS,
  'get /vehicles': ALL,
  'post /vehicles': TUNERS,
  'get /vehicles/:id': ALL,
  'patch /vehicles/:id': TUNERS,
  'delete /vehicles/:id': TUNERS,
  'get /vehicles/:id/map-templates': ALL,
  'post /vehicles/:id/map-templates': TUNERS,
  'delete /vehicles/:id/map-templates/:templateId': TUNERS,
  'get /recordings': ALL,
  'post /recordings': TUNERS,
  'post /scenarios': TUNERS,
  'get /recordings/:id': ALL,
  'patch /recordings/:id': TUNERS,
  'delete /recordings/:id': TUNERS,
  'put /recordings/:id/channel-map': TUNERS,
  'post /recordings/:id/cancel': TUNERS,
  'post /recordings/:id/map-preview': TUNERS,
  'post /recordings/:id/noise': ALL,
  'post /recordings/:id/remedies': TUNERS,
  'post /recordings/:id/remedies/undo': TUNERS,
  'get /recordings/:id/decoded.arrow': ALL,
  'get /recordings/:id/decoded.csv': ALL,
  'get /recordings/:id/health.json': ALL,
  'get /recordings/:id/series': ALL,
  'get /recordings/:id/baseline-track': ALL,
  'post /runs': TUNERS,
  'get /runs': ALL,
  'get /runs/:id': ALL,
  'post /runs/:id/cancel': TUNERS,
  'get /runs/:id/series': ALL,
  'get /runs/:id/solution.csv': ALL,
  'get /runs/:id/innovations.csv': ALL,
  'get /runs/:id/track.geojson': ALL,
  'get /runs/:id/track.kml': ALL,
  'get /runs/:id/track.gpx': ALL,
  'get /requirements': ALL,
  'post /requirements': TUNERS,
  'get /requirements/:id': ALL,
  'patch /requirements/:id': TUNERS,
  'delete /requirements/:id': TUNERS,
  'get /parameter-sets': ALL,
  'post /parameter-sets': TUNERS,
  'get /parameter-sets/:id': ALL,
  'patch /parameter-sets/:id': TUNERS,
  'post /parameter-sets/:id/versions': TUNERS,
  'get /parameter-sets/:id/versions/:n': ALL,
  'patch /parameter-sets/:id/versions/:n': TUNERS,
  'delete /parameter-sets/:id/versions/:n': TUNERS,
  'post /parameter-sets/:id/versions/:n/revise': TUNERS,
  'post /parameter-sets/:id/versions/:n/submit': TUNERS,
  'post /parameter-sets/:id/versions/:n/return': APPROVERS,
  'post /parameter-sets/:id/versions/:n/release': APPROVERS,
  'get /parameter-sets/:id/versions/:n/verification': ALL,
  'post /parameter-sets/:id/versions/:n/verify': TUNERS,
  'get /parameter-sets/:id/versions/:n/export': ALL,
  'get /vehicles/:id/released-set': ALL,
  'post /parameter-sets/:id/versions/:n/waivers': APPROVERS,
  'get /parameter-sets/:id/versions/:n/differences': ALL,
  'get /parameter-sets/:id/versions/:n/history': ALL,
  'get /parameter-sets/:id/versions/:n/comments': ALL,
  'post /parameter-sets/:id/versions/:n/comments': ALL,
};

describe('access', () => {
  let api: Api;
  const members: Partial<Record<Role, Caller>> = {};
  let outsider: Caller;
  beforeAll(async () => {
    api = await startApi();
    const admin = await buildMember(api, 'admin');
    for (const role of ROLES) members[role] = await buildMember(api, role, admin.workspaceId);
    outsider = await buildMember(api, 'admin');
    outsider.workspaceId = admin.workspaceId;
  });
  afterAll(() => api.stop());

  it('is settled for every route', () => {
    expect(ROUTES.map(({ method, path }) => `${method} ${path}`).sort()).toEqual(Object.keys(TABLE).sort());
  });

  // A route that lets the caller in goes on to look at what was sent (nothing that exists): never 401 or 403.
  const call = (caller: Caller, route: string) => {
    const [method, path] = route.split(' ') as [Method, string];
    const filled = path
      .replace(':token', 'no-such-token-no-such-token')
      .replace(':n', '1')
      .replace(/:\w+/, randomUUID());
    return caller.send(
      method.toUpperCase(),
      filled,
      method === 'get' || method === 'delete' ? undefined : {},
    );
  };
  const lets = async (caller: Caller, route: string) =>
    ![401, 403].includes((await call(caller, route)).status);
  const guarded = Object.entries(TABLE).filter(([, who]) => who !== ANYBODY);

  it.each(guarded)('%s: refused without a session', async (route) => {
    expect((await call(api.stranger(), route)).status).toBe(401);
  });

  it.each(guarded.filter(([, who]) => who !== SIGNED_IN))('%s: for %s', async (route, who) => {
    const allowed = [];
    for (const role of ROLES) {
      const member = members[role];
      if (member && (await lets(member, route))) allowed.push(role);
    }
    expect(allowed.join(', ')).toBe(who);
  });

  it.each(guarded.filter(([, who]) => who !== SIGNED_IN))(
    '%s: another workspace’s admin is told that there is no such workspace',
    async (route) => {
      expect((await call(outsider, route)).status).toBe(404);
    },
  );
});
