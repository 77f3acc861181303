/** The workspace as a whole: taking its data away, leaving it, deleting it. */
import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { workspaceDeleteSchema, workspaceLeaveSchema } from '@/shared/contracts/accounts';
import { leaveWorkspace } from '../services/members';
import { deleteWorkspace } from '../services/workspace-deletion';
import { exportWorkspace } from '../services/workspace-export';
import { type Route, SENT, workspaceRoute } from './route';

const tag = 'Team';

export const workspaceRoutes: Route[] = [
  workspaceRoute({
    method: 'get',
    path: '/workspace/export.tar',
    tag,
    summary: 'All data of the workspace: uploads as they came, the rest as JSON',
    permission: 'workspace:export',
    success: { status: 200, description: 'The archive', binary: ['application/x-tar'] },
    handle: async ({ ctx, actor, res }) => {
      const { fileName, content } = await exportWorkspace(ctx, actor);
      res.attachment(fileName);
      res.setHeader('Content-Type', 'application/x-tar');
      await pipeline(Readable.from(content, { objectMode: false }), res);
      return SENT;
    },
  }),
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
