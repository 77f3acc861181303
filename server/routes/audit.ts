/** The audit trail: read and taken away as a file by admins, changed by nobody. */
import type { Response } from 'express';
import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { auditEntrySchema, auditFilterSchema, auditQuerySchema } from '@/shared/contracts/accounts';
import { pageOf } from '@/shared/contracts/common';
import { auditCsv } from '../exports/audit-csv';
import { presentAuditEntry } from '../presenters/accounts';
import { presentPage } from '../presenters/page';
import { allAudit, listAudit } from '../services/audit';
import { type Route, SENT, workspaceRoute } from './route';

const tag = 'Team';

export const auditRoutes: Route[] = [
  workspaceRoute({
    method: 'get',
    path: '/audit',
    tag,
    summary: 'Who changed what, when, from where; before and after in the detail',
    permission: 'audit:read',
    query: auditQuerySchema,
    success: {
      status: 200,
      description: 'Newest first',
      schema: pageOf(auditEntrySchema),
      name: 'AuditPage',
    },
    handle: async ({ ctx, actor, query }) =>
      presentPage(await listAudit(ctx, actor, query), presentAuditEntry),
  }),
  workspaceRoute({
    method: 'get',
    path: '/audit.csv',
    tag,
    summary: 'The same as a file, all of it',
    permission: 'audit:read',
    query: auditFilterSchema,
    success: { status: 200, description: 'Newest first', binary: ['text/csv'] },
    handle: ({ ctx, actor, query, res }) => sendLines(res, auditCsv(allAudit(ctx, actor, query))),
  }),
];

async function sendLines(res: Response, lines: AsyncIterable<string>): Promise<typeof SENT> {
  res.attachment('audit.csv');
  res.setHeader('Content-Type', 'text/csv; charset=utf-8');
  await pipeline(Readable.from(lines), res);
  return SENT;
}
