import { pageOf } from '@/shared/contracts/common';
import {
  requirementInputSchema,
  requirementListQuerySchema,
  requirementPatchSchema,
  requirementSchema,
} from '@/shared/contracts/requirements';
import { presentPage } from '../presenters/page';
import { presentRequirement } from '../presenters/requirement';
import {
  changeRequirement,
  createRequirement,
  deleteRequirement,
  getRequirement,
  listRequirements,
} from '../services/requirements';
import { idParams } from './parts';
import { type Route, workspaceRoute } from './route';

const tag = 'Requirements';
const one = { schema: requirementSchema, name: 'Requirement' };

export const requirementRoutes: Route[] = [
  workspaceRoute({
    method: 'get',
    path: '/requirements',
    tag,
    summary: 'Requirements of the workspace',
    permission: 'workspace:read',
    query: requirementListQuerySchema,
    success: {
      status: 200,
      description: 'By name',
      schema: pageOf(requirementSchema),
      name: 'RequirementPage',
    },
    handle: async ({ ctx, actor, query }) =>
      presentPage(await listRequirements(ctx, actor, query), presentRequirement),
  }),
  workspaceRoute({
    method: 'post',
    path: '/requirements',
    tag,
    summary: 'Add a requirement',
    permission: 'requirement:write',
    body: requirementInputSchema,
    success: { status: 201, description: 'The requirement', ...one },
    failures: { 409: 'The name is taken' },
    handle: async ({ ctx, actor, body }) => presentRequirement(await createRequirement(ctx, actor, body)),
  }),
  workspaceRoute({
    method: 'get',
    path: '/requirements/:id',
    tag,
    summary: 'One requirement',
    permission: 'workspace:read',
    params: idParams,
    success: { status: 200, description: 'The requirement', ...one },
    handle: async ({ ctx, actor, params }) => presentRequirement(await getRequirement(ctx, actor, params.id)),
  }),
  workspaceRoute({
    method: 'patch',
    path: '/requirements/:id',
    tag,
    summary: 'Change a requirement; what was judged by it is out of date then',
    permission: 'requirement:write',
    params: idParams,
    body: requirementPatchSchema,
    success: { status: 200, description: 'The requirement', ...one },
    failures: { 409: 'The name is taken' },
    handle: async ({ ctx, actor, params, body }) =>
      presentRequirement(await changeRequirement(ctx, actor, params.id, body)),
  }),
  workspaceRoute({
    method: 'delete',
    path: '/requirements/:id',
    tag,
    summary: 'Delete a requirement',
    permission: 'requirement:write',
    params: idParams,
    success: { status: 204, description: 'Deleted' },
    handle: ({ ctx, actor, params }) => deleteRequirement(ctx, actor, params.id),
  }),
];
