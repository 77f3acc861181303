/** The four roles and what each may do. The server enforces this table on every route; the client mirrors it. */
import { z } from 'zod';

export const roleSchema = z.enum(['viewer', 'engineer', 'approver', 'admin']);
export type Role = z.infer<typeof roleSchema>;

const READ = [
  'workspace:read',
  'export:read',
  'released-set:read',
  'comment:write',
  'workspace:leave',
] as const;
const ENGINEER = [
  'recording:write',
  'vehicle:write',
  'run:create',
  'set:draft',
  'requirement:write',
] as const;
const APPROVER = ['set:review'] as const;
const ADMIN = [
  'team:manage',
  'token:manage',
  'audit:read',
  'mail:read',
  'recording:delete',
  'workspace:delete',
  'workspace:export',
] as const;

export type Permission =
  (typeof READ)[number] | (typeof ENGINEER)[number] | (typeof APPROVER)[number] | (typeof ADMIN)[number];

const GRANTS: Record<Role, readonly Permission[]> = {
  viewer: READ,
  engineer: [...READ, ...ENGINEER, 'recording:delete'],
  approver: [...READ, ...ENGINEER, ...APPROVER, 'recording:delete'],
  admin: [...READ, ...ENGINEER, ...ADMIN],
};

/** What an API token may be given. A token has no role: only what its scopes grant. */
export const tokenScopeSchema = z.enum([
  'released-set:read',
  'export:read',
  'workspace:read',
  'recording:write',
  'run:create',
]);
export type TokenScope = z.infer<typeof tokenScopeSchema>;

const SCOPE_GRANTS: Record<TokenScope, readonly Permission[]> = {
  'released-set:read': ['released-set:read'],
  'export:read': ['released-set:read', 'export:read'],
  'workspace:read': ['released-set:read', 'export:read', 'workspace:read'],
  'recording:write': ['recording:write'],
  'run:create': ['run:create'],
};

export const SCOPE_SUMMARY: Record<TokenScope, string> = {
  'released-set:read': 'Fetches the released set of a vehicle.',
  'export:read': 'Fetches files: any version, runs, recordings, the released set.',
  'workspace:read': 'Reads everything in the workspace but the team’s own pages.',
  'recording:write': 'Uploads recordings, and renames and maps them.',
  'run:create': 'Starts runs and verifications.',
};

/** Whether a token with `scopes` may do `permission`. */
export const scopesCan = (scopes: readonly TokenScope[], permission: Permission): boolean =>
  scopes.some((scope) => SCOPE_GRANTS[scope].includes(permission));

/** Whether `role` may do `permission`. */
export const can = (role: Role, permission: Permission): boolean => GRANTS[role].includes(permission);
export const permissionsOf = (role: Role): readonly Permission[] => GRANTS[role];

export const ROLE_SUMMARY: Record<Role, string> = {
  viewer: 'Reads recordings, runs, sets and reports.',
  engineer: 'Uploads, tunes and drafts parameter sets.',
  approver: 'Does what an engineer does, and reviews and releases sets that somebody else wrote.',
  admin: 'Manages people, tokens and deletion; uploads, tunes and drafts.',
};
