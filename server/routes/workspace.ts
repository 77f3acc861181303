/** The workspace as a whole: leaving it, deleting it. */
import { workspaceDeleteSchema, workspaceLeaveSchema } from '@/shared/contracts/accounts';
import { leaveWorkspace } from '../services/members';
import { deleteWorkspace } from '../services/workspace-deletion';
import { type Route, workspaceRoute } from './route';

const tag = 'Team';

export const workspaceRoutes: Route[] = [
  workspaceRoute({
    method: 'post',
    path: '/workspace/leave',
    tag,
    summary: 'Leave the workspace; what one made stays, tokens that one made are revoked',
    permission: 'workspace:leave',
    body: workspaceLeaveSchema,
    success: { status: 204, description: 'Left' },
    failures: { 409: 'The last admin stays' },
    handle: ({ ctx, actor }) => leaveWorkspace(ctx, actor),
  }),
  workspaceRoute({
    method: 'post',
    path: '/workspace/delete',
    tag,
    summary: 'Delete the workspace with all its data; its name is typed as a confirmation',
    permission: 'workspace:delete',
    body: workspaceDeleteSchema,
    success: { status: 204, description: 'Deleted' },
    handle: ({ ctx, actor, body }) => deleteWorkspace(ctx, actor, body.name),
  }),
];
