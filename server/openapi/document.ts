/** OpenAPI 3.1 made from the very declarations that the router serves. */
import {
  extendZodWithOpenApi,
  OpenAPIRegistry,
  OpenApiGeneratorV31,
  type ResponseConfig,
  type ZodMediaTypeObject,
} from '@asteasolutions/zod-to-openapi';
import { z } from 'zod';
import { API_PREFIX, CSRF_HEADER, problemSchema, WORKSPACE_HEADER } from '@/shared/contracts/common';
import { scopesCan, tokenScopeSchema } from '@/shared/contracts/roles';
import { ROUTES } from '../routes';
import type { Route } from '../routes/route';
import { VERSION } from '../version';

extendZodWithOpenApi(z);

let made: ReturnType<OpenApiGeneratorV31['generateDocument']> | undefined;

/** Made at the first call and kept. */
export function openApiDocument() {
  made ??= generate();
  return made;
}

function generate() {
  const registry = new OpenAPIRegistry();
  const problem = {
    description: 'Why not',
    content: { 'application/problem+json': { schema: problemSchema } },
  };
  registry.registerComponent('securitySchemes', 'session', {
    type: 'apiKey',
    in: 'cookie',
    name: 'driftwright.sid',
    description: `Set by POST /sessions. Requests that change something carry the header ${CSRF_HEADER} (any value) with it.`,
  });
  registry.registerComponent('securitySchemes', 'token', {
    type: 'http',
    scheme: 'bearer',
    description: 'An API token made by an admin; its scopes say what it may do.',
  });
  for (const route of ROUTES) registerRoute(registry, route, problem);
  return new OpenApiGeneratorV31(registry.definitions).generateDocument({
    openapi: '3.1.0',
    info: {
      title: 'Driftwright',
      version: VERSION,
      description:
        'SI units, with the unit in the name. Failures are application/problem+json (RFC 9457) with a stable type. ' +
        'Every time is in seconds on the recording’s own axis.',
    },
    servers: [{ url: API_PREFIX }],
  });
}

function registerRoute(registry: OpenAPIRegistry, route: Route, problem: ResponseConfig): void {
  const { method, path, tag, summary, params, query, access } = route;
  const asObject = (schema: z.ZodType | undefined) => (schema ? { schema: schema as z.ZodObject } : null);
  registry.registerPath({
    method,
    path: path.replace(/:(\w+)/g, '{$1}'),
    tags: [tag],
    summary,
    description: who(route),
    operationId: operationId(route),
    security: securityOf(access),
    request: {
      ...(params ? { params: asObject(params)!.schema } : {}),
      ...(query ? { query: asObject(query)!.schema } : {}),
      ...(inWorkspace(route) ? { headers: workspaceHeader } : {}),
      ...bodyOf(route),
    },
    responses: { ...successOf(route), ...failuresOf(route, problem) },
  });
}

/** Tokens are for what some scope grants. */
function securityOf(access: Route['access']): Record<string, string[]>[] {
  if (access === 'public') return [];
  const byToken =
    access !== 'signed-in' && tokenScopeSchema.options.some((scope) => scopesCan([scope], access));
  return byToken ? [{ session: [] }, { token: [] }] : [{ session: [] }];
}

const inWorkspace = ({ access }: Route) => access !== 'public' && access !== 'signed-in';
const workspaceHeader = z.object({
  [WORKSPACE_HEADER]: z.uuid().optional().describe('May be left out by a member of one workspace alone.'),
});

const who = ({ access }: Route) =>
  access === 'public'
    ? 'Open to anybody.'
    : access === 'signed-in'
      ? 'For anybody signed in.'
      : `Needs ${access}.`;

/** `get /runs/:id/track.kml` → `getRunsByIdTrackKml`. */
function operationId({ method, path }: Route): string {
  const words = path.split(/[/.-]/).filter(Boolean).map((word) => (word.startsWith(':') ? `by-${word.slice(1)}` : word)); // prettier-ignore
  return [method, ...words].join('-').replace(/-(\w)/g, (_, letter: string) => letter.toUpperCase());
}

function bodyOf({ body, multipart }: Route) {
  if (multipart)
    return { body: { required: true, content: { 'multipart/form-data': { schema: MULTIPART } } } };
  return body ? { body: { required: true, content: { 'application/json': { schema: body } } } } : {};
}

/** Files have no JSON schema of their own: written out by hand, the rest comes from the contract. */
const MULTIPART: ZodMediaTypeObject['schema'] = {
  type: 'object',
  required: ['imu', 'gnss', 'meta'],
  properties: {
    imu: { type: 'string', format: 'binary', description: 'IMU log' },
    gnss: { type: 'string', format: 'binary', description: 'GNSS log' },
    reference: { type: 'string', format: 'binary', description: 'Reference trajectory' },
    meta: { type: 'string', description: 'JSON: name, vehicleId?, channelMap?' },
  },
};

function successOf({ success }: Route): Record<string, ResponseConfig> {
  const { status, description, schema, binary } = success;
  if (binary) {
    const file = { schema: { type: 'string', format: 'binary' } } as const;
    return { [status]: { description, content: Object.fromEntries(binary.map((type) => [type, file])) } };
  }
  return {
    [status]: schema ? { description, content: { 'application/json': { schema } } } : { description },
  };
}

function failuresOf({ access, params, query, body, failures = {} }: Route, problem: ResponseConfig) {
  const usual: [number, string, boolean][] = [
    [401, 'Not signed in', access !== 'public'],
    [403, 'The role does not allow it', access !== 'public' && access !== 'signed-in'],
    [404, 'Not in this workspace', params !== undefined],
    [422, 'Some of what was sent is not valid', Boolean(params ?? query ?? body)],
    [503, 'The database does not answer', true],
  ];
  const own = Object.entries(failures).map(
    ([status, description]) => [Number(status), description, true] as const,
  );
  const all = [...usual, ...own].filter(([, , applies]) => applies);
  return Object.fromEntries(all.map(([status, description]) => [status, { ...problem, description }]));
}
