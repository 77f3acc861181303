import type { SinkMessage } from '@/shared/contracts/accounts';
import { type Api, type Caller, problemOf, startApi, until } from '../support/api';
import { buildMember, buildUser, PASSWORD, signIn } from '../support/api-factories';

describe('an empty installation', () => {
  let api: Api;
  beforeAll(async () => {
    api = await startApi();
  });
  afterAll(() => api.stop());

  const input = {
    email: 'Ada@KelmarHaven.example',
    password: PASSWORD,
    name: 'Ada Brink',
    workspaceName: 'Harbour crew',
  };

  it('makes one first admin, also when two people ask at once, and never another', async () => {
    const stranger = api.stranger();
    expect((await stranger.get('/installation')).body).toMatchObject({ needsFirstAdmin: true, demo: false });
    const rivals = [api.stranger(), api.stranger()];
    const answers = await Promise.all(
      rivals.map((rival, i) =>
        rival.post('/installation/first-admin', { ...input, email: `ada${i}@kelmar.example` }),
      ),
    );
    expect(answers.map((answer) => answer.status).sort()).toEqual([201, 409]);
    expect(await api.ctx.db.User.count()).toBe(1);
    expect(await api.ctx.db.Workspace.count()).toBe(1);
    expect((await stranger.get('/installation')).body).toMatchObject({ needsFirstAdmin: false });
    expect((await stranger.post('/installation/first-admin', input)).status).toBe(409);
    const winner = rivals[answers.findIndex((answer) => answer.status === 201)];
    expect((await winner?.get('/me'))?.body).toMatchObject({
      workspaces: [{ name: 'Harbour crew', role: 'admin' }],
    });
  });
});

describe('sign-in', () => {
  let api: Api;
  beforeAll(async () => {
    api = await startApi({ SIGN_IN_ATTEMPTS: '4' });
  });
  afterAll(() => api.stop());

  it('knows the person by the cookie until they sign out', async () => {
    const member = await buildMember(api, 'engineer');
    expect((await member.get('/me')).body).toMatchObject({ user: { email: member.email } });
    expect((await member.delete('/sessions/current')).status).toBe(204);
    const after = await member.get('/me');
    expect(after.status).toBe(401);
    expect(problemOf(after).detail).toMatch(/sign in/i);
  });

  it('takes the address in any case and gives a cookie that scripts and other sites cannot have', async () => {
    const user = await buildUser(api);
    const caller = api.stranger();
    const answer = await caller.post('/sessions', {
      email: ` ${user.email.toUpperCase()} `,
      password: PASSWORD,
    });
    expect(answer.status).toBe(201);
    const cookie = answer.headers.getSetCookie().join();
    expect(cookie).toMatch(/HttpOnly/);
    expect(cookie).toMatch(/SameSite=Lax/);
  });

  it('gives a fresh session id, so that one known before is worth nothing', async () => {
    const member = await buildMember(api, 'engineer');
    const before = member.cookie;
    await member.post('/sessions', { email: member.email, password: PASSWORD });
    expect(member.cookie).not.toBe(before);
    const thief = api.stranger();
    thief.cookie = before;
    expect((await thief.get('/me')).status).toBe(401);
  });

  it('says the same for an unknown address as for a wrong password', async () => {
    const user = await buildUser(api);
    const wrong = await api.stranger().post('/sessions', { email: user.email, password: 'not-the-password' });
    const unknown = await api.stranger().post('/sessions', { email: 'nobody@kelmar.example', password: 'x' });
    expect([wrong.status, unknown.status]).toEqual([401, 401]);
    expect(unknown.body).toEqual(wrong.body);
  });

  it('slows down guessing for one address, and leaves other people alone', async () => {
    const user = await buildUser(api);
    const guess = () => api.stranger().post('/sessions', { email: user.email, password: 'wrong-guess-1' });
    const statuses = [];
    for (let i = 0; i < 5; i++) statuses.push((await guess()).status);
    expect(statuses).toEqual([401, 401, 401, 401, 429]);
    const limited = await guess();
    expect(problemOf(limited).type).toBe('urn:driftwright:problem:too-many-attempts');
    expect(Number(limited.headers.get('Retry-After'))).toBeGreaterThan(0);
    const right = await api.stranger().post('/sessions', { email: user.email, password: PASSWORD });
    expect(right.status).toBe(429);
    const other = await buildUser(api);
    expect((await api.stranger().post('/sessions', { email: other.email, password: PASSWORD })).status).toBe(
      201,
    );
  });

  it('refuses an ended session, whatever ended it', async () => {
    const member = await buildMember(api, 'engineer');
    await api.ctx.db.sequelize.query("UPDATE sessions SET expire = now() - interval '1 second'");
    const expired = await member.get('/vehicles');
    expect(expired.status).toBe(401);
    expect(problemOf(expired).detail).toContain('your session has ended');
    const forged = api.stranger();
    forged.cookie = 'driftwright.sid=s%3Aforged.signature';
    expect((await forged.get('/me')).status).toBe(401);
  });
});

