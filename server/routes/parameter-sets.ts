import { z } from 'zod';
import { idSchema, nameSchema, pageOf, pageQuerySchema } from '@/shared/contracts/common';
import {
  parameterSetCreateSchema,
  parameterSetDetailSchema,
  parameterSetSchema,
  versionCreateSchema,
  versionSchema,
} from '@/shared/contracts/parameter-sets';
import { presentPage } from '../presenters/page';
import { presentSet, presentSetDetail, presentVersion } from '../presenters/parameter-set';
import {
  createSet,
  createVersion,
  getSet,
  getVersion,
  listSets,
  renameSet,
} from '../services/parameter-sets';
import { idParams } from './parts';
import { type Route, workspaceRoute } from './route';

const tag = 'Parameter sets';
const detail = { schema: parameterSetDetailSchema, name: 'ParameterSetDetail' };
const version = { schema: versionSchema, name: 'ParameterSetVersion' };
const versionParams = z.object({ id: idSchema, n: z.coerce.number().int().positive() });

export const parameterSetRoutes: Route[] = [
  workspaceRoute({
    method: 'get',
    path: '/parameter-sets',
    tag,
    summary: 'Parameter sets of the workspace',
    permission: 'workspace:read',
    query: pageQuerySchema,
    success: {
      status: 200,
      description: 'Newest first',
      schema: pageOf(parameterSetSchema),
      name: 'ParameterSetPage',
    },
    handle: async ({ ctx, actor, query }) => presentPage(await listSets(ctx, actor, query), presentSet),
  }),
  workspaceRoute({
    method: 'post',
    path: '/parameter-sets',
    tag,
    summary: 'Make a set with its first version',
    permission: 'set:draft',
    body: parameterSetCreateSchema,
    success: { status: 201, description: 'The set', ...detail },
    failures: { 409: 'The name is taken' },
    handle: async ({ ctx, actor, body }) => presentSetDetail(await createSet(ctx, actor, body)),
  }),
  workspaceRoute({
    method: 'get',
    path: '/parameter-sets/:id',
    tag,
    summary: 'One set with its versions',
    permission: 'workspace:read',
    params: idParams,
    success: { status: 200, description: 'The set', ...detail },
    handle: async ({ ctx, actor, params }) => presentSetDetail(await getSet(ctx, actor, params.id)),
  }),
  workspaceRoute({
    method: 'patch',
    path: '/parameter-sets/:id',
    tag,
    summary: 'Rename a set',
    permission: 'set:draft',
    params: idParams,
    body: z.object({ name: nameSchema }),
    success: { status: 200, description: 'The set', ...detail },
    failures: { 409: 'The name is taken' },
    handle: async ({ ctx, actor, params, body }) =>
      presentSetDetail(await renameSet(ctx, actor, params.id, body.name)),
  }),
  workspaceRoute({
    method: 'post',
    path: '/parameter-sets/:id/versions',
    tag,
    summary: 'Save a further version, a draft',
    permission: 'set:draft',
    params: idParams,
    body: versionCreateSchema,
    success: { status: 201, description: 'The version', ...version },
    handle: async ({ ctx, actor, params, body }) =>
      presentVersion(await createVersion(ctx, actor, params.id, body)),
  }),
  workspaceRoute({
    method: 'get',
    path: '/parameter-sets/:id/versions/:n',
    tag,
    summary: 'One version',
    permission: 'workspace:read',
    params: versionParams,
    success: { status: 200, description: 'The version', ...version },
    handle: async ({ ctx, actor, params }) =>
      presentVersion(await getVersion(ctx, actor, params.id, params.n)),
  }),
];
