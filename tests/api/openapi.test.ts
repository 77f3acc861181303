import type { Express } from 'express';
import type { ILayer } from 'express-serve-static-core';
import { createApp } from '@/server/app';
import { openSessions } from '@/server/middleware/session';
import { ROUTES } from '@/server/routes';
import { type Api, startApi } from '../support/api';

interface Document {
  openapi: string;
  paths: Record<string, Record<string, Operation>>;
}
interface Operation {
  operationId: string;
  security: unknown[];
  parameters?: { name: string; in: string }[];
  requestBody?: unknown;
  responses: Record<string, { content?: Record<string, unknown> }>;
}

describe('the OpenAPI document', () => {
  let api: Api;
  let document: Document;
  beforeAll(async () => {
    api = await startApi();
    document = (await api.stranger().get('/openapi.json')).body as Document;
  });
  afterAll(() => api.stop());

  const described = () =>
    Object.entries(document.paths).flatMap(([path, operations]) =>
      Object.keys(operations).map((method) => `${method} ${path.replace(/\{(\w+)\}/g, ':$1')}`),
    );

  it('describes every route that the server has, and no other', async () => {
    const sessions = openSessions(api.ctx.config, api.ctx.log);
    const served = servedRoutes(createApp(api.ctx, sessions));
    expect(served.length).toBeGreaterThan(40);
    expect(described().sort()).toEqual(served.sort());
    await sessions.close();
  });

  it('names each operation once, and all that its path takes', () => {
    const operations = Object.entries(document.paths).flatMap(([path, methods]) =>
      Object.values(methods).map((operation) => ({ path, operation })),
    );
    const ids = operations.map(({ operation }) => operation.operationId);
    expect(new Set(ids).size).toBe(ids.length);
    for (const { path, operation } of operations) {
      const named = [...path.matchAll(/\{(\w+)\}/g)].map((match) => match[1]);
      const taken = (operation.parameters ?? []).filter((parameter) => parameter.in === 'path');
      expect(taken.map((parameter) => parameter.name)).toEqual(named);
    }
  });

  it('says which routes are open, and how each may fail', () => {
    for (const { method, path, access } of ROUTES) {
      const operation = document.paths[path.replace(/:(\w+)/g, '{$1}')]?.[method];
      const byToken = ['workspace:read', 'export:read', 'released-set:read', 'recording:write', 'run:create'];
      const ways = byToken.includes(access) ? [{ session: [] }, { token: [] }] : [{ session: [] }];
      expect(operation?.security).toEqual(access === 'public' ? [] : ways);
      if (access !== 'public') expect(Object.keys(operation?.responses ?? {})).toContain('401');
      const failures = Object.entries(operation?.responses ?? {}).filter(([status]) => Number(status) >= 400);
      for (const [, failure] of failures) {
        expect(Object.keys(failure.content ?? {})).toEqual(['application/problem+json']);
      }
    }
  });

  it('is OpenAPI 3.1, and carries the contract’s own descriptions of units', () => {
    expect(document.openapi).toBe('3.1.0');
    expect(JSON.stringify(document.paths['/runs'])).toContain('Angle random walk N_g, rad/√s.');
  });
});

/** What Express itself has registered in the API's router. */
function servedRoutes(app: Express): string[] {
  const [router] = app.router.stack.map(({ handle }): unknown => handle).filter(isRouter);
  const routes = (router?.stack ?? []).flatMap(({ route }) => (route ? [route] : []));
  return routes.flatMap(({ path, stack }) => [...new Set(stack.map(({ method }) => `${method} ${path}`))]);
}

const isRouter = (handle: unknown): handle is { stack: ILayer[] } =>
  typeof handle === 'function' && 'stack' in handle;
