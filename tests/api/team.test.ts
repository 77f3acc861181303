import type { AuditEntry, Invitation, SinkMessage } from '@/shared/contracts/accounts';
import { type Api, type Caller, problemOf, startApi, until } from '../support/api';
import { buildMember, buildUser, PASSWORD } from '../support/api-factories';

const items = <T>(body: unknown) => (body as { items: T[] }).items;

describe('members', () => {
  let api: Api;
  beforeAll(async () => {
    api = await startApi();
  });
  afterAll(() => api.stop());

  it('are seen by everybody of the workspace, and of no other', async () => {
    const admin = await buildMember(api, 'admin');
    const viewer = await buildMember(api, 'viewer', admin.workspaceId);
    await buildMember(api, 'admin');
    const seen = items<{ email: string; role: string }>((await viewer.get('/members')).body);
    expect(seen.map(({ email, role }) => [email, role])).toEqual([
      [admin.email, 'admin'],
      [viewer.email, 'viewer'],
    ]);
  });

  it('get another role from an admin, at once', async () => {
    const admin = await buildMember(api, 'admin');
    const member = await buildMember(api, 'viewer', admin.workspaceId);
    expect((await member.post('/vehicles', { name: 'Crawler 1' })).status).toBe(403);
    const changed = await admin.patch(`/members/${member.userId}`, { role: 'engineer' });
    expect(changed.body).toMatchObject({ role: 'engineer', email: member.email });
    expect((await member.post('/vehicles', { name: 'Crawler 1' })).status).toBe(201);
  });

  it('never leave a workspace without an admin, also when two step down at once', async () => {
    const admin = await buildMember(api, 'admin');
    const alone = await admin.patch(`/members/${admin.userId}`, { role: 'viewer' });
    expect(alone.status).toBe(409);
    expect(problemOf(alone).detail).toContain('only admin');
    expect((await admin.delete(`/members/${admin.userId}`)).status).toBe(409);
    const second = await buildMember(api, 'admin', admin.workspaceId);
    const answers = await Promise.all([
      admin.patch(`/members/${admin.userId}`, { role: 'engineer' }),
      second.patch(`/members/${second.userId}`, { role: 'engineer' }),
    ]);
    expect(answers.map((answer) => answer.status).sort()).toEqual([200, 409]);
    const where = { workspaceId: admin.workspaceId, role: 'admin' };
    expect(await api.ctx.db.Membership.count({ where })).toBe(1);
  });

  it('are out at once when taken out', async () => {
    const admin = await buildMember(api, 'admin');
    const member = await buildMember(api, 'engineer', admin.workspaceId);
    expect((await admin.delete(`/members/${member.userId}`)).status).toBe(204);
    expect((await member.get('/vehicles')).status).toBe(404);
    expect((await admin.delete(`/members/${member.userId}`)).status).toBe(404);
  });

  it('of another workspace cannot be touched', async () => {
    const admin = await buildMember(api, 'admin');
    const stranger = await buildMember(api, 'engineer');
    expect((await admin.patch(`/members/${stranger.userId}`, { role: 'viewer' })).status).toBe(404);
    expect((await admin.delete(`/members/${stranger.userId}`)).status).toBe(404);
  });
});

