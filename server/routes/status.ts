import { z } from 'zod';
import { healthSchema } from '@/shared/contracts/common';
import { openApiDocument } from '../openapi/document';
import { checkHealth } from '../services/health';
import { publicRoute, type Route } from './route';

const tag = 'Status';

export const statusRoutes: Route[] = [
  publicRoute({
    method: 'get',
    path: '/health',
    tag,
    summary: 'Whether the server and what it rests on are up',
    success: { status: 200, description: 'As things stand', schema: healthSchema, name: 'Health' },
    handle: ({ ctx }) => checkHealth(ctx),
  }),
  publicRoute({
    method: 'get',
    path: '/openapi.json',
    tag,
    summary: 'This description',
    success: { status: 200, description: 'OpenAPI 3.1', schema: z.record(z.string(), z.unknown()) },
    handle: async () => openApiDocument(),
  }),
];
