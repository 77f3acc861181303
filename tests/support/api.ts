/** A server in this process on a database of its own, and callers of it. */
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { loadConfig } from '@/server/config';
import { type RunningServer, startServer } from '@/server/start';
import {
  API_PREFIX,
  CSRF_HEADER,
  type Problem,
  problemSchema,
  WORKSPACE_HEADER,
} from '@/shared/contracts/common';
import { SESSION_COOKIE } from '@/server/middleware/session';
import { createDatabase } from './database';

/** For a machine that is busy with other things: no test here waits on a clock. */
jest.setTimeout(120_000);

export interface Api extends RunningServer {
  dataDir: string;
  databaseUrl: string;
  /** Nobody, signed in nowhere. */
  stranger(): Caller;
}

/** Starts one; `env` overrides the configuration. Stop it in afterAll. */
export async function startApi(env: Record<string, string> = {}): Promise<Api> {
  const database = await createDatabase();
  const api = await startApiOn(database.url, env);
  return {
    ...api,
    async stop() {
      await api.stop();
      await database.drop();
    },
  };
}

/** The same on a database that somebody else looks after. */
export async function startApiOn(databaseUrl: string, env: Record<string, string> = {}): Promise<Api> {
  const dataDir = fs.mkdtempSync(path.join(os.tmpdir(), 'driftwright-api-'));
  const server = await startServer(loadConfig(apiEnvironment(databaseUrl, dataDir, env)));
  return {
    ...server,
    dataDir,
    databaseUrl,
    stranger: () => new Caller(server.url),
    async stop() {
      await server.stop();
      fs.rmSync(dataDir, { recursive: true, force: true });
    },
  };
}

export const apiEnvironment = (databaseUrl: string, dataDir: string, env: Record<string, string> = {}) => ({
  DATABASE_URL: databaseUrl,
  DATA_DIR: dataDir,
  PORT: '0',
  DEMO: 'off',
  WORKERS: '1',
  LOG_LEVEL: 'silent',
  CLIENT_DIR: path.join(dataDir, 'client'),
  WORKER_ENTRY: process.env.WORKER_ENTRY,
  SIGN_IN_ATTEMPTS: '1000',
  ...env,
});

export interface Answer {
  status: number;
  headers: Headers;
  /** Parsed JSON; undefined where there is none. */
  body: unknown;
  bytes: Buffer;
}

/** Somebody with a cookie jar. */
export class Caller {
  cookie = '';
  workspaceId: string | null = null;

  constructor(readonly url: string) {}

  /** Any request, with what a browser page of ours would send along. */
  async send(
    method: string,
    route: string,
    body?: unknown,
    headers: Record<string, string> = {},
  ): Promise<Answer> {
    const isForm = body instanceof FormData;
    const response = await fetch(this.url + API_PREFIX + route, {
      method,
      headers: {
        ...(this.cookie ? { Cookie: this.cookie } : {}),
        [CSRF_HEADER]: '1',
        ...(this.workspaceId ? { [WORKSPACE_HEADER]: this.workspaceId } : {}),
        ...(body === undefined || isForm ? {} : { 'Content-Type': 'application/json' }),
        ...headers,
      },
      ...(body === undefined ? {} : { body: isForm ? body : JSON.stringify(body) }),
    });
    this.keepCookie(response.headers.getSetCookie());
    const bytes = Buffer.from(await response.arrayBuffer());
    const isJson = response.headers.get('Content-Type')?.includes('json') && bytes.length > 0;
    const parsed: unknown = isJson ? JSON.parse(bytes.toString('utf8')) : undefined;
    return { status: response.status, headers: response.headers, body: parsed, bytes };
  }

  get = (route: string) => this.send('GET', route);
  post = (route: string, body?: unknown) => this.send('POST', route, body);
  put = (route: string, body?: unknown) => this.send('PUT', route, body);
  patch = (route: string, body?: unknown) => this.send('PATCH', route, body);
  delete = (route: string) => this.send('DELETE', route);

  private keepCookie(given: string[]): void {
    const own = given.find((cookie) => cookie.startsWith(`${SESSION_COOKIE}=`));
    if (own) this.cookie = own.split(';')[0] ?? '';
  }
}

/** The problem of a refusal; checks its media type and form on the way. */
export function problemOf(answer: Answer): Problem {
  expect(answer.headers.get('Content-Type')).toMatch(/^application\/problem\+json/);
  const problem = problemSchema.parse(answer.body);
  expect(problem.status).toBe(answer.status);
  expect(problem.type).toMatch(/^urn:driftwright:problem:[a-z-]+$/);
  return problem;
}

/** Repeats `look` until it answers something; fails after `limitMs`. */
export async function until<T>(
  what: string,
  look: () => Promise<T | null | undefined | false> | T | null | undefined | false,
  limitMs = 60_000,
): Promise<T> {
  const deadline = Date.now() + limitMs;
  for (;;) {
    const seen = await look();
    if (seen) return seen;
    if (Date.now() > deadline) throw new Error(`Waited ${limitMs} ms in vain: ${what}.`);
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
}
