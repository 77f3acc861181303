/** Members and invitations. */
import { z } from 'zod';
import {
  invitationAcceptSchema,
  invitationCreateSchema,
  invitationPreviewSchema,
  invitationSchema,
  memberPatchSchema,
  memberSchema,
  meSchema,
} from '@/shared/contracts/accounts';
import { idSchema, pageOf } from '@/shared/contracts/common';
import type { Context } from '../context';
import { limitAttempts } from '../middleware/rate-limit';
import { presentInvitation, presentMember } from '../presenters/accounts';
import { presentWhole } from '../presenters/page';
import {
  acceptInvitation,
  invite,
  listInvitations,
  previewInvitation,
  withdrawInvitation,
} from '../services/invitations';
import { changeRole, listMembers, removeMember } from '../services/members';
import { signedIn } from './accounts';
import { baseUrl, idParams } from './parts';
import { publicRoute, type Route, workspaceRoute } from './route';

const tag = 'Team';
const userParams = z.object({ userId: idSchema });
const tokenParams = z.object({ token: z.string().min(20).max(200) });
const slowly = (ctx: Context) => limitAttempts(ctx.config.signInAttempts);
const all = <T extends z.ZodType>(item: T) => pageOf(item);

export const teamRoutes: Route[] = [
  workspaceRoute({
    method: 'get',
    path: '/members',
    tag,
    summary: 'Members of the workspace',
    permission: 'workspace:read',
    success: { status: 200, description: 'All members', schema: all(memberSchema), name: 'MemberPage' },
    handle: async ({ ctx, actor }) => presentWhole(await listMembers(ctx, actor), presentMember),
  }),
  workspaceRoute({
    method: 'patch',
    path: '/members/:userId',
    tag,
    summary: 'Change a member’s role',
    permission: 'team:manage',
    params: userParams,
    body: memberPatchSchema,
    success: { status: 200, description: 'The member', schema: memberSchema, name: 'Member' },
    failures: { 409: 'The last admin keeps the role' },
    handle: async ({ ctx, actor, params, body }) =>
      presentMember(await changeRole(ctx, actor, params.userId, body.role)),
  }),
  workspaceRoute({
    method: 'delete',
    path: '/members/:userId',
    tag,
    summary: 'Take a member out of the workspace',
    permission: 'team:manage',
    params: userParams,
    success: { status: 204, description: 'Taken out; what the person made stays' },
    failures: { 409: 'The last admin stays' },
    handle: ({ ctx, actor, params }) => removeMember(ctx, actor, params.userId),
  }),
  workspaceRoute({
    method: 'get',
    path: '/invitations',
    tag,
    summary: 'Open invitations',
    permission: 'team:manage',
    success: {
      status: 200,
      description: 'All open ones',
      schema: all(invitationSchema),
      name: 'InvitationPage',
    },
    handle: async ({ ctx, actor }) => presentWhole(await listInvitations(ctx, actor), presentInvitation),
  }),
  workspaceRoute({
    method: 'post',
    path: '/invitations',
    tag,
    summary: 'Invite somebody by e-mail',
    permission: 'team:manage',
    body: invitationCreateSchema,
    success: {
      status: 201,
      description: 'The letter is on its way',
      schema: invitationSchema,
      name: 'Invitation',
    },
    failures: { 409: 'A member already' },
    handle: async ({ ctx, actor, body, req }) => {
      const invitation = await invite(ctx, actor, body, baseUrl(ctx.config, req));
      return { ...presentInvitation(invitation), invitedBy: actor.name };
    },
  }),
  workspaceRoute({
    method: 'delete',
    path: '/invitations/:id',
    tag,
    summary: 'Withdraw an open invitation',
    permission: 'team:manage',
    params: idParams,
    success: { status: 204, description: 'Withdrawn' },
    handle: ({ ctx, actor, params }) => withdrawInvitation(ctx, actor, params.id),
  }),
  publicRoute({
    method: 'get',
    path: '/invitations/:token',
    tag,
    summary: 'Whose invitation a token is',
    params: tokenParams,
    success: {
      status: 200,
      description: 'The invitation',
      schema: invitationPreviewSchema,
      name: 'InvitationPreview',
    },
    failures: { 404: 'Used, withdrawn or run out' },
    handle: ({ ctx, params }) => previewInvitation(ctx, params.token),
  }),
  publicRoute({
    method: 'post',
    path: '/invitations/:token/accept',
    tag,
    summary: 'Accept an invitation, and sign in',
    params: tokenParams,
    body: invitationAcceptSchema,
    success: { status: 201, description: 'Signed in', schema: meSchema, name: 'Me' },
    failures: {
      401: 'The account’s password is wrong',
      404: 'Used, withdrawn or run out',
      429: 'Too many attempts',
    },
    before: slowly,
    handle: async ({ ctx, params, body, req }) =>
      signedIn(ctx, req, await acceptInvitation(ctx, params.token, body, req.ip ?? null)),
  }),
];
