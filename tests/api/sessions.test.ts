/** Where one is signed in, and signing out elsewhere. */
import type { SignedInSession } from '@/shared/contracts/accounts';
import { type Api, type Caller, startApi, until } from '../support/api';
import { buildMember, signIn } from '../support/api-factories';
import { connectLive } from '../support/api-live';

describe('sessions', () => {
  let api: Api;
  beforeAll(async () => {
    api = await startApi();
  });
  afterAll(() => api.stop());

  const sessions = async (caller: Caller) =>
    ((await caller.get('/sessions')).body as { items: SignedInSession[] }).items;

  it('are listed with where and when, without what would open them', async () => {
    const here = await buildMember(api, 'viewer');
    const there = await signIn(api, here.email);
    const listed = await sessions(here);
    expect(listed.map(({ current }) => current).sort()).toEqual([false, true]);
    expect(listed[0]).toMatchObject({ address: expect.stringContaining('127.0.0.1'), browser: 'node' });
    expect(Date.parse(listed[0]!.startedAt!)).toBeLessThanOrEqual(Date.now());
    const secret = decodeURIComponent(there.cookie.split('=')[1]!).slice(2).split('.')[0]!;
    expect(JSON.stringify(listed)).not.toContain(secret);
    const other = await buildMember(api, 'viewer', here.workspaceId);
    expect(await sessions(other)).toHaveLength(1);
  });

  it('are ended one by one, or all but one’s own, with what hangs on them', async () => {
    const here = await buildMember(api, 'viewer');
    const [second, third] = [await signIn(api, here.email), await signIn(api, here.email)];
    const live = await connectLive(third);
    const own = (await sessions(second)).find(({ current }) => current)!;
    expect((await here.delete(`/sessions/${own.id}`)).status).toBe(204);
    expect((await second.get('/me')).status).toBe(401);
    expect((await third.get('/me')).status).toBe(200);
    expect((await here.delete(`/sessions/${own.id}`)).status).toBe(404);
    expect((await here.delete('/sessions')).status).toBe(204);
    expect((await third.get('/me')).status).toBe(401);
    await until('the live connection ends', () => !live.socket.connected);
    expect(await sessions(here)).toHaveLength(1);
  });

  it('of somebody else cannot be ended', async () => {
    const [one, other] = [await buildMember(api, 'admin'), await buildMember(api, 'viewer')];
    const [{ id }] = (await sessions(other)) as [SignedInSession];
    expect((await one.delete(`/sessions/${id}`)).status).toBe(404);
    expect((await other.get('/me')).status).toBe(200);
  });
});
