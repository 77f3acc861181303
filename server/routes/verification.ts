/** Verification of a version: its matrix, and waivers by cell. */
import { verificationSchema, waiverCreateSchema } from '@/shared/contracts/verification';
import { presentVerification } from '../presenters/verification';
import { getVerification, startVerification } from '../services/verification';
import { addWaiver } from '../services/waivers';
import { baseUrl, versionParams } from './parts';
import { type Route, workspaceRoute } from './route';

const tag = 'Verification';
const one = { schema: verificationSchema, name: 'Verification' };
const ONE = '/parameter-sets/:id/versions/:n';

export const verificationRoutes: Route[] = [
  workspaceRoute({
    method: 'get',
    path: `${ONE}/verification`,
    tag,
    summary: 'The verification matrix of the version, as it stands',
    permission: 'workspace:read',
    params: versionParams,
    success: { status: 200, description: 'The matrix', ...one },
    handle: async ({ ctx, actor, params: { id, n } }) =>
      presentVerification(await getVerification(ctx, actor, id, n)),
  }),
  workspaceRoute({
    method: 'post',
    path: `${ONE}/verify`,
    tag,
    summary: 'Verify: queue the runs that are missing, or whose inputs have changed',
    permission: 'run:create',
    params: versionParams,
    success: { status: 202, description: 'The matrix; look again for its progress', ...one },
    failures: { 409: 'No requirement applies' },
    handle: async ({ ctx, actor, params: { id, n }, req }) =>
      presentVerification(await startVerification(ctx, actor, id, n, baseUrl(ctx.config, req))),
  }),
  workspaceRoute({
    method: 'post',
    path: `${ONE}/waivers`,
    tag,
    summary: 'Waive a cell in writing, as it stands',
    permission: 'set:review',
    params: versionParams,
    body: waiverCreateSchema,
    success: { status: 201, description: 'The matrix with the waiver', ...one },
    failures: { 409: 'The version is not in review, or the cell needs no waiver' },
    handle: async ({ ctx, actor, params: { id, n }, body }) =>
      presentVerification(await addWaiver(ctx, actor, id, n, body)),
  }),
];
