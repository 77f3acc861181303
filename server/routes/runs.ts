import { z } from 'zod';
import { pageOf } from '@/shared/contracts/common';
import {
  runCreateSchema,
  runListItemSchema,
  runListQuerySchema,
  runSchema,
  runSeriesQuerySchema,
  solutionQuerySchema,
} from '@/shared/contracts/runs';
import type { RunExportJob } from '@/workers';
import { presentPage } from '../presenters/page';
import { presentRun, presentRunListItem } from '../presenters/run';
import { cancelRun, createRun, exportRun, getRun, listRuns, runSeries } from '../services/runs';
import { idParams } from './parts';
import { type Route, SENT, workspaceRoute } from './route';
import { sendFile } from './send-file';

const tag = 'Runs';
const one = { schema: runSchema, name: 'Run' };
const CSV = 'text/csv; charset=utf-8';

/** The files that a run can be fetched as. */
const TRACKS: { path: string; format: RunExportJob['format']; type: string; summary: string }[] = [
  {
    path: 'innovations.csv',
    format: 'innovations-csv',
    type: CSV,
    summary: 'Every measurement’s innovation',
  },
  { path: 'track.geojson', format: 'geojson', type: 'application/geo+json', summary: 'The track as GeoJSON' },
  {
    path: 'track.kml',
    format: 'kml',
    type: 'application/vnd.google-earth.kml+xml',
    summary: 'The track as KML',
  },
  { path: 'track.gpx', format: 'gpx', type: 'application/gpx+xml', summary: 'The track as GPX' },
];

export const runRoutes: Route[] = [
  workspaceRoute({
    method: 'post',
    path: '/runs',
    tag,
    summary: 'Run the filter over a recording',
    permission: 'run:create',
    body: runCreateSchema,
    success: { status: 202, description: 'Going; follow it on the socket or poll it', ...one },
    failures: { 409: 'The recording is not decoded' },
    handle: async ({ ctx, actor, body }) => ({
      ...presentRun(await createRun(ctx, actor, body)),
      createdBy: actor.name,
    }),
  }),
  workspaceRoute({
    method: 'get',
    path: '/runs',
    tag,
    summary: 'Runs of the workspace',
    permission: 'workspace:read',
    query: runListQuerySchema,
    success: { status: 200, description: 'Newest first', schema: pageOf(runListItemSchema), name: 'RunPage' },
    handle: async ({ ctx, actor, query }) =>
      presentPage(await listRuns(ctx, actor, query), presentRunListItem),
  }),
  workspaceRoute({
    method: 'get',
    path: '/runs/:id',
    tag,
    summary: 'One run, with its summary and provenance',
    permission: 'workspace:read',
    params: idParams,
    success: { status: 200, description: 'The run', ...one },
    handle: async ({ ctx, actor, params }) => presentRun(await getRun(ctx, actor, params.id)),
  }),
  workspaceRoute({
    method: 'post',
    path: '/runs/:id/cancel',
    tag,
    summary: 'Stop a run that is going',
    permission: 'run:create',
    params: idParams,
    success: { status: 200, description: 'The run as it stands now', ...one },
    handle: async ({ ctx, actor, params }) => presentRun(await cancelRun(ctx, actor, params.id)),
  }),
  workspaceRoute({
    method: 'get',
    path: '/runs/:id/series',
    tag,
    summary: 'The run’s curves, thinned, as one binary frame',
    permission: 'workspace:read',
    params: idParams,
    query: runSeriesQuerySchema,
    success: { status: 200, description: 'A frame', binary: ['application/octet-stream'] },
    failures: { 409: 'The series are not kept' },
    handle: async ({ ctx, actor, params, query, res }) => {
      const frame = await runSeries(ctx, actor, params.id, query);
      res
        .type('application/octet-stream')
        .send(Buffer.from(frame.buffer, frame.byteOffset, frame.byteLength));
      return SENT;
    },
  }),
  workspaceRoute({
    method: 'get',
    path: '/runs/:id/solution.csv',
    tag,
    summary: 'The solution at the IMU’s origin with the σ of every state',
    permission: 'export:read',
    params: idParams,
    query: solutionQuerySchema,
    success: { status: 200, description: 'The file', binary: ['text/csv'] },
    failures: { 409: 'The series are not kept' },
    handle: async ({ ctx, actor, params, query, res }) => {
      const options = { rateHz: query.rate ?? null, smoothed: query.smoothed === 'true' };
      return sendFile(res, CSV, await exportRun(ctx, actor, params.id, 'solution-csv', options));
    },
  }),
  ...TRACKS.map(({ path, format, type, summary }) =>
    workspaceRoute({
      method: 'get',
      path: `/runs/:id/${path}`,
      tag,
      summary,
      permission: 'export:read',
      params: idParams,
      query: z.object({}),
      success: { status: 200, description: 'The file', binary: [type.split(';')[0]!] },
      failures: { 409: 'The series are not kept' },
      handle: async ({ ctx, actor, params, res }) =>
        sendFile(res, type, await exportRun(ctx, actor, params.id, format)),
    }),
  ),
];
