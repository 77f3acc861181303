/** API tokens: scoped, kept as hashes, revocable, audited under their own names. */
import type { AuditEntry } from '@/shared/contracts/accounts';
import type { Run } from '@/shared/contracts/runs';
import type { TokenScope } from '@/shared/contracts/roles';
import { type Token, type TokenCreated, tokenCreatedSchema } from '@/shared/contracts/tokens';
import { API_PREFIX } from '@/shared/contracts/common';
import { hashToken } from '@/server/services/secrets';
import { type Api, type Answer, problemOf, startApi } from '../support/api';
import { buildMember, buildRecording, buildVehicle, decoded, uploadForm } from '../support/api-factories';
import { buildDraft } from '../support/api-verification';

describe('API tokens', () => {
  let api: Api;
  let admin: Awaited<ReturnType<typeof buildMember>>;
  let count = 0;
  beforeAll(async () => {
    api = await startApi();
    admin = await buildMember(api, 'admin');
  });
  afterAll(() => api.stop());

  const make = async (scopes: TokenScope[], overrides: object = {}): Promise<TokenCreated> => {
    const answer = await admin.post('/tokens', { name: `Build ${++count}`, scopes, ...overrides });
    expect(answer.status).toBe(201);
    return tokenCreatedSchema.parse(answer.body);
  };
  /** Without cookie, without the headers that a page of ours sends. */
  const as = (token: string) => {
    const caller = api.stranger();
    return (method: string, route: string, body?: unknown): Promise<Answer> =>
      caller.send(method, route, body, { Authorization: `Bearer ${token}`, 'X-Driftwright': '' });
  };
  const listed = async () => ((await admin.get('/tokens')).body as { items: Token[] }).items;

  it('are told once, kept as a hash, and say when they were used last', async () => {
    const { token, id, ...made } = await make(['released-set:read']);
    expect(made).toMatchObject({ prefix: token.slice(0, 10), state: 'active', lastUsedAt: null });
    expect(token).toMatch(/^dwt_[\w-]{43}$/);
    const row = await api.ctx.db.ApiToken.findByPk(id, { rejectOnEmpty: true });
    expect(row.tokenHash).toBe(hashToken(token));
    expect(JSON.stringify(row)).not.toContain(token);
    expect((await admin.get('/tokens')).bytes.toString()).not.toContain(token);
    await as(token)('GET', `/vehicles/${id}/released-set`);
    const used = (await listed()).find((one) => one.id === id);
    expect(used?.lastUsedAt).not.toBeNull();
    expect(used?.lastUsedFrom).toMatch(/127\.0\.0\.1/);
    const year = Date.parse(made.expiresAt!) - Date.parse(made.createdAt);
    expect(Math.round(year / 86_400_000)).toBe(365);
  });

  it('do what their scopes say, and nothing else', async () => {
    const engineer = await buildMember(api, 'engineer', admin.workspaceId);
    const approver = await buildMember(api, 'approver', admin.workspaceId);
    const vehicle = await buildVehicle(engineer);
    const { path } = await buildDraft(engineer, vehicle.id);
    await engineer.post(`${path}/submit`);
    const withoutRequirements = 'None is agreed for this vehicle yet.';
    await approver.post(`${path}/release`, { withoutRequirements });

    const integrator = as((await make(['released-set:read'])).token);
    const set = await integrator('GET', `/vehicles/${vehicle.id}/released-set?format=c`);
    expect(set.status).toBe(200);
    expect(set.bytes.toString()).toContain('#define NAV_PARAMETERS_RELEASED 1');
    const refused = await integrator('GET', `${path}/export`);
    expect(refused.status).toBe(403);
    expect(problemOf(refused)).toMatchObject({ type: 'urn:driftwright:problem:out-of-scope' });
    expect((await integrator('GET', '/vehicles')).status).toBe(403);
    expect((await integrator('GET', '/me')).status).toBe(403);
    expect((await as((await make(['export:read'])).token)('GET', `${path}/export`)).status).toBe(200);
    const all: TokenScope[] = ['workspace:read', 'recording:write', 'run:create', 'export:read'];
    const most = as((await make(all)).token);
    for (const [method, route] of [
      ['POST', `${path}/release`],
      ['POST', `${path}/comments`],
      ['GET', '/tokens'],
      ['POST', '/tokens'],
      ['GET', '/audit'],
      ['DELETE', `${path}`],
    ] as const) {
      expect([route, (await most(method, route, method === 'POST' ? {} : undefined)).status]).toEqual([
        route,
        403,
      ]);
    }
  });

  it('upload and run, audited under their own name', async () => {
    const { name, token, id } = await make(['recording:write', 'run:create', 'workspace:read']);
    const logger = as(token);
    const uploaded = await logger('POST', '/recordings', uploadForm({ name: 'From the field' }));
    expect(uploaded.status).toBe(201);
    const recording = await decoded(admin, (uploaded.body as { id: string }).id);
    expect((await logger('GET', `/recordings/${recording.id}`)).body).toMatchObject({ status: 'ready' });
    const run = await logger('POST', '/runs', { recordingId: recording.id });
    expect(run.status).toBe(202);
    expect((await logger('GET', `/runs/${(run.body as Run).id}`)).status).toBe(200);
    const { items } = (await admin.get('/audit?search=recording.uploaded')).body as { items: AuditEntry[] };
    expect(items[0]).toMatchObject({
      actor: `Token “${name}”`,
      subject: 'From the field',
      detail: { tokenId: id },
    });
  });

  it('open nothing once they are revoked, have run out, or their maker has left', async () => {
    const look = (token: string) => as(token)('GET', '/vehicles');
    const revoked = await make(['workspace:read']);
    expect((await look(revoked.token)).status).toBe(200);
    expect((await admin.delete(`/tokens/${revoked.id}`)).status).toBe(204);
    expect((await admin.delete(`/tokens/${revoked.id}`)).status).toBe(404);
    const answer = await look(revoked.token);
    expect(answer.status).toBe(401);
    expect(problemOf(answer).type).toBe('urn:driftwright:problem:bad-token');
    expect(answer.headers.get('WWW-Authenticate')).toBe('Bearer');

    const old = await make(['workspace:read'], { expiresInDays: 1 });
    await api.ctx.db.ApiToken.update({ expiresAt: new Date(0) }, { where: { id: old.id } });
    expect((await look(old.token)).status).toBe(401);
    const states = new Map((await listed()).map(({ id, state }) => [id, state]));
    expect([states.get(revoked.id), states.get(old.id)]).toEqual(['revoked', 'expired']);

    const leaver = await buildMember(api, 'admin', admin.workspaceId);
    const theirs = tokenCreatedSchema.parse(
      (await leaver.post('/tokens', { name: 'Theirs', scopes: ['workspace:read'] })).body,
    );
    expect((await look(theirs.token)).status).toBe(200);
    await admin.delete(`/members/${leaver.userId}`);
    expect((await look(theirs.token)).status).toBe(401);
    expect((await look('dwt_nonsense')).status).toBe(401);
    expect((await look('')).status).toBe(401);
  });

  it('act in their workspace alone, and are no way around a cookie’s rules', async () => {
    const elsewhere = await buildMember(api, 'admin');
    const { token } = await make(['workspace:read', 'run:create', 'recording:write']);
    const vehicle = await buildVehicle(elsewhere);
    expect((await as(token)('GET', `/vehicles/${vehicle.id}`)).status).toBe(404);
    const named = await fetch(`${api.url}${API_PREFIX}/vehicles`, {
      headers: { Authorization: `Bearer ${token}`, 'X-Workspace': elsewhere.workspaceId },
    });
    expect(named.status).toBe(404);
    // A cookie beside a bad token counts for nothing.
    const mixed = await admin.send('GET', '/vehicles', undefined, { Authorization: 'Bearer dwt_nonsense' });
    expect(mixed.status).toBe(401);
    expect((await admin.send('GET', '/vehicles', undefined, { Authorization: 'Basic eA==' })).status).toBe(
      200,
    );
    const recording = await buildRecording(admin);
    const run = await as(token)('POST', '/runs', { recordingId: recording.id });
    expect(run.status).toBe(202); // no cookie, so no header against cross-site forms is asked for
  });

  it('are managed by admins, with names that tell them apart', async () => {
    const engineer = await buildMember(api, 'engineer', admin.workspaceId);
    expect((await engineer.get('/tokens')).status).toBe(403);
    const { name, id } = await make(['workspace:read']);
    const again = await admin.post('/tokens', { name, scopes: ['workspace:read'] });
    expect(problemOf(again)).toMatchObject({ status: 409, errors: [{ path: 'name' }] });
    await admin.delete(`/tokens/${id}`);
    expect((await admin.post('/tokens', { name, scopes: ['workspace:read'] })).status).toBe(201);
    for (const scopes of [[], ['everything'], ['run:create', 'run:create']]) {
      const refused = await admin.post('/tokens', { name: 'x', scopes });
      expect(problemOf(refused).errors?.[0]?.path).toMatch(/^scopes/);
    }
    const foreign = await buildMember(api, 'admin');
    expect((await foreign.delete(`/tokens/${id}`)).status).toBe(404);
  });
});
