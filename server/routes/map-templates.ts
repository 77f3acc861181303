import { idSchema, pageOf, pageQuerySchema } from '@/shared/contracts/common';
import { mapTemplateInputSchema, mapTemplateSchema } from '@/shared/contracts/map-templates';
import { presentTemplate } from '../presenters/map-template';
import { presentPage } from '../presenters/page';
import { createTemplate, deleteTemplate, listTemplates } from '../services/map-templates';
import { idParams } from './parts';
import { type Route, workspaceRoute } from './route';

const tag = 'Vehicles';

export const mapTemplateRoutes: Route[] = [
  workspaceRoute({
    method: 'get',
    path: '/vehicles/:id/map-templates',
    tag,
    summary: 'Channel maps kept with a vehicle',
    permission: 'workspace:read',
    params: idParams,
    query: pageQuerySchema.omit({ search: true }),
    success: {
      status: 200,
      description: 'Newest first',
      schema: pageOf(mapTemplateSchema),
      name: 'MapTemplatePage',
    },
    handle: async ({ ctx, actor, params, query }) =>
      presentPage(await listTemplates(ctx, actor, params.id, query), presentTemplate),
  }),
  workspaceRoute({
    method: 'post',
    path: '/vehicles/:id/map-templates',
    tag,
    summary: 'Keep a channel map with a vehicle',
    permission: 'vehicle:write',
    params: idParams,
    body: mapTemplateInputSchema,
    success: { status: 201, description: 'The template', schema: mapTemplateSchema, name: 'MapTemplate' },
    failures: { 409: 'The name is taken' },
    handle: async ({ ctx, actor, params, body }) =>
      presentTemplate(await createTemplate(ctx, actor, params.id, body)),
  }),
  workspaceRoute({
    method: 'delete',
    path: '/vehicles/:id/map-templates/:templateId',
    tag,
    summary: 'Delete a template; recordings keep the map that they took from it',
    permission: 'vehicle:write',
    params: idParams.extend({ templateId: idSchema }),
    success: { status: 204, description: 'Deleted' },
    handle: ({ ctx, actor, params }) => deleteTemplate(ctx, actor, params.id, params.templateId),
  }),
];
