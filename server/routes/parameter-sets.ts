import { pageOf } from '@/shared/contracts/common';
import {
  parameterSetCreateSchema,
  parameterSetDetailSchema,
  parameterSetListQuerySchema,
  parameterSetPatchSchema,
  parameterSetSchema,
} from '@/shared/contracts/parameter-sets';
import { presentPage } from '../presenters/page';
import { presentSet, presentSetDetail } from '../presenters/parameter-set';
import { changeSet, createSet, getSet, listSets } from '../services/parameter-sets';
import { idParams } from './parts';
import { type Route, workspaceRoute } from './route';

const tag = 'Parameter sets';
const detail = { schema: parameterSetDetailSchema, name: 'ParameterSetDetail' };

export const parameterSetRoutes: Route[] = [
  workspaceRoute({
    method: 'get',
    path: '/parameter-sets',
    tag,
    summary: 'Parameter sets of the workspace',
    permission: 'workspace:read',
    query: parameterSetListQuerySchema,
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
    summary: 'Rename a set, or give it a vehicle',
    permission: 'set:draft',
    params: idParams,
    body: parameterSetPatchSchema,
    success: { status: 200, description: 'The set', ...detail },
    failures: { 409: 'The name is taken, or the vehicle is settled' },
    handle: async ({ ctx, actor, params, body }) =>
      presentSetDetail(await changeSet(ctx, actor, params.id, body)),
  }),
];
