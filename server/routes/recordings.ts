import { z } from 'zod';
import { pageOf } from '@/shared/contracts/common';
import {
  baselineTrackQuerySchema,
  baselineTrackSchema,
  channelMapSchema,
  mapPreviewSchema,
  recordingListQuerySchema,
  recordingMetaSchema,
  recordingPatchSchema,
  recordingSchema,
  remedyRequestSchema,
  seriesQuerySchema,
  seriesSchema,
} from '@/shared/contracts/recordings';
import { noiseAnalysisSchema, noiseRequestSchema } from '@/shared/contracts/noise';
import { scenarioRequestSchema } from '@/shared/contracts/scenarios';
import { receiveUpload } from '../middleware/upload';
import { presentPage } from '../presenters/page';
import { presentRecording } from '../presenters/recording';
import { baselineTrack, recordingSeries } from '../services/recording-plots';
import {
  addRecording,
  addScenario,
  changeRecording,
  deleteRecording,
  getRecording,
  listRecordings,
  mapRecording,
  previewMap,
} from '../services/recordings';
import { cancelDecoding } from '../services/recording-cancel';
import { acceptRemedy, undoRemedy } from '../services/remedies';
import { sensorNoise } from '../services/sensor-noise';
import { idParams } from './parts';
import { type Route, workspaceRoute } from './route';

const tag = 'Recordings';
const one = { schema: recordingSchema, name: 'Recording' };
const file = z.file().optional();

