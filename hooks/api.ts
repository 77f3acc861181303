/** The REST client: base path, workspace and CSRF headers, problem+json turned into a typed error, uploads with progress. */
import {
  API_PREFIX,
  CSRF_HEADER,
  WORKSPACE_HEADER,
  problemSchema,
  type FieldError,
  type Problem,
} from '@/shared/contracts/common';

/** A refusal by the server, with its plain sentence; `errors` names the fields. */
export class ApiProblem extends Error {
  readonly status: number;
  readonly type: string;
  readonly title: string;
  readonly errors: readonly FieldError[];

  constructor(problem: Problem) {
    super(problem.detail || problem.title);
    this.name = 'ApiProblem';
    this.status = problem.status;
    this.type = problem.type;
    this.title = problem.title;
    this.errors = problem.errors ?? [];
  }
}

/** The server did not answer at all. */
export class NetworkProblem extends Error {
  constructor() {
    super('The server does not answer. Check the connection; what is on the screen is kept. Then try again.');
    this.name = 'NetworkProblem';
  }
}

let workspaceId: string | null = null;
let onSignedOut: () => void = () => undefined;

/** Names the workspace of every later request; null leaves it to the server. */
export function setApiWorkspace(id: string | null) {
  workspaceId = id;
}
/** Called when an answer says that the session is over. */
export function setSignedOutHandler(handler: () => void) {
  onSignedOut = handler;
}

export interface RequestOptions {
  method?: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
  body?: unknown;
  query?: Record<string, string | number | boolean | undefined>;
  signal?: AbortSignal;
  /** A 401 is an answer here, not the end of a session (GET /me, POST /sessions). */
  anonymous?: boolean;
}

/** JSON in, JSON out; 204 gives undefined. */
export async function api<T>(path: string, options: RequestOptions = {}): Promise<T> {
  const response = await send(path, options);
  if (response.status === 204) return undefined as T;
  return (await response.json()) as T;
}

/** For binary answers: a run's series as an encoded frame. */
export async function apiBytes(path: string, options: RequestOptions = {}): Promise<ArrayBuffer> {
  return (await send(path, options)).arrayBuffer();
}

/** Address of a route, for downloads by link. */
export function apiUrl(path: string, query: RequestOptions['query'] = {}): string {
  const given = Object.entries(query).filter(([, value]) => value !== undefined && value !== '');
  const text = new URLSearchParams(given.map(([key, value]) => [key, String(value)])).toString();
  return API_PREFIX + path + (text ? `?${text}` : '');
}

/** Address of a file that the browser fetches by itself: the workspace goes along, as no header can. */
export const downloadUrl = (path: string, query: RequestOptions['query'] = {}): string =>
  apiUrl(path, { ...query, workspace: workspaceId ?? undefined });

export interface Upload<T> {
  done: Promise<T>;
  cancel: () => void;
}

/** A multipart POST with progress in bytes. `cancel` makes `done` fail with an AbortError. */
export function apiUpload<T>(
  path: string,
  form: FormData,
  onProgress: (sent: number, total: number) => void,
): Upload<T> {
  const request = new XMLHttpRequest();
  const done = new Promise<T>((resolve, reject) => {
    request.open('POST', apiUrl(path));
    for (const [name, value] of Object.entries(stateHeaders())) request.setRequestHeader(name, value);
    request.upload.onprogress = (event) => onProgress(event.loaded, event.total);
    request.onload = () => {
      if (request.status >= 200 && request.status < 300) resolve(JSON.parse(request.responseText) as T);
      else reject(refusal(request.status, request.responseText, false));
    };
    request.onerror = () => reject(new NetworkProblem());
    request.onabort = () => reject(new DOMException('The upload was cancelled.', 'AbortError'));
    request.send(form);
  });
  return { done, cancel: () => request.abort() };
}

async function send(path: string, options: RequestOptions): Promise<Response> {
  const { method = 'GET', body, query, signal, anonymous = false } = options;
  const headers: Record<string, string> = method === 'GET' ? workspaceHeader() : stateHeaders();
  if (body !== undefined) headers['Content-Type'] = 'application/json';
  let response: Response;
  try {
    response = await fetch(apiUrl(path, query), {
      method,
      headers,
      body: body === undefined ? undefined : JSON.stringify(body),
      credentials: 'same-origin',
      signal,
    });
  } catch (error) {
    if (signal?.aborted) throw error;
    throw new NetworkProblem();
  }
  if (response.ok) return response;
  throw refusal(response.status, await response.text(), anonymous);
}

function workspaceHeader(): Record<string, string> {
  return workspaceId ? { [WORKSPACE_HEADER]: workspaceId } : {};
}
function stateHeaders(): Record<string, string> {
  return { ...workspaceHeader(), [CSRF_HEADER]: '1' };
}

function refusal(status: number, text: string, anonymous: boolean): ApiProblem {
  if (status === 401 && !anonymous) onSignedOut();
  return new ApiProblem(parseProblem(text) ?? unknownProblem(status));
}

function parseProblem(text: string): Problem | null {
  try {
    const parsed = problemSchema.safeParse(JSON.parse(text));
    return parsed.success ? parsed.data : null;
  } catch {
    return null; // not JSON: a proxy's page, say
  }
}

function unknownProblem(status: number): Problem {
  return {
    type: 'urn:driftwright:problem:unknown',
    title: 'Unexpected answer',
    status,
    detail: `The server answered ${status} without saying why. Try again in a moment.`,
  };
}