describe('requests from other sites', () => {
  let api: Api;
  let member: Caller;
  beforeAll(async () => {
    api = await startApi();
    member = await buildMember(api, 'engineer');
  });
  afterAll(() => api.stop());
  const body = { name: 'Crawler 1' };

  it.each([
    ['without the header that a form cannot send', { 'X-Driftwright': '' }],
    ['from another origin', { Origin: 'https://elsewhere.example' }],
    ['from a page without an origin of its own', { Origin: 'null' }],
    ['that the browser marks as cross-site', { 'Sec-Fetch-Site': 'cross-site' }],
    ['that the browser marks as a sibling’s', { 'Sec-Fetch-Site': 'same-site' }],
  ])('are refused %s', async (_how, headers) => {
    const answer = await member.send('POST', '/vehicles', body, headers);
    expect(answer.status).toBe(403);
    expect(problemOf(answer).type).toBe('urn:driftwright:problem:cross-site');
    expect(await api.ctx.db.Vehicle.count()).toBe(0);
  });

  it('are refused at sign-in as well', async () => {
    const headers = { Origin: 'https://elsewhere.example' };
    const answer = await api
      .stranger()
      .send('POST', '/sessions', { email: 'a@b.example', password: 'x' }, headers);
    expect(answer.status).toBe(403);
  });

  it('are told apart from the page’s own', async () => {
    const headers = { Origin: api.url, 'Sec-Fetch-Site': 'same-origin' };
    expect((await member.send('POST', '/vehicles', body, headers)).status).toBe(201);
  });
});

describe('a forgotten password', () => {
  let api: Api;
  beforeAll(async () => {
    api = await startApi();
  });
  afterAll(() => api.stop());

  const resetLink = async (admin: Caller, email: string) => {
    const letter = await until('the letter arrives', async () => {
      const { items } = (await admin.get('/mail')).body as { items: SinkMessage[] };
      return items.find((message) => message.to === email);
    });
    return /reset-password\?token=([\w-]+)/.exec(letter.text)?.[1] ?? '';
  };

  it('is set anew by a link that works once and ends every session', async () => {
    const admin = await buildMember(api, 'admin');
    const member = await buildMember(api, 'engineer', admin.workspaceId);
    expect((await api.stranger().post('/password-resets', { email: member.email })).status).toBe(202);
    const token = await resetLink(admin, member.email);
    const complete = { token, password: 'new-moon-harbour' };
    expect((await api.stranger().post('/password-resets/complete', complete)).status).toBe(204);
    expect((await member.get('/me')).status).toBe(401);
    expect((await api.stranger().post('/password-resets/complete', complete)).status).toBe(404);
    const old = await api.stranger().post('/sessions', { email: member.email, password: PASSWORD });
    expect(old.status).toBe(401);
    await expect(signIn(api, member.email, 'new-moon-harbour')).resolves.toBeDefined();
    expect((await admin.get('/me')).status).toBe(200);
  });

  it('answers the same for an address that nobody has, and sends nothing', async () => {
    const before = await api.ctx.db.MailMessage.count();
    const answer = await api.stranger().post('/password-resets', { email: 'nobody@kelmar.example' });
    expect(answer.status).toBe(202);
    expect(await api.ctx.db.MailMessage.count()).toBe(before);
  });

  it('refuses a link that has run out, and keeps only the token’s hash', async () => {
    const admin = await buildMember(api, 'admin');
    await api.stranger().post('/password-resets', { email: admin.email });
    const token = await resetLink(admin, admin.email);
    const stored = await api.ctx.db.PasswordReset.findAll({ where: { userId: admin.userId } });
    expect(stored.map((reset) => reset.tokenHash)).not.toContain(token);
    await api.ctx.db.PasswordReset.update({ expiresAt: new Date(0) }, { where: { userId: admin.userId } });
    const answer = await api.stranger().post('/password-resets/complete', { token, password: PASSWORD });
    expect(answer.status).toBe(404);
    expect(problemOf(answer).detail).toContain('run out');
  });

  it('refuses a short password and says which field', async () => {
    const answer = await api
      .stranger()
      .post('/password-resets/complete', { token: 'x'.repeat(30), password: 'short' });
    expect(answer.status).toBe(422);
    expect(problemOf(answer).errors).toEqual([{ path: 'password', message: 'At least 10 characters.' }]);
  });
});

describe('bodies that cannot be read', () => {
  let api: Api;
  beforeAll(async () => {
    api = await startApi();
  });
  afterAll(() => api.stop());

  const raw = (body: string, type: string) =>
    fetch(`${api.url}/api/v1/sessions`, { method: 'POST', headers: { 'Content-Type': type }, body });

  it('broken JSON is 400, another media type 415, too much 413', async () => {
    expect((await raw('{"email":', 'application/json')).status).toBe(400);
    expect((await raw('email=a', 'text/plain')).status).toBe(415);
    expect((await raw(JSON.stringify({ email: 'x'.repeat(5_000_000) }), 'application/json')).status).toBe(
      413,
    );
  });

  it('a path that no route has is a problem, too', async () => {
    const answer = await api.stranger().get('/nothing-here');
    expect(answer.status).toBe(404);
    expect(problemOf(answer).detail).toContain('/nothing-here');
  });
});