describe('invitations', () => {
  let api: Api;
  beforeAll(async () => {
    api = await startApi();
  });
  afterAll(() => api.stop());

  const invite = async (admin: Caller, email: string, role = 'engineer') => {
    const answer = await admin.post('/invitations', { email, role });
    expect(answer.status).toBe(201);
    const letter = await until('the letter arrives', async () =>
      items<SinkMessage>((await admin.get('/mail')).body).find((message) => message.to === email),
    );
    const token = /invitation\?token=([\w-]+)/.exec(letter.text)?.[1] ?? '';
    return { invitation: answer.body as Invitation, token, letter };
  };

  it('make an account, a membership and a session, once', async () => {
    const admin = await buildMember(api, 'admin');
    const { token, letter } = await invite(admin, 'mira@kelmarhaven.example', 'approver');
    expect(letter.subject).toContain('invites you');
    expect(letter.text).toContain('approver');
    const guest = api.stranger();
    expect((await guest.get(`/invitations/${token}`)).body).toMatchObject({
      email: 'mira@kelmarhaven.example',
      role: 'approver',
      hasAccount: false,
    });
    const unnamed = await guest.post(`/invitations/${token}/accept`, { password: PASSWORD });
    expect(problemOf(unnamed).errors?.[0]?.path).toBe('name');
    const accepted = await guest.post(`/invitations/${token}/accept`, {
      name: 'Mira Sund',
      password: PASSWORD,
    });
    expect(accepted.status).toBe(201);
    expect(accepted.body).toMatchObject({ workspaces: [{ id: admin.workspaceId, role: 'approver' }] });
    expect((await guest.get('/me')).status).toBe(200);
    expect((await guest.get(`/invitations/${token}`)).status).toBe(404);
    expect(items((await admin.get('/invitations')).body)).toEqual([]);
  });

  it('ask a person who has an account for its password', async () => {
    const admin = await buildMember(api, 'admin');
    const known = await buildMember(api, 'viewer');
    const { token } = await invite(admin, known.email);
    const guest = api.stranger();
    expect((await guest.get(`/invitations/${token}`)).body).toMatchObject({ hasAccount: true });
    const wrong = await guest.post(`/invitations/${token}/accept`, { password: 'not-the-password' });
    expect(wrong.status).toBe(401);
    const right = await guest.post(`/invitations/${token}/accept`, { password: PASSWORD });
    expect((right.body as { workspaces: unknown[] }).workspaces).toHaveLength(2);
  });

  it('take the place of an older one to the same address, and can be withdrawn', async () => {
    const admin = await buildMember(api, 'admin');
    const user = await buildUser(api);
    const first = await invite(admin, user.email);
    expect((await admin.post('/invitations', { email: user.email, role: 'viewer' })).status).toBe(201);
    expect((await api.stranger().get(`/invitations/${first.token}`)).status).toBe(404);
    const [open] = items<Invitation>((await admin.get('/invitations')).body);
    expect(open?.role).toBe('viewer');
    expect((await admin.delete(`/invitations/${open?.id}`)).status).toBe(204);
    expect(items((await admin.get('/invitations')).body)).toEqual([]);
  });

  it('are refused for a member, and for anybody but an admin', async () => {
    const admin = await buildMember(api, 'admin');
    const engineer = await buildMember(api, 'engineer', admin.workspaceId);
    expect((await admin.post('/invitations', { email: engineer.email, role: 'viewer' })).status).toBe(409);
    expect((await engineer.post('/invitations', { email: 'x@kelmar.example', role: 'admin' })).status).toBe(
      403,
    );
    expect((await engineer.get('/mail')).status).toBe(403);
  });

  it('in the sink are for admins of the same workspace alone', async () => {
    const admin = await buildMember(api, 'admin');
    await invite(admin, 'guest-of-one@kelmarhaven.example');
    const other = await buildMember(api, 'admin');
    const seen = items<SinkMessage>((await other.get('/mail')).body);
    expect(seen.map((message) => message.to)).not.toContain('guest-of-one@kelmarhaven.example');
  });
});

describe('mail', () => {
  it('waits for a dead mail server, holds nobody up, and leaves when it is back', async () => {
    const silent = await startApi({ SMTP_URL: 'smtp://127.0.0.1:9' });
    const admin = await buildMember(silent, 'admin');
    const answer = await admin.post('/invitations', { email: 'later@kelmarhaven.example', role: 'viewer' });
    expect(answer.status).toBe(201);
    const letter = await until('it was tried in vain', () =>
      silent.ctx.db.MailMessage.findOne({
        where: { recipient: 'later@kelmarhaven.example', state: 'waiting' },
      }).then((row) => row && row.attempts > 0 && row),
    );
    expect(letter.lastError).toMatch(/ECONNREFUSED/);
    expect(letter.dueAt.getTime()).toBeGreaterThan(letter.createdAt.getTime());
    const gone = await admin.get('/mail');
    expect(gone.status).toBe(404);
    await silent.stop();
  });
});

describe('the audit trail', () => {
  let api: Api;
  beforeAll(async () => {
    api = await startApi();
  });
  afterAll(() => api.stop());

  it('tells an admin who changed what, page by page, and keeps to the workspace', async () => {
    const admin = await buildMember(api, 'admin');
    const engineer = await buildMember(api, 'engineer', admin.workspaceId);
    for (const name of ['Crawler 1', 'Crawler 2', 'Crawler 3']) await engineer.post('/vehicles', { name });
    await (await buildMember(api, 'engineer')).post('/vehicles', { name: 'Elsewhere' });
    const first = (await admin.get('/audit?limit=2')).body as { nextCursor: string };
    const second = (await admin.get(`/audit?limit=2&cursor=${first.nextCursor}`)).body;
    const seen = [...items<AuditEntry>(first), ...items<AuditEntry>(second)];
    expect(seen.map((entry) => entry.subject)).toEqual(['Crawler 3', 'Crawler 2', 'Crawler 1']);
    expect(new Set(seen.map((entry) => entry.action))).toEqual(new Set(['vehicle.created']));
    expect(items((await admin.get('/audit?search=crawler%202')).body)).toHaveLength(1);
    expect((await engineer.get('/audit')).status).toBe(403);
  });
});
