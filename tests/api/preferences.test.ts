import type { Me } from '@/shared/contracts/accounts';
import { preferencesSchema } from '@/shared/contracts/preferences';
import { type Api, problemOf, startApi } from '../support/api';
import { buildMember } from '../support/api-factories';

describe('preferences', () => {
  let api: Api;
  beforeAll(async () => {
    api = await startApi();
  });
  afterAll(() => api.stop());

  it('begin empty and are kept with the person, piece by piece', async () => {
    const viewer = await buildMember(api, 'viewer');
    const mine = async () => ((await viewer.get('/me')).body as Me).preferences;
    expect(await mine()).toEqual({ units: {}, letters: {}, hintsSeen: [] });
    const units = { angleRandomWalk: 'rad/√s', length: 'ft' };
    const answer = await viewer.patch('/me/preferences', { units });
    expect(answer.status).toBe(200);
    expect(preferencesSchema.parse(answer.body)).toEqual({ units, letters: {}, hintsSeen: [] });
    await viewer.patch('/me/preferences', { hintsSeen: ['bench'] });
    expect(await mine()).toEqual({ units, letters: {}, hintsSeen: ['bench'] });
    await viewer.patch('/me/preferences', { units: {} });
    expect(await mine()).toEqual({ units: {}, letters: {}, hintsSeen: ['bench'] });
    const other = await buildMember(api, 'viewer', viewer.workspaceId);
    expect(((await other.get('/me')).body as Me).preferences).toEqual({
      units: {},
      letters: {},
      hintsSeen: [],
    });
  });

  it('two changes at once both hold', async () => {
    const viewer = await buildMember(api, 'viewer');
    await Promise.all([
      viewer.patch('/me/preferences', { units: { speed: 'kn' } }),
      viewer.patch('/me/preferences', { hintsSeen: ['sets'] }),
    ]);
    expect(((await viewer.get('/me')).body as Me).preferences).toEqual({
      units: { speed: 'kn' },
      letters: {},
      hintsSeen: ['sets'],
    });
  });

  it('refuse a unit that the quantity does not have, and what is not known', async () => {
    const viewer = await buildMember(api, 'viewer');
    const wrong = await viewer.patch('/me/preferences', { units: { speed: 'furlong' } });
    expect(wrong.status).toBe(422);
    expect(problemOf(wrong).errors?.[0]?.path).toBe('units.speed');
    for (const body of [
      { units: { mass: 'kg' } },
      { hintsSeen: ['moon'] },
      { theme: 'night' },
      { letters: { invitation: false } },
      { letters: { released: 'no' } },
    ])
      expect((await viewer.patch('/me/preferences', body)).status).toBe(422);
    expect((await api.stranger().patch('/me/preferences', {})).status).toBe(401);
  });

  it('that a later version no longer knows count as not made', async () => {
    const viewer = await buildMember(api, 'viewer');
    const preferences = { units: { mass: 'kg' } };
    await api.ctx.db.User.update({ preferences }, { where: { id: viewer.userId } });
    expect(((await viewer.get('/me')).body as Me).preferences).toEqual({
      units: {},
      letters: {},
      hintsSeen: [],
    });
  });
});
