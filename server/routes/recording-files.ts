import { decodedQuerySchema, healthFileSchema } from '@/shared/contracts/recording-files';
import { decodedArrow, decodedCsv, healthFile } from '../services/recording-files';
import { idParams } from './parts';
import { type Route, SENT, workspaceRoute } from './route';
import { sendFile } from './send-file';

const tag = 'Recordings';
const ARROW = 'application/vnd.apache.arrow.file';
const failures = { 409: 'Not decoded' };

export const recordingFileRoutes: Route[] = [
  workspaceRoute({
    method: 'get',
    path: '/recordings/:id/decoded.arrow',
    tag,
    summary: 'The decoded columns as an Arrow IPC file; names carry the units',
    permission: 'export:read',
    params: idParams,
    query: decodedQuerySchema,
    success: { status: 200, description: 'The file', binary: [ARROW] },
    failures,
    handle: async ({ ctx, actor, params, query, res }) =>
      sendFile(res, ARROW, await decodedArrow(ctx, actor, params.id, query.channel)),
  }),
  workspaceRoute({
    method: 'get',
    path: '/recordings/:id/decoded.csv',
    tag,
    summary: 'The decoded columns as CSV; headers carry the units, missing values are empty',
    permission: 'export:read',
    params: idParams,
    query: decodedQuerySchema,
    success: { status: 200, description: 'The file', binary: ['text/csv'] },
    failures,
    handle: async ({ ctx, actor, params, query, res }) =>
      sendFile(res, 'text/csv; charset=utf-8', await decodedCsv(ctx, actor, params.id, query.channel)),
  }),
  workspaceRoute({
    method: 'get',
    path: '/recordings/:id/health.json',
    tag,
    summary: 'The health report as a file, with the hashes of what it rests on',
    permission: 'export:read',
    params: idParams,
    success: { status: 200, description: 'The report', schema: healthFileSchema, name: 'HealthFile' },
    failures,
    handle: async ({ ctx, actor, params, res }) => {
      const { body, fileName } = await healthFile(ctx, actor, params.id);
      res.attachment(fileName);
      res.json(body);
      return SENT;
    },
  }),
];