export const recordingRoutes: Route[] = [
  workspaceRoute({
    method: 'get',
    path: '/recordings',
    tag,
    summary: 'Recordings of the workspace',
    permission: 'workspace:read',
    query: recordingListQuerySchema,
    success: { status: 200, description: 'A page', schema: pageOf(recordingSchema), name: 'RecordingPage' },
    handle: async ({ ctx, actor, query }) =>
      presentPage(await listRecordings(ctx, actor, query), presentRecording),
  }),
  workspaceRoute({
    method: 'post',
    path: '/recordings',
    tag,
    summary: 'Upload an IMU log and a GNSS log, and a reference trajectory if there is one',
    permission: 'recording:write',
    multipart: z.object({
      imu: z.file(),
      gnss: file.describe('Left out: the fixes are in the IMU log.'),
      imu2: file.describe('Accelerometer or gyro, where each has a log of its own.'),
      reference: file,
      aids: file.describe('Barometer, heading, odometer.'),
      meta: recordingMetaSchema,
    }),
    success: { status: 201, description: 'Kept; decoding follows', ...one },
    failures: {
      413: 'Larger than this server takes',
      415: 'Not multipart/form-data',
      507: 'The disk is full',
    },
    handle: ({ ctx, actor, req }) =>
      receiveUpload(ctx, req, async (meta, files) =>
        presentRecording(await addRecording(ctx, actor, meta, files)),
      ),
  }),
  workspaceRoute({
    method: 'post',
    path: '/scenarios',
    tag,
    summary: 'Make a simulated recording with exact truth',
    permission: 'recording:write',
    body: scenarioRequestSchema,
    success: { status: 201, description: 'Simulation and decoding follow', ...one },
    handle: async ({ ctx, actor, body }) => presentRecording(await addScenario(ctx, actor, body)),
  }),
  workspaceRoute({
    method: 'get',
    path: '/recordings/:id',
    tag,
    summary: 'One recording, with what the intake found',
    permission: 'workspace:read',
    params: idParams,
    success: { status: 200, description: 'The recording', ...one },
    handle: async ({ ctx, actor, params }) => presentRecording(await getRecording(ctx, actor, params.id)),
  }),
  workspaceRoute({
    method: 'patch',
    path: '/recordings/:id',
    tag,
    summary: 'Rename, annotate, or give it another vehicle (other axes decode it again)',
    permission: 'recording:write',
    params: idParams,
    body: recordingPatchSchema,
    success: { status: 200, description: 'The recording', ...one },
    handle: async ({ ctx, actor, params, body }) =>
      presentRecording(await changeRecording(ctx, actor, params.id, body)),
  }),
  workspaceRoute({
    method: 'delete',
    path: '/recordings/:id',
    tag,
    summary: 'Delete a recording with its runs',
    permission: 'recording:delete',
    params: idParams,
    success: { status: 204, description: 'Deleted' },
    failures: { 409: 'A submitted or released version rests on it' },
    handle: ({ ctx, actor, params }) => deleteRecording(ctx, actor, params.id),
  }),
  workspaceRoute({
    method: 'put',
    path: '/recordings/:id/channel-map',
    tag,
    summary: 'Say what the columns are, and decode again',
    permission: 'recording:write',
    params: idParams,
    body: channelMapSchema,
    success: { status: 202, description: 'Decoding follows', ...one },
    handle: async ({ ctx, actor, params, body }) =>
      presentRecording(await mapRecording(ctx, actor, params.id, body)),
  }),
  workspaceRoute({
    method: 'post',
    path: '/recordings/:id/cancel',
    tag,
    summary: 'Stop the decoding; the files are kept, and a channel map decodes them again',
    permission: 'recording:write',
    params: idParams,
    success: { status: 200, description: 'The recording as it stands now', ...one },
    failures: { 409: 'It is not being decoded' },
    handle: async ({ ctx, actor, params }) => presentRecording(await cancelDecoding(ctx, actor, params.id)),
  }),
  workspaceRoute({
    method: 'post',
    path: '/recordings/:id/map-preview',
    tag,
    summary: 'What a channel map makes of the first rows; changes nothing',
    permission: 'recording:write',
    params: idParams,
    body: channelMapSchema,
    success: { status: 200, description: 'The preview', schema: mapPreviewSchema, name: 'MapPreview' },
    failures: { 409: 'A newer preview took its place' },
    handle: ({ ctx, actor, params, body }) => previewMap(ctx, actor, params.id, body),
  }),
  workspaceRoute({
    method: 'post',
    path: '/recordings/:id/remedies',
    tag,
    summary: 'Accept a remedy of the health report, and decode again',
    permission: 'recording:write',
    params: idParams,
    body: remedyRequestSchema,
    success: { status: 202, description: 'Decoding follows', ...one },
    failures: { 409: 'Not decoded, or changed by somebody else' },
    handle: async ({ ctx, actor, params, body }) =>
      presentRecording(await acceptRemedy(ctx, actor, params.id, body.code)),
  }),
  workspaceRoute({
    method: 'post',
    path: '/recordings/:id/remedies/undo',
    tag,
    summary: 'Take the latest remedy back, and decode again',
    permission: 'recording:write',
    params: idParams,
    success: { status: 202, description: 'Decoding follows', ...one },
    failures: { 409: 'None is in force, or changed by somebody else' },
    handle: async ({ ctx, actor, params }) => presentRecording(await undoRemedy(ctx, actor, params.id)),
  }),
  workspaceRoute({
    method: 'get',
    path: '/recordings/:id/series',
    tag,
    summary: 'Thinned channels for plots; minima and maxima are kept',
    permission: 'workspace:read',
    params: idParams,
    query: seriesQuerySchema,
    success: { status: 200, description: 'The channels', schema: seriesSchema, name: 'Series' },
    failures: { 409: 'Not decoded' },
    handle: ({ ctx, actor, params, query }) => recordingSeries(ctx, actor, params.id, query),
  }),
  workspaceRoute({
    method: 'post',
    path: '/recordings/:id/noise',
    tag,
    summary: 'Allan analysis of a stretch at rest',
    permission: 'workspace:read',
    params: idParams,
    body: noiseRequestSchema,
    success: { status: 200, description: 'The noise', schema: noiseAnalysisSchema, name: 'NoiseAnalysis' },
    failures: { 409: 'Not decoded' },
    handle: ({ ctx, actor, params, body }) => sensorNoise(ctx, actor, params.id, body),
  }),
  workspaceRoute({
    method: 'get',
    path: '/recordings/:id/baseline-track',
    tag,
    summary: 'Track from GNSS alone: what there is without an IMU',
    permission: 'workspace:read',
    params: idParams,
    query: baselineTrackQuerySchema,
    success: { status: 200, description: 'The track', schema: baselineTrackSchema, name: 'BaselineTrack' },
    failures: { 409: 'Not decoded' },
    handle: ({ ctx, actor, params, query }) => baselineTrack(ctx, actor, params.id, query.points),
  }),
];
