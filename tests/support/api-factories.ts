/** Rows for API tests: each test makes its own. Everything may be overridden. */
import { randomUUID } from 'node:crypto';
import type { Role } from '@/shared/contracts/roles';
import type { Recording } from '@/shared/contracts/recordings';
import { recordingSchema } from '@/shared/contracts/recordings';
import { hashPassword } from '@/server/services/secrets';
import { type Api, type Caller, until } from './api';
import { type Logs, smallLogs } from './api-logs';

export const PASSWORD = 'lighthouse-22';
let hash: Promise<string> | undefined;

const short = () => randomUUID().slice(0, 8);

export async function buildUser(api: Api, overrides: { email?: string; name?: string } = {}) {
  hash ??= hashPassword(PASSWORD);
  const tag = short();
  return api.ctx.db.User.create({
    email: `person-${tag}@kelmarhaven.example`,
    name: `Person ${tag}`,
    passwordHash: await hash,
    ...overrides,
  });
}

export const buildWorkspace = (api: Api, overrides: { name?: string } = {}) =>
  api.ctx.db.Workspace.create({ name: `Workspace ${short()}`, ...overrides });

/** Somebody signed in, member of `workspaceId` (left out: of a new workspace) in `role`. */
export async function buildMember(
  api: Api,
  role: Role,
  workspaceId?: string,
): Promise<Caller & { userId: string; email: string; workspaceId: string }> {
  const user = await buildUser(api);
  const workspace = workspaceId ?? (await buildWorkspace(api)).id;
  await api.ctx.db.Membership.create({ workspaceId: workspace, userId: user.id, role });
  const caller = await signIn(api, user.email);
  return Object.assign(caller, { userId: user.id, email: user.email, workspaceId: workspace });
}

export async function signIn(api: Api, email: string, password = PASSWORD): Promise<Caller> {
  const caller = api.stranger();
  const answer = await caller.post('/sessions', { email, password });
  if (answer.status !== 201) throw new Error(`Sign-in was answered ${answer.status}.`);
  return caller;
}

export async function buildVehicle(
  caller: Caller,
  overrides: object = {},
): Promise<{ id: string; name: string }> {
  const answer = await caller.post('/vehicles', { name: `Crawler ${short()}`, ...overrides });
  expect(answer.status).toBe(201);
  return answer.body as { id: string; name: string };
}

/** The multipart body of an upload; `logs` overrides its parts. */
export function uploadForm(meta: object = {}, logs: Partial<Logs> = {}): FormData {
  const form = new FormData();
  form.set('meta', JSON.stringify({ name: `Breakwater ${short()}`, ...meta }));
  for (const [role, text] of Object.entries({ ...smallLogs(), ...logs })) {
    if (text !== undefined) form.set(role, new Blob([new Uint8Array(Buffer.from(text))]), `${role}.csv`);
  }
  return form;
}

export async function upload(
  caller: Caller,
  meta: object = {},
  logs: Partial<Logs> = {},
): Promise<Recording> {
  const answer = await caller.post('/recordings', uploadForm(meta, logs));
  if (answer.status !== 201) throw new Error(`Upload was answered ${answer.status}: ${answer.bytes}`);
  return recordingSchema.parse(answer.body);
}

/** Waits until decoding has come to an end, whichever. */
export function decoded(caller: Caller, id: string): Promise<Recording> {
  return until('the recording is decoded', async () => {
    const recording = recordingSchema.parse((await caller.get(`/recordings/${id}`)).body);
    return recording.status !== 'uploaded' && recording.status !== 'decoding' && recording;
  });
}

/** A recording that is ready to run. */
export async function buildRecording(caller: Caller, meta: object = {}): Promise<Recording> {
  const recording = await decoded(caller, (await upload(caller, meta)).id);
  expect(recording.status).toBe('ready');
  return recording;
}
