/** Files for integrators: any version, and the released one of a vehicle. */
import type { Request, Response } from 'express';
import { exportQuerySchema } from '@/shared/contracts/exports';
import { type ExportedFile, exportReleased, exportVersion } from '../services/exports';
import { idParams, versionParams } from './parts';
import { type Route, SENT, workspaceRoute } from './route';

const tag = 'Exports';
const binary = ['application/json', 'application/yaml', 'text/x-c', 'text/csv'];

export const exportRoutes: Route[] = [
  workspaceRoute({
    method: 'get',
    path: '/parameter-sets/:id/versions/:n/export',
    tag,
    summary: 'A version as JSON, YAML, C header or CSV; one that is not released says so in its text',
    permission: 'export:read',
    params: versionParams,
    query: exportQuerySchema,
    success: { status: 200, description: 'The file', binary },
    handle: async ({ ctx, actor, params: { id, n }, query, req, res }) =>
      sendExport(req, res, await exportVersion(ctx, actor, id, n, query.format)),
  }),
  workspaceRoute({
    method: 'get',
    path: '/vehicles/:id/released-set',
    tag,
    summary: 'The released version for a vehicle; ETag and Last-Modified tell whether it is another one',
    permission: 'released-set:read',
    params: idParams,
    query: exportQuerySchema,
    success: { status: 200, description: 'The file', binary },
    failures: { 404: 'No such vehicle, or nothing is released for it' },
    handle: async ({ ctx, actor, params, query, req, res }) =>
      sendExport(req, res, await exportReleased(ctx, actor, params.id, query.format)),
  }),
];

/**
 * Answers 304 to who has it already. Not left to Express, which sends the whole again where the request says no-cache, as
 * fetch does by itself beside If-None-Match.
 */
function sendExport(req: Request, res: Response, file: ExportedFile): typeof SENT {
  const { body, type, fileName, etag, changedAt } = file;
  res.setHeader('ETag', etag);
  res.setHeader('Last-Modified', changedAt.toUTCString());
  if (hasIt(req, file)) {
    res.status(304).end();
    return SENT;
  }
  res.attachment(fileName);
  res.setHeader('Content-Type', type); // after the name, whose ending would choose another
  res.send(body);
  return SENT;
}

/** By RFC 9110, section 13.2.2: If-None-Match first, If-Modified-Since only without it. */
function hasIt(req: Request, { etag, changedAt }: ExportedFile): boolean {
  const known = req.get('If-None-Match');
  if (known !== undefined) {
    const tags = known.split(',').map((tag) => tag.trim().replace(/^W\//, ''));
    return tags.includes('*') || tags.includes(etag);
  }
  const since = Date.parse(req.get('If-Modified-Since') ?? '');
  return Math.floor(changedAt.getTime() / 1000) * 1000 <= since;
}
