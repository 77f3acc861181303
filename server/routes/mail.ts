/** Letters: what the local sink holds, and what has not left yet. */
import { letterRetrySchema, queuedLetterSchema, sinkMessageSchema } from '@/shared/contracts/accounts';
import { pageOf, pageQuerySchema } from '@/shared/contracts/common';
import { presentQueuedLetter, presentSinkMessage } from '../presenters/accounts';
import { presentPage } from '../presenters/page';
import { listQueuedMail, retryMail } from '../services/mail-queue';
import { listSinkMail } from '../services/sink-mail';
import { type Route, workspaceRoute } from './route';

const tag = 'Team';

export const mailRoutes: Route[] = [
  workspaceRoute({
    method: 'get',
    path: '/mail',
    tag,
    summary: 'Letters that the local mail sink holds for people of the workspace',
    permission: 'mail:read',
    query: pageQuerySchema,
    success: {
      status: 200,
      description: 'Newest first',
      schema: pageOf(sinkMessageSchema),
      name: 'SinkMessagePage',
    },
    failures: { 404: 'A mail server is configured: there is no sink' },
    handle: async ({ ctx, actor, query }) =>
      presentPage(await listSinkMail(ctx, actor, query), presentSinkMessage),
  }),
  workspaceRoute({
    method: 'get',
    path: '/mail/queue',
    tag,
    summary: 'Letters of the workspace that wait to be sent, or could not be sent',
    permission: 'mail:read',
    query: pageQuerySchema,
    success: {
      status: 200,
      description: 'Newest first',
      schema: pageOf(queuedLetterSchema),
      name: 'QueuedLetterPage',
    },
    handle: async ({ ctx, actor, query }) =>
      presentPage(await listQueuedMail(ctx, actor, query), presentQueuedLetter),
  }),
  workspaceRoute({
    method: 'post',
    path: '/mail/queue/retry',
    tag,
    summary: 'Try a letter again at once, or all that have not left',
    permission: 'mail:read',
    body: letterRetrySchema,
    success: { status: 204, description: 'They are tried now; look at the queue for what came of it' },
    handle: ({ ctx, actor, body }) => retryMail(ctx, actor, body.id ?? null),
  }),
];
