/**
 * One declaration a route: the router (app.ts) makes of it the chain authenticate → authorise → validate → handle,
 * and openapi/document.ts its description, so that the two cannot differ.
 */
import type { Request, RequestHandler, Response } from 'express';
import type { z } from 'zod';
import type { Permission } from '@/shared/contracts/roles';
import type { Actor, Context, Person } from '../context';

export type Method = 'get' | 'post' | 'put' | 'patch' | 'delete';
/** Who may call: anybody, anybody signed in, or a member whose role grants the permission. */
export type Access = 'public' | 'signed-in' | Permission;

type Parsed<S> = S extends z.ZodType ? z.output<S> : undefined;
type Schema = z.ZodType | undefined;

export interface Call<P extends Schema, Q extends Schema, B extends Schema> {
  ctx: Context;
  params: Parsed<P>;
  query: Parsed<Q>;
  body: Parsed<B>;
  req: Request;
  res: Response;
}

/** What a success looks like. `binary` names the media types of an answer that is not JSON. */
export interface Success {
  status: 200 | 201 | 202 | 204;
  description: string;
  schema?: z.ZodType;
  /** Name of the schema in the document. */
  name?: string;
  binary?: string[];
}

interface Declaration<P extends Schema, Q extends Schema, B extends Schema> {
  method: Method;
  /** Express path below /api/v1, parameters as `:name`. */
  path: string;
  tag: string;
  summary: string;
  params?: P;
  query?: Q;
  body?: B;
  /** The body is multipart/form-data, read by the handler itself. */
  multipart?: z.ZodType;
  success: Success;
  /** Statuses beyond those that every route of its kind may answer. */
  failures?: Record<number, string>;
  before?: (ctx: Context) => RequestHandler[];
}

/** A declaration with its types erased, as the router and the document read it. */
export interface Route extends Declaration<Schema, Schema, Schema> {
  access: Access;
  run(
    call: Call<Schema, Schema, Schema>,
    who: { person: Person | null; actor: Actor | null },
  ): Promise<unknown>;
}

/** A handler answers the body of the success; `undefined` for none, `SENT` when it wrote the response itself. */
export const SENT = Symbol('sent');

/** Open to anybody. */
export function publicRoute<P extends Schema, Q extends Schema, B extends Schema>(
  declaration: Declaration<P, Q, B> & { handle(call: Call<P, Q, B>): Promise<unknown> },
): Route {
  const { handle, ...rest } = declaration;
  return { ...rest, access: 'public', run: (call) => handle(call) };
}

/** For anybody signed in, whatever the workspace. */
export function personRoute<P extends Schema, Q extends Schema, B extends Schema>(
  declaration: Declaration<P, Q, B> & {
    handle(call: Call<P, Q, B> & { person: Person }): Promise<unknown>;
  },
): Route {
  const { handle, ...rest } = declaration;
  return {
    ...rest,
    access: 'signed-in',
    run: (call, { person }) => handle({ ...(call as Call<P, Q, B>), person: person! }),
  };
}

/** For members of the workspace whose role grants `permission`. */
export function workspaceRoute<P extends Schema, Q extends Schema, B extends Schema>(
  declaration: Declaration<P, Q, B> & {
    permission: Permission;
    handle(call: Call<P, Q, B> & { actor: Actor }): Promise<unknown>;
  },
): Route {
  const { handle, permission, ...rest } = declaration;
  return {
    ...rest,
    access: permission,
    run: (call, { actor }) => handle({ ...(call as Call<P, Q, B>), actor: actor! }),
  };
}
