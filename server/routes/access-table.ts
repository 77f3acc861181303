/**
 * Who may call which route: the published table. It says nothing to the server, which goes by each route's permission;
 * tests/api/access.test.ts holds it against every route, in both directions, with every kind of caller.
 */
import type { Role, TokenScope } from '@/shared/contracts/roles';

export interface AccessRow {
  /** 'anybody': also without signing in. 'signed-in': any person, whatever the workspace. Else members in these roles. */
  people: 'anybody' | 'signed-in' | readonly Role[];
  /** Scopes of which a token needs one; none: no token may. */
  scopes: readonly TokenScope[];
}

const MEMBERS = ['viewer', 'engineer', 'approver', 'admin'] as const;
const TUNERS = ['engineer', 'approver', 'admin'] as const;

const ANYBODY: AccessRow = { people: 'anybody', scopes: [] };
const PERSON: AccessRow = { people: 'signed-in', scopes: [] };
const READ: AccessRow = { people: MEMBERS, scopes: ['workspace:read'] };
const FETCH: AccessRow = { people: MEMBERS, scopes: ['export:read', 'workspace:read'] };
const FETCH_RELEASED: AccessRow = {
  people: MEMBERS,
  scopes: ['released-set:read', 'export:read', 'workspace:read'],
};
const MEMBER: AccessRow = { people: MEMBERS, scopes: [] };
const UPLOAD: AccessRow = { people: TUNERS, scopes: ['recording:write'] };
const RUN: AccessRow = { people: TUNERS, scopes: ['run:create'] };
const TUNE: AccessRow = { people: TUNERS, scopes: [] };
const REVIEW: AccessRow = { people: ['approver'], scopes: [] };
const MANAGE: AccessRow = { people: ['admin'], scopes: [] };

/** One line a route: method and path below /api/v1. */
export const ACCESS_TABLE: Readonly<Record<string, AccessRow>> = {
  'get /health': ANYBODY,
  'get /openapi.json': ANYBODY,
  'get /installation': ANYBODY,
  'post /installation/first-admin': ANYBODY,
  'post /sessions': ANYBODY,
  'delete /sessions/current': PERSON,
  'get /me': PERSON,
  'patch /me/preferences': PERSON,
  'post /password-resets': ANYBODY,
  'post /password-resets/complete': ANYBODY,
  'get /sessions': PERSON,
  'delete /sessions': PERSON,
  'delete /sessions/:id': PERSON,
  'get /members': READ,
  'get /workspace/export.tar': MANAGE,
  'post /workspace/leave': MEMBER,
  'post /workspace/delete': MANAGE,
  'patch /members/:userId': MANAGE,
  'delete /members/:userId': MANAGE,
  'get /invitations': MANAGE,
  'post /invitations': MANAGE,
  'delete /invitations/:id': MANAGE,
  'get /invitations/:token': ANYBODY,
  'post /invitations/:token/accept': ANYBODY,
  'get /mail': MANAGE,
  'get /mail/queue': MANAGE,
  'post /mail/queue/retry': MANAGE,
  'get /audit': MANAGE,
  'get /audit.csv': MANAGE,
  'get /tokens': MANAGE,
  'post /tokens': MANAGE,
  'delete /tokens/:id': MANAGE,
  'get /vehicles': READ,
  'post /vehicles': TUNE,
  'get /vehicles/:id': READ,
  'patch /vehicles/:id': TUNE,
  'delete /vehicles/:id': TUNE,
  'get /vehicles/:id/map-templates': READ,
  'post /vehicles/:id/map-templates': TUNE,
  'delete /vehicles/:id/map-templates/:templateId': TUNE,
  'get /recordings': READ,
  'post /recordings': UPLOAD,
  'post /scenarios': UPLOAD,
  'get /recordings/:id': READ,
  'patch /recordings/:id': UPLOAD,
  'delete /recordings/:id': TUNE,
  'put /recordings/:id/channel-map': UPLOAD,
  'post /recordings/:id/cancel': UPLOAD,
  'post /recordings/:id/map-preview': UPLOAD,
  'post /recordings/:id/remedies': UPLOAD,
  'post /recordings/:id/remedies/undo': UPLOAD,
  'get /recordings/:id/series': READ,
  'post /recordings/:id/noise': READ,
  'get /recordings/:id/baseline-track': READ,
  'get /recordings/:id/decoded.arrow': FETCH,
  'get /recordings/:id/decoded.csv': FETCH,
  'get /recordings/:id/health.json': FETCH,
  'post /runs': RUN,
  'get /runs': READ,
  'get /runs/:id': READ,
  'post /runs/:id/cancel': RUN,
  'get /runs/:id/series': READ,
  'get /runs/:id/solution.csv': FETCH,
  'get /runs/:id/innovations.csv': FETCH,
  'get /runs/:id/track.geojson': FETCH,
  'get /runs/:id/track.kml': FETCH,
  'get /runs/:id/track.gpx': FETCH,
  'get /parameter-sets': READ,
  'post /parameter-sets': TUNE,
  'get /parameter-sets/:id': READ,
  'patch /parameter-sets/:id': TUNE,
  'post /parameter-sets/:id/versions': TUNE,
  'get /parameter-sets/:id/versions/:n': READ,
  'patch /parameter-sets/:id/versions/:n': TUNE,
  'delete /parameter-sets/:id/versions/:n': TUNE,
  'post /parameter-sets/:id/versions/:n/revise': TUNE,
  'post /parameter-sets/:id/versions/:n/submit': TUNE,
  'post /parameter-sets/:id/versions/:n/return': REVIEW,
  'post /parameter-sets/:id/versions/:n/release': REVIEW,
  'get /parameter-sets/:id/versions/:n/differences': READ,
  'get /parameter-sets/:id/versions/:n/history': READ,
  'get /parameter-sets/:id/versions/:n/comments': READ,
  'post /parameter-sets/:id/versions/:n/comments': MEMBER,
  'get /requirements': READ,
  'post /requirements': TUNE,
  'get /requirements/:id': READ,
  'patch /requirements/:id': TUNE,
  'delete /requirements/:id': TUNE,
  'get /parameter-sets/:id/versions/:n/verification': READ,
  'post /parameter-sets/:id/versions/:n/verify': RUN,
  'post /parameter-sets/:id/versions/:n/waivers': REVIEW,
  'get /parameter-sets/:id/versions/:n/export': FETCH,
  'get /parameter-sets/:id/versions/:n/report': FETCH,
  'get /parameter-sets/:id/versions/:n/report.pdf': FETCH,
  'get /vehicles/:id/released-set': FETCH_RELEASED,
};
